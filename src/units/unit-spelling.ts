/** How people spell units: any text to the canonical keys of a product of powers, "uN.sec" to "s^1 uN^1". */

/** Symbol (micro written u) and the names taken for it in any case. */
const ATOMS: Readonly<Record<string, readonly string[]>> = {
  m: ['metre', 'metres', 'meter', 'meters'],
  cm: ['centimetre', 'centimetres', 'centimeter', 'centimeters'],
  mm: ['millimetre', 'millimetres', 'millimeter', 'millimeters'],
  um: ['micrometre', 'micrometres', 'micrometer', 'micrometers', 'micron', 'microns'],
  nm: ['nanometre', 'nanometres', 'nanometer', 'nanometers'],
  in: ['inch', 'inches'],
  mil: ['mils'],
  thou: [],
  ft: ['foot', 'feet'],
  kg: ['kilogram', 'kilograms', 'kilogramme', 'kilogrammes', 'kgs'],
  g: ['gram', 'grams', 'gramme', 'grammes', 'gm'],
  mg: ['milligram', 'milligrams'],
  ug: ['microgram', 'micrograms', 'mcg'],
  lb: ['lbs', 'pound', 'pounds', 'lbm'],
  oz: ['ounce', 'ounces'],
  grain: ['grains'],
  rad: ['radian', 'radians'],
  mrad: ['milliradian', 'milliradians'],
  urad: ['microradian', 'microradians'],
  '°': ['deg', 'degs', 'degree', 'degrees'],
  arcmin: ['arcminute', 'arcminutes'],
  arcsec: ['arcsecond', 'arcseconds'],
  "'": ['’'],
  '"': ['”'],
  s: ['sec', 'secs', 'second', 'seconds'],
  ms: ['msec', 'millisecond', 'milliseconds'],
  us: ['usec', 'microsecond', 'microseconds'],
  min: ['mins', 'minute', 'minutes'],
  Hz: ['hertz'],
  kHz: ['kilohertz'],
  mHz: ['millihertz'],
  N: ['newton', 'newtons'],
  mN: ['millinewton', 'millinewtons'],
  uN: ['micronewton', 'micronewtons'],
  nN: ['nanonewton', 'nanonewtons'],
  dyn: ['dyne', 'dynes'],
  gf: ['pond'],
  mgf: [],
  kgf: [],
  lbf: [],
  ozf: [],
  pdl: ['poundal', 'poundals'],
  Pa: ['pascal', 'pascals'],
  mPa: ['millipascal', 'millipascals'],
  hPa: ['hectopascal', 'hectopascals'],
  kPa: ['kilopascal', 'kilopascals'],
  MPa: ['megapascal', 'megapascals'],
  GPa: ['gigapascal', 'gigapascals'],
  bar: ['bars'],
  mbar: ['millibar', 'millibars', 'mb'],
  ubar: ['microbar', 'microbars'],
  Torr: ['torrs'],
  mTorr: ['millitorr'],
  mmHg: [],
  inHg: [],
  Hg: [],
  atm: ['atmosphere', 'atmospheres'],
  psi: ['psia'],
  V: ['volt', 'volts'],
  kV: ['kilovolt', 'kilovolts'],
  mV: ['millivolt', 'millivolts'],
  Gal: ['gals'],
  mGal: ['milligal', 'milligals'],
  '%': ['percent', 'pct', 'per cent'],
  '‰': ['permille', 'permil'],
  ppm: [],
  px: ['pixel', 'pixels'],
  counts: ['count', 'cts', 'steps'],
  C: ['degc', 'celsius'],
  F: ['farad', 'farads'],
  mF: ['millifarad', 'millifarads'],
  uF: ['microfarad', 'microfarads'],
  nF: ['nanofarad', 'nanofarads'],
  ohm: ['ohms'],
  mohm: ['milliohm', 'milliohms'],
  kohm: ['kiloohm', 'kiloohms', 'kilohm', 'kilohms'],
  T: ['tesla'],
  mT: ['millitesla'],
  uT: ['microtesla'],
  S: [],
};

/** Symbols run together, as in "Ns" or "uNms/rad". */
const RUN_TOGETHER = /^([munUM]?N)(mm|m|M)?(s|sec|S)?$/;

const NAMES: ReadonlyMap<string, string> = new Map(
  Object.entries(ATOMS).flatMap(([symbol, names]) => names.map((name) => [name, symbol] as const)),
);

/** Symbols by their lower-case form, for texts whose capitals are not ours ("KG", "Torr" for "torr"). */
const FOLDED: ReadonlyMap<string, readonly string[]> = (() => {
  const folded = new Map<string, string[]>();
  for (const symbol of Object.keys(ATOMS)) {
    const lower = symbol.toLowerCase();
    folded.set(lower, [...(folded.get(lower) ?? []), symbol]);
  }
  return folded;
})();

/** A capital M may be mega, and n may be nano: only where neither is in doubt do the capitals not count. */
function capitalsMayDiffer(text: string, symbol: string): boolean {
  if (symbol.endsWith('N')) return text.endsWith('N') && !text.startsWith('M');
  if (symbol === 'mPa' || symbol === 'MPa') return false;
  if (symbol === 'mV') return !text.startsWith('M');
  if (text.length > 1 && text.startsWith('M') && symbol.startsWith('m')) return text === text.toUpperCase();
  return true;
}

