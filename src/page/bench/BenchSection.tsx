/** The bench: the pendulum drawn to scale, and beside the drawing every quantity that was measured on it. */
import { useMemo, useState } from 'react';
import type { ReactNode } from 'react';
import type { Problem } from '../../problems/problems.ts';
import { sentence } from '../../problems/sentences.ts';
import { editOf } from '../../reduction/slipEdit.ts';
import { entriesInUse, GAUGE_UNIT, measuredDimension, usualReadingUnit } from '../../reduction/entries.ts';
import type { EntryRead, Reduction } from '../../reduction/results.ts';
import { setChoice, setEntry, setEntryInstrument, setFreeSwing, setPulseSamples } from '../../session/edits.ts';
import { ENTRIES } from '../../session/entries.ts';
import type { EntryKind, EntryName } from '../../session/entries.ts';
import type { Choices, Sheet } from '../../session/session.ts';
import { useActions, useStore } from '../../store/hooks.tsx';
import { AgreementTable } from './AgreementTable.tsx';
import styles from './bench.module.css';
import { BenchDrawing } from './BenchDrawing.tsx';
import { ChoiceField } from './ChoiceField.tsx';
import { CorrectionsGroup, PulseSamples } from './CorrectionsGroup.tsx';
import { EntryField } from './EntryField.tsx';
import { ForceRecords } from './ForceRecords.tsx';
import { FilmWords } from './FilmWords.tsx';
import { CAUTIONS, DAMPING_LAWS, DAMPING_WAYS, FORMS, GRAVITY_WAYS, GROUP_ENTRIES, HAMMER_AFTER, HAMMER_FORMS, HUNG_AS, MASS_HUNG, OF_TRACES, PERIOD_TIMED, PLUME, PULSE_SHAPES, READING_WAYS, REPORTED, REST_TAKEN, RESTORING, ROUTES, SCREENS, SHOWN_WITH, SWING_MEASURED, WEIGHTS_PULL, ZERO_TAKEN } from './groups.ts';
import type { GroupName } from './groups.ts';
import { Instruments } from './Instruments.tsx';
import { KeptBenches } from './KeptBenches.tsx';
import { PartsTable } from './PartsTable.tsx';
import { PressureGroup } from './PressureGroup.tsx';

const NO_CORRECTIONS: Reduction['corrections'] = [];
const NO_FORCE: Reduction['forceRecords'] = [];
const NO_PROBLEMS: readonly Problem[] = [];

/** Roles that any column has, as one text, so that the bench is not drawn anew for every cell. */
function rolesOf(sheets: readonly Sheet[]): string {
  return [...new Set(sheets.flatMap(({ columns }) => columns.map(({ role }) => role)))].sort().join(' ');
}

function byEntry(problems: readonly Problem[]): ReadonlyMap<string, readonly Problem[]> {
  const found = new Map<string, Problem[]>();
  for (const problem of problems) {
    const { entry } = problem.place;
    if (entry === undefined) continue;
    const list = found.get(entry);
    if (list === undefined) found.set(entry, [problem]);
    else list.push(problem);
  }
  return found;
}

