import { describe, expect, test } from 'vitest';
import fc from 'fast-check';
import { fromSi, siUnit, toSi, unitNamed, unitsOf } from '../../src/units/units.ts';
import type { Dimension, Unit } from '../../src/units/units.ts';
import reference from '../reference/units.json' with { type: 'json' };

const DIMENSIONS: readonly Dimension[] = [
  'length', 'mass', 'angle', 'latitude', 'time', 'impulse', 'angularImpulse', 'pressure', 'voltage',
  'momentOfInertia', 'rotationalStiffness', 'angularFrequency', 'calibrationFactor', 'acceleration', 'number',
  'pixel', 'count', 'pixelScale', 'stiffness', 'force', 'celsius', 'density', 'modulus', 'capacitance', 'resistance', 'magneticFluxDensity',
];
const ALL = DIMENSIONS.flatMap((dimension) => unitsOf(dimension));

function unit(text: string, dimension?: Dimension): Unit {
  const found = unitNamed(text, dimension);
  if (found === null) throw new Error(`no unit ${text}`);
  return found;
}

describe('conversion factors agree with NIST SP 811 App. B and the SI Brochure', () => {
  const { expected, tolerance } = reference;
  test.each([
    ['in', expected.inch_m], ['mil', expected.mil_m], ['lbf·s', expected.lbf_s_Ns], ['dyn·s', expected.dyn_s_Ns],
    ['gf·s', expected.gf_s_Ns], ['kgf·s', expected.kgf_s_Ns], ['ozf·s', expected.ozf_s_Ns], ['pdl·s', expected.poundal_s_Ns],
    ['lb', expected.lb_kg], ['grain', expected.grain_kg], ['°', expected.deg_rad], ['mmHg', expected.mmHg_Pa], ['atm', expected.atm_Pa],
  ])('one %s is %d SI units', (symbol, si) => {
    expect(Math.abs(toSi(1, unit(symbol)) / si - 1)).toBeLessThanOrEqual(tolerance);
  });

  test('one pound-force second in dyne seconds', () => {
    const dyne = fromSi(toSi(1, unit('lbf·s')), unit('dyn·s'));
    expect(Math.abs(dyne / expected.lbf_s_in_dyn_s - 1)).toBeLessThanOrEqual(tolerance);
  });

  // SI Brochure and NIST SP 811 App. B.8, from memory; the last is lbf/in² from the exact definitions.
  test.each([
    ['Torr', 101325 / 760], ['mTorr', 0.101325 / 0.76], ['inHg', 3386.388640341], ['mbar', 100], ['µbar', 0.1], ['psi', 6894.757293168361],
    ['−kPa', -1000], ['−inHg', -3386.388640341], ['mΩ', 1e-3], ['µF', 1e-6], ['µT', 1e-6],
    ['ft', 0.3048], ['oz', 0.028349523125], ['Gal', 0.01], ['mGal', 1e-5], ['g·cm/s', 1e-5], ['g·mm²', 1e-9], ['g·cm²', 1e-7],
    ['N·mm/rad', 1e-3], ['N·m/°', 180 / Math.PI], ['′', Math.PI / 10800], ['″', Math.PI / 648000],
  ])('one %s is %d SI units, by its definition', (symbol, si) => {
    const dimension = ['′', '″'].includes(symbol) ? 'angle' : undefined;
    expect(Math.abs(unit(symbol, dimension).factor / si - 1)).toBeLessThanOrEqual(4e-16);
  });
});

describe('the table of units', () => {
  test.each(DIMENSIONS)('%s has its SI unit first, with factor one', (dimension) => {
    expect(siUnit(dimension).factor).toBe(1);
    expect(unitsOf(dimension)[0]).toBe(siUnit(dimension));
  });

  test('every symbol as shown names its own unit', () => {
    for (const one of ALL) expect(unitNamed(one.symbol, one.dimension)).toBe(one);
  });

  test('decimal units convert without a lost bit', () => {
    expect(toSi(118, unit('mm'))).toBe(0.118);
    expect(toSi(3, unit('µN·s'))).toBe(3e-6);
    expect(toSi(0.5, unit('in'))).toBe(0.0127);
  });

  test('a value comes back from any unit to a part in 10^15', () => {
    fc.assert(fc.property(fc.constantFrom(...ALL), fc.double({ min: 1e-12, max: 1e12, noNaN: true }), (one, value) => {
      expect(Math.abs(fromSi(toSi(value, one), one) / value - 1)).toBeLessThan(1e-15);
    }));
  });

  test('the decimal prefixes are a thousand apart', () => {
    expect(toSi(1000, unit('nN·s'))).toBe(toSi(1, unit('µN·s')));
    expect(toSi(1000, unit('mN·s'))).toBe(toSi(1, unit('N·s')));
  });
});

