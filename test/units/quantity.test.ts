import { describe, expect, test } from 'vitest';
import fc from 'fast-check';
import { readNumber, readQuantity } from '../../src/units/quantity.ts';
import { unitsOf } from '../../src/units/units.ts';
import type { Dimension } from '../../src/units/units.ts';

describe('a number in a cell', () => {
  test.each([
    ['12.5', 12.5], ['12,5', 12.5], ['−3', -3], ['–3', -3], ['+4', 4], ['.5', 0.5], [',5', 0.5], ['5.', 5], ['  7 ', 7], ['-0', 0],
    ['1.2e-3', 1.2e-3], ['1.2E+3', 1200], ['1,2·10^-3', 1.2e-3], ['1.2×10⁻³', 1.2e-3], ['1.2 x 10^(-3)', 1.2e-3], ['1.2*10^3', 1200],
    ['1.234,5', 1234.5], ['1,234.5', 1234.5], ['1,234,567', 1234567], ['1.234.567', 1234567], ['1.234.567,8', 1234567.8],
    ['1\u2009234.5', 1234.5], ['1\u202F234,5', 1234.5], ['1\u00A0234', 1234], ['1\u2007234\u2007567', 1234567], ["1'234.5", 1234.5], ['1’234.5', 1234.5],
    ['1,234', 1.234], ['0,123', 0.123], ['00012', 12],
  ])('%s reads as %d', (text, value) => {
    expect(readNumber(text)).toBe(value);
  });

  test.each([
    '', ' ', '-', '+', '.', ',', 'abc', '0x10', '0b1', 'Infinity', '-Infinity', 'NaN', '1e', 'e5', '1e999', '1.2.3', '1,2,3', '1,23,456', '12 5', '1..2',
    '1.234,5,6', '12,5 mm', '1-2', '--1', '5%', '1/2', '½', '1 2 3', '1 234', '31.625 120', '12 34.5', "1'23", '1,234 567.8', '=1+1', '1_000',
  ])('"%s" is no number', (text) => {
    expect(readNumber(text)).toBeNull();
  });

  test('a known decimal mark leaves the other to group thousands only', () => {
    expect(readNumber('1,234', '.')).toBe(1234);
    expect(readNumber('1.234', ',')).toBe(1234);
    expect(readNumber('1,234', ',')).toBe(1.234);
    expect(readNumber('1.234', '.')).toBe(1.234);
    expect(readNumber('12,5', '.')).toBeNull();
    expect(readNumber('12.5', ',')).toBeNull();
    expect(readNumber('0,123', '.')).toBeNull();
    expect(readNumber('1,234.5', ',')).toBeNull();
  });

  test('every finite number reads back from its own text, with point or comma', () => {
    fc.assert(fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => {
      expect(readNumber(String(value), '.')).toBe(value === 0 ? 0 : value);
      expect(readNumber(String(value).replace('.', ','), ',')).toBe(value === 0 ? 0 : value);
    }));
  });

  test('grouped thousands read as the number without groups', () => {
    fc.assert(fc.property(fc.integer({ min: 0, max: 1e12 }), fc.constantFrom('\u00A0', '\u2009', '\u202F', "'"), (value, mark) => {
      expect(readNumber(String(value).replace(/\B(?=(\d{3})+$)/g, mark))).toBe(value);
    }));
  });

  test('any text gives a finite number or none', () => {
    fc.assert(fc.property(fc.oneof(fc.string(), fc.string({ unit: fc.constantFrom(...'0123456789.,-+e ×^') })), (text) => {
      const value = readNumber(text);
      expect(value === null || Number.isFinite(value)).toBe(true);
    }));
  });
});

/** Value and spread in millimetres, rounded where the conversion to metres rounds. */
const inMillimetres = (text: string, decimal?: '.' | ','): readonly unknown[] => {
  const read = readQuantity(text, 'length', 'mm', decimal);
  if (!read.ok) return [read.fault, read.found];
  const shown = (si: number): number => Number((si * 1000).toPrecision(12));
  return [shown(read.value), read.spread === null ? null : shown(read.spread), read.unit.symbol];
};

