/** What to check at the bench: each thing that fools people there, with its size for this bench and what to do about it. */
import { BENCH_EFFECT_WORDS } from '../../problems/benchEffects.ts';
import type { BenchEffect } from '../../reduction/results.ts';
import { useStore } from '../../store/hooks.tsx';
import { chooseUnit, plain } from '../../units/format.ts';
import type { Dimension } from '../../units/units.ts';
import { PERCENT } from '../stated/numberWords.ts';
import styles from './atTheBench.module.css';

/** Sizes are of an order; two digits are as many as they bear. */
const DIGITS = 2;
const shown = (value: number, dimension: Dimension): string => plain(value, dimension === 'number' ? PERCENT : chooseUnit([value], dimension), DIGITS);
const part = (value: number): string => plain(Math.abs(value), PERCENT, DIGITS);

const OF: Readonly<Record<BenchEffect['share']['of'], string>> = { impulse: 'of the impulse bit', firstSwing: 'of the first swing', stiffness: 'of κ' };

export function AtTheBenchSection() {
  const effects = useStore((state) => state.reduction?.benchEffects);
  const [mattering, smaller] = [effects?.filter(({ matters }) => matters) ?? [], effects?.filter(({ matters }) => !matters) ?? []];
  return (
    <section id="at-the-bench" aria-labelledby="at-the-bench-heading" className={styles.section}>
      <h2 id="at-the-bench-heading" tabIndex={-1}>To check at the bench</h2>
      {mattering.length + smaller.length === 0 ? <p className="quiet">Sized once there is a run mean.</p> : (
        <p className={`quiet ${styles.lead}`}>
          None of these is in the impulse bit or its uncertainty. Each is sized for this bench from what was typed; where nothing was, for what is typical, which is said.
        </p>
      )}
      {mattering.length > 0 && <Effects label="What could matter" effects={mattering} />}
      {mattering.length === 0 && smaller.length > 0 && <p>None of them could matter here.</p>}
      {smaller.length > 0 && (
        <details>
          <summary>Too small to matter here: {smaller.length}</summary>
          <Effects label="Too small to matter" effects={smaller} />
        </details>
      )}
    </section>
  );
}

function Effects({ label, effects }: { readonly label: string; readonly effects: readonly BenchEffect[] }) {
  return (
    <ol className={styles.list} aria-label={label}>
      {effects.map((effect) => <Effect key={effect.id} effect={effect} />)}
    </ol>
  );
}

function Effect({ effect: { id, size, share, ofImpulse, taken } }: { readonly effect: BenchEffect }) {
  const { name, does, toDo } = BENCH_EFFECT_WORDS[id];
  return (
    <li>
      <h3>{name}</h3>
      <p>
        {does.charAt(0).toUpperCase() + does.slice(1)} <span className="num">{shown(size.value, size.dimension)}</span>
        {size.dimension === 'number' ? ` ${OF[share.of]}` : <>, <span className="num">{part(share.value)}</span> {OF[share.of]}</>}
        {share.of === 'stiffness' && <>: {ofImpulse === 0 ? 'nothing of the impulse bit, as it is calibrated' : <><span className="num">{part(ofImpulse)}</span> of the impulse bit</>}</>}
        .
        {taken.length > 0 && <span className="quiet"> Typical: {taken.map(({ what, value, dimension }) => `${what} ${shown(value, dimension)}`).join(', ')}.</span>}
      </p>
      <p>{toDo}</p>
    </li>
  );
}
