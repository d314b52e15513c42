/** The selected record opened: its chain from reading to impulse bit, the other ways beside it, its swing, its budget. */
import { useLayoutEffect, useRef, useState } from 'react';
import type { Budget, RecordResult, Reduction } from '../../reduction/results.ts';
import { countAgain, setAside } from '../../session/edits.ts';
import { impulseUnit } from '../../plots/impulseUnit.ts';
import { recordName } from '../../plots/recordWords.ts';
import { sentence } from '../../problems/sentences.ts';
import { useActions, useStore } from '../../store/hooks.tsx';
import type { Unit } from '../../units/units.ts';
import { AsideDialog } from '../readings/AsideDialog.tsx';
import { BudgetTable } from '../budget/BudgetTable.tsx';
import { coverageFactor } from '../stated/numberWords.ts';
import { Quantity } from '../stated/Quantity.tsx';
import { Beside } from './Beside.tsx';
import { ChainTable } from './ChainTable.tsx';
import { SwingPicture } from './SwingPicture.tsx';
import styles from './record.module.css';

export function RecordSection() {
  const reduction = useStore((state) => state.reduction);
  const selected = useStore((state) => state.selected);
  const record = reduction?.records.find(({ id }) => id === selected) ?? null;
  const section = useRef<HTMLElement>(null);
  useStillBelow(section);
  return (
    <section id="record" ref={section} className={styles.section} aria-labelledby="record-heading">
      {reduction === null || record === null
        ? <div className={styles.unchosen}><Unchosen reduction={reduction} /></div>
        : <Chosen reduction={reduction} record={record} />}
    </section>
  );
}

/**
 * A record opens above what is being read or typed further down, which must not move. Where the browser keeps it still by
 * itself (scroll anchoring), nothing is done.
 */
function useStillBelow(section: { readonly current: HTMLElement | null }) {
  useLayoutEffect(() => {
    const watched = section.current;
    if (watched === null || 'overflowAnchor' in watched.style) return undefined;
    let height = watched.offsetHeight;
    const observer = new ResizeObserver(() => {
      const grown = watched.offsetHeight - height;
      height += grown;
      if (watched.getBoundingClientRect().bottom - grown < 0) window.scrollBy({ top: grown, behavior: 'instant' });
    });
    observer.observe(watched);
    return () => observer.disconnect();
  }, [section]);
}

function Unchosen({ reduction }: { readonly reduction: Reduction | null }) {
  const { select } = useActions();
  const records = reduction?.records ?? [];
  const first = records.find(({ kind }) => kind === 'shot') ?? records[0];
  return (
    <>
      <h2 id="record-heading">Record</h2>
      {first === undefined
        ? <p className="quiet">No readings yet; a record opens here into the chain that made its impulse bit.</p>
        : (
          <p className="quiet">
            Choose a record in the run above, and the chain that made its impulse bit opens here.{' '}
            <button type="button" className="plain-button" onClick={() => select(first.id)}>Open {recordName(first)}</button>
          </p>
        )}
    </>
  );
}

interface Props {
  readonly reduction: Reduction;
  readonly record: RecordResult;
}

function Chosen({ reduction, record }: Props) {
  const unit = impulseUnit(reduction);
  const { impulseBit } = record;
  const explained = reduction.explained?.record === record.id ? reduction.explained : null;
  const configuration = reduction.configurations[record.kind === 'tap' ? 'taps' : 'shots'];
  const name = recordName(record);
  return (
    <>
      <Heading reduction={reduction} record={record} />
      {impulseBit !== null && (
        <p className={styles.answer}>
          <Quantity value={impulseBit.value} spread={impulseBit.U} unit={unit} />
          {' '}<span className="quiet">± U, 95 %, k = {coverageFactor(impulseBit.k)}{record.kind === 'tap' ? '; at the tap’s own lever arm' : ''}</span>
        </p>
      )}
      <Standing record={record} />
      {record.note !== '' && <p className="quiet">Note: {record.note}</p>}
      {record.problems.length > 0 && (
        <ul className={styles.problems}>
          {record.problems.map((one) => <li key={`${one.code} ${one.place.column ?? ''}`} className="look">{sentence(one)}</li>)}
        </ul>
      )}
      <div className={styles.open}>
        {explained !== null && explained.chain.length > 0 && <div className={styles.chain}><ChainTable chain={explained.chain} impulse={unit} /></div>}
        <div className={styles.evidence}>
          {configuration !== null && record.angle !== null && record.launch !== null && (
            <SwingPicture angle={record.angle.value} launch={record.launch.value} dampingRatio={configuration.dampingRatio.value} period={configuration.period.value} />
          )}
          {impulseBit !== null && <Beside record={record} reduction={reduction} unit={unit} />}
          {explained !== null && explained.budget !== null && (
            <Contributions budget={explained.budget} of={name.charAt(0).toLowerCase() + name.slice(1)} unit={unit} />
          )}
        </div>
      </div>
    </>
  );
}

function Contributions({ budget, of, unit }: { readonly budget: Budget; readonly of: string; readonly unit: Unit }) {
  const [brief, setBrief] = useState(true);
  return (
    <>
      <h3>What contributes to the uncertainty of {of}</h3>
      <BudgetTable budget={budget} of={of} unit={unit} brief={brief} />
      <button type="button" className="plain-button" onClick={() => setBrief(!brief)}>{brief ? 'All columns of this budget' : 'Fewer columns'}</button>
    </>
  );
}

function Heading({ reduction, record }: Props) {
  const { select } = useActions();
  const { records } = reduction;
  const at = records.findIndex(({ id }) => id === record.id);
  const before = records[at - 1];
  const after = records[at + 1];
  return (
    <div className={styles.heading}>
      <h2 id="record-heading">{recordName(record)} <span className="quiet">record {record.order} of {records.length}</span></h2>
      <span className={styles.turn}>
        <button type="button" disabled={before === undefined} onClick={() => before !== undefined && select(before.id)}>Record before</button>
        <button type="button" disabled={after === undefined} onClick={() => after !== undefined && select(after.id)}>Record after</button>
      </span>
    </div>
  );
}

/** Whether the record counts, and the way to change that. */
function Standing({ record }: { readonly record: RecordResult }) {
  const { change } = useActions();
  const [asking, setAsking] = useState(false);
  const name = recordName(record);
  return (
    <div>
      {record.setAside === null
        ? <button type="button" className="plain-button" onClick={() => setAsking(true)}>Set aside…</button>
        : (
          <>
            Set aside: {record.setAside}. It does not count.{' '}
            <button type="button" className="plain-button" onClick={() => change(`count ${name} again`, countAgain(record.id))}>Count again</button>
          </>
        )}
      {asking && (
        <AsideDialog
          record={name}
          reason=""
          onReason={(reason) => change(`set aside ${name}`, setAside(record.id, reason))}
          onClose={() => setAsking(false)}
        />
      )}
    </div>
  );
}