describe('a quantity as people write it', () => {
  test.each([
    ['118.0 ± 0.3 mm', 118, 0.3, 'mm'], ['118.0 +/- 0.3 mm', 118, 0.3, 'mm'], ['118.0 +- 0.3mm', 118, 0.3, 'mm'], ['118.0±0.3mm', 118, 0.3, 'mm'],
    ['118.0 + / − 0.3 mm', 118, 0.3, 'mm'], ['(118.0 ± 0.3) mm', 118, 0.3, 'mm'], ['( 118.0 mm ± 0.3 mm )', 118, 0.3, 'mm'],
    ['118.0 mm (± 0.3 mm)', 118, 0.3, 'mm'], ['118.0 mm ± 0.3', 118, 0.3, 'mm'], ['118.0 mm ± 0.3 mm', 118, 0.3, 'mm'],
    ['118.0(3) mm', 118, 0.3, 'mm'], ['118(2) mm', 118, 2, 'mm'], ['118.0(1.5) mm', 118, 1.5, 'mm'], ['118,0(1,5) mm', 118, 1.5, 'mm'],
    ['118.0 (3) mm', 118, 0.3, 'mm'], ['1.2345(12) m', 1234.5, 1.2, 'm'], ['12,5 mm', 12.5, null, 'mm'], ['12,5 ± 0,1 mm', 12.5, 0.1, 'mm'],
    ['118 mm ± 1 %', 118, 1.18, 'mm'], ['118 ± 1 %', 118, 1.18, 'mm'], ['(118 ± 1 %) mm', 118, 1.18, 'mm'], ['−118 mm ± 1 %', -118, 1.18, 'mm'],
    ['118 mm ± 200 ppm', 118, 0.0236, 'mm'], ['11.8 cm ± 3 mm', 118, 3, 'cm'], ['1.2e-3 ± 1e-5 m', 1.2, 0.01, 'm'], ['1e-3m', 1, null, 'm'],
    ['(1.20 ± 0.02)e-3 m', 1.2, 0.02, 'm'], ['(1.20 ± 0.02)·10^-3 m', 1.2, 0.02, 'm'], ['1.20(2)×10⁻³ m', 1.2, 0.02, 'm'], ['1.20(2)e-3 m', 1.2, 0.02, 'm'],
    ['118', 118, null, 'mm'], ['118 ± 0', 118, 0, 'mm'], ['-5 mm', -5, null, 'mm'], ['1\u202F234,5 mm', 1234.5, null, 'mm'], ['(118 ± 1 mm) mm', 118, 1, 'mm'], ['2"', 50.8, null, 'in'],
  ])('%s is %d mm with %s', (text, value, spread, unit) => {
    expect(inMillimetres(text)).toEqual([value, spread, unit]);
  });

  test.each<[string, string, string]>([
    ['', 'empty', ''], ['   ', 'empty', ''], ['abc', 'notANumber', 'abc'], ['mm', 'notANumber', 'mm'], ['± 3 mm', 'notANumber', '± 3 mm'],
    ['1.2.3 mm', 'notANumber', '1.2.3 mm'], ['12-15 mm', 'notANumber', '12-15 mm'], ['12 13 mm', 'notANumber', '12 13 mm'],
    ['118 px', 'wrongDimension', 'px'], ['118 Mm', 'unknownUnit', 'Mm'], ['118 mm or so', 'unknownUnit', 'mm or so'], ['(118 mm ± 1) mm', 'unknownUnit', 'mm'], ['118 200 mm', 'notANumber', '118 200 mm'],
    ['118 g', 'wrongDimension', 'g'], ['118 ± 1 g', 'wrongDimension', 'g'], ['118 mm ± 1 g', 'wrongDimension', 'g'], ['5 %', 'wrongDimension', '%'],
    ['118 ± -1 mm', 'badSpread', '-1 mm'], ['118 ± x mm', 'badSpread', 'x mm'], ['118 mm ±', 'badSpread', '118 mm ±'], ['118.0(3) ± 1 mm', 'badSpread', '1 mm'],
    ['118 ± −0.3 mm', 'badSpread', '-0.3 mm'], ['118.0(1.2.3) mm', 'badSpread', '1.2.3'],
  ])('"%s" is told as %s', (text, fault, found) => {
    expect(inMillimetres(text)).toEqual([fault, found]);
  });

  test('the same length in five notations is the same length', () => {
    const lengths = ['118.0(3) mm', '118.0 ± 0.3 mm', '11.80(3) cm', '0.1180(3) m', '(1.180 ± 0.003)e2 mm'].map((text) => inMillimetres(text).slice(0, 2));
    for (const one of lengths) expect(one).toEqual([118, 0.3]);
  });

  // GUM (JCGM 100:2008) 7.2.2, a standard of mass in three notations; quoted from memory.
  test.each(['100.02147(35) g', '100.02147(0.00035) g', '(100.02147 ± 0.00035) g'])('%s is the GUM’s m_S', (text) => {
    expect(readQuantity(text, 'mass', 'g')).toMatchObject({ ok: true, value: 100.02147 / 1000, unitAssumed: false });
    const read = readQuantity(text, 'mass', 'g');
    expect(read.ok ? read.spread : null).toBeCloseTo(3.5e-7, 18);
  });

  test('a percentage of a pure number is a part of the value, of a percentage an amount', () => {
    const parts = (text: string, usual = '1'): readonly unknown[] => {
      const read = readQuantity(text, 'number', usual);
      return read.ok ? [read.value, read.spread] : [read.fault];
    };
    expect(parts('1 ± 2 %')).toEqual([1, 0.02]);
    expect(parts('5 ± 1 %')).toEqual([5, 0.05]);
    expect(parts('5 %')).toEqual([0.05, null]);
    expect(parts('5 % ± 1 %')).toEqual([0.05, 0.01]);
    expect(parts('(5 ± 1) %')).toEqual([0.05, 0.01]);
    expect(parts('5(1) %')).toEqual([0.05, 0.01]);
    expect(parts('2', '%')).toEqual([0.02, null]);
    expect(parts('1.002 ± 0.001')).toEqual([1.002, 0.001]);
  });

  test('a number alone takes the usual unit and says so', () => {
    expect(readQuantity('12,5', 'mass', 'g')).toEqual({
      ok: true, value: 0.0125, spread: null, unit: unitsOf('mass').find((one) => one.symbol === 'g'), unitAssumed: true, decimals: 1, ambiguousComma: false,
    });
    expect(readQuantity('12,5 g', 'mass', 'kg')).toMatchObject({ value: 0.0125, unitAssumed: false });
    expect(readQuantity('118 ± 0.3 mm', 'length', 'm')).toMatchObject({ value: 0.118, unitAssumed: false });
  });

  test('a southern latitude is negative with a spread that is not', () => {
    expect(readQuantity('33.9 ± 0.1 ° S', 'latitude', '°')).toMatchObject({ value: (-33.9 * Math.PI) / 180, spread: (0.1 * Math.PI) / 180 });
  });

  test('decimals are those typed, in the unit', () => {
    for (const [text, decimals] of [['118', 0], ['118.0', 1], ['118.00(3) mm', 2], ['1.20e-3 m', 5], ['1.2e3 mm', 0], ['1,250 ± 0,005', 3]] as const) {
      expect(readQuantity(text, 'length', 'mm')).toMatchObject({ ok: true, decimals });
    }
  });

  test('a comma before three digits is told as doubtful unless the rest settles it', () => {
    const doubtful = (text: string, decimal?: '.' | ','): readonly unknown[] => {
      const read = readQuantity(text, 'number', '1', decimal);
      return read.ok ? [read.value, read.ambiguousComma] : [read.fault];
    };
    expect(doubtful('1,234')).toEqual([1.234, true]);
    expect(doubtful('-1,234')).toEqual([-1.234, true]);
    expect(doubtful('1,234(5)')).toEqual([1.234, true]);
    expect(doubtful('1,234 ± 0,005')).toEqual([1.234, false]);
    expect(doubtful('1,234 ± 0.5')).toEqual([1234, true]);
    expect(doubtful('0,123')).toEqual([0.123, false]);
    expect(doubtful('1,23')).toEqual([1.23, false]);
    expect(doubtful('1,234,567')).toEqual([1234567, false]);
    expect(doubtful('1,234.5')).toEqual([1234.5, false]);
    expect(doubtful('1.234')).toEqual([1.234, false]);
    expect(doubtful('1,234', ',')).toEqual([1.234, false]);
    expect(doubtful('1,234', '.')).toEqual([1234, false]);
  });

  test('a usual unit that is none of the dimension is our mistake', () => {
    expect(() => readQuantity('1', 'length', 'kg')).toThrow(RangeError);
  });
});

