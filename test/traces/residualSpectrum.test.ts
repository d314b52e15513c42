import { describe, expect, it } from 'vitest';
import { residualSpectrum } from '../../src/traces/residualSpectrum.ts';
import { draws } from '../metrology/sources.ts';

const spectrumOf = (residuals: Float64Array, spacing: number) => residualSpectrum(residuals.length, (from, to) => residuals.slice(from, to), spacing);

describe('the spectrum of what is left', () => {
  it('shows a pump and a building with their frequencies and amplitudes', () => {
    const { normal } = draws(3);
    const residuals = Float64Array.from({ length: 60_000 }, (_, i) => 0.1 * normal() + 0.05 * Math.sin(2 * Math.PI * 24.83 * i * 0.002) + 0.08 * Math.sin(2 * Math.PI * 0.37 * i * 0.002));
    const found = spectrumOf(residuals, 0.002)!;
    expect(found.lines).toHaveLength(2);
    const [low, high] = [...found.lines].sort((a, b) => a.frequency - b.frequency);
    expect(low!.frequency).toBeCloseTo(0.37, 1);
    expect(high!.frequency).toBeCloseTo(24.83, 1);
    expect(Math.abs(low!.amplitude / 0.08 - 1)).toBeLessThan(0.1);
    expect(Math.abs(high!.amplitude / 0.05 - 1)).toBeLessThan(0.1);
    expect(found.frequency.length).toBeLessThan(1300);
    expect(found.frequency.at(-1)).toBeGreaterThan(248);
  });

  it('of noise alone has no lines, white or not', () => {
    const { normal } = draws(8);
    let e = 0;
    const white = Float64Array.from({ length: 30_000 }, () => normal());
    const red = white.map((value) => (e = 0.9 * e + value));
    expect(spectrumOf(white, 0.01)!.lines).toEqual([]);
    expect(spectrumOf(red, 0.01)!.lines).toEqual([]);
  });

  it('of too short a record is none', () => {
    expect(spectrumOf(new Float64Array(20), 0.01)).toBeNull();
  });
});
