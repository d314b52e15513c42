/** The words for every problem: what was found, where, and what to do. */
import { dateWords } from '../units/calendarDate.ts';
import { chooseUnit, plain } from '../units/format.ts';
import type { Dimension } from '../units/units.ts';
import type { Place, Problem } from './problems.ts';
import { evidenceWords } from './evidence.ts';
import { sampledRecordWords } from './sampledRecord.ts';
import { traceWords } from './traces.ts';
import { KIND_WORDS, ROLE_WORDS } from './words.ts';

/** Figures in a sentence: enough to find the thing, not to compute with. */
const FIGURES = 4;

/** "readings.csv, line 9, column “Rest (mm)”"; '' where the problem has no place in a sheet. */
export function placeInWords({ sheetName, line, column, record }: Place): string {
  const typedRow = record?.split('/').at(-1);
  const row = typedRow?.startsWith('+') === true ? `row ${typedRow}` : line !== undefined && line > 0 ? `line ${line}` : '';
  const columnWords = column === undefined ? '' : /^\d+$/.test(column) ? `column ${column}` : `column “${column}”`;
  return [sheetName ?? '', row, columnWords].filter((part) => part !== '').join(', ');
}

/** One problem as a sentence or two, beginning with where it is. */
export function sentence(found: Problem): string {
  const where = placeInWords(found.place);
  if (where === '') return sentenceInPlace(found);
  // A file's name is left as it is.
  const begins = found.place.sheetName === undefined ? where.charAt(0).toUpperCase() + where.slice(1) : where;
  return `${begins}: ${words(found)}`;
}

/** The same without its place, for where the place is plain to see. */
export function sentenceInPlace(found: Problem): string {
  const said = words(found);
  return said.charAt(0).toUpperCase() + said.slice(1);
}

