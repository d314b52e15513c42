import { test } from 'vitest';
import { writeFileSync } from 'node:fs';
import { nextTurningPoint } from '../../src/pendulum/launch.ts';
import { ratioFromSwings } from '../../src/pendulum/damping.ts';
test('probe', () => {
  const out: string[] = [];
  for (const a of [0.003, 0.1, 0.35, 1]) for (const zeta of [0.002, 0.05, 0.3]) for (const rest of [null, 0]) {
    const pts: { number: number; angle: number }[] = []; let x = a; for (let k = 0; k < 5; k++) { pts.push({ number: k, angle: x }); x = nextTurningPoint(x, zeta, 1); }
    const f = ratioFromSwings(rest, pts, 1);
    let worst = 0; const h = a * 1e-4;
    const norm = Math.hypot(...f.sensitivities);
    const off = rest === null ? 0 : 1;
    for (let i = 0; i < f.sensitivities.length; i++) {
      const at = (d: number) => { const q = pts.map((p, j) => ({ ...p, angle: p.angle + (j + off === i ? d : 0) })); return ratioFromSwings(rest === null ? null : rest + (i === 0 ? d : 0), q, 1).dampingRatio; };
      const num = (at(h) - at(-h)) / (2 * h);
      worst = Math.max(worst, Math.abs(num - f.sensitivities[i]!) / norm);
    }
    out.push(`sens a${a} z${zeta} r${rest} worst ${worst} dz ${f.dampingRatio - zeta}`);
  }
  writeFileSync('/tmp/fs/probe.txt', out.join('\n') + '\n');
}, 120000);
