import { describe, expect, test } from 'vitest';
import fc from 'fast-check';
import { alignedParts, chooseUnit, plain, shortNotation, tenDigits, withPlusMinus } from '../../src/units/format.ts';
import { readQuantity } from '../../src/units/quantity.ts';
import { toSi, unitNamed, unitsOf } from '../../src/units/units.ts';
import type { Dimension, Unit } from '../../src/units/units.ts';

function unit(text: string, dimension?: Dimension): Unit {
  const found = unitNamed(text, dimension);
  if (found === null) throw new Error(`no unit ${text}`);
  return found;
}
const mNs = unit('mN·s');
const mm = unit('mm');
const one = unit('1');

describe('rounding after the GUM', () => {
  // GUM (JCGM 100:2008) 7.2.2: m_S = 100.02147 g, u_c = 0.35 mg; quoted from memory.
  test('the standard of mass of 7.2.2 is 100.02147(35) g', () => {
    expect(shortNotation(0.10002147, 0.35e-6, unit('g'))).toBe('100.02147(35) g');
    expect(withPlusMinus(0.10002147, 0.35e-6, unit('g'))).toBe('100.02147 ± 0.00035 g');
  });

  // GUM 7.2.6: 10.057 62 (Ω there) with u_c = 27 m(Ω) is rounded to 10.058; 28.05 to 28; quoted from memory.
  test('10.05762 with 0.027 is 10.058(27), as in 7.2.6', () => {
    expect(shortNotation(10.05762, 0.027, unit('V'))).toBe('10.058(27) V');
    expect(withPlusMinus(1000, 28.05, unit('V'))).toBe('1000 ± 28 V');
  });

  test('value and uncertainty have the same decimals', () => {
    expect(shortNotation(1.2471e-3, 3.1e-5, mNs)).toBe('1.247(31) mN·s');
    expect(withPlusMinus(1.2471e-3, 3.1e-5, mNs)).toBe('1.247 ± 0.031 mN·s');
    expect(shortNotation(1.2e-3, 3.14e-5, mNs)).toBe('1.200(31) mN·s');
    expect(shortNotation(0.0123, 0.00123, mm)).toBe('12.3(1.2) mm');
    expect(shortNotation(12.347, 0.234, mm)).toBe('12350(230) mm');
    expect(withPlusMinus(12.347, 0.234, mm)).toBe('12350 ± 230 mm');
  });

  test('an uncertainty that rounds up to a new digit keeps the decimals', () => {
    expect(withPlusMinus(1.2471, 0.0996, one)).toBe('1.247 ± 0.100');
    expect(shortNotation(1.2471, 0.0996, one)).toBe('1.247(100)');
    expect(withPlusMinus(1.2471, 0.0994, one)).toBe('1.247 ± 0.099');
    expect(shortNotation(9.9996, 0.0012, one)).toBe('9.9996(12)');
    expect(shortNotation(9.9996, 0.012, one)).toBe('10.000(12)');
  });

  test('without a finite uncertainty the value stands alone to six digits', () => {
    for (const u of [0, Number.NaN, Infinity, 1e-18]) expect(shortNotation(0.1 / 3, u, mm)).toBe('33.3333 mm');
    expect(withPlusMinus(-0.1, 0, mm)).toBe('−100 mm');
    expect(shortNotation(Number.NaN, 1, mm)).toBe('— mm');
    expect(() => shortNotation(1, -1, mm)).toThrow(RangeError);
  });

  test('very large and very small numbers stand before a power of ten', () => {
    expect(shortNotation(1.2471e-8, 3.1e-10, unit('N·s'))).toBe('1.247(31)×10⁻⁸ N·s');
    expect(withPlusMinus(-1.2471e-8, 3.1e-10, unit('N·s'))).toBe('(−1.247 ± 0.031)×10⁻⁸ N·s');
    expect(shortNotation(1.5e6, 1234, unit('Pa'))).toBe('1.5000(12)×10⁶ Pa');
    expect(plain(1e-9, unit('m'))).toBe('1×10⁻⁹ m');
  });

  test('a negative value has a minus sign, a rounded zero none', () => {
    expect(shortNotation(-1.5e-3, 1e-4, mNs)).toBe('−1.50(10) mN·s');
    expect(shortNotation(-1e-8, 1e-4, mm)).toBe('0.00(10) mm');
  });

  test('a percentage and a degree take brackets, so that the ± is not read as a part of the value', () => {
    expect(withPlusMinus(0.05, 0.001, unit('%'))).toBe('(5.00 ± 0.10) %');
    expect(withPlusMinus(toSi(1.5, unit('°', 'angle')), toSi(0.02, unit('°', 'angle')), unit('°', 'angle'))).toBe('(1.500 ± 0.020)°');
    expect(shortNotation(1.01, 0.02, one)).toBe('1.010(20)');
  });

  test('plain numbers drop trailing zeros and keep those before the point', () => {
    expect(plain(9.80665, unit('m/s²'))).toBe('9.80665 m/s²');
    expect(plain(0, mm)).toBe('0 mm');
    expect(plain(0.1, mm)).toBe('100 mm');
    expect(plain(1.23456789, unit('m'), 3)).toBe('1.23 m');
    expect(plain(0.9999999, unit('m'), 3)).toBe('1 m');
    expect(plain(toSi(12.25, unit('°', 'angle')), unit('°', 'angle'))).toBe('12.25°');
  });

  test('parts for alignment are the whole, the decimals, the uncertainty and the unit', () => {
    expect(alignedParts(-1.2471e-3, 3.1e-5, mNs)).toEqual({ whole: '−1', fraction: '.247', spread: '0.031', unit: 'mN·s' });
    expect(alignedParts(12.347, 0.234, mm)).toEqual({ whole: '12350', fraction: '', spread: '230', unit: 'mm' });
    expect(alignedParts(1.2471e-8, 3.1e-10, unit('N·s'))).toEqual({ whole: '1', fraction: '.247', spread: '0.031', unit: '×10⁻⁸ N·s' });
    expect(alignedParts(1.5, 0, one)).toEqual({ whole: '1', fraction: '.5', spread: '', unit: '' });
  });
});

