/** The words for what is wrong with the evidence of a calibration: taps, timings, weights, masses, and how they agree. */
import type { ProblemCode } from './problems.ts';
import type { FactWords } from './sampledRecord.ts';
import { checksInWords, slipWords } from './slips.ts';

export type EvidenceCode = Extract<
  ProblemCode,
  | 'force-records-do-not-fit' | 'timing-spread-missing' | 'timing-without-place' | 'timing-not-positive'
  | 'weights-too-few' | 'weights-wrong-way' | 'taps-one-size' | 'taps-drifted'
  | 'taps-intercept' | 'taps-curved' | 'masses-tell-little' | 'mass-heavier-than-pendulum'
  | 'masses-inertia-negative' | 'evidence-contradicts' | 'bench-disagrees' | 'chosen-evidence-missing'
>;

export function evidenceWords(code: EvidenceCode, { has, text, figure, quantity, many }: FactWords): string {
  switch (code) {
    case 'force-records-do-not-fit':
      return `the force records hold ${many('pulses', 'pulse')} and ${many('taps', 'tap')} state no impulse; none is given to another’s. Take out what is not a tap’s, or write the missing impulses.`;
    case 'timing-spread-missing':
      return `nothing says how well the ${many('timings', 'period')} were started and stopped; only the last digit of the times counts. Write one start or stop, by hand about 0.1 s.`;
    case 'timing-without-place':
      return 'a mass hung while this was timed, but not both its mass and its radius are known; the timing is left out. Write both in the table, or as the calibration mass.';
    case 'timing-not-positive':
      return 'the time, its cycles or the amplitude are none of a swing; the timing is left out.';
    case 'weights-too-few':
      return `known weights of ${many('sizes', 'size')} make no line; three readings of at least two weights are needed.`;
    case 'weights-wrong-way':
      return 'the reading does not go up with the known weights, so they give no stiffness. Check the direction of the scale and the columns.';
    case 'taps-one-size':
      return `all ${many('taps', 'tap')} are of one size: that they lie on a line through the origin is taken, not seen. Tap at two or three sizes that span the shots.`;
    case 'taps-drifted':
      return `the calibration moved from ${text('from')} to ${text('to')} the firings by ${figure('percent', 2)} %, ${figure('inU', 2)} times the uncertainty of that difference. Take the mean with its limits, or interpolate, under Calibration; and look for what changed.`;
    case 'taps-intercept':
      return `the taps’ line misses the origin by ${figure('t', 2)} times its uncertainty (chance ${figure('percent', 2)} %): a zero that is off, an offset of the hammer, or friction. The line with an intercept is under Calibration.`;
    case 'taps-curved':
      return `the taps bend away from a straight line by ${figure('t', 2)} times the uncertainty of the bend (chance ${figure('percent', 2)} %): look at the largest ones, at the reading’s geometry, and at the hammer.`;
    case 'masses-tell-little':
      return `hung where it was, the mass changes the period so little that the moment of inertia is known to ${figure('percent', 2)} % only. ${has('better') ? `At ${quantity('better', 'length')} the same timings would tell it to ${figure('betterPercent', 2)} %.` : 'A heavier mass, well above or below that place, would tell it.'}`;
    case 'mass-heavier-than-pendulum':
      return `a mass of ${quantity('mass', 'mass')} was hung on a pendulum of ${quantity('pendulum', 'mass')}: check its unit. A mass that heavy also bends or loads a pivot that carries little.`;
    case 'masses-inertia-negative':
      return 'the periods with masses hung give a moment of inertia that is not above zero: a time or a radius is wrong, or the mass hung near the place where the period does not change.';
    case 'evidence-contradicts':
      return `the evidence of the calibration does not agree within its uncertainties (χ² = ${figure('chiSquared', 3)} for ${text('dof')}, chance ${figure('percent', 2)} %). ${has('item') ? `“${text('item')}” pulls most, by ${figure('deviation', 2)} times the uncertainty. ` : ''}Nothing is widened for it: find which is wrong.`;
    case 'bench-disagrees': {
      const off = checksInWords((has('off') ? text('off') : '').split(' ').filter((id) => id !== ''));
      const begin = `${off === '' ? 'what was measured' : off} ${off.includes(' and ') || off.endsWith('taps') ? 'do' : 'does'} not fit masses and lengths.`;
      if (!has('slip')) return `${begin} No single slip reconciles them: look at the masses, the lengths, and what hung on the pendulum.`;
      const one = `“${text('what')}” ${slipWords(text('slip'))}${has('to') ? ` (${text('from')} → ${text('to')})` : ''}`;
      const other = has('other') ? `, or that “${text('otherWhat')}” ${slipWords(text('other'))}${has('otherTo') ? ` (→ ${text('otherTo')})` : ''}; the numbers do not tell the two apart` : '';
      return `${begin} All would fit if ${one}${other}.`;
    }
    case 'chosen-evidence-missing':
      return `the calibration is to be known ${text('way')}, but that evidence is not complete. Choose another way under Calibration, or add what is missing.`;
  }
}
