/** Dates as typed. ISO 8601 for the year first; that a month alone means its last day is common practice on certificates, no source. */
import { describe, expect, test } from 'vitest';
import { dateWords, readDate } from '../../src/units/calendarDate.ts';

const iso = (text: string): string | null => readDate(text)?.iso ?? null;

describe('a date as typed', () => {
  test.each([
    ['2027-03-31', '2027-03-31', 'yearFirst'], ['2027/3/1', '2027-03-01', 'yearFirst'], ['31.3.2027', '2027-03-31', 'dayFirst'], ['31. 3. 2027', '2027-03-31', 'dayFirst'],
    ['31/03/27', '2027-03-31', 'dayFirst'], ['3/31/2027', '2027-03-31', 'monthFirst'], ['31 Mar 2027', '2027-03-31', 'named'], ['March 31, 2027', '2027-03-31', 'named'],
    ['31. march 2027', '2027-03-31', 'named'], ['Sept 1 2027', '2027-09-01', 'named'], ['2028-02', '2028-02-29', 'month'], ['02/2027', '2027-02-28', 'month'], ['Feb 2027', '2027-02-28', 'month'],
  ] as const)('%s is %s', (text, day, order) => {
    expect(readDate(text)).toMatchObject({ iso: day, order });
  });

  test('a date that could be either way round is taken day first, and says that it could be the other', () => {
    expect(readDate('03/04/2027')).toEqual({ iso: '2027-04-03', order: 'dayFirst', ambiguous: true });
    expect(readDate('04.04.2027')?.ambiguous).toBe(false);
    expect(readDate('13.04.2027')?.ambiguous).toBe(false);
  });

  test.each(['', 'soon', '31.2.2027', '2027-13-01', '0.3.2027', '2027', '31 Foo 2027', '1/2/345', '12345-01-01'])('“%s” is no date', (text) => {
    expect(iso(text)).toBeNull();
  });

  test('the 29th of February is a day of leap years alone', () => {
    expect(iso('29.2.2028')).toBe('2028-02-29');
    expect(iso('29.2.2027')).toBeNull();
  });

  test('a day is written the same wherever it is read', () => {
    expect(dateWords('2027-04-03')).toBe('3 Apr 2027');
  });
});
