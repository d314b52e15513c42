/** The calibration: the pendulum as fired and as tapped, its factor by geometry and by taps, and which of them counts. */
import { useMemo } from 'react';
import type { Reduction } from '../../reduction/results.ts';
import { tapsAndShots } from '../../plots/tapsAndShots.ts';
import { useActions, useStore } from '../../store/hooks.tsx';
import { goToElement } from '../head/goTo.ts';
import { FigureView } from '../plot/FigureView.tsx';
import { useInks } from '../plot/useInks.ts';
import { Adjustment } from './Adjustment.tsx';
import { CalibrationFactors } from './CalibrationFactors.tsx';
import { Configurations } from './Configurations.tsx';
import { Decay } from './Decay.tsx';
import { Masses } from './Masses.tsx';
import { SwingForm } from './SwingForm.tsx';
import { TapLine } from './TapLine.tsx';
import { TapsAgainst } from './TapsAgainst.tsx';
import styles from './calibration.module.css';

export function CalibrationSection() {
  const reduction = useStore((state) => state.reduction);
  return (
    <section id="calibration" className={styles.section} aria-labelledby="calibration-heading">
      <h2 id="calibration-heading">Calibration</h2>
      {reduction === null ? <p className="quiet">No readings yet.</p> : (
        <>
          <CalibrationFactors reduction={reduction} />
          <Adjustment reduction={reduction} />
          <TapsFigure reduction={reduction} />
          <TapLine reduction={reduction} />
          <TapsAgainst reduction={reduction} />
          <Masses reduction={reduction} />
          <Configurations reduction={reduction} />
          <Decay reduction={reduction} />
          <SwingForm reduction={reduction} />
        </>
      )}
    </section>
  );
}

function TapsFigure({ reduction }: { readonly reduction: Reduction }) {
  const selected = useStore((state) => state.selected);
  const { select } = useActions();
  const inks = useInks();
  const { records, chosen, calibrations, ranges, chosenFactor } = reduction;
  const figure = useMemo(() => tapsAndShots({ records, chosen, calibrations, ranges, chosenFactor }, inks), [records, chosen, calibrations, ranges, chosenFactor, inks]);
  if (figure.marks.length === 0) return null;
  return <FigureView figure={figure} inks={inks} selected={selected} onSelect={select} onOpen={() => goToElement('record')} />;
}
