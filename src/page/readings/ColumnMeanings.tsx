/** What each column of a sheet means and in which unit: proposed with the reason, to be checked and changed. */
import { useState } from 'react';
import { ROLE_DIMENSIONS, USUAL_UNIT, proposeColumns, unitsOfRole } from '../../readings/columns.ts';
import { ROLES } from '../../readings/meanings.ts';
import type { Role } from '../../readings/meanings.ts';
import type { TableRead } from '../../readings/table.ts';
import { sentenceForProposal } from '../../problems/proposals.ts';
import { setColumn, setColumns } from '../../session/edits.ts';
import type { Sheet } from '../../session/session.ts';
import { unitNamed } from '../../units/units.ts';
import { useActions } from '../../store/hooks.tsx';
import type { ShownColumn, ShownSheet } from './sheetRows.ts';
import { ROLE_LABELS } from './tradeWords.ts';
import styles from './sheet.module.css';

interface ColumnMeaningsProps {
  readonly sheet: Sheet;
  readonly table: TableRead;
  readonly shown: ShownSheet;
}

/** Cells of a column that stand beside its meaning, so that one sees what is being named. */
const SAMPLES = 3;

const isRole = (text: string): text is Role => ROLES.some((role) => role === text);

const unitChoices = (role: Role): readonly string[] => unitsOfRole(role).map(({ symbol }) => symbol);

/** The unit that a column has in a new role: the one written at it or chosen before where it fits, else the usual one. */
function unitIn(role: Role, candidates: readonly (string | null | undefined)[]): string {
  for (const text of candidates) {
    for (const dimension of ROLE_DIMENSIONS[role]) {
      const unit = text == null || text === '' ? null : unitNamed(text, dimension);
      if (unit !== null) return unit.symbol;
    }
  }
  return USUAL_UNIT[role];
}

export function ColumnMeanings({ sheet, table, shown }: ColumnMeaningsProps) {
  const { change } = useActions();
  const proposed = sheet.columns.some(({ by }) => by === 'proposal');
  const [open, setOpen] = useState(proposed);
  const proposals = proposeColumns(table);

  function reasonOf({ index, meaning }: ShownColumn): { readonly text: string; readonly look: boolean } {
    const proposal = proposals[index];
    if (meaning.by === 'person') return { text: sheet.origin === 'typed' ? '' : 'as you chose', look: false };
    if (proposal === undefined || proposal.role !== meaning.role || proposal.unit !== meaning.unit) return { text: 'as proposed before', look: false };
    return { text: sentenceForProposal(proposal), look: !proposal.sure };
  }

  const toCheck = proposed ? shown.columns.filter((column) => reasonOf(column).look).length : 0;
  return (
    <details className={styles.meanings} open={open} onToggle={(toggled) => setOpen(toggled.currentTarget.open)}>
      <summary>
        {proposed ? <strong>Column meanings proposed: check them</strong> : 'Column meanings'}
        {toCheck > 0 && <span className="look"> {toCheck === 1 ? '1 is unsure' : `${toCheck} are unsure`}</span>}
      </summary>
      <div className={styles.scroll}>
        <table className={styles.meaningsTable} aria-label={`Column meanings of ${sheet.name}`}>
          <thead>
            <tr>
              <th scope="col">column</th>
              <th scope="col" className={styles.samples}>first cells</th>
              <th scope="col">means</th>
              <th scope="col">in</th>
              <th scope="col">because</th>
            </tr>
          </thead>
          <tbody>
            {shown.columns.map((column) => {
              const { header, index, meaning } = column;
              const reason = reasonOf(column);
              const units = unitChoices(meaning.role);
              return (
                <tr key={index} className={reason.look ? styles.unsure : undefined}>
                  <th scope="row">{header}</th>
                  <td className={`${styles.samples} quiet`}>{shown.rows.slice(0, SAMPLES).map((row) => row.cells[index] ?? '').filter((cell) => cell.trim() !== '').join(' · ')}</td>
                  <td>
                    <select
                      aria-label={`Meaning of ${header}`}
                      value={meaning.role}
                      onChange={({ target: { value } }) => {
                        if (isRole(value)) change(`${header} is ${ROLE_LABELS[value]}`, setColumn(sheet.id, index, { role: value, unit: unitIn(value, [table.unitTexts[index], meaning.unit]) }));
                      }}
                    >
                      {ROLES.map((role) => <option key={role} value={role}>{ROLE_LABELS[role]}</option>)}
                    </select>
                  </td>
                  <td>
                    {units.length > 0 && (
                      <select aria-label={`Unit of ${header}`} value={meaning.unit} onChange={({ target: { value } }) => change(`${header} in ${value}`, setColumn(sheet.id, index, { unit: value }))}>
                        {!units.includes(meaning.unit) && <option value={meaning.unit}>{meaning.unit}</option>}
                        {units.map((symbol) => <option key={symbol} value={symbol}>{symbol}</option>)}
                      </select>
                    )}
                  </td>
                  <td className={reason.look ? 'look' : 'quiet'}>
                    {reason.text}
                  </td>
                </tr>
              );
            })}
          </tbody>
        </table>
      </div>
      <p className={styles.buttons}>
        {proposed && (
          <button
            type="button"
            onClick={() => {
              change(`columns of ${sheet.name} checked`, setColumns(sheet.id, shown.columns.map(({ meaning }) => ({ ...meaning, by: 'person' }))));
              setOpen(false);
            }}
          >
            The columns are right
          </button>
        )}
        {sheet.origin === 'typed' && (
          <button type="button" onClick={() => change('add a column', setColumn(sheet.id, shown.columns.length, { role: 'nextSwing', unit: unitIn('nextSwing', sheet.columns.map(({ unit }) => unit)) }))}>
            Add a column
          </button>
        )}
      </p>
    </details>
  );
}
