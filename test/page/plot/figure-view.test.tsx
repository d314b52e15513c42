import { act, fireEvent, screen } from '@testing-library/react';
import { expect, test } from 'vitest';
import { RunStrip } from '../../../src/page/strip/RunStrip.tsx';
import { withReduction } from '../withReduction.tsx';

/** The surface that the plotter lays over its axes. */
function overlay(container: ParentNode): Element {
  const over = container.querySelector('.u-over');
  if (over === null) throw new Error('The figure is drawn');
  return over;
}

test('pointing at the figure reads the nearest record out, leaving it takes the readout away', async () => {
  await withReduction(<RunStrip />);
  fireEvent.pointerMove(overlay(document), { clientX: 1, clientY: 30 });
  expect(screen.getByText('Zero Z1')).toBeInTheDocument();
  fireEvent.pointerLeave(overlay(document));
  expect(screen.queryByText('Zero Z1')).toBe(null);
});

test('a click chooses the record and says so politely', async () => {
  const { store } = await withReduction(<RunStrip />);
  await act(async () => {
    fireEvent.click(overlay(document), { clientX: 1, clientY: 30 });
  });
  expect(store.state.getState().selected).toBe('s1/2');
  expect(screen.getByRole('status')).toHaveTextContent('Zero Z1');
});

test('a new reduction is drawn in place of the old one, not beside it', async () => {
  const { store } = await withReduction(<RunStrip />);
  await act(async () => store.actions.change('lever arm', (session) => ({ ...session, freeSwing: '1' })));
  expect(document.querySelectorAll('.u-over')).toHaveLength(1);
});
