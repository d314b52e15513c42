/** Taps and shots in one picture: angular impulse against damping-corrected first swing, with the calibration line and the taps' range. */
import { placeInTapRange } from '../reduction/beside.ts';
import type { TapRange } from '../reduction/beside.ts';
import type { RecordResult, Reduction } from '../reduction/results.ts';
import { WAY_WORDS } from '../reduction/wayWords.ts';
import { chooseUnit, withPlusMinus } from '../units/format.ts';
import { fromSi, siUnit, unitNamed } from '../units/units.ts';
import type { Unit } from '../units/units.ts';
import { axis, frame, roomForBoth } from './axes.ts';
import type { Range } from './axes.ts';
import type { Figure, FigureTable, Inks, Mark } from './figure.ts';
import { bracket, rayBand } from './lines.ts';
import { markSeries } from './marks.ts';
import { KIND_WORDS, recordName } from './recordWords.ts';

const HEIGHT = 340;
/** The coverage factor of all bars here: swing and angular impulse carry a standard uncertainty only. */
const K_OF_BARS = 2;
/** Free space around the marks, as a part of their span. */
const ROOM = 0.15;
/** A change of configuration smaller than this is none to be seen. */
const SAME_LINE = 1e-6;

const SWING_UNIT: Unit = unitNamed('mrad', 'angle') ?? siUnit('angle');

interface Placed extends RecordResult {
  readonly launch: NonNullable<RecordResult['launch']>;
  readonly angularImpulse: NonNullable<RecordResult['angularImpulse']>;
}

const isPlaced = (record: RecordResult): record is Placed =>
  (record.kind === 'tap' || record.kind === 'shot') && record.launch !== null && record.angularImpulse !== null;

/** A tap's own stated impulse is its y; a shot's y is on the line, its own part that of its readings. */
function placedMark(record: Placed, unit: Unit): Mark {
  const { launch, angularImpulse, impulseBit, kind, ownU } = record;
  const isShot = kind === 'shot';
  const ownShare = isShot && impulseBit !== null && impulseBit.u > 0 ? Math.min(1, ownU / impulseBit.u) : 0;
  const bar = K_OF_BARS * angularImpulse.u;
  return {
    id: record.id,
    kind,
    setAside: record.setAside !== null,
    x: fromSi(launch.value, SWING_UNIT),
    y: fromSi(angularImpulse.value, unit),
    whisker: fromSi(bar, unit),
    own: fromSi(bar * ownShare, unit),
    across: isShot ? 0 : fromSi(K_OF_BARS * launch.u, SWING_UNIT),
    missing: false,
    reading: `${recordName(record)}, ${withPlusMinus(launch.value, K_OF_BARS * launch.u, SWING_UNIT)}, `
      + `${withPlusMinus(angularImpulse.value, bar, unit)} (2u)${record.setAside === null ? '' : `, set aside: ${record.setAside}`}`,
  };
}

const percent = (part: number): string => `${(100 * part).toFixed(part < 0.1 ? 1 : 0)} %`;

/** The sentence that says whether the shots lie inside the range of the taps. */
export function tapRangeSentence(place: TapRange | null): string {
  if (place === null) return 'No taps to compare with.';
  switch (place.where) {
    case 'inside': return 'All shots lie inside the range that the taps cover.';
    case 'edge': return 'All shots lie inside the range that the taps cover, the outermost close to its edge.';
    case 'beyond': {
      const parts = [
        place.above > 0 ? `the largest shot lies ${percent(place.above)} above the largest tap` : '',
        place.below > 0 ? `the smallest shot lies ${percent(place.below)} below the smallest tap` : '',
      ].filter((part) => part !== '');
      const words = parts.join(', ');
      return `Not all shots lie inside the range that the taps cover: ${words}.`;
    }
  }
}

