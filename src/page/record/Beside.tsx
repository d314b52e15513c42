/** A record's impulse bit by both forms and by both calibrations, with how far they part. */
import { beside } from '../../reduction/beside.ts';
import type { RecordResult, Reduction, Result } from '../../reduction/results.ts';
import { useStore } from '../../store/hooks.tsx';
import { plain } from '../../units/format.ts';
import type { Unit } from '../../units/units.ts';
import { Aligned, alignedColumn } from '../stated/Aligned.tsx';
import { coverageFactor, PERCENT, timesU } from '../stated/numberWords.ts';
import { SheetTable } from '../stated/SheetTable.tsx';

interface Line {
  readonly label: string;
  readonly result: Result | null;
  readonly counts: boolean;
  /** The first of the pair, which this one is held against. */
  readonly against: Result | null;
}

interface Props {
  readonly record: RecordResult;
  readonly reduction: Reduction;
  readonly unit: Unit;
}

export function Beside({ record, reduction, unit }: Props) {
  const form = useStore((state) => state.session.choices.swingForm);
  const { chosen } = reduction;
  const lines: readonly Line[] = [
    { label: 'full pendulum', result: record.full, counts: form === 'full', against: null },
    { label: 'small-angle form', result: record.smallAngle, counts: form === 'smallAngle', against: record.full },
    { label: 'geometry', result: record.byGeometry, counts: chosen === 'geometry', against: null },
    { label: 'taps', result: record.byTaps, counts: chosen === 'taps', against: record.byGeometry },
  ];
  const values = alignedColumn(lines.map(({ result }) => result && { value: result.value, spread: result.U, unit }));
  return (
    <SheetTable label="The other ways beside it">
      <caption>The other ways beside it <span className="quiet">apart: from the line above, and in its standard uncertainties u</span></caption>
      <thead>
        <tr>
          <th scope="col">Impulse bit by</th>
          <th scope="col">Value ± U</th>
          <th scope="col">k</th>
          <th scope="col">Apart</th>
          <th scope="col">in u</th>
        </tr>
      </thead>
      <tbody>
        {lines.map((line, row) => (
          <tr key={line.label}>
            <th scope="row">{line.label}{line.counts && <span className="quiet"> (chosen)</span>}</th>
            <td><Aligned column={values} row={row} /></td>
            <td className="num">{line.result === null ? '' : coverageFactor(line.result.k)}</td>
            <Apart line={line} />
          </tr>
        ))}
      </tbody>
    </SheetTable>
  );
}

/** The step between the two of a pair, in percent and in standard uncertainties of the first. */
function Apart({ line: { result, against } }: { readonly line: Line }) {
  if (result === null || against === null) return <><td /><td /></>;
  const { relative, inU } = beside(against, result);
  return (
    <>
      <td className="num">{relative === null ? '' : plain(relative, PERCENT, 2)}</td>
      <td className="num">{inU === null ? '' : timesU(inU)}</td>
    </>
  );
}
