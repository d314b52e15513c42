/** The words for what is wrong with a trace as a record of a swing: its columns, its shots and its fit. */
import type { ProblemCode } from './problems.ts';
import type { FactWords } from './sampledRecord.ts';

export type TraceCode = Extract<
  ProblemCode,
  | 'trace-no-samples'
  | 'trace-too-long'
  | 'trace-constant'
  | 'trace-unit-assumed'
  | 'trace-event-not-read'
  | 'trace-events-outside'
  | 'trace-not-fitted'
  | 'trace-position-step'
  | 'trace-large-swing'
  | 'trace-two-values'
  | 'trace-jumps-unlisted'
  | 'trace-camera-scale-differs'
  | 'trace-camera-leans'
  | 'trace-train-not-read'
  | 'trace-train-not-fitted'
  | 'trace-train-slow'
  | 'trace-bytes-missing'
  | 'trace-clipped'
  | 'trace-spikes'
  | 'trace-no-trigger'
  | 'trace-unit-unknown'
  | 'trace-wrong-unit'
  | 'trace-rate-missing'
  | 'trace-pivot-missing'
  | 'trace-sensor-slope-missing'
  | 'trace-offset-found'
  | 'trace-offset-open'
  | 'trace-clock-drifts'
  | 'trace-jumps-found'
  | 'trace-swing-from-bench'
  | 'trace-times-moved'
  | 'trace-too-close'
>;

