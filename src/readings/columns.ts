/** Proposes what each column of a table means and in which unit, always with the reason. */
import { problem } from '../problems/problems.ts';
import type { Place, Problem } from '../problems/problems.ts';
import { unitNamed, unitsOf } from '../units/units.ts';
import type { Dimension, Unit } from '../units/units.ts';
import { profileColumn } from './columnProfile.ts';
import type { ColumnProfile } from './columnProfile.ts';
import { placeByValues } from './columnsByValues.ts';
import { columnUnit } from './headerUnits.ts';
import type { ColumnMeaning, Role } from './meanings.ts';
import type { TableRead } from './table.ts';
import { roleOfHeader } from './words.ts';

/**
 * Why a column has its role. header: its words · unit: its unit · values: its numbers or words · position: its place among the others ·
 * nothing: no sign of a role · kept: as it was in the earlier version of the file.
 */
export type ReasonCode = 'header' | 'unit' | 'values' | 'position' | 'nothing' | 'kept';

/**
 * Facts used by problems/proposals.ts. `word`: phrase of the header; `unit` and `unitFrom` ('header', 'cells', 'others', 'assumed', 'none');
 * `unknownUnit`: text in the header's brackets that is no unit; `seen`: what the values show; `taken`: header of the column that has the role.
 */
export type ReasonFacts = Readonly<Record<string, string | number>>;

export interface Reason {
  readonly code: ReasonCode;
  readonly facts: ReasonFacts;
}

export type Proposal = ColumnMeaning & {
  readonly because: Reason;
  /** false: a person should look at it. */
  readonly sure: boolean;
};

/** What a role's numbers are measured in; readings are a length, or an angle. */
export const ROLE_DIMENSIONS: Readonly<Record<Role, readonly Dimension[]>> = {
  rest: ['length', 'angle', 'pixel', 'count'],
  restAfter: ['length', 'angle', 'pixel', 'count'],
  nextSwingDown: ['pixel'],
  firstSwing: ['length', 'angle', 'pixel', 'count'],
  nextSwing: ['length', 'angle', 'pixel', 'count'],
  restDown: ['pixel'],
  firstSwingDown: ['pixel'],
  time: ['time'],
  voltage: ['voltage'],
  // A number is percent on a vacuum dial.
  pressure: ['pressure', 'number'],
  tapImpulse: ['impulse'],
  hammerIn: ['angle'],
  hammerRebound: ['angle'],
  hammerFollow: ['angle'],
  tapForce: ['force'],
  tapDuration: ['time'],
  weight: ['mass', 'force'],
  loading: ['length', 'angle', 'pixel', 'count'],
  unloading: ['length', 'angle', 'pixel', 'count'],
  swingsTime: ['time'],
  cycles: ['count'],
  amplitude: ['angle'],
  massHung: ['mass'],
  massHungAt: ['length'],
  maximumTime: ['time'],
  swingBefore: ['length', 'angle', 'pixel', 'count'],
  timeSinceMaximum: ['time'],
  kind: [],
  label: [],
  note: [],
  ignored: [],
};

/** Of plain numbers a column takes percent alone. */
const isOfColumns = (unit: Unit): boolean => unit.dimension !== 'number' || unit.symbol === '%';

/** Units in which a role's numbers can be written. */
export const unitsOfRole = (role: Role): readonly Unit[] => ROLE_DIMENSIONS[role].flatMap((dimension) => unitsOf(dimension)).filter(isOfColumns);

/** Unit taken where none is written, told with the proposal. */
export const USUAL_UNIT: Readonly<Record<Role, string>> = {
  rest: 'mm', restAfter: 'mm', nextSwingDown: 'px', firstSwing: 'mm', nextSwing: 'mm', restDown: 'px', firstSwingDown: 'px', time: 's', voltage: 'V', pressure: 'Pa', tapImpulse: 'mN·s',
  hammerIn: '°', hammerRebound: '°', hammerFollow: '°', tapForce: 'mN', tapDuration: 'ms', weight: 'mg', loading: 'mm', unloading: 'mm', swingsTime: 's', cycles: 'counts', amplitude: '°', massHung: 'g', massHungAt: 'mm', swingBefore: 'mm', timeSinceMaximum: 's', maximumTime: 's', kind: '', label: '', note: '', ignored: '',
};