export function BenchSection() {
  const { change } = useActions();
  const entries = useStore((state) => state.session.entries);
  const choices = useStore((state) => state.session.choices);
  const parts = useStore((state) => state.session.parts);
  const instruments = useStore((state) => state.session.instruments);
  const freeSwing = useStore((state) => state.session.freeSwing);
  const forceRecords = useStore((state) => state.session.forceRecords);
  const forceTold = useStore((state) => state.reduction?.forceRecords);
  const pulseSamples = useStore((state) => state.session.pulseSamples);
  const readings = useStore((state) => state.reduction?.entries);
  const problems = useStore((state) => state.reduction?.problems);
  const corrections = useStore((state) => state.reduction?.corrections);
  const film = useStore((state) => state.reduction?.film ?? null);
  const pressure = useStore((state) => state.reduction?.pressure ?? null);
  const air = useStore((state) => state.reduction?.air.shots ?? null);
  const agreement = useStore((state) => state.reduction?.agreement ?? null);
  const [focused, setFocused] = useState<string | null>(null);

  const reads = useMemo(() => new Map(readings?.map((read) => [read.name, read])), [readings]);
  const problemsByEntry = useMemo(() => byEntry(problems ?? NO_PROBLEMS), [problems]);
  const used = useMemo(() => entriesInUse(choices).used, [choices]);
  const unclear = String(problems?.find(({ code }) => code === 'gauge-meaning-unclear')?.facts['unit'] ?? '');
  const readOf = (name: string): EntryRead | undefined => reads.get(name);
  const problemsOf = (name: string): readonly Problem[] => problemsByEntry.get(name) ?? NO_PROBLEMS;
  const roles = useStore((state) => rolesOf(state.session.sheets));
  const hasTraces = useStore((state) => state.session.traces.length > 0);
  const swingsHammer = roles.includes('hammerIn') || entries.hammerMass !== undefined;
  const hangsWeights = roles.split(' ').includes('weight');
  const isShown = (name: EntryName): boolean => {
    const role = SHOWN_WITH[name];
    return entries[name] !== undefined || (used.has(name) && (role === undefined || roles.includes(role)) && (hasTraces || !OF_TRACES.has(name)));
  };
  const choose = <Name extends keyof Choices>(name: Name, what: string) => (value: Choices[Name]) => change(what, setChoice(name, value));

  function fields(group: GroupName) {
    const shown = GROUP_ENTRIES[group].filter(isShown);
    return shown.map((name: EntryName) => {
      const kind: EntryKind = ENTRIES[name];
      return (
        <EntryField
          key={name}
          name={name}
          kind={kind.dimension === 'gauge' ? { ...kind, unit: GAUGE_UNIT[choices.gaugeMeaning] } : kind.dimension === 'reading' ? { ...kind, unit: usualReadingUnit(choices) } : kind}
          entry={entries[name]}
          read={readOf(name)}
          problems={used.has(name) ? problemsOf(name) : NO_PROBLEMS}
          unused={!used.has(name)}
          onFocus={setFocused}
          measured={{ instruments, dimension: measuredDimension(name, kind, choices), onChoose: (instrument) => change(`${kind.label.toLowerCase()}: measured with`, setEntryInstrument(name, instrument)) }}
          onChange={(patch) => change(kind.label.toLowerCase(), setEntry(name, patch), `entry.${name}`)}
        />
      );
    });
  }

  return (
    <section id="bench" aria-labelledby="bench-heading" className={styles.bench}>
      <h2 id="bench-heading" tabIndex={-1}>Bench</h2>
      <p className={`quiet ${styles.how}`}>
        Type each quantity with its unit and its uncertainty: <span className="num">118.0 ± 0.3 mm</span>, <span className="num">118.0(3) mm</span>, <span className="num">12,5 g</span>.
      </p>
      <div className={styles.columns}>
        <BenchDrawing choices={choices} parts={parts} reads={reads} focused={focused} />
        <div className={styles.groups}>
          <div className={styles.groupColumns}>
            <div className={styles.column}>
              <Group name="Pendulum">
                <ChoiceField name="form" legend="Form" value={choices.form} options={FORMS} onChoose={choose('form', 'form of the pendulum')} />
                {choices.form !== 'periodAndStiffness' && choices.form !== 'filmStrip' && <ChoiceField name="restoring" legend="Brought back by" value={choices.restoring} options={RESTORING} onChoose={choose('restoring', 'what brings it back')} />}
                {choices.form === 'bodyOfParts' && <PartsTable parts={parts} instruments={instruments} readOf={readOf} problemsOf={problemsOf} change={change} />}
                {fields('Pendulum')}
                <FilmWords film={film} />
              </Group>
              <Group name="Local g">
                <ChoiceField name="gravityWay" legend="Known" value={choices.gravityWay} options={GRAVITY_WAYS} onChoose={choose('gravityWay', 'local g')} />
                {fields('Local g')}
              </Group>
              <Group name="Thrust">
                <ChoiceField name="plume" legend="Thruster" value={choices.plume} options={PLUME} onChoose={choose('plume', 'thruster carried or plume caught')} />
                {choices.plume === 'caught' && <ChoiceField name="reported" legend="The run reports" value={choices.reported} options={REPORTED} onChoose={choose('reported', 'what the run reports')} />}
                {fields('Thrust')}
                <Caution words={CAUTIONS.charge} />
              </Group>
              <Group name="Corrections">
                <CorrectionsGroup choices={choices} corrections={corrections ?? NO_CORRECTIONS} onSwitch={(name, what, on) => change(what, setChoice(name, on))}>
                  {fields('Corrections')}
                  {choices.correctPulse && <ChoiceField name="pulseShape" legend="Shape of the pulse" value={choices.pulseShape} options={PULSE_SHAPES} onChoose={choose('pulseShape', 'shape of the pulse')} />}
                  {((choices.correctPulse && choices.pulseShape === 'measured') || pulseSamples !== '') && (
                    <PulseSamples text={pulseSamples} problems={problemsOf('pulseSamples')} onChange={(text) => change('samples of the pulse', setPulseSamples(text), 'pulseSamples')} />
                  )}
                </CorrectionsGroup>
              </Group>
              <Group name="Pressure">
                <PressureGroup choices={choices} pressure={pressure} air={air} unclear={unclear} onGauge={choose('gaugeMeaning', 'what the gauge shows')} onAir={choose('correctAir', 'air on the strip')}>
                  {fields('Pressure')}
                </PressureGroup>
                <Caution words={CAUTIONS.vacuum} />
              </Group>
            </div>
            <div className={styles.column}>
              <Group name="Reading">
                <ChoiceField name="readingWay" legend="Read as" value={choices.readingWay} options={READING_WAYS} onChoose={choose('readingWay', 'way of reading')} />
                {choices.readingWay === 'laserSpot' && <Caution words={CAUTIONS.laser} />}
                {choices.readingWay === 'laserSpot' && <ChoiceField name="screenShape" legend="Screen" value={choices.screenShape} options={SCREENS} onChoose={choose('screenShape', 'shape of the screen')} />}
                <ChoiceField name="swingMeasured" legend="The first-swing column holds the swing" value={choices.swingMeasured} options={SWING_MEASURED} onChoose={choose('swingMeasured', 'what the first swing holds')} />
                {roles.split(' ').includes('restAfter') && <ChoiceField name="restTaken" legend="Rest of a record that has one before and one after" value={choices.restTaken} options={REST_TAKEN} onChoose={choose('restTaken', 'rest before or mean')} />}
                <ChoiceField name="zeroTaken" legend="Rest of a record without one" value={choices.zeroTaken} options={ZERO_TAKEN} onChoose={choose('zeroTaken', 'rest between zeros')} />
                {fields('Reading')}
                <label className={styles.check} id="choice-scaleRunsBackward" tabIndex={-1}>
                  <input
                    type="checkbox"
                    checked={choices.scaleRunsBackward}
                    onChange={(event) => change('direction of the scale', setChoice('scaleRunsBackward', event.target.checked))}
                  />
                  The scale’s numbers fall as the pendulum swings away from the thrust
                </label>
              </Group>
              <Group name="Damping">
                <ChoiceField name="dampingWay" legend="Damping from" value={choices.dampingWay} options={DAMPING_WAYS} onChoose={choose('dampingWay', 'damping from')} />
                {choices.dampingWay === 'swings' && <ChoiceField name="dampingLaw" legend="Damping law" value={choices.dampingLaw} options={DAMPING_LAWS} onChoose={choose('dampingLaw', 'damping law')} />}
                {fields('Damping')}
                {(choices.dampingWay === 'swings' || freeSwing !== '') && (
                  <FreeSwing text={freeSwing} problems={problemsOf('freeSwing')} onChange={(text) => change('free swing', setFreeSwing(text), 'freeSwing')} />
                )}
              </Group>
              <Group name="Timed period">
                <ChoiceField name="route" legend="Stiffness and inertia from" value={choices.route} options={ROUTES} onChoose={choose('route', 'route')} />
                {fields('Timed period')}
                <ChoiceField name="periodTimedAs" legend="Timed with the pendulum" value={choices.periodTimedAs} options={PERIOD_TIMED} onChoose={choose('periodTimedAs', 'period timed as')} />
              </Group>
              <Group name="Calibration mass">
                <ChoiceField name="calibrationMassHung" legend="Hung on the pendulum" value={choices.calibrationMassHung} options={MASS_HUNG} onChoose={choose('calibrationMassHung', 'calibration mass hung')} />
                {fields('Calibration mass')}
              </Group>
              <Group name="Static deflection">
                {fields('Static deflection')}
                {hangsWeights && <ChoiceField name="weightsPull" legend="Known weights pull by" value={choices.weightsPull} options={WEIGHTS_PULL} onChoose={choose('weightsPull', 'how the weights pull')} />}
                {hangsWeights && <ChoiceField name="weightsHungAs" legend="On the pendulum" value={choices.weightsHungAs} options={HUNG_AS} onChoose={choose('weightsHungAs', 'pendulum of the weights')} />}
              </Group>
              <Group name="Taps">
                {swingsHammer && <ChoiceField name="hammerForm" legend="Swinging hammer" value={choices.hammerForm} options={HAMMER_FORMS} onChoose={choose('hammerForm', 'form of the hammer')} />}
                {swingsHammer && <ChoiceField name="hammerAfter" legend="After the blow it" value={choices.hammerAfter} options={HAMMER_AFTER} onChoose={choose('hammerAfter', 'hammer after the blow')} />}
                {fields('Taps')}
                <ForceRecords records={forceRecords} told={forceTold ?? NO_FORCE} change={change} />
                <Caution words={CAUTIONS.hammer} />
              </Group>
            </div>
          </div>
        </div>
      </div>
      <Instruments />
      <KeptBenches />
      <AgreementTable agreement={agreement} onTake={(slip) => change(`${slip.what}: take it so`, editOf(slip.edit))} />
    </section>
  );
}