describe('units in the spellings of the bench', () => {
  test.each([
    ['N.s', 'N·s'], ['N*s', 'N·s'], ['N s', 'N·s'], ['Ns', 'N·s'], ['N-s', 'N·s'], ['N⋅s', 'N·s'], ['N•s', 'N·s'], ['s·N', 'N·s'], ['NS', 'N·s'],
    ['uN.s', 'µN·s'], ['\u03BCN·s', 'µN·s'], ['\u00B5N·s', 'µN·s'], ['uNs', 'µN·s'], ['mN-sec', 'mN·s'], ['newton-seconds', 'N·s'],
    ['µN s', 'µN·s'], ['lbf-s', 'lbf·s'], ['lb-sec', 'lbf·s'], ['g cm/s', 'g·cm/s'], ['kg m s^-1', 'kg·m/s'], ['dyne sec', 'dyn·s'],
    ['m/s^2', 'm/s²'], ['m/s2', 'm/s²'], ['m·s⁻²', 'm/s²'], ['m s-2', 'm/s²'], ['m/s/s', 'm/s²'], ['m per s²', 'm/s²'], ['mgal', 'mGal'],
    ['kg m2', 'kg·m²'], ['kg·m^2', 'kg·m²'], ['kg*m**2', null], ['g·mm2', 'g·mm²'],
    ['Nm/rad', 'N·m/rad'], ['mNm/rad', 'mN·m/rad'], ['uN*m/rad', 'µN·m/rad'], ['N·m/deg', 'N·m/°'], ['Nmm/rad', 'N·mm/rad'],
    ['N·m·s/rad', 'N·m·s/rad'], ['mN·m/(rad/s)', 'mN·m·s/rad'], ['uNms/rad', 'µN·m·s/rad'], ['1/s', 'rad/s'], ['rad s-1', 'rad/s'],
    ['MM', 'mm'], ['millimeters', 'mm'], ['in.', 'in'], ['inches', 'in'], ['"', 'in'], ['thou', 'mil'], ['um', 'µm'], ['㎜', 'mm'], ['[mm]', 'mm'],
    ['KG', 'kg'], ['lbs', 'lb'], ['deg', '°'], ['degrees', '°'], ['º', '°'], ['MRAD', 'mrad'], ['SEC', 's'], ['ms', 'ms'],
    ['torr', 'Torr'], ['TORR', 'Torr'], ['mmHg', 'mmHg'], ['mm Hg', 'mmHg'], ['in Hg', 'inHg'], ['MBAR', 'mbar'], ['hpa', 'hPa'], ['kv', 'kV'],
    ['percent', '%'], ['ppm', 'ppm'],
  ])('%s is %s', (text, symbol) => {
    expect(unitNamed(text)?.symbol ?? null).toBe(symbol);
  });

  test.each(['MN·s', 'MNs', 'Mm', 'Mg', 'Mrad', 'Mbar', 'MV', 'mpa', 'ns', 'NM', 'gr', '', ' ', 'N·m/rad·s', 'furlong', 'N²', 'mm·', '·', '/', '1/'])(
    '%s is no unit: mega, nano and what the table does not have are never guessed', (text) => {
      expect(unitNamed(text)).toBeNull();
    });

  test('a sign that two dimensions share is read by the dimension', () => {
    expect(unitNamed('"', 'angle')?.symbol).toBe('″');
    expect(unitNamed('″', 'length')?.symbol).toBe('in');
    expect(unitNamed("'", 'angle')?.symbol).toBe('′');
    expect(unitNamed('arcsec', 'length')).toBeNull();
    expect(unitNamed('°', 'latitude')?.dimension).toBe('latitude');
    expect(unitNamed('kg', 'length')).toBeNull();
  });

  test('a southern latitude counts negative', () => {
    expect(toSi(90, unit('° S', 'latitude'))).toBe(-Math.PI / 2);
    expect(toSi(90, unit('°N', 'latitude'))).toBe(Math.PI / 2);
  });

  test('any text names one unit or none, and never throws', () => {
    fc.assert(fc.property(fc.oneof(fc.string(), fc.string({ unit: fc.constantFrom(...'mNsgkµ·/^2-( )radM°') })), (text) => {
      const found = unitNamed(text);
      expect(found === null || ALL.includes(found)).toBe(true);
    }));
  });
});