/** Where a column stands while the proposal is being made. */
export interface Claim {
  role: Role | null;
  code: ReasonCode;
  facts: Record<string, string | number>;
  /** Part of the header that the known words cover, then their length, for choosing between two columns of one role. */
  strength: number;
  sure: boolean;
}

const READINGS: readonly Role[] = ['rest', 'restAfter', 'firstSwing', 'nextSwing', 'loading', 'unloading', 'swingBefore'];
export const isReading = (role: Role | null): boolean => role !== null && READINGS.includes(role);

/** The unit of a column as written in its header, a units row or its cells. */
export function writtenUnit(table: TableRead, profile: ColumnProfile): { unit: Unit | null; from: 'header' | 'cells' | 'none'; unknown: string } {
  const text = table.unitTexts[profile.index] ?? null;
  const inHeader = text === null ? null : columnUnit(text);
  if (inHeader !== null) return { unit: inHeader, from: 'header', unknown: '' };
  const inCells = profile.unit === '' ? null : columnUnit(profile.unit);
  return { unit: inCells, from: inCells === null ? 'none' : 'cells', unknown: text ?? '' };
}

/**
 * A meaning for every column: by its header's words, else its unit, else its values and place.
 *
 * @param known meanings of the same columns in an earlier version of the file; kept where there are as many.
 */
export function proposeColumns(table: TableRead, known?: readonly ColumnMeaning[]): Proposal[] {
  if (known !== undefined && known.length === table.headers.length && known.length > 0) {
    return known.map((meaning): Proposal => ({ ...meaning, because: { code: 'kept', facts: { unit: meaning.unit, unitFrom: 'none' } }, sure: true }));
  }
  const before = PROPOSED.get(table);
  if (before !== undefined) return [...before];
  const proposals = proposeAfresh(table);
  PROPOSED.set(table, proposals);
  return [...proposals];
}

/** A table is asked for its proposal at every recalculation, and its answer never changes. */
const PROPOSED = new WeakMap<TableRead, readonly Proposal[]>();

function proposeAfresh(table: TableRead): Proposal[] {
  const profiles = table.headers.map((_, i) => profileColumn(table, i));
  const claims = profiles.map((profile) => claimByHeader(table, profile));
  settleRivals(table, claims);
  settleEvidence(claims);
  profiles.forEach((profile, i) => {
    const claim = claims[i];
    if (claim !== undefined && claim.role === null) claimByUnit(table, profile, claim, claims);
  });
  placeByValues(profiles, claims);
  return withUnits(table, profiles, claims);
}

const MOSTLY = 0.8;

const fitsRole = (unit: Unit | null, role: Role): boolean => unit !== null && isOfColumns(unit) && ROLE_DIMENSIONS[role].some((d) => unitNamed(unit.symbol, d) !== null);

