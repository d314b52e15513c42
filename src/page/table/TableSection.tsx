/** The impulse table, one row a record, in a unit of the reader's choice, to save and to copy. */
import { memo, useMemo, useState } from 'react';
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
import stated from '../stated/stated.module.css';
import { tableText } from './tableText.ts';
import styles from './table.module.css';

const UNITS = ['nN·s', 'µN·s', 'mN·s', 'N·s'] as const;

export function TableSection() {
  const records = useStore((state) => state.reduction?.records);
  const run = useStore((state) => state.reduction?.run ?? null);
  return (
    <section id="table" className={styles.section} aria-labelledby="table-heading">
      <h2 id="table-heading">Table</h2>
      {records === undefined || records.length === 0 ? <p className="quiet">No readings yet.</p> : <Table records={records} run={run} />}
    </section>
  );
}

type Shown = Pick<Reduction, 'records' | 'run'>;

function Table({ records, run }: Shown) {
  const selected = useStore((state) => state.selected);
  const [wanted, setWanted] = useState<(typeof UNITS)[number] | ''>('');
  const fitting = impulseUnit({ records, run });
  const unit = (wanted === '' ? null : unitNamed(wanted, 'impulse')) ?? fitting;
  return (
    <>
      <div className={styles.tools}>
        <label>
          Unit{' '}
          <select value={wanted} onChange={(chosen) => setWanted(UNITS.find((symbol) => symbol === chosen.target.value) ?? '')}>
            <option value="">as fits ({fitting.symbol})</option>
            {UNITS.map((symbol) => <option key={symbol} value={symbol}>{symbol}</option>)}
          </select>
        </label>
        <Outlets unit={unit} />
      </div>
      <Rows records={records} unit={unit} selected={selected} />
    </>
  );
}

/** Save and copy. The file is the one of the exports; the copy is what the table shows, for a spreadsheet. */
function Outlets({ unit }: { readonly unit: Unit }) {
  const stateNow = useStateNow();
  const [told, setTold] = useState('');
  function save(): void {
    const { session, reduction } = stateNow();
    if (reduction === null) return;
    saveTextAsFile(fileName(session.title.name, 'impulse-table', 'csv'), perShotCsv(session, reduction), 'text/csv;charset=utf-8');
  }
  async function copy(): Promise<void> {
    const taken = await copyText(tableText(stateNow().reduction?.records ?? [], unit));
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

interface RowsProps {
  readonly records: readonly RecordResult[];
  readonly unit: Unit;
  readonly selected: string | null;
}

/** The rows of one leaf, in columns that are aligned at the decimal sign. */
function columnsOf(all: readonly RecordResult[], records: readonly RecordResult[], unit: Unit) {
  const angleUnit = chooseUnit(all.map(({ angle }) => angle?.value ?? 0), 'angle');
  const finest = Math.min(...all.flatMap(({ impulseBit }) => (impulseBit === null || impulseBit.u === 0 ? [] : [impulseBit.u])));
  return {
    angleUnit,
    angle: alignedColumn(records.map(({ angle }) => angle && { value: angle.value, spread: angle.u, unit: angleUnit })),
    bit: alignedTo(records.map(({ impulseBit }) => impulseBit?.value ?? null), finest, unit),
    u: alignedTo(records.map(({ impulseBit }) => impulseBit?.u ?? null), finest, unit),
    U: alignedTo(records.map(({ impulseBit }) => impulseBit?.U ?? null), finest, unit),
  };
}

type Columns = ReturnType<typeof columnsOf>;

// Hundreds of rows: drawn again only when their own numbers, the unit or the choice of record change.
const Rows = memo(function Rows({ records: all, unit, selected }: RowsProps) {
  const { select } = useActions();
  const leaves = useLeaves(all.length);
  const { from, to } = leaves;
  const records = useMemo(() => all.slice(from, to), [all, from, to]);
  const columns = useMemo(() => columnsOf(all, records, unit), [all, records, unit]);
  return (
    <>
      <SheetTable label="Impulse table">
        <thead>
          <tr>
            <th scope="col">Record</th>
            <th scope="col">First swing θ<sub>p</sub> ± u ({columns.angleUnit.symbol})</th>
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
            <Row key={record.id} record={record} columns={columns} row={row} selected={record.id === selected} onSelect={select} />
          ))}
        </tbody>
      </SheetTable>
      <Leaves leaves={leaves} of="impulse table" />
    </>
  );
});

interface RowProps {
  readonly record: RecordResult;
  readonly columns: Columns;
  readonly row: number;
  readonly selected: boolean;
  readonly onSelect: (record: string) => void;
}

const Row = memo(function Row({ record, columns, row, selected, onSelect }: RowProps) {
  const { kind, label, order, setAside, impulseBit } = record;
  const name = <>{KIND_WORDS[kind]} {label === '' ? order : label}</>;
  return (
    <tr className={rowClass(setAside !== null, selected)} aria-current={selected ? 'true' : undefined}>
      <th scope="row" className={styles.name}>
        <KindMark kind={kind} setAside={setAside !== null} />{' '}
        <button type="button" className="plain-button" onClick={() => onSelect(record.id)}>
          {setAside === null ? name : <del>{name}</del>}
        </button>
      </th>
      <td><Aligned column={columns.angle} row={row} bare /></td>
      <td><Aligned column={columns.bit} row={row} bare /></td>
      <td><Aligned column={columns.u} row={row} bare /></td>
      <td><Aligned column={columns.U} row={row} bare /></td>
      <td className="num">{impulseBit === null ? '' : coverageFactor(impulseBit.k)}</td>
      <td className={stated.words}>{setAside ?? ''}</td>
      <td className={stated.words}>{record.note}</td>
    </tr>
  );
});

const rowClass = (aside: boolean, selected: boolean): string => [aside ? styles.aside : '', selected ? styles.selected : ''].join(' ').trim();
