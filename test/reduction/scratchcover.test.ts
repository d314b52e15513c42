import { it } from 'vitest';
import { writeFileSync, appendFileSync } from 'node:fs';
import { reduce } from '../../src/reduction/reduce.ts';
import { rowId } from '../fixtures/session.ts';
import { simulate, type Scenario } from './simulated.ts';
const usual: Scenario = { choices: { route: 'massesAndPeriod' }, mean: 1.27e-3, scatter: 0.03, restWander: 0.5, division: 0.5, eye: 0.15, further: 2, shots: [8, 12], taps: 6, zeroEvery: 0 };
const S: Record<string, Scenario> = {
  usual,
  masses: { ...usual, choices: { route: 'masses' } },
  routeB: { ...usual, choices: { route: 'inertiaAndPeriod' } },
  steadyRest: { ...usual, restWander: 0, scatter: 0.005 },
  steadyWide: { ...usual, restWander: 0.05, scatter: 0.03 },
  zeros: { ...usual, zeroEvery: 4 },
  fine: { ...usual, division: 0.05, eye: 0.02, scatter: 0.05 },
  longSwings: { ...usual, further: 7 },
  onediv: { ...usual, mean: 0.4e-3, scatter: 0.08, restWander: 0 }, onedivNoEye: { ...usual, mean: 0.4e-3, scatter: 0.08, restWander: 0, eye: 0 }, few3: { ...usual, shots: [3, 3] },
  tiny: { ...usual, mean: 0.25e-3, scatter: 0.1 },
  few: { ...usual, shots: [3, 4] },
  back: { ...usual, further: 1 },
};
it('cover', () => {
  const N = Number(process.env.N ?? 300);
  writeFileSync('/tmp/fs/cover.txt', '');
  for (const [name, sc] of Object.entries(S)) {
    if (process.env.ONLY && !process.env.ONLY.split(',').includes(name)) continue;
    const c = { shotG: 0, shotT: 0, meanG: 0, meanT: 0 }; const z: Record<string, number[]> = { shotG: [], shotT: [], meanG: [], meanT: [] };
    const t0 = performance.now(); let bad = 0; let share: number[] = [];
    for (let i = 0; i < N; i++) {
      const s = simulate(sc, 1000003 * i + 17 + Number(process.env.SEED ?? 0));
      const r = reduce(s.session, null);
      const shot = r.records.find((x) => x.id === rowId(s.firstShotRow))!;
      if (!shot.byTaps || !r.runs.taps) { bad++; continue; }
      const add = (k: keyof typeof c, x: { value: number; u: number; U: number }, t: number) => { if (Math.abs(x.value - t) <= x.U) c[k]++; z[k]!.push((x.value - t) / x.u); };
      add('shotG', shot.byGeometry!, s.firstShot); add('shotT', shot.byTaps, s.firstShot); add('meanG', r.runs.geometry!.mean, sc.mean); add('meanT', r.runs.taps.mean, sc.mean);
      share.push(r.runs.geometry!.uScatter / r.runs.geometry!.mean.u);
    }
    const st = (a: number[]) => { const m = a.reduce((x, y) => x + y, 0) / a.length; return `m=${m.toFixed(2)} sd=${Math.sqrt(a.reduce((x, y) => x + (y - m) ** 2, 0) / a.length).toFixed(2)}`; };
    appendFileSync('/tmp/fs/cover.txt', `${name.padEnd(12)} n=${N} bad=${bad} ${Object.entries(c).map(([k, v]) => `${k} ${(100 * v / (N - bad)).toFixed(1)}% (${st(z[k]!)})`).join('  ')} scatterShare ${(share.reduce((a, b) => a + b, 0) / share.length).toFixed(2)} ${(performance.now() - t0).toFixed(0)} ms\n`);
  }
}, 600000);
