/** Reads the invented tables of test/fixtures/readings. */
import { readFileSync } from 'node:fs';
import { proposeColumns } from '../../src/readings/columns.ts';
import type { Proposal } from '../../src/readings/columns.ts';
import { recordsOf } from '../../src/readings/records.ts';
import type { RecordsRead, SheetShape } from '../../src/readings/records.ts';
import { readTable } from '../../src/readings/table.ts';
import type { TableRead } from '../../src/readings/table.ts';

export const fixture = (name: string): string => readFileSync(new URL(`../fixtures/readings/${name}`, import.meta.url), 'utf8');

export interface Dropped extends RecordsRead {
  readonly table: TableRead;
  readonly proposals: readonly Proposal[];
  readonly sheet: SheetShape;
}

/** A text as it is when dropped: cut, columns as proposed, records read. */
export function drop(text: string, more: Partial<SheetShape> = {}): Dropped {
  const table = readTable(text);
  const proposals = proposeColumns(table);
  const sheet: SheetShape = { id: 's1', name: 'bench.csv', origin: 'file', columns: proposals, kindOfAll: null, edits: {}, added: [], ...more };
  return { table, proposals, sheet, ...recordsOf(sheet, table) };
}

export const roles = (proposals: readonly Proposal[]): string[] => proposals.map(({ role }) => role);
