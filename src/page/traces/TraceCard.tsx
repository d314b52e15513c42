/** One sampled trace: where it came from, how it is read, its shots and taps, and what the fit tells of its swing. */
import { useId } from 'react';
import type { TracePicture } from '../../numeric/minMaxPyramid.ts';
import { humWords } from '../../plots/traceSpectrum.ts';
import type { Problem } from '../../problems/problems.ts';
import { sentence } from '../../problems/sentences.ts';
import type { TraceTold, TrainTold } from '../../reduction/traceResults.ts';
import { linesAgain, removeTrace, setTrace, type Edit } from '../../session/edits.ts';
import type { Trace, TraceUse } from '../../session/session.ts';
import type { TraceState } from '../../store/traceDesk.ts';
import { chooseUnit, plain, withPlusMinus } from '../../units/format.ts';
import { counted } from '../readings/tradeWords.ts';
import { EventTable } from './EventTable.tsx';
import { Fold } from './Fold.tsx';
import { TracePictures } from './TracePictures.tsx';
import { TraceSettings } from './TraceSettings.tsx';
import styles from './traceCard.module.css';

interface Props {
  readonly trace: Trace;
  readonly told: TraceTold | undefined;
  readonly state: TraceState | undefined;
  /** null until it can be drawn. */
  readonly picture: TracePicture | null;
  readonly uses: readonly TraceUse[];
  readonly problems: readonly Problem[];
  readonly change: (what: string, edit: Edit, join?: string) => void;
  readonly onStop: () => void;
  readonly onBytes: (file: File) => void;
}

const DIGEST_SHOWN = 12;

/** What the fit found, in a sentence. */
function fitSentence(told: TraceTold, hasUnlisted: boolean): string {
  const { fitted, dimension } = told;
  if (!fitted) return 'No swing has been fitted yet.';
  if (hasUnlisted) return 'Its shots and taps are wanted before its swing can be told.';
  const { period, ratio, noise, colour, least, noiseEquivalent, noFire } = fitted;
  const second = chooseUnit([period.value], 'time');
  const reading = chooseUnit([noise], dimension);
  const parts = [
    `It swings with T₀ = ${withPlusMinus(period.value, period.u, second)} and ζ = ${withPlusMinus(ratio.value, ratio.u, chooseUnit([1], 'number'))} (standard uncertainties)`,
    `noise ${plain(noise, reading, 2)} a sample${colour > 1.2 || colour < 0.8 ? `, which counts ${plain(Math.sqrt(colour), chooseUnit([1], 'number'), 2)} times at the swing, as it is not white` : ''}`,
  ];
  const throwUnit = chooseUnit([least ?? noise], dimension);
  const impulse = chooseUnit([noiseEquivalent ?? 1e-6], 'impulse');
  const hums = humWords(told);
  return [
    `${parts.join('; ')}.`,
    ...(least === null ? [] : [`A throw is known to ${plain(least, throwUnit, 2)} by the noise alone${noiseEquivalent === null ? '' : `: a noise-equivalent impulse bit of ${plain(noiseEquivalent, impulse, 2)} for this record in this band`}.`]),
    ...(noFire === null ? [] : [noFireSentence(noFire, dimension, told.events.length === 0)]),
    ...(hums.length === 0 ? [] : [`Out of the residuals stand ${hums.join(', ')}.`]),
  ].join(' ');
}

/** Decision and detection limit in standard deviations of what no shot gives, one-sided, 5 % each way. Source: Currie, Anal. Chem. 40 (1968) 586, from memory. */
const [DECISION, DETECTION] = [1.645, 3.29];
/** Scatter that differs from the fit's noise by no more than this agrees with it. */
const ALIKE = 1.5;

