/** Before there are readings: what a guessed impulse bit would show on this bench, the taps to span it, and the place of a calibration mass. */
import { useMemo } from 'react';
import type { Problem } from '../../problems/problems.ts';
import type { Plan, ScaleEnd } from '../../reduction/plan.ts';
import type { Reduction } from '../../reduction/results.ts';
import { setEntry } from '../../session/edits.ts';
import { ENTRIES } from '../../session/entries.ts';
import type { EntryKind, EntryName } from '../../session/entries.ts';
import { useActions, useStore } from '../../store/hooks.tsx';
import { chooseUnit, plain } from '../../units/format.ts';
import { siUnit, unitNamed } from '../../units/units.ts';
import type { Unit } from '../../units/units.ts';
import { EntryField } from '../bench/EntryField.tsx';
import { PERCENT, PLAIN } from '../stated/numberWords.ts';
import { Quantity } from '../stated/Quantity.tsx';
import { SheetTable } from '../stated/SheetTable.tsx';
import { MassPlaces } from './MassPlaces.tsx';
import styles from './plan.module.css';

/** A guess bears no more digits. */
const DIGITS = 3;
const part = (value: number): string => plain(value, PERCENT, 2);
const impulse = (value: number): string => plain(value, chooseUnit([value], 'impulse'), DIGITS);
const angle = (value: number): string => plain(value, chooseUnit([value], 'angle'), DIGITS);

/** Wide swings are thought of in degrees. */
const DEGREES = unitNamed('°', 'angle') ?? siUnit('angle');

const NO_PROBLEMS: readonly Problem[] = [];
const PLANNED: readonly EntryName[] = ['guessedImpulse', 'scaleReach'];

export function PlanSection() {
  const { change } = useActions();
  const entries = useStore((state) => state.session.entries);
  const reduction = useStore((state) => state.reduction);
  const reads = useMemo(() => new Map(reduction?.entries.map((read) => [read.name, read])), [reduction]);
  const guessed = reads.get('guessedImpulse')?.value ?? null;
  return (
    <section id="plan" aria-labelledby="plan-heading" className={styles.section}>
      <h2 id="plan-heading" tabIndex={-1}>Before the pump goes on</h2>
      <p className={`quiet ${styles.lead}`}>
        From the bench above and an impulse bit that you guess: what a shot would show, before there is one. Nothing of this reaches the results.
      </p>
      <div className={styles.fields}>
        {PLANNED.map((name) => {
          const kind: EntryKind = ENTRIES[name];
          const read = reads.get(name);
          return (
            <EntryField
              key={name}
              name={name}
              kind={kind.dimension === 'reading' && read ? { ...kind, unit: read.unit } : kind}
              entry={entries[name]}
              read={read}
              problems={reduction?.problems.filter(({ place }) => place.entry === name) ?? NO_PROBLEMS}
              onChange={(patch) => change(kind.label.toLowerCase(), setEntry(name, patch), `entry.${name}`)}
            />
          );
        })}
      </div>
      {reduction?.plan ? <Planned plan={reduction.plan} reduction={reduction} />
        : guessed !== null && <p>The bench does not yet tell an impulse from a reading; what is missing is among the things to look at.</p>}
    </section>
  );
}

function Planned({ plan, reduction }: { readonly plan: Plan; readonly reduction: Reduction }) {
  const { taps, calibrationMass, least, expected } = plan;
  const unit = unitNamed(plan.unit, plan.dimension) ?? chooseUnit([expected?.reading.value ?? 0], plan.dimension);
  const shown = (reading: number): string => plain(reading, unit, DIGITS);
  return (
    <>
      <Shot plan={plan} reduction={reduction} unit={unit} />
      {least && (
        <p className={styles.words}>
          The smallest impulse bit that one shot shows: above {impulse(least.decision.impulse)} ({shown(least.decision.reading)}) a throw is more than its readings’ own scatter, wrongly so one time in
          twenty; from {impulse(least.detection.impulse)} ({shown(least.detection.reading)}) on it is seen nineteen times in twenty.
        </p>
      )}
      {least && least.guessSeen !== 'surely' && <p className="look">{least.guessSeen === 'no' ? 'A single shot of the guess would not be seen.' : 'A single shot of the guess would often be missed.'}</p>}
      {taps && (
        <SheetTable label="Taps that span the shots">
          <caption>Taps that span the shots <span>at the tap’s own lever arm, on the pendulum as tapped</span></caption>
          <thead><tr><th scope="col">Tap</th><th scope="col">Strike with</th><th scope="col">Reads about</th></tr></thead>
          <tbody>
            {taps.map((tap, index) => (
              <tr key={tap.impulse}><th scope="row" className="num">{index + 1}</th><td className="num">{impulse(tap.impulse)}</td><td className="num">{shown(tap.reading)}</td></tr>
            ))}
          </tbody>
        </SheetTable>
      )}
      {!taps && expected && <p className="quiet">With the lever arm of the tap the taps that would span the shots stand here.</p>}
      {calibrationMass && <MassPlaces mass={calibrationMass} />}
    </>
  );
}

const END: Readonly<Record<ScaleEnd, string>> = {
  scale: 'where the scale ends',
  radius: 'where the reading point stands level with the pivot',
  alongScale: 'where the pendulum runs along its scale',
  grazing: 'where the beam grazes its screen',
  upright: 'where the pendulum stands nearly upright',
  sides: 'where a swing is too wide to be read from side to side',
  smallSwings: 'where the film’s small swings end',
};

function Shot({ plan: { guessed, calibration, expected, fullScale, reading }, reduction, unit }: { readonly plan: Plan; readonly reduction: Reduction; readonly unit: Unit }) {
  const { plume, reported, damping } = reduction;
  const delivered = plume === 'caught' && reported === 'delivered';
  const shown = (value: number): string => plain(value, unit, DIGITS);
  return (
    <>
      <p className={styles.answer}>
        {expected === null ? <>A shot of {impulse(guessed.value)} is beyond what this bench can read.</>
          : <>A shot of {impulse(guessed.value)}{delivered && ' delivered to the target'} would read <Quantity value={expected.reading.value} spread={expected.reading.u} unit={unit} /></>}
      </p>
      {expected && (
        <p className={styles.words}>
          First swing {angle(expected.angle)}; ± is u, from the guess and the bench, calibrated by {calibration}.
          {damping?.way === 'none' && ' No damping is reckoned with: with some the throw is smaller, by 1.5 % for a damping ratio of 0.01.'}
          {expected.beyondScale && <strong> That is beyond the scale.</strong>}
        </p>
      )}
      {fullScale && (
        <p className={styles.words}>
          Full scale is {impulse(fullScale.impulse)}, {plain(fullScale.times, PLAIN, 2)} times the guess: {fullScale.reading !== null && `${shown(fullScale.reading)}, `}{plain(fullScale.angle, DEGREES, DIGITS)}, {END[fullScale.end]}.
        </p>
      )}
      {reading ? (
        <p className={styles.words}>
          Division and eye leave one throw open by u = {shown(reading.u)}, {part(reading.ofThrow)} of it. That makes {part(reading.ofImpulse)} of one shot’s impulse bit,
          and {part(reading.share)} of its variance; all in all u = {impulse(reading.shotU)}.
        </p>
      ) : expected && <p className="quiet">What the readings add, and the smallest impulse bit that can be seen, stand here once “{ENTRIES.division.label}” is typed.</p>}
    </>
  );
}