function Group({ name, children }: { readonly name: GroupName; readonly children: ReactNode }) {
  return (
    <div className={styles.group} role="group" aria-label={name}>
      <h3>{name}</h3>
      {children}
    </div>
  );
}

function Caution({ words }: { readonly words: string }) {
  return <p className={styles.caution}>{words}</p>;
}

interface FreeSwingProps {
  readonly text: string;
  readonly problems: readonly Problem[];
  readonly onChange: (text: string) => void;
}

function FreeSwing({ text, problems, onChange }: FreeSwingProps) {
  return (
    <div className={text.trim() === '' ? `${styles.freeSwing} ${styles.empty}` : styles.freeSwing}>
      <label htmlFor="entry-freeSwing">Free swing</label>
      <textarea
        id="entry-freeSwing"
        rows={2}
        spellCheck={false}
        placeholder="31.6 −29.1 26.9 mm"
        aria-describedby="entry-freeSwing-below"
        value={text}
        onChange={(event) => onChange(event.target.value)}
      />
      <div id="entry-freeSwing-below" className="quiet">
        <span className="unprinted">turning readings of one free swing, side after side, with the unit; empty: the swings of the records alone</span>
        {problems.map((problem) => <p key={problem.code} className="look">{sentence(problem)}</p>)}
      </div>
    </div>
  );
}
