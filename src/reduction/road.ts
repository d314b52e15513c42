/** What the road has gathered once its shots are reduced: what record results, the chain and the run are written from. */
import type { Anchor, Uncertain } from '../metrology/uncertain.ts';
import type { BenchRead } from './entries.ts';
import type { Corrections } from './corrections.ts';
import type { Factors } from './factors.ts';
import type { SessionRecord } from './sheets.ts';
import type { Form, Swing, Way } from './shots.ts';
import type { TapKnown } from './tapImpulse.ts';
import type { ByConfiguration } from './stand.ts';
import type { Damping, Scale } from './swings.ts';

export type ImpulseOf = (swing: Swing, form: Form, way: Way) => Uncertain | null;

export interface Road {
  readonly bench: BenchRead;
  readonly scale: Scale | null;
  readonly damping: Damping;
  /** Absolute, Pa, by record id. */
  readonly pressures: ReadonlyMap<string, Uncertain>;
  readonly shares: ByConfiguration<Anchor>;
  readonly arms: ByConfiguration<Uncertain | null>;
  readonly factors: Readonly<Record<Form, Factors>>;
  readonly swings: readonly Swing[];
  readonly taps: readonly TapKnown[];
  readonly corrections: Corrections;
  /** At the pendulum: of a shot the momentum delivered, of a tap the impulse at its own lever arm. */
  readonly delivered: ImpulseOf;
  /** What the run reports. */
  readonly impulse: ImpulseOf;
  readonly thruster: (swing: Swing) => Uncertain | null;
  readonly form: Form;
  readonly way: Way;
  readonly reported: 'thruster' | 'delivered';
  /** Reason, or null where the record counts. */
  readonly setAside: (record: SessionRecord) => string | null;
}
