/** A date as a person types it, 2027-03-31, 31.3.2027, 31 Mar 2027 or 3/2027, to one day of the calendar. */

/** How the numbers of a date were taken; 'month': no day was typed, and its last day is taken. */
export type DateOrder = 'yearFirst' | 'dayFirst' | 'monthFirst' | 'named' | 'month';

export interface DateRead {
  /** YYYY-MM-DD, so that dates compare as texts. */
  readonly iso: string;
  readonly order: DateOrder;
  /** Day and month could stand the other way round. */
  readonly ambiguous: boolean;
}

const MONTHS = ['jan', 'feb', 'mar', 'apr', 'may', 'jun', 'jul', 'aug', 'sep', 'oct', 'nov', 'dec'] as const;
/** Years written with two digits are of this century: certificates are not older. */
const CENTURY = 2000;

const NUMBERS = /^(\d{1,4})([-./ ])(\d{1,2})\2(\d{1,4})$/;
const MONTH_ALONE = /^(?:(\d{4})[-./](\d{1,2})|(\d{1,2})[-./](\d{4}))$/;
const DAY_NAMED = /^(\d{1,2})(?:st|nd|rd|th)?[-. ]+([a-z]{3,9})[-., ]+(\d{4}|\d{2})$/;
const NAMED_DAY = /^([a-z]{3,9})[. ]+(\d{1,2})(?:st|nd|rd|th)?,? +(\d{4}|\d{2})$/;
const NAMED_MONTH = /^([a-z]{3,9})[., -]+(\d{4})$/;

const daysIn = (year: number, month: number): number => new Date(Date.UTC(year, month, 0)).getUTCDate();

function read(year: number, month: number, day: number, order: DateOrder, ambiguous = false): DateRead | null {
  const whole = year < 100 ? CENTURY + year : year;
  if (!(whole >= 1900 && month >= 1 && month <= 12 && day >= 1 && day <= daysIn(whole, month))) return null;
  const two = (n: number): string => String(n).padStart(2, '0');
  return { iso: `${whole}-${two(month)}-${two(day)}`, order, ambiguous };
}

function monthNamed(word: string): number {
  const full = ['january', 'february', 'march', 'april', 'may', 'june', 'july', 'august', 'september', 'october', 'november', 'december'].findIndex((name) => name.startsWith(word));
  return 1 + (full >= 0 ? full : word === 'sept' ? 8 : -1);
}

const lastOf = (year: number, month: number): DateRead | null => (month >= 1 && month <= 12 ? read(year, month, daysIn(year, month), 'month') : null);

/**
 * The day that a text names; null where it names none.
 *
 * The year comes first (ISO 8601), or last with the day before the month; the month first only where nothing else is a
 * date (3/31/2027), so a date that could be either is told as ambiguous. A month without a day is its last day, as
 * certificates mean it.
 */
export function readDate(text: string): DateRead | null {
  const plain = text.trim().toLowerCase().replace(/\s+/g, ' ').replace(/(?<=\d[./-]) (?=\d)/g, '');
  const numbers = NUMBERS.exec(plain);
  if (numbers) {
    const [a, b, c] = [Number(numbers[1]), Number(numbers[3]), Number(numbers[4])];
    if (numbers[1]!.length === 4) return read(a, b, c, 'yearFirst');
    if (numbers[1]!.length > 2 || (numbers[4]!.length !== 4 && numbers[4]!.length !== 2)) return null;
    return read(c, b, a, 'dayFirst', a <= 12 && a !== b) ?? read(c, a, b, 'monthFirst');
  }
  const month = MONTH_ALONE.exec(plain);
  if (month) return lastOf(Number(month[1] ?? month[4]), Number(month[2] ?? month[3]));
  const dayNamed = DAY_NAMED.exec(plain);
  if (dayNamed) return read(Number(dayNamed[3]), monthNamed(dayNamed[2]!), Number(dayNamed[1]), 'named');
  const namedDay = NAMED_DAY.exec(plain);
  if (namedDay) return read(Number(namedDay[3]), monthNamed(namedDay[1]!), Number(namedDay[2]), 'named');
  const named = NAMED_MONTH.exec(plain);
  return named ? lastOf(Number(named[2]), monthNamed(named[1]!)) : null;
}

/** "31 Mar 2027", the same wherever the page is read. */
export function dateWords(iso: string): string {
  const [year = '', month = '', day = ''] = iso.split('-');
  const name = MONTHS[Number(month) - 1] ?? '';
  return `${Number(day)} ${name.charAt(0).toUpperCase()}${name.slice(1)} ${year}`;
}
