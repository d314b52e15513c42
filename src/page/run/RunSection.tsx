/** The run: its mean, what that mean's uncertainty is made of, and what is set aside. */
import { useMemo } from 'react';
import { ends } from '../../reduction/beside.ts';
import type { RecordResult, Reduction, RunResult } from '../../reduction/results.ts';
import { countAgain } from '../../session/edits.ts';
import { impulseUnit } from '../../plots/impulseUnit.ts';
import { recordName } from '../../plots/recordWords.ts';
import { shotsFigure } from '../../plots/shotsFigure.ts';
import { useActions, useStore } from '../../store/hooks.tsx';
import { plain, withPlusMinus } from '../../units/format.ts';
import type { Unit } from '../../units/units.ts';
import { goToElement } from '../head/goTo.ts';
import { FigureView } from '../plot/FigureView.tsx';
import { useInks } from '../plot/useInks.ts';
import { Aligned, alignedTo } from '../stated/Aligned.tsx';
import { coverageFactor, degreesOfFreedom, roundedAs } from '../stated/numberWords.ts';
import { FiredAt } from '../stated/FiredAt.tsx';
import { Quantity } from '../stated/Quantity.tsx';
import { SymbolText } from '../words.tsx';
import { SheetTable } from '../stated/SheetTable.tsx';
import styles from './run.module.css';

export function RunSection() {
  const reduction = useStore((state) => state.reduction);
  return (
    <section id="run" className={styles.section} aria-labelledby="run-heading">
      <h2 id="run-heading">The run</h2>
      {reduction === null ? <p className="quiet">No readings yet.</p> : <Run reduction={reduction} />}
    </section>
  );
}

function Run({ reduction }: { readonly reduction: Reduction }) {
  const { run, runWithSetAside, records, blanks, pressure } = reduction;
  const unit = impulseUnit(reduction);
  const aside = records.filter(({ setAside }) => setAside !== null);
  const hasShots = records.some(({ kind, impulseBit }) => kind === 'shot' && impulseBit !== null);
  return (
    <>
      {run === null ? <p className="quiet">No run mean yet: no shot that counts has an impulse bit.</p> : (
        <>
          <p className={styles.answer}>
            Mean impulse bit <Quantity value={run.mean.value} spread={run.mean.U} unit={unit} />
          </p>
          <p className="quiet">± is U, the expanded uncertainty at 95 %, k = {coverageFactor(run.mean.k)}; {run.n} of {run.of} shots count.</p>
          {pressure !== null && <p><FiredAt pressure={pressure} /></p>}
          <Composition run={run} withAside={runWithSetAside} unit={unit} />
          <p className={styles.reason}>
            Only the scatter of the shots is divided by √n. The common part (lever arm, inertia, scale, calibration) pushes every shot the same way,
            so no number of shots takes it off the mean.
          </p>
          {run.readingsInsteadOfScatter && (
            <p className={styles.reason}>The shots scatter less than their readings alone would have them (or there is one shot); the readings’ part stands in for s/√n.</p>
          )}
        </>
      )}
      {hasShots && <ShotsFigure records={records} run={run} />}
      {aside.length > 0 && <SetAside records={aside} unit={unit} />}
      {blanks !== null && (
        <p>
          Blanks, reduced like shots: mean <Quantity value={blanks.mean.value} spread={blanks.mean.u} unit={unit} /> (± u), {blanks.n} {blanks.n === 1 ? 'blank' : 'blanks'}
          {blanks.scatter !== null && (blanks.scatter === 0 ? ', all with the same readings' : <>, scatter s = {plain(blanks.scatter, unit, 2)}</>)}. They are not taken off the shots.
        </p>
      )}
    </>
  );
}

interface Row {
  readonly label: string;
  readonly symbol: string;
  /** Stands in the column that is aligned at the decimal sign, N·s. */
  readonly value?: (run: RunResult) => number | null;
  readonly text?: (run: RunResult, unit: Unit) => string;
}

/** "1.220 mN·s to 1.283 mN·s". */
function intervalText({ mean }: RunResult, unit: Unit): string {
  const [low, high] = ends(mean);
  return `${roundedAs(low, mean.U, unit)} to ${roundedAs(high, mean.U, unit)}`;
}

