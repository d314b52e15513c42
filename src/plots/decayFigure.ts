/** How a swing dies away: amplitude at each turning point, with what every damping law makes of it. */
import type { DecayOfLaw, DecayTold } from '../reduction/decayLaws.ts';
import { plain, withPlusMinus } from '../units/format.ts';
import { fromSi, siUnit, unitNamed } from '../units/units.ts';
import type { Unit } from '../units/units.ts';
import { axis, frame, roomFor } from './axes.ts';
import type { Figure, FigureTable, Inks, Mark } from './figure.ts';
import { curve } from './lines.ts';
import { markSeries } from './marks.ts';

const HEIGHT = 260;
const K_OF_BARS = 2;
const MILLIRADIAN: Unit = unitNamed('mrad', 'angle') ?? siUnit('angle');
const ONE = siUnit('number');

type Law = DecayTold['law'];
const LAW_NAMES: Readonly<Record<Law, string>> = { viscous: 'viscous', quadratic: 'quadratic', friction: 'friction of the pivot' };
/** Dashes of a law's line, CSS px; none: a whole line. */
const DASHES: Readonly<Record<Law, readonly number[]>> = { viscous: [], quadratic: [7, 4], friction: [2, 3] };
const DASH_WORDS: Readonly<Record<Law, string>> = { viscous: 'whole line', quadratic: 'dashed', friction: 'dotted' };

const parameterOf = ({ law, parameter: { value, u } }: DecayOfLaw): string =>
  law === 'viscous' ? `ζ = ${withPlusMinus(value, u, ONE)}` : law === 'quadratic' ? `β = ${withPlusMinus(value, u, ONE)} per radian` : `friction angle ${withPlusMinus(value, u, MILLIRADIAN)}`;

/** "viscous (whole line), ζ = 0.0121 ± 0.0004, χ² = 3.1 for 4, used". */
function lawWords(fit: DecayOfLaw, used: Law): string {
  const fits = fit.dof > 0 ? `, χ² = ${plain(fit.chiSquared, ONE, 2)} for ${fit.dof}` : ', through every reading';
  return `${LAW_NAMES[fit.law]} (${DASH_WORDS[fit.law]}), ${parameterOf(fit)}${fits}${fit.law === used ? ', used' : ''}`;
}

function tableOf({ readings, fits, law }: DecayTold): FigureTable {
  return {
    head: ['Turning point', 'Amplitude read ± 2u', ...fits.map((fit) => `${LAW_NAMES[fit.law]}${fit.law === law ? ' (used)' : ''}`)],
    rows: readings.map(({ number, amplitude }) => ({
      id: String(number),
      cells: [String(number + 1), withPlusMinus(amplitude.value, K_OF_BARS * amplitude.u, MILLIRADIAN), ...fits.map((fit) => plain(fit.amplitudes[number] ?? 0, MILLIRADIAN, 4))],
    })),
  };
}

/** Turning points counted from 1, the first swing; amplitudes from the rest, mrad. `of` names the swing. */
export function decayFigure(told: DecayTold, of: string, inks: Inks): Figure {
  const marks: Mark[] = told.readings.map(({ number, amplitude }) => ({
    id: String(number), kind: 'freeSwing', setAside: false, x: number + 1, y: fromSi(amplitude.value, MILLIRADIAN), whisker: fromSi(K_OF_BARS * amplitude.u, MILLIRADIAN), own: 0, across: 0, missing: false,
    reading: `turning point ${number + 1}, ${withPlusMinus(amplitude.value, K_OF_BARS * amplitude.u, MILLIRADIAN)} (2u)`,
  }));
  const { columns, series } = markSeries(marks, inks);
  const high = roomFor([0, ...marks.map(({ y, whisker }) => y + whisker)]).high;
  const last = marks.at(-1)?.x ?? 1;
  return {
    title: 'How the swing dies away',
    summary: [
      `${of}: amplitude at each turning point, and what each damping law fitted to it makes of it.`,
      `Laws: ${told.fits.map((fit) => lawWords(fit, told.law)).join('; ')}.`,
    ].join(' '),
    marks,
    columns,
    options: {
      ...frame({ low: 0.5, high: last + 0.5 }, { low: 0, high }, HEIGHT),
      axes: [axis({ label: 'Turning point', side: 'bottom', whole: true }, inks), axis({ label: `Amplitude  (${MILLIRADIAN.symbol})`, side: 'left' }, inks)],
      series,
      hooks: {
        drawAxes: [(u) => {
          for (const { law, amplitudes } of told.fits) {
            curve(u, amplitudes.map((amplitude, i) => [i + 1, fromSi(amplitude, MILLIRADIAN)] as const), { ink: law === told.law ? inks.shot : inks.quiet, dash: DASHES[law] });
          }
        }],
      },
    },
    table: tableOf(told),
    nearest: 'both',
  };
}
