/** Every stand read in every way: a swing integrated by ODEX, shown as that way would show it by geometry of the test's own, gives its impulse back. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { READING_WAYS, type ReadingWay } from '../../src/readings/ways.ts';
import { reduce } from '../../src/reduction/reduce.ts';
import type { EntryName } from '../../src/session/entries.ts';
import { CHOICE_VALUES, type Choices } from '../../src/session/session.ts';
import { exactly, sessionOf, type PartTexts } from '../fixtures/session.ts';
import { sheet, withSheets } from '../fixtures/sheets.ts';
import { bodyOf, factorOf, swingsAfter, type Body } from './truth.ts';

/** Relative; rest and swing are written to sixteen digits, and a rise at small angles keeps half of them. */
const TOLERANCE = 1e-7;

const between = (min: number, max: number): fc.Arbitrary<number> => fc.double({ min, max, noNaN: true });
const rig = fc.record({ m: between(1e-3, 0.2), L: between(0.1, 0.8), g: between(9.78, 9.83), ratio: between(0, 0.2), arm: between(0.4, 1), size: between(0.05, 0.4), flexure: between(0.05, 0.9), e: between(-0.05, 0.05), N: fc.integer({ min: 2000, max: 100_000 }) });
type Rig = typeof rig extends fc.Arbitrary<infer T> ? T : never;

type Texts = Partial<Record<EntryName, string>>;
interface StandMade {
  readonly body: Body;
  readonly entries: Texts;
  readonly choices: Partial<Choices>;
  readonly parts?: readonly PartTexts[];
}

const kg = (x: number): string => `${exactly(x)} kg`;
const metres = (x: number): string => `${exactly(x)} m`;

/** The rigid stands; the hanging film, whose swing is no pendulum's, is held against a beam of its own in film.test.ts. */
const STANDS: Readonly<Record<string, (r: Rig) => StandMade>> = {
  'point bob': (r) => ({ body: bodyOf([{ m: r.m, r: r.L, own: 0 }], r.g, 0, r.ratio), entries: { bobMass: kg(r.m), bobDistance: metres(r.L) }, choices: { form: 'pointBob' } }),
  'uniform strip': (r) => ({ body: bodyOf([{ m: r.m, r: r.L / 2, own: (r.m * r.L ** 2) / 12 }], r.g, 0, r.ratio), entries: { stripMass: kg(r.m), stripLength: metres(r.L) }, choices: { form: 'uniformStrip' } }),
  'strip with a plate': (r) => ({
    body: bodyOf([{ m: r.m, r: r.L / 2, own: (r.m * r.L ** 2) / 12 }, { m: r.m / 2, r: 0.9 * r.L, own: 1e-6 }], r.g, 0, r.ratio),
    entries: { stripMass: kg(r.m), stripLength: metres(r.L), plateMass: kg(r.m / 2), plateDistance: metres(0.9 * r.L), plateInertia: '1e-6 kg·m²' }, choices: { form: 'stripWithPlate' },
  }),
  'body of parts with a flexure': (r) => {
    const bare = bodyOf([{ m: r.m, r: 0.8 * r.L, own: 1e-6 }, { m: r.m / 3, r: -0.2 * r.L, own: 0 }], r.g, 0, 0);
    const k = (bare.weight * r.flexure) / (1 - r.flexure);
    return {
      body: { ...bare, stiffness: bare.weight + k, ratio: r.ratio }, entries: { flexureStiffness: `${exactly(k)} N·m/rad` }, choices: { form: 'bodyOfParts' },
      parts: [{ mass: kg(r.m), distance: metres(0.8 * r.L), ownInertia: '1e-6 kg·m²' }, { mass: kg(r.m / 3), distance: metres(-0.2 * r.L) }],
    };
  },
  'torsion stand': (r) => {
    const inertia = r.m * r.L ** 2;
    return { body: { inertia, stiffness: r.flexure, weight: 0, ratio: r.ratio }, entries: { flexureStiffness: `${exactly(r.flexure)} N·m/rad` }, choices: { form: 'bodyOfParts', restoring: 'flexureAlone' }, parts: [{ mass: kg(r.m), distance: metres(r.L) }] };
  },
  'known by period and stiffness': (r) => {
    const body = bodyOf([{ m: r.m, r: r.L, own: 0 }], r.g, 0, r.ratio);
    return {
      body, choices: { form: 'periodAndStiffness' },
      entries: { staticStiffness: `${exactly(body.stiffness)} N·m/rad`, period: `${exactly((2 * Math.PI * Math.sqrt(body.inertia / body.stiffness)) / Math.sqrt(1 - r.ratio ** 2))} s` },
    };
  },
};

