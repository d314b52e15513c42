/** The bench apart from the readings taken on it: to keep, and to use again for another session. */
import { nextInstrumentId, setSheetInstrument, type Edit } from './edits.ts';
import { emptySession, type Instrument, type Session } from './session.ts';

/** What describes the stand and what it was measured with; no readings, no decisions about records, no title. */
export type Bench = Pick<Session, 'demo' | 'entries' | 'parts' | 'instruments' | 'freeSwing' | 'pulseSamples' | 'choices'>;

export const benchOf = ({ demo, entries, parts, instruments, freeSwing, pulseSamples, choices }: Bench): Bench =>
  ({ demo, entries, parts, instruments, freeSwing, pulseSamples, choices });

/** A session with this bench and no readings; as a text (file.ts) it is what is kept. */
export const sessionWithBench = (bench: Bench): Session => ({ ...emptySession(), ...benchOf(bench) });

/** Nothing is typed on it, and all choices stand as they begin. */
export function isBlankBench({ entries, parts, instruments, freeSwing, pulseSamples }: Bench): boolean {
  return Object.keys(entries).length === 0 && parts.length === 0 && instruments.length === 0 && freeSwing.trim() === '' && pulseSamples.trim() === '';
}

const FIELDS = ['name', 'serial', 'certificate', 'due', 'measures'] as const;
const isSame = (a: Instrument, b: Instrument): boolean =>
  FIELDS.every((field) => a[field] === b[field]) && a.scale.text === b.scale.text && a.scale.plusMinus === b.scale.plusMinus && a.scale.k === b.scale.k;

/**
 * Puts this bench in the place of the present one. Readings, marks and title stay; an instrument that readings were
 * read with stays too, under an id of its own where the bench does not have it.
 */
export const putBench = (bench: Bench): Edit => (session) => {
  const instruments = [...bench.instruments];
  const renamed = new Map<string, string>();
  for (const { instrument: id } of session.sheets) {
    const read = session.instruments.find((one) => one.id === id);
    if (read === undefined || renamed.has(read.id)) continue;
    const same = instruments.find((one) => isSame(one, read));
    const newId = same?.id ?? nextInstrumentId(instruments);
    if (same === undefined) instruments.push({ ...read, id: newId });
    renamed.set(read.id, newId);
  }
  // Invented readings stay marked as such on any bench, and so do readings on an invented bench.
  const demo = bench.demo || (session.demo && session.sheets.length > 0);
  const changed: Session = { ...session, ...benchOf(bench), demo, instruments };
  return session.sheets.reduce((so, { id, instrument }) => (instrument === undefined || renamed.get(instrument) === instrument ? so : setSheetInstrument(id, renamed.get(instrument) ?? null)(so)), changed);
};