function words({ code, place, facts, weight }: Problem): string {
  const has = (name: string): boolean => facts[name] !== undefined && facts[name] !== '';
  const text = (name: string, otherwise = '…'): string => (has(name) ? String(facts[name]) : otherwise);
  const number = (name: string): number => (typeof facts[name] === 'number' ? facts[name] : Number.NaN);
  const figure = (name: string, figures = FIGURES): string => shown(number(name), figures);
  const quantity = (name: string, dimension: Dimension): string => {
    const value = number(name);
    return Number.isFinite(value) ? plain(value, chooseUnit([value], dimension), FIGURES) : 'not known';
  };
  const many = (name: string, one: string, more = `${one}s`): string => (number(name) === 1 ? `1 ${one}` : `${text(name, 'some')} ${more}`);
  const day = (name: string): string => (has(name) ? dateWords(text(name)) : 'another day');
  const entry = text('label', place.entry ?? 'this entry');
  const found = text('found');
  const role = ROLE_WORDS[text('role')] ?? 'reading';
  const configuration = text('configuration') === 'taps' ? 'for the taps' : text('configuration') === 'shots' ? 'for the shots' : '';
  const ofConfiguration = configuration === '' ? '' : ` ${configuration}`;

  switch (code) {
    case 'file-empty':
      return 'there is nothing in it. Drop the file that holds the readings, or type them into the table.';
    case 'file-binary':
      return `this is ${text('kind', 'not a text file')}, not a table of text. ${text('remedy', 'Save the readings as CSV, or copy the cells and paste them here.')}`;
    case 'file-too-large':
      return `the file has ${text('size')} and a table taken by hand at most ${text('limit')}. If it is a recorded trace, read the swings off it first; if it holds more than the readings, save only these.`;
    case 'file-no-rows':
      return 'there is a header or free text, but no row of readings beneath it. Check that the whole table was saved or copied.';
    case 'file-other-encoding':
      return `the text is not UTF-8 and was read as ${text('taken', 'windows-1252')}. Check signs such as µ, ° and ±, or save the file as UTF-8.`;
    case 'column-missing':
      return `no column is marked as ${role}. Choose it above the table.`;
    case 'column-twice':
      return `a second column is marked as ${role}; ${quotedColumn(text('used'))} is used. Mark one of them otherwise.`;
    case 'column-proposed-by-values':
      return `taken as ${role}${inUnit(text('unit', ''), text('unitFrom'))}, told from the values and the place of the column, not from a header. Check it, and choose the meaning above the table.`;
    case 'column-unit-assumed':
      return `no unit${!has('unknownUnit') ? '' : ` that is known (found “${text('unknownUnit')}”)`} is given for ${role}; ${text('unit')} is taken${text('unitFrom') === 'others' ? ', as in the other columns of readings' : ''}. Check it, and choose the unit above the table.`;
    case 'decimal-comma-in-comma-file':
      return weight === 'stops'
        ? `“${found}” looks like a number with a decimal comma, cut in two because commas part the cells here, so no number of this row is used. Save the table with semicolons or tabs between the cells, or with decimal points.`
        : `numbers such as “${found}” may have a decimal comma and be cut in two here, because commas part the cells. If so, save the table with semicolons or tabs between the cells, or with decimal points.`;
    case 'decimal-marks-mixed':
      return `${many('commas', 'number')} with a decimal comma and ${many('points', 'number')} with a decimal point stand in one table; the decimal ${text('taken') === ',' ? 'comma' : 'point'} is taken. Write all numbers in one way, or choose the mark above the table.`;
    case 'row-ragged':
      return number('found') > number('expected')
        ? `${text('found')} cells, but the table has ${many('expected', 'column')}. The cells past the last column are kept and not used; check that none has slipped to the right.`
        : `${many('found', 'cell')}, but the table has ${many('expected', 'column')}. The missing cells are taken as empty.`;
    case 'quote-not-closed':
      return 'a quotation mark is not closed, so quotation marks in this line are taken as plain signs. Close it, or take it out.';
    case 'same-file-rows-lost':
      return `${many('lost', 'row')} of the earlier version ${number('lost') === 1 ? 'is' : 'are'} not in this one${number('marked') > 0 ? `, ${text('marked')} of them with a decision of yours (set aside, kind or typed over)` : ''}. Undo brings the earlier version back.`;

    case 'cell-not-a-number':
      return `“${found}” is not a number. Correct it, or leave the cell empty; the row gives no ${role} until then.`;
    case 'cell-unknown-unit':
      return `the unit “${found}” is not known. Write the number in ${text('unit', 'a usual unit')}, or with another unit.`;
    case 'cell-wrong-kind-of-unit':
      return `“${found}” is not a unit for ${role}. Write the number in ${text('unit', 'the column’s unit')}.`;
    case 'reading-wrong-kind-of-unit':
      return `“${text('found', 'the reading')}” is in ${text('unit', 'another unit')}, and the stand is read in another kind of unit. Change the column’s unit, or how the stand is read.`;
    case 'cell-kind-unknown':
      return `“${found}” is none of shot, tap, blank, zero or free swing, so the kind is told from what is filled in. Write one of these words, or choose the kind in the table.`;
    case 'cell-empty':
      return `no ${role} is written, so this ${KIND_WORDS[text('kind')] ?? 'record'} gives no impulse bit. Fill it in, or set the record aside with its reason (no discharge, say).`;

    case 'record-no-rest':
      return 'no rest reading, neither its own nor from a zero before it. Write the rest, or a zero record.';
    case 'record-rest-from-zero':
      return `no rest reading of its own; that of the zero in line ${text('zeroLine', 'before')} is taken. If the rest has moved since, write it.`;
    case 'record-no-throw':
      return 'the first swing equals the rest, so there is no throw and the impulse bit is 0. If there was no discharge, set the record aside; else check the reading.';
    case 'record-negative-throw':
      return 'the first swing lies on the other side of the rest than the thrust should send it. Check whether rest and first swing are exchanged, or the return swing was taken for the first.';
    case 'record-reading-beyond-radius':
      return `the reading lies ${quantity('reading', 'length')} from the plumb point, farther than the reading radius of ${quantity('radius', 'length')} can reach. Check the reading, its unit, and the radius.`;
    case 'record-angle-too-large':
      return `the angle is ${figure('degrees')}°, and a pendulum that swings so far is past what is reckoned here. Check the reading, its unit, and the reading radius.`;
    case 'record-tap-without-impulse':
      return 'a tap without its impulse; it does not count for the calibration. Write the impulse of the tap, or choose another kind.';
    case 'swings-not-decaying':
      return place.record !== undefined
        ? 'the swings do not grow smaller from one to the next on alternate sides of the rest, so they are not used for the damping. Check them and the rest.'
        : place.entry !== undefined
          ? 'the turning readings of the free swing do not grow smaller from one to the next, so they are not used. Check them: they are to be the readings at the turning points, in order, one side after the other.'
          : 'the swings do not grow smaller from one to the next. Check rest and swings, or type the log decrement.';
    case 'swings-grow':
      return `taken together, the swings do not die away (they grow by as much as a damping of ${figure('value', 2)} would take), so no damping is taken. Check rest and swings, or type the damping.`;
    case 'swings-too-few':
      return 'too few turning readings for a damping: with the rest read, two of them; without it, three that do not all lie on one side. Write the rest, or the swings of the other side.';
    case 'swings-fit-unsettled':
      return 'no damping follows from these swings: the fit does not settle. Look for a misread turning point, or one in the wrong column.';
    case 'swing-stopped':
      return 'the last turning readings are alike, so the pendulum had come to a standstill, held by friction or too little to be read; the repeats are left out. Blank them.';
    case 'swings-never-cross-rest':
      return `${place.entry === undefined ? `the swings of ${many('records', 'record')}` : 'the free swing'} only die${place.entry === undefined && number('records') !== 1 ? '' : 's'} away on one side of the rest. A pendulum that does not cross its rest is damped critically or more (or so nearly that it cannot be read), and turning points do not tell how much: take the damping from the time to the first maximum, t_p = arccosh ζ/(ω_n √(ζ² − 1)), or type the damping ratio. If only the swings of one side were noted, leave a blank for each swing between.`;
    case 'maximum-time-needs-the-body':
      return 'the time to the first maximum tells the damping only with the pendulum’s natural frequency, from its masses and lengths. Type them, or take the damping otherwise.';
    case 'maximum-time-too-late':
      return `the first maximum came at ${quantity('found', 'time')}, later than the quarter period of ${quantity('quarter', 'time')} that the undamped pendulum takes; no damping does that. Count from the middle of the pulse, and check masses, lengths and the clock.`;

    case 'all-throws-negative':
      return 'every first swing lies on the other side of the rest than the thrust should send it. If the numbers of the ruler fall in that direction, mark it as running backward.';
    case 'all-on-one-division':
      return `all ${text('shots')} shots read the same throw to the division, so their scatter says nothing and the division decides. Read finer, by estimating between the marks, or state the division.`;
    case 'division-from-readings':
      return `readings are taken as made to the nearest ${figure('division')} ${text('unit')}, the smallest step in ${many('readings', 'reading')}. If the ruler was read otherwise, write the division.`;
    case 'few-shots':
      return `${many('n', 'shot')} only, so the coverage factor is ${figure('k', 3)}. More shots narrow the interval.`;
    case 'no-shots':
      return `none of the ${many('records', 'record')} is a shot that counts. Check the kinds, the columns, and what is set aside.`;
    case 'shots-beyond-taps':
      return `${text('shots')} of ${text('of')} shots swing ${number('largest') > 1 ? `up to ${figure('largest', 3)} times the widest tap` : `as little as ${figure('smallest', 3)} of the smallest tap`}, outside the range that the taps calibrate. Tap over the whole range of the shots.`;
    case 'forms-differ':
      return `the small-angle form differs from the full pendulum by ${figure('percent', 2)} %, ${figure('inU', 2)} times the standard uncertainty. Use the full pendulum.`;
    case 'scatter-below-reading':
      return `the shots scatter by ${quantity('scatter', 'impulse')}, less than their readings alone would make them (${quantity('reading', 'impulse')}); the larger is used. The division or the eye may be stated too large.`;
    case 'taps-scatter-more-than-stated':
      return `the ${text('taps')} taps scatter by ${figure('seen', 2)} %, their stated uncertainties make ${figure('stated', 2)} %; the larger is used. Look for a tap that slipped or struck off its point.`;
    case 'calibrations-differ':
      return `the calibration by taps differs from that by geometry by ${figure('percent', 2)} %, ${figure('inU', 2)} times the uncertainty of the difference. Check lever arms, masses, and the hammer’s calibration.`;
    case 'damping-none':
      return weight === 'note'
        ? 'no damping is taken, as chosen; impulse bits come out too small by what the first quarter swing loses.'
        : 'there is no damping to be had from the readings or the entries, so none is taken, and impulse bits come out too small. Note the swings after the first, or type the log decrement.';
    case 'film-model-alone':
      return `The figure leans on the model of the film alone: its spread is ${figure('percent', 2)} %, common to all shots, and read as a rigid strip it would come out ${figure('overRigid', 3)} times this. Tap it in place on the plume’s line, stiffen it, or hang an end plate of at least three times the film’s mass.`;
    case 'film-regime':
      return `The film is ${text('regime')} (stiffness number ${figure('stiffness', 2)}): its first maximum comes at ${figure('quarters', 2)} of a quarter period, and its period does not show that it is no rigid strip.`;
    case 'film-out-of-range':
      return 'The film’s measures give no stiffness number that the model covers, or the struck zone lies beyond the film. Check thickness, modulus, length and zone, and their units.';
    case 'film-needs-displacement':
      return 'A film is reduced from the displacement of one of its points. Read it with a ruler, a sensor or a camera marker, and type how far below the clamp that point is.';
    case 'stiffness-missing':
      return 'The stiffness is missing: type it as torque per angle, or as the pull per deflection with its lever arm and the reading radius.';
    case 'damping-laws-not-told-apart':
      return `The swings do not tell which damping law holds (${text('possible', 'several')} fit); ${text('used', 'viscous')} damping is taken. Note more swings of one free swing.`;
    case 'damping-law-fits-badly':
      return `No damping law fits the swings within their uncertainty; ${text('used', 'viscous')} damping, the nearest, is taken. Look for a misread turning point or a rubbing pivot.`;
    case 'pulse-reaches-the-peak':
      return 'The pulse lasts until the first maximum or beyond, so no impulse bit follows from a first swing. Shorten it, lengthen the period, or read it as thrust × time.';
    case 'change-needs-the-body':
      return 'The calibration mass hung there for a part of the run only, and without the pendulum’s inertia and stiffness the taps cannot be carried over to the shots. Type its masses and lengths, or tap it as it was fired.';
    case 'frames-too-slow':
      return 'The exposure or the time between frames is longer than half a period of the swing, so the frames do not show it; they are left uncorrected. Check both, and their units.';
    case 'background-swing-larger':
      return 'The swing before the shot is as large as the swing after it, so this record gives no impulse bit. Let the pendulum come to rest, or read its whole swing.';
    case 'background-swing-off-scale':
      return 'the swing before the shot is wider than the scale can show, so it is left out. Check it and its unit.';
    case 'background-phase-not-used':
      return text('because') === 'film'
        ? 'the phase of the swing before the shot is not used on a film, whose first maximum has more than one mode in it; the swing counts as one of unknown phase.'
        : 'a pendulum damped critically or more has no phase; the swing before the shot counts as one of unknown phase.';
    case 'background-not-this-shot':
      return 'with the swing before the shot as typed, amplitude and phase, no shot along the thrust gives this first swing. Check both, or leave the phase empty.';
    case 'tilt-leaves-no-leverage':
      return 'tilted so far, the thrust has no leverage on the pendulum. Check the tilt and its unit, and the exit’s place.';
    case 'pulse-samples-missing':
      return `the pulse is to be as measured, and ${number('samples') === 0 ? 'there are no samples' : 'one sample is not enough'}. Paste a time and a thrust a line, from its beginning to its end, or choose a shape.`;
    case 'pulse-samples-too-many':
      return `${text('samples')} lines are a whole record and not a pulse; ${text('most')} at most. Paste the stretch of the pulse alone, or every tenth line.`;
    case 'pulse-sample-not-two-numbers':
      return `measured pulse, line ${text('at')}: “${found}” is not a time and a thrust. Write two numbers, parted by a tab, a semicolon or blanks.`;
    case 'pulse-sample-time-not-rising':
      return `measured pulse, line ${text('at')}: the time in “${found}” is not later than that of the line before. Put the lines in the order of time, each time once.`;
    case 'pulse-samples-no-impulse':
      return 'the measured pulse has no impulse along the thrust: its integral is not above zero. Take the reading without thrust off the samples, and check the sign.';
    case 'pulse-samples-unit-assumed':
      return `no unit of time stands over the samples of the pulse; ${text('unit')} is taken. Write it in a line above them: “${text('unit')}; N”, say.`;
    case 'momentum-factor-undeclared':
      return 'The plume is caught on a target whose momentum factor is not typed: it may lie anywhere from 1 to 2, which leaves 20 % common to all shots. Type what is known of the target, or report the momentum delivered to it.';
    case 'capture-taken-as-all':
      return 'Nothing is typed of how much of the plume meets the target; all of it is taken. Type the part caught, or the plume’s exponent and the target’s half-angle.';
    case 'propellant-too-heavy':
      return 'The propellant used is heavier than what swings. Check its mass and unit.';
    case 'damping-from-few':
      return `the damping rests on ${many('records', 'record')} with more than one swing. Note the return swing of more shots, or a free swing.`;
    case 'damping-carried-over':
      return `there are swings of the ${text('from') === 'taps' ? 'taps' : 'shots'} only, so the damping of the other configuration is carried over from them.${text('gas') === 'differs' ? ' The gas is at another pressure there, and damps more or less: anything from none of it to twice as much is allowed for (0.01 in ζ moves an impulse bit by 1.6 %).' : ''} Note swings with the other configuration, too.`;
    case 'period-differs':
      return `the timed period, ${quantity('measured', 'time')}, differs from the ${quantity('predicted', 'time')} that masses and lengths make by ${figure('percent', 2)} %, ${figure('inU', 2)} times the uncertainty of the difference. Check distances, masses, the flexure, and the count of cycles.`;
    case 'pressures-mixed':
      return `the shots were fired between ${quantity('low', 'pressure')} and ${quantity('high', 'pressure')}, and one mean is taken over all. Treat them as several runs if the pressure matters.`;

    case 'pressure-not-stated':
      return 'no pressure is stated for the shots, so the figure can be called neither a vacuum figure nor one in air, and the air about the pendulum is left out. Write the pressure on the bench, or a column of it.';
    case 'not-a-vacuum-figure': {
      const at = `the shots were fired at up to ${quantity('pressure', 'pressure')}, above the ${quantity('below', 'pressure')} up to which a figure here counts as a vacuum one`;
      const what = text('plume') === 'caught' ? 'what swings the target is also the gas that the plume drives at it' : 'the plume pushes against the gas about it, and drives it at what stands near';
      return number('pressure') >= 1000
        ? `${at}. At such a pressure the plume stops within centimetres and ${text('plume') === 'caught' ? 'what strikes the target is a blast of driven gas' : 'what swings the pendulum is the push on a blast of driven gas'}: this is not a vacuum impulse bit, and says nothing of one. Report the pressure with it, and do not set it beside vacuum figures.`
        : `${at}: ${what}, so the figure is not a vacuum impulse bit. Report the pressure with it.`;
    }
    case 'gauge-meaning-unclear':
      return text('unit') === '%'
        ? 'the pressure is in %, and nobody has said of what: percent of a fixed full scale (most dials), or percent of the outside pressure. Choose it with the pressure on the bench; until then no absolute pressure is had.'
        : text('unit').startsWith('−')
          ? `the pressure is in ${text('unit')}, counted down from the outside, but the gauge is not said to show that. Choose “pressure against the outside” with the pressure on the bench; until then no absolute pressure is had.`
          : `the pressure is in ${text('unit', 'a unit of pressure')}, but the gauge is said to show percent. Choose what the gauge shows, or the column’s unit.`;
    case 'pressure-beyond-dial':
      return `the dial shows ${figure('percent')} %, which is not on a dial of 0 to 100 %. Check the reading and the unit of the column.`;
    case 'pressure-below-zero':
      return `the absolute pressure comes out as ${quantity('pressure', 'pressure')}${number('u') > 0 ? ` with u = ${quantity('u', 'pressure')}` : ''}, which cannot be. ${text('meaning') === 'absolute' ? 'If the gauge counts from the outside pressure, say so.' : 'Check what the dial means, its zero and the barometer; near full scale such a dial hardly tells the pressure.'}`;
    case 'pressure-above-outside':
      return `the gauge reads above the outside pressure, ${quantity('pressure', 'pressure')} against ${quantity('outside', 'pressure')} absolute. If it counts down from the outside pressure, write the numbers as negative, or in −kPa.`;
    case 'outside-pressure-missing':
      return 'this gauge counts from the outside pressure, and neither a barometer reading nor the height is given, so there is no absolute pressure. Write one of them; the barometer’s as read at the station.';
    case 'barometer-at-sea-level':
      return `the barometer reading, ${quantity('barometer', 'pressure')}, is well above the ${quantity('station', 'pressure')} that the height makes: it may have been reduced to sea level, as forecasts are. Write the pressure at the station.`;
    case 'height-beyond-atmosphere':
      return 'the height is outside the −500 m to 11 km of the standard atmosphere, so no outside pressure follows from it. Write the barometer reading.';
    case 'air-needs-width':
      return has('taps')
        ? `the taps were made at ${quantity('taps', 'pressure')} and the shots fired at ${quantity('shots', 'pressure')}; a light strip carries air along, more of it where the pressure is higher, so the calibration changes between them. Write the width of the strip, or tap at the pressure of the shots.`
        : `at ${quantity('shots', 'pressure')} a light strip carries air along, which adds to its inertia and is left out here. Write the width of the strip.`;
    case 'air-on-strip':
      return `at ${quantity('pressure', 'pressure')} the air that the strip carries along amounts to ${figure('percent', 2)} % of its inertia. ${text('use') === 'correction' ? 'It is added, with what its viscosity leaves open.' : 'The air is too viscous there for the formula to correct by; it stands in the budget as an uncertainty. Tap at the pressure of the shots.'}`;
    case 'air-not-reckoned':
      return 'the air on the strip is left out: the strip is wider than long, or lighter than the air that it displaces, or the gas is colder than can be. Check its measures and the temperature.';

    case 'entry-missing':
      return `${entry} is missing. Write it with its unit and uncertainty.`;
    case 'entry-not-a-number':
      return `${entry}: “${found}” is not a number with a unit. Write it as 118.0 ± 0.3${!has('unit') || text('unit') === '1' ? '' : ` ${text('unit')}`}, say.`;
    case 'entry-unknown-unit':
      return `${entry}: the unit in “${found}” is not known. Write it in ${text('unit', 'a usual unit')}, say.`;
    case 'entry-wrong-kind-of-unit':
      return `${entry}: “${found}” has a unit of another kind. Write it in ${text('unit', 'a fitting unit')}, say.`;
    case 'entry-out-of-range':
      return `${entry}: “${found}” ${text('range') === 'positive' ? 'must be greater than zero' : text('range') === 'notNegative' ? 'must not be less than zero' : 'is outside what can be'}. Check sign and value.`;
    case 'entry-no-uncertainty':
      return `${entry}: “${found}” has no uncertainty, and is taken as exact. Write it after ±.`;
    case 'entry-unit-assumed':
      return `${entry}: “${found}” has no unit; ${text('unit')} is taken. Write the unit.`;
    case 'entry-uncertainty-large':
      return `${entry}: the uncertainty of “${found}” is ${figure('percent', 2)} % of it. Check its unit, and what the ± means.`;
    case 'entry-decimal-ambiguous':
      return `${entry}: the comma in “${found}” is read as a decimal comma. If it groups thousands, leave it out.`;
    case 'bench-unstable':
      return `the stiffness${ofConfiguration} comes out as ${quantity('value', 'rotationalStiffness')}, not above zero: the pendulum would not come back to rest. Check the distances of the masses; above the pivot they are negative.`;
    case 'bench-inertia-not-positive':
      return `the moment of inertia${ofConfiguration} comes out as ${quantity('value', 'momentOfInertia')}, not above zero. Check masses, distances, and the period.`;
    case 'gravity-assumed':
      return `no local g is given; ${quantity('value', 'acceleration')} ± ${quantity('limits', 'acceleration')} is taken. Write it, or latitude and height.`;

    case 'record-zero-moved':
      return `the rest moved over this swing by ${figure('move', 2)} ${text('unit')}, ${figure('inU', 2)} times the uncertainty of that: drift, a slip of the pivot, or a knock. The rest before it counts; the mean with its limits is under Reading.`;
    case 'hammer-angle-too-wide':
      return `the hammer stood at ${figure('degrees', 3)}°; beyond 90° it does not swing as it was drawn, so this tap has no known impulse. Check the angle and its unit.`;
    case 'hammer-entry-missing':
      return `the hammer’s angles are there, but not ${text('label')}. Write it on the bench, under Taps.`;
    case 'tap-force-without-time':
      return 'a force and its length make an impulse; one of the two is missing here, so this tap has none.';
    case 'tap-both-rebound-and-follow':
      return 'the hammer cannot come back and go on through at once; both angles are filled in, so this tap has no known impulse. Blank the one that was not seen.';
    case 'trace-time-not-rising':
    case 'trace-samples-repeated':
    case 'trace-time-coarse':
    case 'trace-samples-missing':
    case 'trace-spacing-uneven':
    case 'trace-numbers-missing':
    case 'trace-rows-passed-over':
    case 'trace-cut-off':
    case 'trace-gzip-broken':
      return sampledRecordWords(code, weight, { has, text, number, figure, quantity, many });
    case 'trace-no-samples':
    case 'trace-too-long':
    case 'trace-constant':
    case 'trace-unit-assumed':
    case 'trace-event-not-read':
    case 'trace-events-outside':
    case 'trace-not-fitted':
    case 'trace-position-step':
    case 'trace-large-swing':
    case 'trace-two-values':
    case 'trace-jumps-unlisted':
    case 'trace-camera-scale-differs':
    case 'trace-camera-leans':
    case 'trace-train-not-read':
    case 'trace-train-not-fitted':
    case 'trace-train-slow':
    case 'trace-bytes-missing':
    case 'trace-clipped':
    case 'trace-spikes':
    case 'trace-no-trigger':
    case 'trace-unit-unknown':
    case 'trace-wrong-unit':
    case 'trace-rate-missing':
    case 'trace-pivot-missing':
    case 'trace-sensor-slope-missing':
    case 'trace-offset-found':
    case 'trace-offset-open':
    case 'trace-clock-drifts':
    case 'trace-jumps-found':
    case 'trace-swing-from-bench':
    case 'trace-times-moved':
    case 'trace-too-close':
      return traceWords(code, { has, text, number, figure, quantity, many });
    case 'force-record-no-samples':
      return 'no two columns of numbers, time and force, were found in it. Check that the whole record was saved.';
    case 'force-record-time-not-rising':
      return 'the time does not rise here; the record is left out. Check that it is one record, in order.';
    case 'force-record-too-long':
      return `the record has ${text('rows')} samples and a hammer’s record at most ${text('most')}. Save the taps alone.`;
    case 'force-record-unit-assumed':
      return `its header does not name both units; ${text('time')} and ${text('force')} are taken. Write them in the header.`;
    case 'force-record-no-pulse':
      return 'no pulse stands out of its noise, so no tap has its impulse from it.';
    case 'force-record-clipped':
      return `${many('pulses', 'pulse')} reached the end of the sensor’s range; the force was larger than recorded, and the impulse with it. Tap less hard, or set a larger range.`;
    case 'force-record-after-contact':
      return `after the contact the force of ${many('pulses', 'pulse')} ${text('after') === 'secondContact' ? 'rises again: the hammer struck twice' : text('after') === 'cutOff' ? 'is still going where the record ends' : 'stays below its level for long, as behind a coupled amplifier'}; whole and contact part by ${figure('percent', 2)} %.`;
    case 'force-records-do-not-fit':
    case 'timing-spread-missing':
    case 'timing-without-place':
    case 'timing-not-positive':
    case 'weights-too-few':
    case 'weights-wrong-way':
    case 'taps-one-size':
    case 'taps-drifted':
    case 'taps-intercept':
    case 'taps-curved':
    case 'masses-tell-little':
    case 'mass-heavier-than-pendulum':
    case 'masses-inertia-negative':
    case 'evidence-contradicts':
    case 'bench-disagrees':
    case 'chosen-evidence-missing':
      return evidenceWords(code, { has, text, number, figure, quantity, many });

    case 'instrument-overdue':
      return `the calibration of ${text('name', 'an instrument')} was due on ${day('due')}, before the session of ${day('date')}. Have it calibrated, or write the new certificate and its due date.`;
    case 'instrument-calibration-wide':
      return `the calibration of ${text('name', 'an instrument')} is said to be uncertain by ${figure('percent', 2)} % of all that it measures. Check its unit, and what the ± means.`;
    case 'instrument-due-unread':
      return `the due date of ${text('name', 'an instrument')}, “${found}”, is not read as a date. Write it as 2027-03-31, say.`;

    case 'session-not-json':
      return 'this file cannot be read as a session: it is damaged, or of another kind. Open the file that was saved here.';
    case 'session-not-ours':
      return 'this file is not a session of Firstswing. To read a table of readings, drop it on the readings.';
    case 'session-newer':
      return `this session was saved by a later version (format ${text('version')}; known here: ${text('known')}). Open it with that version.`;
    case 'session-damaged':
      return `a piece of the session could not be read and was left out: ${text('where')}${!has('found') ? '' : `, where “${found}” stands`}. The rest is as saved; check that piece.`;
  }
}

function shown(value: number, figures: number): string {
  return Number.isFinite(value) ? String(Number(value.toPrecision(figures))).replace('-', '−') : 'not known';
}

const quotedColumn = (name: string): string => (/^\d+$/.test(name) ? `column ${name}` : `“${name}”`);

function inUnit(unit: string, from: string): string {
  return unit === '' ? '' : ` in ${unit}${from === 'assumed' ? ' (no unit is given)' : from === 'others' ? ' (as the other readings)' : ''}`;
}
