import { render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { expect, test, vi } from 'vitest';
import { ForceRecords } from '../../../src/page/bench/ForceRecords.tsx';
import type { Edit } from '../../../src/session/edits.ts';
import { emptySession, type Session } from '../../../src/session/session.ts';

test('a chosen file becomes a force record of the session, word for word, and can be taken out again', async () => {
  let session: Session = emptySession();
  const change = vi.fn((_what: string, edit: Edit) => {
    session = edit(session);
  });
  const { rerender } = render(<ForceRecords records={[]} told={[]} change={change} />);
  const text = 'Time (ms);Force (N)\n0;0\n1;2\n';
  await userEvent.upload(screen.getByLabelText(/Force records of the taps/), new File([text], 'tap1.csv', { type: 'text/csv' }));
  await vi.waitFor(() => expect(session.forceRecords).toHaveLength(1));
  expect(session.forceRecords[0]).toMatchObject({ id: 'f1', name: 'tap1.csv', text });
  rerender(<ForceRecords records={session.forceRecords} told={[{ id: 'f1', name: 'tap1.csv', pulses: [{ impulse: { value: 1.2e-3, u: 1e-5 }, byContact: 1.25e-3, peak: 2, time: 0.001, after: 'ringing' }] }]} change={change} />);
  expect(screen.getByRole('listitem')).toHaveTextContent('tap1.csv: 1.200 ± 0.010 mN·s (ringing taken in)');
  await userEvent.click(screen.getByRole('button', { name: 'Take out force record tap1.csv' }));
  expect(session.forceRecords).toEqual([]);
});

test('a file that is no text is said so, and nothing is added', async () => {
  const change = vi.fn();
  render(<ForceRecords records={[]} told={[]} change={change} />);
  await userEvent.upload(screen.getByLabelText(/Force records of the taps/), new File([new Uint8Array([0x89, 0x50, 0x4e, 0x47, 1, 2])], 'picture.png'));
  expect(await screen.findByText(/PNG/)).toBeVisible();
  expect(change).not.toHaveBeenCalled();
});