const ROWS: readonly Row[] = [
  { label: 'Shots that count', symbol: 'n', text: ({ n, of }) => `${n} of ${of}` },
  { label: 'Mean impulse bit', symbol: 'Ī', value: ({ mean }) => mean.value },
  { label: 'Scatter of the shots, standard deviation', symbol: 's', value: ({ scatter }) => scatter },
  { label: 'Scatter’s part of the mean', symbol: 's/√n', value: ({ uScatter }) => uScatter },
  { label: 'Common part, not divided by √n', symbol: 'u_common', value: ({ uCommon }) => uCommon },
  { label: 'Standard uncertainty of the mean', symbol: 'u', value: ({ mean }) => mean.u },
  { label: 'Effective degrees of freedom', symbol: 'ν_eff', text: ({ mean }) => degreesOfFreedom(mean.dof) },
  { label: 'Coverage factor for 95 %', symbol: 'k', text: ({ mean }) => coverageFactor(mean.k) },
  { label: 'Expanded uncertainty', symbol: 'U = k·u', value: ({ mean }) => mean.U },
  { label: '95 % interval of the mean', symbol: 'Ī ± U', text: intervalText },
];

interface CompositionProps {
  readonly run: RunResult;
  readonly withAside: RunResult | null;
  readonly unit: Unit;
}

/** What the mean and its uncertainty are made of, beside the same with the set-aside shots counted too. */
function Composition({ run, withAside, unit }: CompositionProps) {
  const runs = withAside === null ? [run] : [run, withAside];
  // One digit more than the answer has, so that sums can be checked.
  const columns = runs.map((one) => alignedTo(ROWS.map(({ value }) => value?.(one) ?? null), run.mean.u / 10, unit));
  return (
    <SheetTable label="What the run mean is made of">
      <thead>
        <tr>
          <th scope="col">Quantity</th>
          <th scope="col">Symbol</th>
          <th scope="col">As it counts</th>
          {withAside !== null && <th scope="col">With those set aside</th>}
        </tr>
      </thead>
      <tbody>
        {ROWS.map(({ label, symbol, text }, row) => (
          <tr key={label}>
            <th scope="row">{label}</th>
            <td><SymbolText symbol={symbol} /></td>
            {columns.map((column, index) => (
              <td key={index === 0 ? 'counts' : 'with'} className={index === 0 ? 'num' : `num ${styles.other}`}>
                {text === undefined ? <Aligned column={column} row={row} /> : text(runs[index] ?? run, unit)}
              </td>
            ))}
          </tr>
        ))}
      </tbody>
    </SheetTable>
  );
}

function ShotsFigure({ records, run }: Pick<Reduction, 'records' | 'run'>) {
  const selected = useStore((state) => state.selected);
  const { select } = useActions();
  const inks = useInks();
  const figure = useMemo(() => shotsFigure({ records, run }, inks), [records, run, inks]);
  return <FigureView figure={figure} inks={inks} selected={selected} onSelect={select} onOpen={() => goToElement('record')} />;
}

function SetAside({ records, unit }: { readonly records: readonly RecordResult[]; readonly unit: Unit }) {
  const { change, select } = useActions();
  return (
    <SheetTable label="Set aside">
      <caption>Set aside</caption>
      <thead>
        <tr>
          <th scope="col">Record</th>
          <th scope="col">Reason</th>
          <th scope="col">Impulse bit ± U</th>
          <th scope="col"><span className="visually-hidden">To do</span></th>
        </tr>
      </thead>
      <tbody>
        {records.map((record) => (
          <tr key={record.id}>
            <th scope="row">
              <button type="button" className="plain-button" onClick={() => select(record.id)}>{recordName(record)}</button>
            </th>
            <td>{record.setAside}</td>
            <td className="num">{record.impulseBit === null ? '–' : withPlusMinus(record.impulseBit.value, record.impulseBit.U, unit)}</td>
            <td>
              <button type="button" className="plain-button" onClick={() => change(`count ${recordName(record)} again`, countAgain(record.id))}>
                count again<span className="visually-hidden">: {recordName(record)}</span>
              </button>
            </td>
          </tr>
        ))}
      </tbody>
    </SheetTable>
  );
}
