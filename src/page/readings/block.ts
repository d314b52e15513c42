/** Blocks of cells as spreadsheets put them on the clipboard: tab between cells, line break between rows. */

/** Cells as clipboard text; a cell with a tab, a line break or a leading quote is quoted. */
export function textOfBlock(rows: readonly (readonly string[])[]): string {
  return rows.map((cells) => cells.map(quoted).join('\t')).join('\n');
}

const quoted = (cell: string): string => (/[\t\n\r]|^"/.test(cell) ? `"${cell.replaceAll('"', '""')}"` : cell);

/** Clipboard text as cells; the last line break ends the last row and begins no other. */
export function blockOfText(text: string): readonly (readonly string[])[] {
  const rows: string[][] = [[]];
  let rest = text.replace(/\r\n?/g, '\n').replace(/\n$/, '');
  for (;;) {
    const inQuotes = /^"((?:[^"]|"")*)"(?=[\t\n]|$)/.exec(rest);
    const whole = inQuotes?.[0] ?? /^[^\t\n]*/.exec(rest)?.[0] ?? '';
    const cell = inQuotes?.[1]?.replaceAll('""', '"') ?? whole;
    rows.at(-1)?.push(cell.replaceAll('\n', ' ').trim());
    const mark = rest[whole.length];
    if (mark === undefined) return rows;
    if (mark === '\n') rows.push([]);
    rest = rest.slice(whole.length + 1);
  }
}

/** How many cells the widest row of a block has. */
export const widthOfBlock = (rows: readonly (readonly string[])[]): number => Math.max(0, ...rows.map((cells) => cells.length));
