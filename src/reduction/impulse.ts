/** From a corrected launch to the impulse: K φ over the lever arm, the pulse, the alignment, the propellant gone, and the target. */
import { propagate, type Uncertain } from '../metrology/uncertain.ts';
import type { Choices } from '../session/session.ts';
import { propellantFactor, type Correction, type Corrections } from './corrections.ts';
import { factorAt, launchAt, type Factors } from './factors.ts';
import type { ImpulseOf } from './road.ts';
import { impulseOfLaunch, type Form, type Swing } from './shots.ts';
import type { ConfigurationName } from './stand.ts';

const times = (y: Uncertain, factor: Uncertain): Uncertain => propagate(({ a, f }) => a * f, { a: y, f: factor });
const throughAll = (y: Uncertain, corrections: readonly Correction[]): Uncertain => corrections.reduce((so, { factor }) => times(so, factor), y);

export function impulses(
  swings: readonly Swing[], factors: Readonly<Record<Form, Factors>>, arms: Readonly<Record<ConfigurationName, Uncertain | null>>, corrections: Corrections, choices: Choices,
): { readonly delivered: ImpulseOf; readonly impulse: ImpulseOf } {
  const order = new Map(swings.filter((s) => s.record.kind === 'shot').map((s, i, all) => [s.record.id, all.length < 2 ? 0 : i / (all.length - 1)]));
  const delivered = once((swing, form, way) => {
    const factor = factorAt(factors[form], way, swing);
    const arm = arms[swing.configuration];
    if (!swing.launch || !factor || !arm) return null;
    const bare = propagate(impulseOfLaunch, { factor, launch: launchAt(factors[form], way, swing.launch[form]), arm });
    if (swing.record.kind === 'tap') return bare;
    if (corrections.impulse === null) return null;
    const y = throughAll(bare, corrections.impulse);
    const done = order.get(swing.record.id);
    return corrections.propellant && done ? times(y, propellantFactor(corrections.propellant, done)) : y;
  });
  const impulse = choices.reported === 'thruster' && corrections.target.length > 0 ? once((swing, form, way) => toThruster(delivered(swing, form, way), swing, corrections)) : delivered;
  return { delivered, impulse };
}

/** The runs, the records and the chain ask for the same impulses again. */
function once(of: ImpulseOf): ImpulseOf {
  const kept = new Map<Swing, Map<string, Uncertain | null>>();
  return (swing, form, way) => {
    let own = kept.get(swing);
    if (!own) kept.set(swing, (own = new Map<string, Uncertain | null>()));
    const key = `${form}.${way}`;
    let y = own.get(key);
    if (y === undefined) own.set(key, (y = of(swing, form, way)));
    return y;
  };
}

/** I_thruster = I_delivered/(f_cap β_m); a tap strikes the pendulum itself. */
export const toThruster = (delivered: Uncertain | null, swing: Swing, corrections: Corrections): Uncertain | null =>
  delivered && swing.record.kind !== 'tap' ? throughAll(delivered, corrections.target) : delivered;