/** What the same fit finds where nothing was fired. */
function noFireSentence({ jumps, sd, impulse, overFit }: NonNullable<NonNullable<TraceTold['fitted']>['noFire']>, dimension: TraceTold['dimension'], isBlank: boolean): string {
  const words = (times: number): string => (impulse === null ? plain(times * sd, chooseUnit([sd], dimension), 2) : plain(times * impulse, chooseUnit([impulse], 'impulse'), 2));
  const begin = `Where nothing was fired the same fit finds ${counted(jumps, 'jump')} that scatter by ${words(1)}`;
  const fits = overFit === null ? '' : overFit < ALIKE && overFit > 1 / ALIKE ? ', as its noise has it' : `, ${plain(overFit, chooseUnit([1], 'number'), 2)} times what its noise has: ${overFit > 1 ? 'look for a sway, a knock or a drift between the shots' : 'it is noisier about the shots'}`;
  return isBlank ? `No shot is in it, so it gives its limits alone. ${begin}: decision limit ${words(DECISION)}, detection limit ${words(DETECTION)} (5 % each way).` : `${begin}${fits}; detection limit ${words(DETECTION)}.`;
}

/** What the track tells of its own picture. */
function cameraSentence({ radius, span, lean, pivotBy, against }: NonNullable<TraceTold['camera']>): string {
  const [pixels, one, degrees] = [chooseUnit([1], 'pixel'), chooseUnit([1], 'number'), (rad: number): string => `${plain((180 / Math.PI) * rad, chooseUnit([1], 'number'), 3)}°`];
  return [
    radius === null ? 'The marker’s arc is too short to tell its radius.' : `The marker’s arc, over ${degrees(span)}, has a radius of ${withPlusMinus(radius.value, radius.u, pixels)} (u)${pivotBy === 'arc' ? '; its centre serves as the pivot, and its u goes into every impulse bit' : ''}.`,
    ...(against === null ? [] : [`That is ${withPlusMinus(against.ratio.value, against.ratio.u, one)} times scale and radius as stated, ${plain(Math.abs(against.inU), one, 2)} u off.`]),
    ...(lean === null ? [] : [`The plumb line leans by ${degrees(lean.value)} in the picture.`]),
  ].join(' ');
}

/** κθ/(r ℓ) in words. */
function trainSentence({ from, to, rate, pulses, deflection, ripple, impulse }: TrainTold, dimension: TraceTold['dimension']): string {
  const unit = chooseUnit([deflection.value], dimension);
  const bit = impulse === null ? 'no impulse bit without a calibration and a lever arm' : `mean impulse bit κθ/(r ℓ) = ${withPlusMinus(impulse.value, impulse.U, chooseUnit([impulse.value], 'impulse'))} (U, k = ${plain(impulse.k, chooseUnit([1], 'number'), 3)})`;
  return `Train of ${pulses} pulses at ${plain(rate, chooseUnit([rate], 'frequency'), 4)}, ${plain(from, chooseUnit([to], 'time'), 5)} to ${plain(to, chooseUnit([to], 'time'), 5)}: steady deflection ${withPlusMinus(deflection.value, deflection.u, unit)} (u), ${bit}. Each pulse moves the reading by ${plain(100 * ripple, chooseUnit([1], 'number'), 2)} % of that.`;
}

function sizeSentence({ rows, from, to, spacing }: TraceTold): string {
  const span = chooseUnit([to - from], 'time');
  const step = chooseUnit([spacing], 'time');
  return rows === null ? '' : `${counted(rows, 'sample')}, ${plain(to - from, span, 4)}, one each ${plain(spacing, step, 4)}`;
}

