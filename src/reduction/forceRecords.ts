/** Force records of the hammer: their pulses in order become the impulses of the taps that state none. */
import type { Source } from '../metrology/source.ts';
import { combine, ofSource, type Uncertain } from '../metrology/uncertain.ts';
import { pulsesOfRecord, type ForcePulse } from '../pendulum/forceRecord.ts';
import { problem, type Problem } from '../problems/problems.ts';
import { readForceRecord } from '../readings/forceRecord.ts';
import type { ForceRecord } from '../session/session.ts';
import type { ForceRecordTold } from './evidenceResults.ts';
import { familyOf } from './readings.ts';
import type { SessionRecord } from './sheets.ts';

export interface RecordedPulse {
  readonly record: ForceRecord;
  readonly number: number;
  readonly pulse: ForcePulse;
}

export interface ForceRecordsRead {
  readonly pulses: readonly RecordedPulse[];
  readonly told: readonly ForceRecordTold[];
}

/** Every pulse of every record, in the order of the records. */
export function forceRecordsOf(records: readonly ForceRecord[], problems: Problem[]): ForceRecordsRead {
  const pulses: RecordedPulse[] = [];
  const told: ForceRecordTold[] = [];
  for (const record of records) {
    const place = { sheetName: record.name };
    const read = readForceRecord(record.name, record.text);
    problems.push(...read.problems);
    const found = read.samples && pulsesOfRecord(read.samples);
    if (!found || found.status !== 'found') {
      if (found) problems.push(problem('force-record-no-pulse', 'doubt', place, { why: found.status }));
      told.push({ id: record.id, name: record.name, pulses: [] });
      continue;
    }
    if (found.pulses.some(({ clipped }) => clipped > 0)) problems.push(problem('force-record-clipped', 'doubt', place, { pulses: found.pulses.filter(({ clipped }) => clipped > 0).length }));
    const odd = found.pulses.filter(({ after }) => after === 'secondContact' || after === 'cutOff' || after === 'undershoot');
    if (odd.length > 0) problems.push(problem('force-record-after-contact', 'doubt', place, { pulses: odd.length, after: odd[0]!.after, percent: 100 * Math.abs(odd[0]!.byWhole / odd[0]!.byContact - 1) }));
    told.push({ id: record.id, name: record.name, pulses: found.pulses.map(({ impulse, byContact, peak, peakTime, after, uNoise, uSampling }) => ({ impulse: { value: impulse, u: Math.hypot(uNoise, uSampling) }, byContact, peak, time: peakTime, after })) });
    found.pulses.forEach((pulse, i) => pulses.push({ record, number: i + 1, pulse }));
  }
  return { pulses, told };
}

/** I_h of the pulse: its own noise and sampling are this tap's alone. */
export function impulseOfPulse(tap: SessionRecord, { pulse: { impulse, uNoise, uSampling } }: RecordedPulse): Uncertain {
  const source = (part: string, label: string, estimate: number, u: number): Source => ({ id: `${tap.id}.${part}`, label, symbol: 'I_h', dimension: 'impulse', estimate, u, distribution: 'normal', dof: Infinity, family: familyOf('tap') });
  return combine([[1, ofSource(source('pulse', 'Noise of the force record', impulse, uNoise))], [1, ofSource(source('sampling', 'Sampling of the force record', 0, uSampling))]]);
}

/** The taps that state no impulse take the pulses in order; a number that does not fit is told, and no tap is given another's. */
export function pulsesForTaps(taps: readonly SessionRecord[], read: ForceRecordsRead, problems: Problem[]): ReadonlyMap<string, RecordedPulse> {
  const without = taps.filter(({ tapImpulse, hammerIn, tapForce, tapDuration }) => [tapImpulse, hammerIn, tapForce, tapDuration].every((cell) => cell === null));
  if (read.pulses.length === 0 || without.length === 0) return new Map();
  if (without.length !== read.pulses.length) {
    problems.push(problem('force-records-do-not-fit', 'doubt', {}, { pulses: read.pulses.length, taps: without.length }));
    return new Map();
  }
  return new Map(without.map((tap, i) => [tap.id, read.pulses[i]!]));
}
