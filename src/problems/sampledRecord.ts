/** The words for what is wrong with a sampled record: its file, its rows and its times. */
import type { Dimension } from '../units/units.ts';
import type { ProblemCode, Weight } from './problems.ts';

/** The facts of one problem, in words. */
export interface FactWords {
  readonly has: (name: string) => boolean;
  readonly text: (name: string) => string;
  readonly number: (name: string) => number;
  readonly figure: (name: string, digits?: number) => string;
  readonly quantity: (name: string, dimension: Dimension) => string;
  readonly many: (name: string, one: string) => string;
}

export type SampledRecordCode = Extract<
  ProblemCode,
  | 'trace-time-not-rising' | 'trace-samples-repeated' | 'trace-time-coarse' | 'trace-samples-missing' | 'trace-spacing-uneven'
  | 'trace-numbers-missing' | 'trace-rows-passed-over' | 'trace-cut-off' | 'trace-gzip-broken'
>;

export function sampledRecordWords(code: SampledRecordCode, weight: Weight, { has, text, number, figure, quantity, many }: FactWords): string {
  const are = (name: string): string => (number(name) === 1 ? 'is' : 'are');
  switch (code) {
    case 'trace-time-not-rising':
      if (!has('left')) return 'the time does not rise here; the record is left out. Check that it is one record, in order.';
      if (weight === 'stops') return 'the time never rises, so no sample has one. Choose another column for the time, or none and write the sampling rate.';
      return number('restarts') > 0
        ? `the time goes back and begins again here. The longest stretch in which it rises is used; ${many('left', 'row')} ${are('left')} left out. Check that it is one record.`
        : `the time runs backward here; ${many('left', 'row')} out of order ${are('left')} left out.`;
    case 'trace-samples-repeated':
      return weight === 'stops'
        ? 'all rows have one time. Choose another column for the time, or none and write the sampling rate.'
        : `${many('repeated', 'row')} with the same time or number as the one before ${are('repeated')} left out, the first of them here.`;
    case 'trace-time-coarse':
      return `the time is written too coarsely: ${many('repeated', 'row')} with the same time as the one before ${are('repeated')} left out. Choose no time column and write the sampling rate${number('rate') > 0 ? `, about ${figure('rate')} a second` : ''}; then every row counts.`;
    case 'trace-samples-missing':
      return `${many('missing', 'sample')} ${are('missing')} missing, in ${many('gaps', 'gap')}; the first begins at ${quantity('time', 'time')}. Nothing is filled in for them.`;
    case 'trace-spacing-uneven':
      return `the samples are not evenly spaced: ${quantity('least', 'time')} to ${quantity('most', 'time')} apart. Each is taken at its own time.`;
    case 'trace-numbers-missing':
      return `${many('rows', 'row')} without a number ${are('rows')} left out, the first of them here.`;
    case 'trace-rows-passed-over':
      return `${many('rows', 'line')} with a word or too few cells ${are('rows')} passed over; the first reads “${text('found')}”.`;
    case 'trace-cut-off':
      return 'the file stops in the middle of its last number, which is left out. Check that the whole record was saved.';
    case 'trace-gzip-broken':
      return weight === 'stops'
        ? 'the gzip file is damaged and nothing of it can be unpacked. Copy it again from where it was recorded.'
        : 'the gzip file is damaged or cut off; what comes before that place is used. Copy it again from where it was recorded.';
  }
}