describe('typed quantities over all units', () => {
  const dimensions: readonly Dimension[] = ['length', 'mass', 'impulse', 'pressure', 'momentOfInertia', 'calibrationFactor', 'acceleration', 'angle'];
  const anyUnit = fc.constantFrom(...dimensions.flatMap((dimension) => unitsOf(dimension)));
  const digits = fc.record({ whole: fc.integer({ min: -999999, max: 999999 }), decimals: fc.integer({ min: 0, max: 5 }), last: fc.integer({ min: 0, max: 9999 }) });

  test('every notation of one value and spread reads the same, with point or comma', () => {
    fc.assert(fc.property(anyUnit, digits, fc.constantFrom('.', ','), (unit, { whole, decimals, last }, mark) => {
      const value = (whole / 10 ** decimals).toFixed(decimals);
      const spread = (last / 10 ** decimals).toFixed(decimals);
      const read = [
        `${value} ± ${spread} ${unit.symbol}`, `(${value} +/- ${spread}) ${unit.symbol}`, `${value}(${last}) ${unit.symbol}`,
        `${value.replace('-', '−')} ${unit.symbol} ± ${spread} ${unit.symbol}`,
      ].map((text) => readQuantity(text.replace(/\./g, mark), unit.dimension, unit.symbol, mark === '.' ? '.' : ','));
      const [first] = read;
      expect(first).toMatchObject({ ok: true, unit, decimals, unitAssumed: false });
      if (first?.ok !== true || first.spread === null) throw new Error('not read');
      expect(first.value).toBeCloseTo(Number(value) * unit.factor, 5);
      for (const other of read) expect(other).toEqual(first);
    }));
  });

  test('any text gives finite numbers or a fault', () => {
    fc.assert(fc.property(fc.oneof(fc.string(), fc.string({ unit: fc.constantFrom(...'019.,-+±()e ×^mg%°') })), (text) => {
      const read = readQuantity(text, 'length', 'mm');
      expect(read.ok ? Number.isFinite(read.value) && (read.spread === null || read.spread >= 0) : read.fault.length > 0).toBe(true);
    }));
  });
});
