/** Instruments of the bench: who measured what, when their calibration is due, and the ± that all they measured has in common. */
import type { Source } from '../metrology/source.ts';
import { anchor, ofSource, propagate, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import { problem, type Problem } from '../problems/problems.ts';
import type { EntryKind } from '../session/entries.ts';
import type { Entry, Instrument, Session } from '../session/session.ts';
import { readDate } from '../units/calendarDate.ts';
import type { Dimension } from '../units/units.ts';
import type { EntryRead, InstrumentTold } from './results.ts';

/** The relative ± of an instrument's calibration, as an entry of its own. */
export const INSTRUMENT_SCALE: EntryKind = {
  label: 'Calibration ±', symbol: 's', dimension: 'number', unit: '%', range: 'notNegative', isSpread: true,
  hint: 'relative, one and the same for all that it measured; what one reading adds stands with that reading',
};

export const instrumentEntry = (id: string, field: 'scale' | 'due'): string => `instrument.${id}.${field}`;

/** Relative u of a calibration that is hardly one; from 1 on it is a slip, and none is taken. */
const LARGE = 0.3;

const NAMELESS = 'Instrument';
/** "Steel ruler, serial 4711", or "Instrument 2". */
export const instrumentName = ({ name, serial }: Instrument, index: number): string =>
  `${name.trim() || `${NAMELESS} ${index + 1}`}${serial.trim() === '' ? '' : `, serial ${serial.trim()}`}`;

/** The same with its certificate and due date, as a report states it. */
export const instrumentWords = (instrument: Instrument, index: number): string =>
  [instrumentName(instrument, index), ...(['certificate', 'due'] as const).flatMap((field) => (instrument[field].trim() === '' ? [] : [`${field} ${instrument[field].trim()}`]))].join(', ');

export interface InstrumentsRead {
  readonly told: readonly InstrumentTold[];
  /** One source an instrument, by its id: 1 with the relative u of its calibration. Those without one are not here. */
  readonly scales: ReadonlyMap<string, { readonly instrument: Instrument; readonly source: Source; readonly factor: Anchor }>;
  /** As a report states it, by id. */
  readonly words: ReadonlyMap<string, string>;
}

export const NO_INSTRUMENTS: InstrumentsRead = { told: [], scales: new Map(), words: new Map() };

type ReadScale = (name: string, kind: EntryKind, typed: Entry, problems: Problem[]) => EntryRead;

/** `readScale`: how an entry is read, as for those of the bench. */
export function readInstruments({ instruments, title }: Session, readScale: ReadScale, problems: Problem[]): InstrumentsRead {
  if (instruments.length === 0) return NO_INSTRUMENTS;
  const session = readDate(title.date);
  const told: InstrumentTold[] = [];
  const scales = new Map<string, { readonly instrument: Instrument; readonly source: Source; readonly factor: Anchor }>();
  instruments.forEach((instrument, index) => {
    const { id, measures } = instrument;
    const name = instrumentName(instrument, index);
    const scale = readScale(instrumentEntry(id, 'scale'), { ...INSTRUMENT_SCALE, label: `${name}: calibration ±` }, { ...instrument.scale, text: instrument.scale.text.replace(/^\s*(?:±|\+\s*\/?\s*-)\s*/, '') }, problems);
    const due = readDate(instrument.due);
    told.push({ id, name, due, scale });
    if (due === null && instrument.due.trim() !== '') problems.push(problem('instrument-due-unread', 'note', { entry: instrumentEntry(id, 'due') }, { name, found: instrument.due.trim() }));
    if (due && session && due.iso < session.iso) problems.push(problem('instrument-overdue', 'note', { entry: instrumentEntry(id, 'due') }, { name, due: due.iso, date: session.iso }));
    const u = scale.value ?? 0;
    if (!(u > 0) || measures === 'other') return;
    if (u >= LARGE) {
      const place = { entry: instrumentEntry(id, 'scale') };
      const facts = { label: `${name}: calibration ±`, found: instrument.scale.text };
      problems.push(u >= 1 ? problem('entry-out-of-range', 'stops', place, { ...facts, range: 'any' }) : problem('instrument-calibration-wide', 'doubt', place, { name, percent: 100 * u }));
      if (u >= 1) return;
    }
    const source: Source = {
      id: `instrument.${id}`, label: `Calibration of ${instrumentWords(instrument, index)}`, symbol: `s_${index + 1}`, dimension: 'number', estimate: 1, u,
      distribution: instrument.scale.plusMinus === 'limits' ? 'rectangular' : 'normal', dof: Infinity,
    };
    scales.set(id, { instrument, source, factor: anchor(ofSource(source)) });
  });
  return { told, scales, words: new Map(instruments.map((instrument, index) => [instrument.id, instrumentWords(instrument, index)])) };
}

/** Its calibration as a factor about 1; null where it has none, or measures something else. */
export function scaleOfInstrument(read: InstrumentsRead, id: string | undefined, dimension: Dimension): Anchor | null {
  const found = id === undefined ? undefined : read.scales.get(id);
  return found?.instrument.measures === dimension ? found.factor : null;
}

/** x of its own source times the calibration of what it was measured with. */
export const timesScale = (value: Uncertain, factor: Anchor): Anchor => anchor(propagate(({ x, s }) => x * s, { x: value, s: factor }));