describe('what is shown reads back', () => {
  const dimensions: readonly Dimension[] = ['length', 'mass', 'impulse', 'angle', 'momentOfInertia', 'number', 'pressure', 'latitude'];
  const anyUnit = fc.constantFrom(...dimensions.flatMap((dimension) => unitsOf(dimension)));
  const anyValue = fc.double({ min: -1e7, max: 1e7, noNaN: true });
  const anyU = fc.double({ min: 1e-7, max: 1e5, noNaN: true });

  test('both notations give value and uncertainty back within the rounding of two digits', () => {
    fc.assert(fc.property(anyUnit, anyValue, anyU, (inUnit, value, u) => {
      const si = toSi(value, inUnit);
      const uSi = Math.abs(toSi(u, inUnit));
      for (const text of [shortNotation(si, uSi, inUnit), withPlusMinus(si, uSi, inUnit)]) {
        const read = readQuantity(text, inUnit.dimension, inUnit.symbol, '.');
        if (!read.ok) throw new Error(`${text}: ${read.fault}`);
        if (read.spread === null) continue;
        expect(Math.abs(read.value - si)).toBeLessThanOrEqual(0.0501 * uSi);
        expect(Math.abs(read.spread - uSi)).toBeLessThanOrEqual(0.0501 * uSi);
      }
    }));
  });

  test('value and uncertainty show the same number of decimals', () => {
    fc.assert(fc.property(anyUnit, anyValue, anyU, (inUnit, value, u) => {
      const { fraction, spread } = alignedParts(toSi(value, inUnit), Math.abs(toSi(u, inUnit)), inUnit);
      fc.pre(spread !== '');
      expect((spread.split('.')[1] ?? '').length).toBe(Math.max(0, fraction.length - 1));
    }));
  });
});

describe('ten digits for machine files', () => {
  test.each([
    [1 / 3, '0.3333333333'], [0.1 + 0.2, '0.3'], [1.247e-3, '0.001247'], [1e-7 / 3, '3.333333333e-8'], [-5e-10, '-5e-10'], [123456789.0123, '123456789'],
    [12345.678901234, '12345.6789'], [-0, '0'], [0, '0'], [1e300, '1e+300'], [Infinity, 'Infinity'],
  ])('%d is written %s', (value, text) => {
    expect(tenDigits(value)).toBe(text);
  });

  test('what is written has at most ten digits, reads back within half of the tenth, and is written again the same', () => {
    fc.assert(fc.property(fc.double({ min: -1e200, max: 1e200, noNaN: true }).filter((value) => Math.abs(value) > 1e-200), (value) => {
      const text = tenDigits(value);
      const digits = text.replace(/e.*/, '').replace(/[-.]/g, '').replace(/^0+|0+$/g, '');
      expect(digits.length).toBeLessThanOrEqual(10);
      expect(Math.abs(Number(text) / value - 1)).toBeLessThanOrEqual(5.0001e-10);
      expect(tenDigits(Number(text))).toBe(text);
    }));
  });

  test('a last bit does not show', () => {
    expect(tenDigits(0.1 * 3)).toBe(tenDigits(0.3));
  });

  test('NaN is our mistake', () => {
    expect(() => tenDigits(Number.NaN)).toThrow(RangeError);
  });
});

describe('the unit of a column', () => {
  test.each<[readonly number[], Dimension, string]>([
    [[1e-3, 2e-3, 5e-6], 'impulse', 'mN·s'], [[3e-6], 'impulse', 'µN·s'], [[4e-9], 'impulse', 'nN·s'], [[1e-13], 'impulse', 'nN·s'], [[50], 'impulse', 'N·s'],
    [[0.0315], 'length', 'mm'], [[-0.0315, 0, Number.NaN], 'length', 'mm'], [[0.001], 'length', 'mm'], [[3], 'length', 'm'], [[0.02], 'angle', 'mrad'],
    [[0.9], 'latitude', '°'], [[0.0125], 'mass', 'g'], [[2e-6], 'momentOfInertia', 'kg·mm²'], [[0.003], 'number', '1'], [[9.81], 'acceleration', 'm/s²'],
  ])('%j of %s is shown in %s', (values, dimension, symbol) => {
    expect(chooseUnit(values, dimension).symbol).toBe(symbol);
  });

  test('a column without numbers has the usual unit', () => {
    expect(chooseUnit([], 'length').symbol).toBe('mm');
    expect(chooseUnit([0, Number.NaN], 'impulse').symbol).toBe('mN·s');
  });

  test('the median of impulses from 1 nN·s to 1000 N·s lies in 1 … 1000', () => {
    fc.assert(fc.property(fc.double({ min: 1e-9, max: 999, noNaN: true }), (value) => {
      const shown = value / chooseUnit([value], 'impulse').factor;
      expect(shown).toBeGreaterThanOrEqual(1 - 1e-12);
      expect(shown).toBeLessThan(1000 + 1e-9);
    }));
  });
});