/** What each way shows of θ, and what it is told of the stand. x(θ) − x(0), in its SI unit. */
const WAYS_SHOWN: Readonly<Record<ReadingWay, { readonly unit: string; readonly entries: (r: Rig) => Texts; readonly shows: (theta: number, r: Rig) => number }>> = {
  rulerAtTip: { unit: 'm', entries: (r) => ({ readingRadius: metres(r.L) }), shows: (t, r) => r.L * Math.sin(t) },
  rulerUnderLine: { unit: 'm', entries: (r) => ({ rulerHeight: metres(r.L) }), shows: (t, r) => r.L * Math.tan(t) },
  arcRuler: { unit: 'm', entries: (r) => ({ readingRadius: metres(r.L) }), shows: (t, r) => r.L * t },
  chord: { unit: 'm', entries: (r) => ({ readingRadius: metres(r.L) }), shows: (t, r) => Math.hypot(r.L * Math.sin(t), r.L * (1 - Math.cos(t))) },
  rise: { unit: 'm', entries: (r) => ({ readingRadius: metres(r.L) }), shows: (t, r) => 2 * r.L * Math.sin(t / 2) ** 2 },
  laserSpot: { unit: 'm', entries: (r) => ({ screenDistance: metres(3 * r.L) }), shows: (t, r) => 3 * r.L * Math.tan(2 * t) },
  cameraMarker: { unit: 'px', entries: (r) => ({ readingRadius: metres(r.L), pixelScale: '4 px/mm' }), shows: (t, r) => 4000 * r.L * Math.sin(t) },
  cameraPivotMarker: { unit: 'px', entries: () => ({ pivotAcross: '500 px', pivotDown: '40 px' }), shows: (t) => t },
  sensorOnFace: { unit: 'm', entries: (r) => ({ sensorHeight: metres(r.L), faceOffset: metres(r.e) }), shows: (t, r) => r.L * Math.tan(t) + r.e * (1 / Math.cos(t) - 1) },
  sensorOnPoint: { unit: 'm', entries: (r) => ({ readingRadius: metres(r.L) }), shows: (t, r) => r.L * Math.sin(t) },
  encoder: { unit: 'counts', entries: (r) => ({ countsPerTurn: `${r.N} counts` }), shows: (t, r) => (r.N * t) / (2 * Math.PI) },
  angle: { unit: 'rad', entries: () => ({}), shows: (t) => t },
};

const pairs = Object.keys(STANDS).flatMap((stand) => READING_WAYS.map((way) => [stand, way] as const));

describe('an impulse comes back', () => {
  it.each(pairs)('%s, read as %s', (standName, way) => {
    fc.assert(fc.property(rig, (r) => {
      const stand = STANDS[standName]!(r);
      const shown = WAYS_SHOWN[way];
      const arm = r.arm * r.L;
      const impulse = (r.size * factorOf(stand.body)) / arm;
      const [theta] = swingsAfter(stand.body, impulse * arm, 1);
      const session = sessionOf({
        choices: { dampingWay: 'ratio', readingWay: way, ...stand.choices }, ...(stand.parts ? { parts: stand.parts } : {}),
        entries: { gravity: `${exactly(r.g)} m/s²`, leverArm: metres(arm), dampingRatio: exactly(r.ratio), division: `1e-12 ${shown.unit}`, ...shown.entries(r), ...stand.entries },
      });
      const picture = (t: number): readonly string[] => [exactly(500 + 900 * Math.sin(t)), exactly(40 + 900 * Math.cos(t))];
      const sheetMade = way === 'cameraPivotMarker'
        ? sheet('shots', [['rest', 'px'], ['restDown', 'px'], ['firstSwing', 'px'], ['firstSwingDown', 'px']], [[...picture(0.02), ...picture(0.02 + theta!)]], { kindOfAll: 'shot' })
        : sheet('shots', [['rest', shown.unit], ['firstSwing', shown.unit]], [['0', exactly(shown.shows(theta!, r))]], { kindOfAll: 'shot' });
      const { records, problems } = reduce(withSheets(session, sheetMade), null);
      expect(problems.filter(({ weight }) => weight === 'stops')).toEqual([]);
      expect(Math.abs(records[0]!.impulseBit!.value / impulse - 1)).toBeLessThan(TOLERANCE);
    }), { numRuns: 6 });
  });

  it('names every form of the pendulum but the film', () => {
    const forms = new Set(Object.values(STANDS).map((of) => of({ m: 0.1, L: 0.3, g: 9.81, ratio: 0, arm: 0.8, size: 0.1, flexure: 0.1, e: 0, N: 4000 }).choices.form));
    expect(CHOICE_VALUES.form.filter((form) => !forms.has(form))).toEqual(['filmStrip']);
  });
});
