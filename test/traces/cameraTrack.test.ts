/** Arcs of a swinging marker, drawn with noise, and what is told of them. */
import { describe, expect, it } from 'vitest';
import { fitArc, leanOf, type Arc } from '../../src/traces/cameraTrack.ts';
import { draws } from '../metrology/sources.ts';

/** A marker `radius` px below (400, −150), its plumb line leaning by `lean`, swinging by ±`swing` rad; y downward. */
function track(radius: number, swing: number, { lean = 0, noise = 0.2, frames = 600, seed = 1 } = {}): readonly [Float64Array, Float64Array] {
  const { normal } = draws(seed);
  const theta = Array.from({ length: frames }, (_, i) => lean + swing * Math.cos(0.3 * i) * Math.exp(-0.001 * i));
  return [Float64Array.from(theta, (angle) => 400 + radius * Math.sin(angle) + noise * normal()), Float64Array.from(theta, (angle) => -150 + radius * Math.cos(angle) + noise * normal())];
}
const fitted = (...args: Parameters<typeof track>): Arc => {
  const arc = fitArc(...track(...args));
  if (arc.status !== 'fitted') throw new Error(arc.status);
  return arc;
};

describe('an arc', () => {
  it.each([[600, 0.3], [900, 0.15], [300, 1.2], [300, Math.PI]])('of %d px over ±%d rad comes back', (radius, swing) => {
    const { centre, radius: found, noise } = fitted(radius, swing, { noise: 0 });
    expect(found / radius).toBeCloseTo(1, 8);
    expect(centre[0]).toBeCloseTo(400, 5);
    expect(centre[1]).toBeCloseTo(-150, 5);
    expect(noise).toBeLessThan(1e-6);
  });

  it('has a radius that scatters over noise realisations as its u says', () => {
    const found = Array.from({ length: 200 }, (_, run) => fitted(600, 0.2, { seed: run + 10 }));
    const rms = Math.sqrt(found.reduce((sum, { radius, uRadius }) => sum + ((radius - 600) / uRadius) ** 2, 0) / found.length);
    expect(rms).toBeGreaterThan(0.8);
    expect(rms).toBeLessThan(1.2);
    const bias = found.reduce((sum, { radius }) => sum + radius - 600, 0) / found.length;
    expect(Math.abs(bias)).toBeLessThan(0.25 * found[0]!.uRadius);
  });

  it('that is too short to tell its radius is refused', () => {
    expect(fitArc(...track(600, 0.01)).status).toBe('tooShort');
    expect(fitArc(new Float64Array(100).fill(5), new Float64Array(100).fill(7)).status).toBe('tooShort');
    expect(fitArc(new Float64Array(10), new Float64Array(10)).status).toBe('tooFew');
  });

  it('passes over frames that are left out or hold no marker', () => {
    const [across, down] = track(600, 0.3, { noise: 0 });
    across[5] = NaN;
    down[9] = 4000;
    const use = new Uint8Array(across.length).fill(1);
    use[9] = 0;
    const arc = fitArc(across, down, use);
    expect(arc.status === 'fitted' && arc.radius / 600).toBeCloseTo(1, 8);
  });

  it('leans in the picture as the plumb line does, with its u', () => {
    const arc = fitted(600, 0.3, { lean: 0.05 });
    const { value, u } = leanOf(arc, [400 + 600 * Math.sin(0.05), -150 + 600 * Math.cos(0.05)]);
    expect(Math.abs(value - 0.05)).toBeLessThan(4 * u);
    expect(u).toBeLessThan(0.002);
    expect(leanOf({ centre: [0, 0], covariance: [0, 0, 0] }, [0, 10]).value).toBe(0);
    expect(leanOf({ centre: [0, 0], covariance: [0, 0, 0] }, [3, 3]).value).toBeCloseTo(Math.PI / 4, 12);
  });
});