/** Symbols that one run of letters stands for, in order of likelihood; more than one product is never guessed between. */
function atomsNamed(text: string): readonly (readonly string[])[] {
  if (Object.hasOwn(ATOMS, text)) return text === 'S' ? [['s'], ['S']] : [[text]];
  const together = RUN_TOGETHER.exec(text);
  const isNanometreInCapitals = text === 'NM';
  if (together !== null && !text.startsWith('M') && !isNanometreInCapitals) {
    const [, newton = 'N', metre, second] = together;
    const parts = [newton.replace('U', 'u')];
    if (metre !== undefined) parts.push(metre.toLowerCase());
    if (second !== undefined) parts.push('s');
    return [parts];
  }
  const name = NAMES.get(text.toLowerCase());
  if (name !== undefined) return [[name]];
  const close = (FOLDED.get(text.toLowerCase()) ?? []).filter((symbol) => capitalsMayDiffer(text, symbol));
  return isNanometreInCapitals ? [] : close.map((symbol) => [symbol]);
}

const SUPERSCRIPTS = '⁰¹²³⁴⁵⁶⁷⁸⁹';

/** Superscripts as ^n, every minus as '-', every space as ' ', full-width signs as plain ones. */
export function plainText(text: string): string {
  return text
    .replace(/″/g, '"')
    .replace(/[º˚]/g, '°')
    .replace(/[⁺⁻]?[⁰¹²³⁴⁵⁶⁷⁸⁹]+/g, (run) =>
      `^${run.replace('⁻', '-').replace('⁺', '').replace(/[^-]/g, (one) => String(SUPERSCRIPTS.indexOf(one)))}`)
    .normalize('NFKC')
    .replace(/[−–‐‑﹣]/g, '-')
    .replace(/[\s\u200B\u2060\uFEFF]+/g, ' ')
    .trim();
}

type Powers = ReadonlyMap<string, number>;

/**
 * Canonical keys of a unit text, the likeliest first; none where it is no product of known symbols.
 *
 * A product after a solidus needs brackets: `N·m/rad·s` is refused as ambiguous.
 * Source: SI Brochure (9th ed.), 5.4.2.
 */
export function unitKeys(text: string): readonly string[] {
  let plain = plainText(text).replace(/μ/g, 'u').replace(/Ω/g, 'ohm').replace(/′/g, "'");
  const bracketed = /^\[(.*)\]$/.exec(plain) ?? /^\(([^()]*)\)$/.exec(plain);
  if (bracketed?.[1] !== undefined) plain = bracketed[1].trim();
  plain = plain.replace(/(?<=[A-Za-z])\.$/, '');
  if (plain === '') return [];
  if (plain === '1') return ['1'];
  const whole = NAMES.get(plain.toLowerCase());
  if (whole !== undefined) return [keyOf(new Map([[whole, 1]]))];
  // "-kPa": counted down from the outside pressure.
  return plain.startsWith('-') ? product(plain.slice(1)).map((powers) => `-${keyOf(powers)}`) : product(plain).map(keyOf);
}

function keyOf(powers: Powers): string {
  return [...powers].filter(([, power]) => power !== 0).map(([symbol, power]) => `${symbol}^${power}`).sort().join(' ');
}

const FACTOR = /^(''|[A-Za-z]+|[°%‰'’"”])(?:\^? ?\(?([+-]?\d)\)?)?/;
const BETWEEN = /^ ?[·⋅∙•×*. -] ?/;

/** All readings of a product of factors, a quotient, or a factor in brackets after a solidus. */
function product(text: string): readonly Powers[] {
  let readings: readonly Powers[] = [new Map()];
  let rest = text;
  let divided = false;
  let sign = 1;
  if (/^1 ?\//.test(rest)) rest = rest.slice(1);
  for (let first = true; rest !== ''; first = false) {
    const solidus = /^ ?(?:\/| per ) ?/i.exec(rest);
    if (solidus !== null) {
      rest = rest.slice(solidus[0].length);
      divided = true;
      sign = -1;
    } else if (!first) {
      if (divided) return [];
      const between = BETWEEN.exec(rest);
      if (between !== null) rest = rest.slice(between[0].length);
    }
    const group = /^\(([^()]+)\)/.exec(rest);
    if (group?.[1] !== undefined) {
      const inner = product(group[1].trim());
      readings = readings.flatMap((one) => inner.map((two) => times(one, two, sign)));
      rest = rest.slice(group[0].length);
      continue;
    }
    const factor = FACTOR.exec(rest);
    if (factor?.[1] === undefined) return [];
    const atoms = atomsNamed(factor[1] === "''" ? '"' : factor[1]);
    const power = sign * Number(factor[2] ?? '1');
    readings = readings.flatMap((one) =>
      atoms.map((symbols) => times(one, new Map(symbols.map((symbol, at) => [symbol, at === symbols.length - 1 ? power : sign])), 1)));
    rest = rest.slice(factor[0].length);
  }
  return readings;
}

function times(one: Powers, two: Powers, sign: number): Powers {
  const result = new Map(one);
  for (const [symbol, power] of two) result.set(symbol, (result.get(symbol) ?? 0) + sign * power);
  return result;
}
