/** The byte scanner against PapaParse and against Number(): the same bits, whatever the pieces that the bytes come in. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { utf8Of } from '../../../src/readings/sampled/encodedText.ts';
import { createSampledReader, readSampledText, type SampledRecord } from '../../../src/readings/sampled/sampledRecord.ts';
import { sniffSampled } from '../../../src/readings/sampled/sniff.ts';
import { inPieces, invented, numberText } from './invented.ts';

function read(bytes: Uint8Array, lengths: readonly number[], plain: boolean, piece?: number): SampledRecord | null {
  const dialect = sniffSampled(bytes.subarray(0, 65_536), bytes.length <= 65_536);
  if (dialect === null) return null;
  const reader = createSampledReader({ dialect: { ...dialect, plain }, ...(piece === undefined ? {} : { piece }) });
  inPieces(bytes, lengths, reader.take);
  return reader.finish();
}

/** All that a record says, its numbers bit by bit. */
function told({ columns, lineOfRow, ...rest }: SampledRecord): unknown {
  return {
    ...rest, plain: undefined,
    columns: columns.map(({ values, ...column }) => ({ ...column, bits: [...new BigUint64Array(values.slice().buffer)].map(String) })),
    lines: Array.from({ length: rest.rows }, (_row, row) => lineOfRow(row)),
  };
}

describe('both ways read the same', () => {
  it('bit by bit, whatever the file and the pieces', () => {
    let [rows, scanned] = [0, 0];
    fc.assert(fc.property(invented, fc.array(fc.integer({ min: 1, max: 90 }), { minLength: 1, maxLength: 5 }), fc.integer({ min: 1, max: 200 }), ({ text }, lengths, piece) => {
      const bytes = utf8Of(text);
      const whole = read(bytes, [bytes.length], true);
      const scannedInPieces = read(bytes, lengths, true);
      const odd = read(bytes, [bytes.length], false);
      const oddInPieces = read(bytes, lengths, false, piece);
      if (whole === null || scannedInPieces === null || odd === null || oddInPieces === null) return;
      rows += whole.rows;
      if (whole.plain) scanned += 1;
      expect(odd.plain).toBe(false);
      expect(told(scannedInPieces)).toEqual(told(whole));
      expect(told(odd)).toEqual(told(whole));
      expect(told(oddInPieces)).toEqual(told(whole));
    }), { numRuns: 500 });
    expect(rows).toBeGreaterThan(5000);
    expect(scanned).toBeGreaterThan(350);
  }, 20_000);

  it('byte by byte', () => {
    fc.assert(fc.property(invented, ({ text }) => {
      const bytes = utf8Of(text);
      const whole = read(bytes, [bytes.length], true);
      if (whole === null) return;
      expect(told(read(bytes, [1], true)!)).toEqual(told(whole));
      expect(told(read(bytes, [1], false, 1)!)).toEqual(told(whole));
    }), { numRuns: 200 });
  });

  it('where quotation marks begin in the middle of a record', () => {
    const rows = Array.from({ length: 200 }, (_, i) => (i < 120 || i % 7 > 0 ? `${i}.25,${i * i}` : `${i}.25,"${i * i}"`));
    rows[150] = '150.25,"22500\n"';
    const text = `t,x\n${rows.join('\n')}`;
    const bytes = utf8Of(text);
    const dialect = sniffSampled(bytes.subarray(0, 500))!;
    expect(dialect.plain).toBe(true);
    const reader = createSampledReader({ dialect, piece: 64 });
    inPieces(bytes, [17], reader.take);
    const record = reader.finish();
    expect(record).toMatchObject({ rows: 200, plain: false, passedOverCount: 0 });
    expect([...record.columns[1]!.values]).toEqual(Array.from({ length: 200 }, (_, i) => i * i));
    expect([150, 151, 199].map(record.lineOfRow)).toEqual([152, 154, 202]);
  });
});

describe('numbers', () => {
  // The correctly rounded double is what ECMA-262 asks of Number() (StringToNumber), from memory.
  it('are those of Number(), to the bit', () => {
    fc.assert(fc.property(fc.array(numberText.filter((text) => /^[-+\d.eE]+$/.test(text) && Number.isFinite(Number(text))), { minLength: 6, maxLength: 60 }), (texts) => {
      const { columns, rows } = readSampledText(`x\n${texts.map((text) => `${text};1.5`).join('\n')}\n`);
      expect(rows).toBe(texts.length);
      expect(columns[0]!.values).toEqual(Float64Array.from(texts, (text) => Number(text) + 0));
      expect([...columns[0]!.values].some((value) => Object.is(value, -0))).toBe(false);
    }), { numRuns: 500 });
  });

  it('of 17 digits come back as they were printed', () => {
    fc.assert(fc.property(fc.array(fc.double({ noNaN: true, noDefaultInfinity: true }), { minLength: 5, maxLength: 100 }), (values) => {
      const { columns } = readSampledText(values.map((value) => `1.0\t${value.toExponential(16)}`).join('\r\n'));
      expect(columns[1]!.values).toEqual(Float64Array.from(values, (value) => value + 0));
    }), { numRuns: 200 });
  });

  it('a record that is longer than its beginning promised grows', () => {
    const rows = Array.from({ length: 50_000 }, (_, i) => `${i}`);
    const reader = createSampledReader({ bytes: 100 });
    reader.take(utf8Of(rows.map((row) => `${row},-${row}`).join('\n')));
    const { columns } = reader.finish();
    expect(columns[0]!.values).toEqual(Float64Array.from(rows, Number));
    expect(columns[1]!.values).toEqual(Float64Array.from(rows, (row) => 0 - Number(row)));
  });
});