function claimByHeader(table: TableRead, profile: ColumnProfile): Claim {
  const claim: Claim = { role: null, code: 'nothing', facts: {}, strength: 0, sure: false };
  const header = table.headers[profile.index] ?? '';
  const read = header === '' ? null : roleOfHeader(header);
  if (profile.full > 0 && profile.kind >= MOSTLY && (read === null || read.role === 'kind' || read.role === 'label' || read.role === 'tapImpulse')) {
    const byHeader = read?.role === 'kind';
    return { role: 'kind', code: byHeader ? 'header' : 'values', facts: byHeader ? { word: read.phrase } : { seen: 'kindWords' }, strength: 1, sure: true };
  }
  const written = writtenUnit(table, profile);
  // One letter with a foreign unit ("C (mN s)") is a name, not a word.
  if (read === null || (read.phrase.length <= 2 && written.from === 'header' && !fitsRole(written.unit, read.role))) return claim;
  // "Tap (mN·s)": a unit that only impulses have says more than a word that also numbers taps.
  if (read.role === 'label' && written.from === 'header' && fitsRole(written.unit, 'tapImpulse')) {
    return { role: 'tapImpulse', code: 'unit', facts: { word: read.phrase }, strength: 1, sure: false };
  }
  claim.facts = { word: read.phrase };
  claim.strength = read.covers + read.phrase.length / 1000;
  const { role } = read;
  if (role === 'kind' && profile.full > 0 && profile.kind === 0) {
    return { ...claim, role: 'ignored', code: 'values', facts: { ...claim.facts, seen: 'noKindWords' } };
  }
  const { unit, unknown } = written;
  const needsNumbers = ROLE_DIMENSIONS[role].length > 0;
  const mismatch = needsNumbers && unit !== null && !fitsRole(unit, role);
  const strange = needsNumbers && !isReading(role) && unit === null && unknown !== '';
  if (mismatch || strange) {
    return { ...claim, role: 'ignored', code: 'unit', facts: { ...claim.facts, wrongUnit: unit?.symbol ?? unknown, wanted: role } };
  }
  if (needsNumbers && profile.full >= 2 && profile.numeric + profile.clock < 1 - MOSTLY) {
    return { ...claim, role: 'note', code: 'values', facts: { ...claim.facts, seen: 'text' } };
  }
  return { ...claim, role, code: 'header', sure: true };
}

const SINGLE: readonly Role[] = [
  'kind', 'label', 'rest', 'restAfter', 'firstSwing', 'time', 'voltage', 'pressure', 'tapImpulse', 'hammerIn', 'hammerRebound', 'hammerFollow', 'tapForce', 'tapDuration', 'weight', 'loading', 'unloading', 'swingsTime', 'cycles', 'amplitude', 'massHung', 'massHungAt', 'swingBefore', 'timeSinceMaximum', 'maximumTime',
];

/** Of two columns with one role the better named keeps it; a second first swing is a next swing, any other is left aside, with the reason. */
function settleRivals(table: TableRead, claims: readonly Claim[]): void {
  for (const role of SINGLE) {
    const rivals = [...claims.entries()].filter(([, claim]) => claim.role === role);
    if (rivals.length < 2) continue;
    const best = rivals.reduce((one, two) => (two[1].strength > one[1].strength + 1e-9 ? two : one));
    for (const [index, claim] of rivals) {
      if (index === best[0]) continue;
      const taken = table.headers[best[0]] ?? '';
      claim.facts = { ...claim.facts, taken: taken === '' ? String(best[0] + 1) : taken, wanted: role };
      claim.sure = false;
      claim.role = role === 'firstSwing' && index > best[0] ? 'nextSwing' : 'ignored';
      claim.code = 'position';
    }
  }
}

/** Roles of a table of shots or taps; beside them a weight is a remark. */
const OF_FIRINGS: readonly Role[] = ['rest', 'restAfter', 'nextSwing', 'voltage', 'tapImpulse', 'hammerIn'];

/** A weight is one of a calibration only where deflections stand beside it; a radius only beside a mass that hung there. */
function settleEvidence(claims: readonly Claim[]): void {
  const has = (...roles: readonly Role[]): boolean => claims.some(({ role }) => role !== null && roles.includes(role));
  const leave = (role: Role): void => {
    const to = role === 'weight' ? { role: 'ignored', code: 'nothing', facts: { seen: 'noSign' } } : { role: null, code: 'nothing', facts: {}, sure: false };
    for (const claim of claims) if (claim.role === role) Object.assign(claim, to);
  };
  if (has('weight') && !has('loading', 'unloading')) {
    const deflection = has(...OF_FIRINGS) ? undefined : claims.find(({ role }) => role === 'firstSwing');
    if (deflection) deflection.role = 'loading';
    else leave('weight');
  }
  if (!has('weight')) for (const role of ['loading', 'unloading'] as const) leave(role);
  if (!has('massHung')) leave('massHungAt');
  if (!has('swingsTime')) for (const role of ['cycles', 'amplitude'] as const) leave(role);
}