function tableOf(records: readonly Placed[], unit: Unit): FigureTable {
  return {
    head: ['Record', 'Kind', 'First swing, damping-corrected ± 2u', 'Angular impulse ± 2u', 'Set aside'],
    rows: records.map(({ id, label, order, kind, launch, angularImpulse, setAside }) => ({
      id,
      cells: [
        label === '' ? String(order) : label,
        KIND_WORDS[kind],
        withPlusMinus(launch.value, K_OF_BARS * launch.u, SWING_UNIT),
        withPlusMinus(angularImpulse.value, K_OF_BARS * angularImpulse.u, unit),
        setAside ?? '',
      ],
    })),
  };
}

const along = (mark: Mark): number[] => [mark.x - mark.across, mark.x + mark.across];
const upward = (mark: Mark): number[] => [mark.y - mark.whisker, mark.y + mark.whisker];

/** Swings and impulses begin at zero; a range that comes near it goes there. */
function fromZeroUp({ low, high }: Range): Range {
  return low < high / 3 ? { low: 0, high } : { low, high };
}

/** Slope of a calibration line in the units of the axes. */
const slopeIn = (factor: number, unit: Unit): number => fromSi(factor, unit) / fromSi(1, SWING_UNIT);

/** What the figure is drawn from. */
type Calibrated = Pick<Reduction, 'records' | 'chosen' | 'calibrations' | 'ranges' | 'chosenFactor'>;

/** φ in mrad along, angular impulse up; the line is K·φ of the chosen calibration with ± U of K. */
export function tapsAndShots({ records, chosen, calibrations, ranges, chosenFactor }: Calibrated, inks: Inks): Figure {
  const placed = records.filter(isPlaced).sort((a, b) => a.launch.value - b.launch.value);
  const unit = chooseUnit(placed.map((record) => record.angularImpulse.value), 'angularImpulse');
  const marks = placed.map((record) => placedMark(record, unit));
  const { columns, series } = markSeries(marks, inks);
  const line = chosenFactor;
  const asTaken = calibrations.taps;
  const isOtherLine = asTaken !== null && Math.abs(asTaken.change.value - 1) > SAME_LINE;
  const counting = marks.filter((mark) => !mark.setAside);
  const aside = marks.filter((mark) => mark.setAside);
  const x = fromZeroUp(roomForBoth(counting.flatMap(along), aside.flatMap(along), ROOM));
  const y = fromZeroUp(roomForBoth(counting.flatMap(upward), aside.flatMap(upward), ROOM));
  const taps = ranges.taps;
  return {
    title: 'Taps and shots',
    summary: [
      tapRangeSentence(placeInTapRange(ranges.taps, ranges.shots)),
      line === null ? '' : `Line: angular impulse per swing by ${WAY_WORDS[chosen]}, band ± U of its factor; shots stand on it.`,
      isOtherLine ? 'Dashed: the taps’ own line, in the configuration they were struck in.' : '',
      'Bars: 2u; thick: the record’s own part.',
      aside.some((mark) => mark.x < x.low || mark.x > x.high || mark.y < y.low || mark.y > y.high) ? 'What is set aside and lies far off is drawn at the edge.' : '',
    ].filter((part) => part !== '').join(' '),
    marks,
    columns,
    options: {
      ...frame(x, y, HEIGHT),
      axes: [
        axis({ label: `First swing, damping-corrected  (${SWING_UNIT.symbol})`, side: 'bottom' }, inks),
        axis({ label: `Angular impulse  (${unit.symbol})`, side: 'left' }, inks),
      ],
      series,
      hooks: {
        drawAxes: [
          (u) => {
            if (line !== null) {
              rayBand(u, { slope: slopeIn(line.value, unit), half: slopeIn(line.U, unit), dashed: false, ink: inks.shot }, inks);
            }
            if (isOtherLine) rayBand(u, { slope: slopeIn(asTaken.asTaken.value, unit), half: 0, dashed: true, ink: inks.tap }, inks);
            if (taps !== null) {
              bracket(u, fromSi(taps[0], SWING_UNIT), fromSi(taps[1], SWING_UNIT), inks.tap, inks.font, 'range of the taps');
            }
          },
        ],
      },
    },
    table: tableOf(placed, unit),
    nearest: 'both',
  };
}
