/** What is left of the record beside the swing, by frequency: the lines that a pump or a building make stand out of it. */
import { powers, powerOfTwo } from '../numeric/fourier.ts';

export interface ResidualSpectrum {
  /** Hz, rising; no more than MOST_POINTS. */
  readonly frequency: readonly number[];
  /** Amplitude of a sine at that frequency, unit of the residuals: the largest about each point. */
  readonly amplitude: readonly number[];
  readonly lines: readonly { readonly frequency: number; readonly amplitude: number }[];
}

const MOST_POINTS = 1200;
/** Samples of a piece; pieces overlap by half and are averaged. */
const LONGEST_PIECE = 32_768;
/** Of more pieces, evenly some. */
const MOST_PIECES = 8;
/** A line stands so many times above the median power about it. */
const STANDS_OUT = 25;
/** Half-width of what is about a line, bins. */
const ABOUT = 40;
const MOST_LINES = 6;
const SMALLEST_RECORD = 64;

/**
 * Amplitudes by averaged, Hann-windowed pieces. Valid: samples evenly spaced, or nearly so; left-out samples are 0. `residualsIn`: a copy of those of a stretch.
 * Source: P. D. Welch, IEEE Trans. Audio Electroacoust. 15 (1967) 70, from memory.
 */
export function residualSpectrum(n: number, residualsIn: (from: number, to: number) => Float64Array, spacing: number): ResidualSpectrum | null {
  if (n < SMALLEST_RECORD || !(spacing > 0)) return null;
  const piece = Math.min(LONGEST_PIECE, powerOfTwo(n / 2 + 1) / 2 < SMALLEST_RECORD ? powerOfTwo(n) / 2 : powerOfTwo(n / 2 + 1) / 2);
  const window = Float64Array.from({ length: piece }, (_, i) => 0.5 - 0.5 * Math.cos((2 * Math.PI * (i + 0.5)) / piece));
  const gain = window.reduce((sum, value) => sum + value, 0);
  const sum = new Float64Array(piece / 2 + 1);
  let pieces = 0;
  const steps = Math.max(1, Math.floor((n - piece) / (piece / 2)) + 1);
  const taken = Math.min(steps, MOST_PIECES);
  for (let k = 0; k < taken; k++) {
    const from = Math.floor(((k * (steps - 1)) / Math.max(1, taken - 1))) * (piece / 2);
    const residuals = residualsIn(from, from + piece);
    for (let i = 0; i < piece; i++) residuals[i]! *= window[i]!;
    const found = powers(residuals);
    for (let j = 0; j < sum.length; j++) sum[j]! += found[j]!;
    pieces += 1;
  }
  const amplitude = sum.map((value) => (2 * Math.sqrt(value / pieces)) / gain);
  const unit = 1 / (piece * spacing);
  return { ...thinned(amplitude, unit), lines: linesOf(amplitude, unit) };
}

/** Few points, evenly in the logarithm of the frequency; of those that fall together the largest. */
function thinned(amplitude: Float64Array, unit: number): Pick<ResidualSpectrum, 'frequency' | 'amplitude'> {
  const frequency: number[] = [];
  const kept: number[] = [];
  const last = amplitude.length - 1;
  const step = Math.log(last) / MOST_POINTS;
  for (let j = 1; j <= last;) {
    const next = Math.max(j + 1, Math.ceil(j * Math.exp(step)));
    let best = j;
    for (let i = j; i < Math.min(next, last + 1); i++) if (amplitude[i]! > amplitude[best]!) best = i;
    frequency.push(best * unit);
    kept.push(amplitude[best]!);
    j = next;
  }
  return { frequency, amplitude: kept };
}

function linesOf(amplitude: Float64Array, unit: number): ResidualSpectrum['lines'] {
  const found: { readonly frequency: number; readonly amplitude: number }[] = [];
  const usual = mediansOf(amplitude);
  for (let j = 2; j < amplitude.length - 2; j++) {
    const here = amplitude[j]!;
    if (!(here >= amplitude[j - 1]! && here > amplitude[j + 1]!)) continue;
    const about = usual[Math.floor(j / ABOUT)]!;
    if (!(here * here > STANDS_OUT * about * about)) continue;
    // Peak of a Hann-windowed line by a parabola through the logarithms.
    const [a, b, c] = [amplitude[j - 1]!, here, amplitude[j + 1]!].map((value) => Math.log(Math.max(value, 1e-300)));
    const bend = a! - 2 * b! + c!;
    const shift = bend < 0 ? (a! - c!) / (2 * bend) : 0;
    found.push({ frequency: (j + shift) * unit, amplitude: Math.exp(b! - (shift * (a! - c!)) / 4) });
  }
  return found.sort((one, other) => other.amplitude - one.amplitude).slice(0, MOST_LINES);
}

/** Median of each ABOUT bins with those to both sides. */
function mediansOf(amplitude: Float64Array): readonly number[] {
  return Array.from({ length: Math.ceil(amplitude.length / ABOUT) }, (_, k) => {
    const about = Array.from(amplitude.subarray(Math.max(1, (k - 1) * ABOUT), (k + 2) * ABOUT)).sort((a, b) => a - b);
    return about[about.length >> 1] ?? Infinity;
  });
}
