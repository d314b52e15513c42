/** Why a column is proposed as what it is, in one sentence each. */
import { ROLE_WORDS } from './words.ts';

/** A proposal as readings/columns.ts makes it, as far as its sentence needs it. */
export interface ProposalShape {
  readonly role: string;
  readonly unit: string;
  readonly sure: boolean;
  readonly because: {
    readonly code: 'header' | 'unit' | 'values' | 'position' | 'nothing' | 'kept';
    readonly facts: Readonly<Record<string, string | number>>;
  };
}

/** "Rest reading, by its header “Ruhelage”; mm, as the header says." */
export function sentenceForProposal(proposal: ProposalShape): string {
  const { role, unit, because } = proposal;
  const name = ROLE_WORDS[role] ?? role;
  const said = `${name.charAt(0).toUpperCase()}${name.slice(1)}, ${reason(role, because)}`;
  return `${said}${unitSentence(unit, because.facts)}${proposal.sure ? '.' : '. Check it.'}`;
}

function reason(role: string, { code, facts }: ProposalShape['because']): string {
  const word = facts['word'] === undefined ? '' : `“${facts['word']}”`;
  const wanted = ROLE_WORDS[String(facts['wanted'] ?? '')] ?? '';
  switch (code) {
    case 'header':
      return role === 'ignored' ? `as ${word} in the header is nothing that is used here` : `by ${word} in its header`;
    case 'unit':
      if (facts['wrongUnit'] === undefined) return 'by its unit';
      if (wanted === '') return `as nothing here is measured in ${facts['wrongUnit']}`;
      return `as ${word} in the header says ${wanted}, but ${facts['wrongUnit']} is not a unit for it`;
    case 'values':
      return seenInWords(String(facts['seen'] ?? ''), word);
    case 'position':
      if (facts['taken'] !== undefined) {
        const other = /^\d+$/.test(String(facts['taken'])) ? `column ${facts['taken']}` : `“${facts['taken']}”`;
        return `as ${other} is the ${wanted === '' ? name(role) : wanted} already`;
      }
      return facts['seen'] === 'onlyNumbers' ? 'as the only column of numbers left' : 'by its place in the usual order: rest, first swing, next swings';
    case 'nothing':
      return facts['seen'] === 'blank' ? 'as the column is empty' : 'as neither header nor values say what it is';
    case 'kept':
      return 'as in the earlier version of this file';
  }
}

const name = (role: string): string => ROLE_WORDS[role] ?? role;

function seenInWords(seen: string, word: string): string {
  switch (seen) {
    case 'kindWords': return 'as its words name kinds of record';
    case 'noKindWords': return `as the header says ${word}, but none of its words names a kind of record`;
    case 'clock': return 'as it holds clock times';
    case 'differentWords': return 'as the first column has another word in every row';
    case 'text': return word === '' ? 'as it holds text' : `as the header says ${word}, but the cells hold text`;
    case 'countsUp': return 'as its whole numbers count up';
    case 'voltsBySize': return 'as its numbers have the size of charge voltages';
    case 'staysPut': return 'as its numbers hardly move, and another column stands off from them by a throw';
    case 'apartFromRest': return 'as its numbers stand off from the rest, on one side of it';
    case 'otherSide': return 'as its numbers lie on the other side of the rest than the swing before';
    default: return 'by its values';
  }
}

function unitSentence(unit: string, facts: Readonly<Record<string, string | number>>): string {
  if (unit === '') return '';
  const unknown = facts['unknownUnit'] === undefined ? '' : ` (“${facts['unknownUnit']}” is not known as a unit)`;
  switch (facts['unitFrom']) {
    case 'header': return `; ${unit}, as the header says`;
    case 'cells': return `; ${unit}, as the cells say`;
    case 'others': return `; ${unit}, as the other readings${unknown}`;
    case 'assumed': return `; no unit is given, ${unit} is taken${unknown}`;
    default: return '';
  }
}