const ROLE_OF_DIMENSION: Readonly<Partial<Record<Dimension, Role>>> = { voltage: 'voltage', pressure: 'pressure', impulse: 'tapImpulse', time: 'time' };

function claimByUnit(table: TableRead, profile: ColumnProfile, claim: Claim, claims: readonly Claim[]): void {
  const { unit } = writtenUnit(table, profile);
  if (unit === null) return;
  const role = ROLE_OF_DIMENSION[unit.dimension];
  const free = role !== undefined && !claims.some((other) => other.role === role);
  if (free) Object.assign(claim, { role, code: 'unit', facts: { ...claim.facts } });
  else if (unit.dimension !== 'length' && unit.dimension !== 'angle' && unit.dimension !== 'pixel' && unit.dimension !== 'count') {
    Object.assign(claim, { role: 'ignored', code: 'unit', facts: { ...claim.facts, wrongUnit: unit.symbol } });
  }
}

function withUnits(table: TableRead, profiles: readonly ColumnProfile[], claims: readonly Claim[]): Proposal[] {
  const written = profiles.map((profile) => writtenUnit(table, profile));
  const readingUnits = claims.flatMap((claim, i) => {
    const unit = written[i]?.unit ?? null;
    return isReading(claim.role) && unit !== null ? [unit] : [];
  });
  return claims.map((claim, i): Proposal => {
    const role = claim.role ?? 'ignored';
    const dimensions = ROLE_DIMENSIONS[role];
    if (dimensions.length === 0) return { role, unit: '', by: 'proposal', because: { code: claim.code, facts: { ...claim.facts, unit: '', unitFrom: 'none' } }, sure: claim.sure };
    const own = written[i];
    const ownUnit = own?.unit ?? null;
    const fits = ownUnit !== null ? dimensions.map((d) => unitNamed(ownUnit.symbol, d)).find((u) => u !== null) : undefined;
    const clock = role === 'time' && (profiles[i]?.clock ?? 0) > 0;
    const likeOthers = isReading(role) ? readingUnits[0] : undefined;
    const unit = fits?.symbol ?? likeOthers?.symbol ?? USUAL_UNIT[role];
    const unitFrom = fits !== undefined ? (own?.from ?? 'none') : likeOthers !== undefined ? 'others' : clock ? 'clock' : 'assumed';
    const unknown = own !== undefined && own.unknown !== '' && ownUnit === null ? { unknownUnit: own.unknown } : {};
    const unitIsSure = unitFrom === 'header' || unitFrom === 'cells' || unitFrom === 'clock';
    return { role, unit, by: 'proposal', because: { code: claim.code, facts: { ...claim.facts, ...unknown, unit, unitFrom } }, sure: claim.sure && unitIsSure };
  });
}

/** How a column is named to the user: its header, or its one-based number. */
export function columnName(headers: readonly string[], index: number): string {
  const header = headers[index] ?? '';
  return header === '' ? String(index + 1) : header;
}

/** A note for each column that still stands as proposed without a sure sign, so that no guess is silent; blank and ignored ones aside. */
export function proposalProblems(table: TableRead, columns: readonly ColumnMeaning[], place: Place): Problem[] {
  if (columns.every(({ by }) => by === 'person')) return [];
  const proposals = proposeColumns(table);
  return columns.flatMap((meaning, i) => {
    const proposal = proposals[i];
    if (meaning.by === 'person' || proposal === undefined || proposal.sure || proposal.role !== meaning.role || meaning.role === 'ignored' || meaning.role === 'note') return [];
    const { code, facts } = proposal.because;
    const unitOnly = code === 'header';
    return [
      problem(unitOnly ? 'column-unit-assumed' : 'column-proposed-by-values', 'note', { ...place, column: columnName(table.headers, i) }, {
        role: meaning.role, unit: meaning.unit, unitFrom: facts['unitFrom'] ?? 'none', unknownUnit: facts['unknownUnit'] ?? '',
      }),
    ];
  });
}
