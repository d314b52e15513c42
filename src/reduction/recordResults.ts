/** The end of the road in plain numbers: each record, the blanks and the ranges of the swings. */
import { expanded, finiteSources } from '../metrology/coverage.ts';
import { ownParts } from '../metrology/pooled.ts';
import { exact, propagate, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import type { Problem } from '../problems/problems.ts';
import type { RecordResult, Reduction, RunResult } from './results.ts';
import { unitNamed } from '../units/units.ts';
import { factorAt, launchAt } from './factors.ts';
import type { Road } from './road.ts';
import { runOf, stated } from './run.ts';
import type { Form, Way } from './shots.ts';

export function recordResults({ swings, damping, taps, delivered, thruster, impulse, factors, corrections, pressures, form, way, setAside }: Road): readonly RecordResult[] {
  const hasTarget = corrections.target.length > 0;
  const knownOf = new Map(taps.map((tap) => [tap.swing.record.id, tap]));
  const anchors = [factors.full, factors.smallAngle].flatMap((f) => [f.geometry, f.taps, f[way]]).flatMap((k) => [k.shots, k.taps]).filter((a): a is Anchor => a !== null);
  const finite = finiteSources([...anchors, damping.ratio.shots, damping.ratio.taps]);
  const result = (y: Uncertain | null): ReturnType<typeof expanded> | null => (y ? expanded(y, finite) : null);
  const impulses = swings.map((swing) => impulse(swing, form, way));
  const own = ownParts(impulses.map((y) => y ?? exact(0)));
  return swings.map((swing, i): RecordResult => {
    const { record } = swing;
    const chosen = impulses[i]!;
    const by = (asked: Way): ReturnType<typeof result> => (asked === way ? chosenResult : result(impulse(swing, form, asked)));
    const otherForm: Form = form === 'full' ? 'smallAngle' : 'full';
    const chosenResult = result(chosen);
    const otherFormResult = result(impulse(swing, otherForm, way));
    const known = knownOf.get(record.id);
    const pressure = pressures.get(record.id);
    const factor = factorAt(factors[form], way, swing);
    const moment = known ? known.angularImpulse : swing.launch && factor ? propagate(({ k, f }) => k * f, { k: factor, f: launchAt(factors[form], way, swing.launch[form]) }) : null;
    return {
      id: record.id, sheet: record.sheet, line: record.line, order: i + 1, kind: record.kind, kindBy: record.kindBy, label: record.label, note: record.note,
      setAside: setAside(record), problems: [],
      readings: {
        rest: swing.readings.rest?.value ?? null, firstSwing: swing.readings.first?.value ?? null, nextSwings: record.nextSwings.map((cell) => cell?.value ?? null),
        time: record.time?.value ?? null, voltage: record.voltage?.value ?? null, pressure: record.pressure && unitNamed(record.pressure.unit, 'pressure') ? record.pressure.value : null, tapImpulse: record.tapImpulse?.value ?? null,
      },
      pressure: pressure ? stated(pressure) : null,
      angle: swing.angle ? stated(swing.angle) : null,
      launch: swing.launch ? stated(swing.launch[form]) : null,
      full: form === 'full' ? chosenResult : otherFormResult,
      smallAngle: form === 'full' ? otherFormResult : chosenResult,
      byGeometry: by('geometry'),
      byTaps: by('taps'),
      impulseBit: chosenResult,
      delivered: hasTarget ? result(delivered(swing, form, way)) : chosenResult,
      thruster: swing.record.kind === 'tap' ? null : hasTarget ? result(thruster(swing)) : chosenResult,
      ownU: own[i]!,
      knownImpulse: known ? stated(known.impulse) : null,
      angularImpulse: moment ? stated(moment) : null,
    };
  });
}

/** Each record with the problems that are its own, those of the run's remarks among them. */
export function withProblems(records: readonly RecordResult[], problems: readonly Problem[]): readonly RecordResult[] {
  const byRecord = new Map<string, Problem[]>();
  for (const p of problems) {
    if (p.place.record === undefined) continue;
    const found = byRecord.get(p.place.record);
    if (found) found.push(p);
    else byRecord.set(p.place.record, [p]);
  }
  return records.map((record) => {
    const own = byRecord.get(record.id);
    return own ? { ...record, problems: own } : record;
  });
}

export function blanksOf({ swings, impulse, form, way, setAside, bench }: Road): Reduction['blanks'] {
  const found = swings.filter((s) => s.record.kind === 'blank' && setAside(s.record) === null).map((s) => impulse(s, form, way));
  const items = found.filter((y): y is Uncertain => y !== null);
  const run: RunResult | undefined = runOf(items, items.length, bench.sources)?.result;
  return run ? { n: run.n, mean: { value: run.mean.value, u: run.mean.u }, scatter: run.scatter } : null;
}

export function rangeOf({ swings, setAside, form }: Road, kind: 'shot' | 'tap'): readonly [number, number] | null {
  const values = swings.filter((s) => s.record.kind === kind && setAside(s.record) === null && s.launch).map((s) => Math.abs(s.launch![form].value));
  return values.length === 0 ? null : [Math.min(...values), Math.max(...values)];
}
