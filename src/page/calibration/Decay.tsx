/** How the longest swing dies away, beside the damping that is taken from the swings. */
import { useMemo, useState } from 'react';
import type { Reduction } from '../../reduction/results.ts';
import { decayFigure } from '../../plots/decayFigure.ts';
import { recordName } from '../../plots/recordWords.ts';
import { useActions } from '../../store/hooks.tsx';
import { goToElement } from '../head/goTo.ts';
import { FigureView } from '../plot/FigureView.tsx';
import { useInks } from '../plot/useInks.ts';

export function Decay({ reduction: { decay, records } }: { readonly reduction: Reduction }) {
  const { select } = useActions();
  const [point, setPoint] = useState<string | null>(null);
  const inks = useInks();
  const record = records.find(({ id }) => id === decay?.record);
  const figure = useMemo(() => decay && decayFigure(decay, record === undefined ? 'Free swing typed on the bench' : `The longest swing, ${recordName(record)}`, inks), [decay, record, inks]);
  if (figure === null || decay === null) return null;
  const open = (): void => {
    if (decay.record === null) {
      goToElement('entry-freeSwing');
      return;
    }
    select(decay.record);
    goToElement('record');
  };
  return <FigureView figure={figure} inks={inks} selected={point} onSelect={setPoint} onOpen={open} />;
}
