import { test } from 'vitest';
import { writeFileSync } from 'node:fs';
import { turningPoints, turningPointAfter, stateAt, atRest } from './odexSwing.ts';
import { launchOfFirstSwing, nextTurningPoint, peakTimeOfSmall } from '../../src/pendulum/launch.ts';
import { ratioFromSwings, dampingFactor } from '../../src/pendulum/damping.ts';
test('probe', () => {
  const out: string[] = [];
  let seed = 12345;
  const rnd = () => { seed = (Math.imul(seed, 1664525) + 1013904223) >>> 0; return (seed + 0.5) / 4294967296; };
  const gauss = () => Math.sqrt(-2 * Math.log(rnd())) * Math.cos(2 * Math.PI * rnd());
  for (const a of [0.003, 0.05, 0.3, 1.2, 2]) for (const p of [0, 0.7, 1]) for (const zeta of [0, 0.0005, 0.005, 0.05, 0.3, 0.6]) for (const n of [2, 3, 4, 8, 30]) for (const rest of [null, 0]) for (const rel of [1e-3, 0.01, 0.05]) {
    let angles: number[];
    angles = [a]; while (angles.length < n) angles.push(nextTurningPoint(angles.at(-1)!, zeta, p));
    const count: Record<string, number> = {};
    const N = 60; const zs: number[] = []; let us = 0;
    for (let i = 0; i < N; i++) {
      const noisy = angles.map((angle, number) => ({ number, angle: angle + rel * a * gauss() }));
      let status: string;
      try { const r = ratioFromSwings(rest === null ? null : rel * a * gauss(), noisy, p); status = r.status; if (r.status === 'found') { zs.push(r.dampingRatio); us += rel * a * rel * a * r.sensitivities.reduce((s, c) => s + c * c, 0); } } catch (e) { status = String(e).slice(0, 40); }
      count[status] = (count[status] ?? 0) + 1;
    }
    const m = zs.reduce((x, y) => x + y, 0) / zs.length; const sd = Math.sqrt(zs.reduce((s, z) => s + (z - m) ** 2, 0) / (zs.length - 1));
    const bad = Object.keys(count).filter((k) => k !== 'found' && k !== 'tooFew');
    const ratio = Math.sqrt(us / zs.length) / sd;
    if (bad.length > 0 || ratio < 0.6 || ratio > 1.7) out.push(`a${a} p${p} z${zeta} n${n} r${rest} rel${rel} ${JSON.stringify(count)} mean ${m} sd ${sd} pred/sd ${ratio}`);
  }
  // Mixed
  for (const z of [0.9, 0.99, 0.995, 0.999, 0.99995, 1, 1.00005, 1.001, 1.005, 1.01, 1.1]) out.push(`D ${z} ${dampingFactor(z)} ${peakTimeOfSmall(z)}`);
  for (const z of [-0.4, -0.1, 2, 5, 20, 100]) { try { const l = launchOfFirstSwing(0.1, z, 1); out.push(`z ${z} ${l.launch} ${0.1*dampingFactor(z)} ${turningPointAfter({ zeta: z, p: 1 }, atRest(l.launch)).angle}`); } catch (e) { out.push(`z${z} ${e}`); } }
  for (const a of [1e-300, 1e-12, 3, 3.1, 3.14, 3.14159, 3.1415926535]) for (const z of [0, 0.01, 0.3]) { try { const l = launchOfFirstSwing(a, z, 1); out.push(`a ${a} z${z} ${l.launch / (2 * Math.sin(a / 2)) - 1} t ${l.peakTime}`); } catch (e) { out.push(`a${a} z${z} ${e}`); } }
  writeFileSync('/tmp/fs/probe.txt', out.join('\n') + '\n');
}, 120000);