export function traceWords(code: TraceCode, { text, number, figure, quantity, many, has }: FactWords): string {
  switch (code) {
    case 'trace-no-samples':
      return number('rows') >= 20
        ? 'no column of a swing was found in it beside the time. Choose the columns under “How it is read”, or check that the whole record was saved.'
        : `${number('rows') > 0 ? many('rows', 'row') : 'no row'} of numbers ${number('rows') > 1 ? 'were' : 'was'} found in it; a swing takes twenty or more. Check that the whole record was saved.`;
    case 'trace-too-long':
      return `the record has more than ${text('most')} rows of its columns; those are read and the rest is left out. Save every tenth sample, or a part of it.`;
    case 'trace-constant':
      return 'the reading never changes: the sensor was not read, or this is another column.';
    case 'trace-unit-assumed':
      return `the header of ${has('column') && text('column') !== '' ? `“${text('column')}”` : 'its column'} names no unit; ${text('unit')} is taken. Write it under “How it is read”.`;
    case 'trace-unit-unknown':
      return `“${text('found')}” is no unit of time. Write s, ms, µs or min.`;
    case 'trace-wrong-unit':
      return `its reading is headed in ${text('found')}, which this way of reading does not take; ${text('unit')} is taken. Choose another column, or write the unit.`;
    case 'trace-event-not-read':
      return `line ${text('at')} of its list, “${text('found')}”, cannot be read. A shot is written 12.5, or 12.5 tap 1.2 mN·s, or 40.2 blank; a bad stretch 12.5 13.1.`;
    case 'trace-events-outside':
      return `${many('events', 'shot')} of its list ${number('events') === 1 ? 'lies' : 'lie'} outside the record, which runs from ${quantity('from', 'time')} to ${quantity('to', 'time')}, and ${number('events') === 1 ? 'is' : 'are'} left out. Check the clock of the list.`;
    case 'trace-not-fitted':
      return text('why') === 'noSwing' ? 'no swing stands out of it, and the bench tells none: with masses and lengths, or a period, its jumps can still be bounded.' : text('why') === 'tooFewSamples' ? 'it has too few samples for so many shots.' : `its samples do not tell the swing ${quantity('from', 'time')} into it: too few between two shots, or before the first. Leave one of them out.`;
    case 'trace-too-close':
      return `the shots at ${quantity('time', 'time')} and just after have no samples between them, so only the first is kept. Take one of them out of the list.`;
    case 'trace-position-step':
      return `at ${quantity('time', 'time')} the position steps by ${figure('inU', 2)} times its uncertainty, which a shot does not do: a wrong time, an electrical step, stick-slip, or a knock.`;
    case 'trace-large-swing':
      return text('how') === 'full' ? `swings reach ${figure('degrees', 3)}°: its jumps are solved with the full pendulum, which differs from the small swing by up to ${figure('percent', 2)} %${number('drag') > 0 ? `, with a drag that goes as the square of the speed (β = ${figure('drag', 2)} a radian)` : ''}.` : `swings reach ${figure('degrees', 3)}°, and the full pendulum could not be fitted; the small swing’s equation is used, off by up to ${figure('percent', 2)} %.`;
    case 'trace-jumps-unlisted':
      return `no shot is listed, but its swing jumps ${number('jumps') === 1 ? 'once' : `${text('jumps')} times or so`}. List the shots and taps, or choose “jumps found in the swing”.`;
    case 'trace-two-values':
      return 'its reading has two values only: the sensor stood at one end of its range or the other all the time, or this is a trigger. Take less gain, or choose another column.';
    case 'trace-camera-scale-differs':
      return `the radius of the marker’s arc in the picture differs by ${figure('percent', 2)} % from scale times radius as stated, ${figure('inU', 2)} times the uncertainty of that. Check the pixels per millimetre (was its scale in the plane of the swing?) and the radius; the lens bends, too.`;
    case 'trace-camera-leans':
      return `the plumb line leans by ${figure('degrees', 2)}° in the picture, which makes every reading across ${figure('percent', 2)} % too small. Set the camera upright, or read pivot and marker, where it makes no difference.`;
    case 'trace-train-not-read':
      return `line ${text('at')} of its trains, “${text('found')}”, cannot be read. A train is written 20 60 50 Hz: from, to, pulses a second.`;
    case 'trace-train-not-fitted':
      return `the train from ${quantity('from', 'time')} to ${quantity('to', 'time')} gives no steady deflection: the record needs twenty samples of it, and twenty of the rest beside it without another shot.`;
    case 'trace-train-slow':
      return `its pulses, ${quantity('rate', 'frequency')}, are not much faster than the swing: the reading goes up and down by ${figure('percent', 2)} % of the deflection between them. List them as shots, which are solved one by one.`;
    case 'trace-bytes-missing':
      return 'its bytes are not here, so its shots have no impulse bits. Choose the file itself again, under Traces.';
    case 'trace-clipped':
      return `it reached the end of the sensor’s range in ${many('stretches', 'stretch')}, first at ${quantity('time', 'time')}; those samples are left out of the fit.`;
    case 'trace-spikes':
      return `${many('spikes', 'spike')} stand out of it, the first at ${quantity('time', 'time')}; they are left out of the fit.`;
    case 'trace-no-trigger':
      return 'no trigger that rises was found in it. Choose its column, or list the shots.';
    case 'trace-rate-missing':
      return 'its samples or frames are counted and nothing says how many a second. Write that under “How it is read”.';
    case 'trace-pivot-missing':
      return 'pivot and marker are read from the picture: the marker’s row is wanted as a column here, and the pivot’s place as columns or under Reading: the arc of this marker is too short to tell where its centre is.';
    case 'trace-sensor-slope-missing':
      return 'it is in volts. Write the slope of the sensor’s calibration line, under Reading, or the unit of its reading.';
    case 'trace-offset-found':
      return `its list fits the jumps of the swing with ${quantity('offset', 'time')} added to each time (± ${quantity('u', 'time')}, standard uncertainty; ${text('matched')} of ${text('listed')} shots).`;
    case 'trace-offset-open':
      return text('why') === 'ambiguous' ? `its list fits the jumps of the swing with ${quantity('one', 'time')} added as well as with ${quantity('other', 'time')}. Write the one that is right as the offset.` : 'no offset brings its list on to the jumps of the swing. Check that list and record belong together, or let the shots be found.';
    case 'trace-clock-drifts':
      return `the clock of its list runs ${figure('perMillion', 2)} parts in a million off that of the record, ${quantity('over', 'time')} over the record.`;
    case 'trace-jumps-found':
      return `${many('jumps', 'jump')} of the swing were found and are taken for shots. Check them in the picture: taps, blanks and knocks are among them where there were any.`;
    case 'trace-swing-from-bench':
      return 'no swing stands out of it; frequency and damping are taken from the bench, so that its jumps can be bounded.';
    case 'trace-times-moved':
      return `${many('times', 'time')} of its list ${number('times') === 1 ? 'was' : 'were'} moved by the fit, by ${quantity('most', 'time')} at the most.`;
  }
}