export function TraceCard({ trace, told, state, picture, uses, problems, change, onStop, onBytes }: Props) {
  const id = useId();
  const named = (what: string): string => `${trace.name}: ${what}`;
  return (
    <article className={styles.card} aria-labelledby={`${id}-name`}>
      <header className={styles.head}>
        <h3 id={`${id}-name`}>{trace.name}</h3>
        <p className="quiet">
          {told === undefined ? '' : sizeSentence(told)}
          {' · '}
          <span title={`SHA-256 of the bytes as they came: ${trace.sha256}`}>SHA-256 {trace.sha256.slice(0, DIGEST_SHOWN)}…</span>
        </p>
        <button type="button" className="plain-button unprinted" aria-label={`Take out trace ${trace.name}`} onClick={() => change(named('take out'), removeTrace(trace.id))}>take out</button>
      </header>
      {state?.status === 'reading' && (
        <p className={styles.reading} role="status">
          <label htmlFor={`${id}-read`}>Reading {trace.name}</label>
          <progress id={`${id}-read`} max={state.bytes} value={state.read} />
          <button type="button" onClick={onStop}>Stop</button>
        </p>
      )}
      {(state?.status === 'missing' || state?.status === 'failed') && (
        <p className="look">
          {state.status === 'missing' ? `The bytes of ${trace.name} are not on this device. ` : `${trace.name} could not be read: ${state.why}. `}
          <label htmlFor={`${id}-again`}>Choose the file itself again: </label>
          <input
            id={`${id}-again`}
            type="file"
            onChange={({ currentTarget }) => {
              const [file] = currentTarget.files ?? [];
              if (file) onBytes(file);
            }}
          />
        </p>
      )}
      {problems.map((found) => <p key={`${found.code} ${found.place.line ?? ''} ${JSON.stringify(found.facts)}`} className={found.weight === 'note' ? 'quiet' : 'look'}>{sentence(found)}</p>)}
      {told !== undefined && told.rows !== null && <p className={styles.told}>{fitSentence(told, problems.some(({ code }) => code === 'trace-jumps-unlisted'))}</p>}
      {told?.camera != null && <p className={styles.told}>{cameraSentence(told.camera)}</p>}
      {told?.trains.map((train) => <p key={train.id} className={styles.told}>{trainSentence(train, told.dimension)}</p>)}
      {told !== undefined && picture !== null && <TracePictures trace={trace} told={told} picture={picture} change={change} />}
      {told !== undefined && told.events.length > 0 && told.fitted !== null && (
        <Fold title="Its shots and taps as fitted, and by the peak alone" suggested={false}>
          <EventTable told={told} />
        </Fold>
      )}
      <Fold title="How it is read" suggested={told !== undefined && told.fitted === null}>
        <TraceSettings trace={trace} told={told} uses={uses} onChange={(what, patch, join) => change(named(what), setTrace(trace.id, patch), join)} />
      </Fold>
      {trace.eventsFrom === 'list' && (
        <Fold title={`List of its shots and taps (${trace.events.length})`} suggested={trace.events.length === 0}>
          <div className={styles.list}>
            <label htmlFor={`${id}-list`} className="quiet">One a line: 12.5 · 17.25 s tap 1.2 mN·s · 40.2 blank; times on the record’s clock, in s</label>
            <textarea
              id={`${id}-list`}
              spellCheck={false}
              value={trace.events.map(({ text }) => text).join('\n')}
              onChange={({ target: { value } }) => change(named('list of shots and taps'), setTrace(trace.id, { events: linesAgain(trace.events, value) }), `${trace.id}.events`)}
            />
          </div>
        </Fold>
      )}
      <Fold title={`Trains of pulses read as a steady deflection (${trace.trains.length})`} suggested={trace.trains.length > 0}>
        <div className={styles.list}>
          <label htmlFor={`${id}-trains`} className="quiet">One a line, from, to and pulses a second: 20 60 50 Hz; on the record’s clock. The record wants some of its rest before or after it.</label>
          <textarea
            id={`${id}-trains`}
            spellCheck={false}
            value={trace.trains.map(({ text }) => text).join('\n')}
            onChange={({ target: { value } }) => change(named('trains of pulses'), setTrace(trace.id, { trains: linesAgain(trace.trains, value) }), `${trace.id}.trains`)}
          />
        </div>
        {told?.fitted?.trainsBetterFrom != null && <p className="quiet">By the noise of this record a train tells the mean impulse bit better than shots fired one by one from about {plain(told.fitted.trainsBetterFrom, chooseUnit([told.fitted.trainsBetterFrom], 'frequency'), 2)} on, in the same time.</p>}
      </Fold>
      <Fold title={`Stretches marked as bad (${trace.bad.length})`} suggested={trace.bad.length > 0}>
        <div className={styles.list}>
          <label htmlFor={`${id}-bad`} className="quiet">One a line, from and to: 12.5 13.1; on the record’s clock, in s. They are left out of the fit.</label>
          <textarea
            id={`${id}-bad`}
            spellCheck={false}
            value={trace.bad.map(({ text }) => text).join('\n')}
            onChange={({ target: { value } }) => change(named('stretches marked as bad'), setTrace(trace.id, { bad: linesAgain(trace.bad, value) }), `${trace.id}.bad`)}
          />
        </div>
      </Fold>
    </article>
  );
}
