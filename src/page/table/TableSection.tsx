/** The impulse table, one row a record, in a unit of the reader's choice, to save and to copy. */
import { useState } from 'react';
import { perShotCsv } from '../../exports/perShotTable.ts';
import type { RecordResult, Reduction } from '../../reduction/results.ts';
import { impulseUnit } from '../../plots/impulseUnit.ts';
import { KIND_WORDS } from '../../plots/recordWords.ts';
import { copyText } from '../../platform/clipboard.ts';
import { fileName, saveTextAsFile } from '../../platform/download.ts';
import { useActions, useStateNow, useStore } from '../../store/hooks.tsx';
import { chooseUnit } from '../../units/format.ts';
import { unitNamed } from '../../units/units.ts';
import type { Unit } from '../../units/units.ts';
import { Leaves, useLeaves } from '../plot/Leaves.tsx';
import { KindMark } from '../readings/KindMark.tsx';
import { Aligned, alignedColumn, alignedTo } from '../stated/Aligned.tsx';
import { coverageFactor } from '../stated/numberWords.ts';
import { SheetTable } from '../stated/SheetTable.tsx';
import { tableText } from './tableText.ts';
import styles from './table.module.css';

const UNITS = ['nN·s', 'µN·s', 'mN·s', 'N·s'] as const;

export function TableSection() {
  const reduction = useStore((state) => state.reduction);
  const count = reduction?.records.length ?? 0;
  return (
    <section id="table" className={styles.section} aria-labelledby="table-heading">
      <h2 id="table-heading">Table</h2>
      {reduction === null || count === 0 ? <p className="quiet">No readings yet.</p> : <Table reduction={reduction} />}
    </section>
  );
}

function Table({ reduction }: { readonly reduction: Reduction }) {
  const [wanted, setWanted] = useState<(typeof UNITS)[number] | ''>('');
  const unit = (wanted === '' ? null : unitNamed(wanted, 'impulse')) ?? impulseUnit(reduction);
  return (
    <>
      <div className={styles.tools}>
        <label>
          Unit{' '}
          <select value={wanted} onChange={(chosen) => setWanted(UNITS.find((symbol) => symbol === chosen.target.value) ?? '')}>
            <option value="">as fits ({impulseUnit(reduction).symbol})</option>
            {UNITS.map((symbol) => <option key={symbol} value={symbol}>{symbol}</option>)}
          </select>
        </label>
        <Outlets reduction={reduction} unit={unit} />
      </div>
      <Rows reduction={reduction} unit={unit} />
    </>
  );
}

/** Save and copy. The file has SI numbers with all their digits; the copy is what the table shows, for a spreadsheet. */
function Outlets({ reduction, unit }: { readonly reduction: Reduction; readonly unit: Unit }) {
  const stateNow = useStateNow();
  const [told, setTold] = useState('');
  function save(): void {
    const { session } = stateNow();
    saveTextAsFile(fileName(session.title.name, 'impulse-table', 'csv'), perShotCsv(session, reduction), 'text/csv;charset=utf-8');
  }
  async function copy(): Promise<void> {
    const taken = await copyText(tableText(reduction.records, unit));
    setTold(taken ? 'Copied.' : 'The browser did not allow copying; save the table instead.');
  }
  return (
    <>
      <button type="button" onClick={save}>Save table (CSV)</button>
      <button type="button" onClick={() => void copy()}>Copy for a spreadsheet</button>
      <span role="status" className="quiet">{told}</span>
    </>
  );
}

function Rows({ reduction, unit }: { readonly reduction: Reduction; readonly unit: Unit }) {
  const selected = useStore((state) => state.selected);
  const leaves = useLeaves(reduction.records.length);
  const records = reduction.records.slice(leaves.from, leaves.to);
  const angleUnit = chooseUnit(reduction.records.map(({ angle }) => angle?.value ?? 0), 'angle');
  const finest = Math.min(...reduction.records.flatMap(({ impulseBit }) => (impulseBit === null || impulseBit.u === 0 ? [] : [impulseBit.u])));
  const angles = alignedColumn(records.map(({ angle }) => angle && { value: angle.value, spread: angle.u, unit: angleUnit }));
  const bits = alignedTo(records.map(({ impulseBit }) => impulseBit?.value ?? null), finest, unit);
  const us = alignedTo(records.map(({ impulseBit }) => impulseBit?.u ?? null), finest, unit);
  const Us = alignedTo(records.map(({ impulseBit }) => impulseBit?.U ?? null), finest, unit);
  return (
    <>
      <SheetTable label="Impulse table">
        <thead>
          <tr>
            <th scope="col">Record</th>
            <th scope="col">First swing θ<sub>p</sub> ± u ({angleUnit.symbol})</th>
            <th scope="col">Impulse bit ({unit.symbol})</th>
            <th scope="col">u ({unit.symbol})</th>
            <th scope="col">U, 95 % ({unit.symbol})</th>
            <th scope="col">k</th>
            <th scope="col">Set aside</th>
            <th scope="col">Note</th>
          </tr>
        </thead>
        <tbody>
          {records.map((record, row) => (
            <tr key={record.id} className={rowClass(record, selected)} aria-current={record.id === selected ? 'true' : undefined}>
              <th scope="row"><RecordName record={record} /></th>
              <td><Aligned column={angles} row={row} bare /></td>
              <td><Aligned column={bits} row={row} bare /></td>
              <td><Aligned column={us} row={row} bare /></td>
              <td><Aligned column={Us} row={row} bare /></td>
              <td className="num">{record.impulseBit === null ? '' : coverageFactor(record.impulseBit.k)}</td>
              <td className={styles.words}>{record.setAside ?? ''}</td>
              <td className={styles.words}>{record.note}</td>
            </tr>
          ))}
        </tbody>
      </SheetTable>
      <Leaves leaves={leaves} of="impulse table" />
    </>
  );
}

function rowClass(record: RecordResult, selected: string | null): string {
  return [record.setAside === null ? '' : styles.aside, record.id === selected ? styles.selected : ''].join(' ').trim();
}

function RecordName({ record }: { readonly record: RecordResult }) {
  const { select } = useActions();
  const { kind, label, order } = record;
  const name = <>{KIND_WORDS[kind]} {label === '' ? order : label}</>;
  return (
    <button type="button" className={`plain-button ${styles.name}`} onClick={() => select(record.id)}>
      <KindMark kind={kind} setAside={record.setAside !== null} /> {record.setAside === null ? name : <del>{name}</del>}
    </button>
  );
}
