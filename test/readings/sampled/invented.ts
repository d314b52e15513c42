/** Invented sampled records as text, in the shapes that loggers and camera programs write, for properties. */
import fc from 'fast-check';
import type { DecimalMark } from '../../../src/units/quantity.ts';

export interface Invented {
  readonly text: string;
  readonly decimal: DecimalMark;
}

const DIGIT_RUN = (most: number): fc.Arbitrary<string> => fc.string({ unit: fc.constantFrom(...'0123456789'), minLength: 1, maxLength: most });

/** Numbers as programs print them, with a point: short, long, in scientific notation, and odd ones. */
export const numberText: fc.Arbitrary<string> = fc.oneof(
  { weight: 6, arbitrary: fc.tuple(fc.constantFrom('', '-', '+'), DIGIT_RUN(5), DIGIT_RUN(8)).map(([sign, whole, part]) => `${sign}${whole}.${part}`) },
  { weight: 2, arbitrary: fc.tuple(fc.constantFrom('', '-'), DIGIT_RUN(9)).map(([sign, whole]) => `${sign}${whole}`) },
  { weight: 2, arbitrary: fc.tuple(fc.constantFrom('', '-'), DIGIT_RUN(1), DIGIT_RUN(7), fc.constantFrom('e', 'E'), fc.integer({ min: -40, max: 40 })).map(([sign, whole, part, e, power]) => `${sign}${whole}.${part}${e}${power < 0 ? '-' : '+'}${String(Math.abs(power)).padStart(2, '0')}`) },
  { weight: 2, arbitrary: fc.double({ noNaN: true, noDefaultInfinity: true }).map(String) },
  { weight: 1, arbitrary: fc.tuple(DIGIT_RUN(25), DIGIT_RUN(25)).map(([whole, part]) => `${whole}.${part}`) },
  { weight: 1, arbitrary: fc.constantFrom('.5', '5.', '-.5', '0', '-0', '-0.000', '9007199254740993', '9007199254740992', '9007199254740991', '0.1', '1e22', '1e23', '1E-22', '1e-23', '1e', '4.9e-324', '1e400', '1.5d-03', '123456789012345678e-5') },
);

const oddText = fc.oneof(
  { weight: 4, arbitrary: fc.constantFrom('', '', 'NaN', 'nan', '-inf', 'Inf', '1.#QNAN', 'n/a', '-') },
  { weight: 2, arbitrary: fc.constantFrom('OVR', 'lost', '***', '1.5 mm', '12:30:01.250', '14:02', '−3.5', '1e5x', '--5', '1.2.3', '0x10', '+-1', 'µm', '\u00a07.5') },
);

const cell = fc.oneof({ weight: 20, arbitrary: numberText }, { weight: 1, arbitrary: oddText });

const between = fc.constantFrom('', '', '', ' ', '  ', '\t');

/** Lines that are no rows. */
const interrupting = fc.constantFrom('', '', 'trigger lost', '# 5 stopped here', '% note', '//', '   ', 'second part: begins');

interface Style {
  readonly delimiter: '\t' | ';' | ',' | ' ';
  readonly decimal: DecimalMark;
  readonly newline: '\n' | '\r\n' | '\r';
  readonly columns: number;
  readonly trailing: boolean;
  readonly mark: boolean;
  readonly header: boolean;
  readonly notes: readonly string[];
}

const style: fc.Arbitrary<Style> = fc.record({
  dialect: fc.constantFrom([',', '.'], [';', '.'], [';', ','], ['\t', '.'], ['\t', ','], [' ', '.'], [' ', ','] as const),
  newline: fc.constantFrom('\n', '\n', '\r\n', '\r' as const),
  columns: fc.integer({ min: 1, max: 5 }),
  trailing: fc.boolean(), mark: fc.boolean(), header: fc.boolean(),
  notes: fc.array(fc.constantFrom('An invented record', 'Operator: nobody', '# Rate: 1000 Hz', '% made up', ''), { maxLength: 6 }),
}).map(({ dialect: [delimiter, decimal], ...rest }) => ({ ...rest, delimiter, decimal }));

const NAMES = ['time (s)', 'displacement (mm)', 'trigger (V)', 'note', 'x'];

/** A record in one style, a few lines of which are none of its rows; its last line may be cut. */
export const invented: fc.Arbitrary<Invented> = style.chain((chosen) =>
  fc.record({
    first: fc.array(fc.tuple(numberText, fc.array(numberText, { minLength: chosen.columns, maxLength: chosen.columns })), { minLength: 3, maxLength: 3 }),
    lines: fc.array(fc.oneof(
      { weight: 12, arbitrary: fc.array(fc.tuple(between, cell, between), { minLength: chosen.columns, maxLength: chosen.columns }) },
      { weight: 1, arbitrary: fc.array(fc.tuple(between, cell, between), { minLength: 1, maxLength: chosen.columns + 2 }) },
      { weight: 1, arbitrary: interrupting },
    ), { maxLength: 40, size: 'max' }),
    ended: fc.boolean(),
    cut: fc.integer({ min: 0, max: 12 }),
  }).map(({ first, lines, ended, cut }) => {
    const { delimiter, decimal, newline, trailing, header, notes, columns } = chosen;
    const written = (text: string): string => (decimal === ',' ? text.replace('.', ',') : text);
    const inRow = (cells: readonly string[]): string => cells.join(delimiter) + (trailing && delimiter !== ' ' ? delimiter : '');
    const space = (text: string): string => (delimiter === '\t' ? text.replaceAll('\t', ' ') : text);
    const rows = [
      ...first.map(([, cells]) => inRow(cells.map(written))),
      ...lines.map((line) => (typeof line === 'string' ? line : inRow(line.map(([before, text, after]) => `${space(before)}${written(text)}${space(after)}`)))),
    ];
    const text = `${chosen.mark ? '\ufeff' : ''}${[...notes, ...(header ? [inRow(NAMES.slice(0, columns))] : []), ...rows].join(newline)}${ended ? newline : ''}`;
    return { text: cut > 6 ? text.slice(0, text.length - (cut - 6)) : text, decimal };
  }));

/** Bytes in pieces of the given lengths, over and over. */
export function inPieces(bytes: Uint8Array, lengths: readonly number[], take: (piece: Uint8Array) => void): void {
  for (let from = 0, k = 0; from < bytes.length; k += 1) {
    const length = lengths[k % lengths.length] ?? 1;
    // A copy, so that a reader that holds on to its piece is found out.
    const piece = bytes.slice(from, from + length);
    take(piece);
    piece.fill(0x39);
    from += length;
  }
}
