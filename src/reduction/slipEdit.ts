/** A slip of the pen as the edit of the session that mends it; apart, since the page needs no more of it. */
import { setChoice, setColumn, setEntry, setPartEntry, type Edit } from '../session/edits.ts';
import type { EntryName, PartEntryName } from '../session/entries.ts';
import type { SlipEdit } from './evidenceResults.ts';

/** The edit of the session that a slip stands for. */
export function editOf(edit: SlipEdit): Edit {
  switch (edit.is) {
    case 'entry': {
      const part = /^part\.(.+)\.(mass|distance|ownInertia)$/.exec(edit.name);
      return part ? setPartEntry(part[1]!, part[2] as PartEntryName, { text: edit.text }) : setEntry(edit.name as EntryName, { text: edit.text });
    }
    case 'choice': return setChoice(edit.name, edit.value);
    case 'column': return (session) => edit.indices.reduce((so, index) => setColumn(edit.sheet, index, { unit: edit.unit, ...(edit.role === null ? {} : { role: edit.role }) })(so), session);
  }
}
