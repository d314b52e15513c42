/** The parts of a built-up body: each a name and three quantities, added and taken out by hand. */
import type { Problem } from '../../problems/problems.ts';
import type { EntryRead } from '../../reduction/results.ts';
import { PART_ENTRIES } from '../../session/entries.ts';
import type { PartEntryName } from '../../session/entries.ts';
import { addPart, removePart, setPartEntry, setPartEntryInstrument, setPartName } from '../../session/edits.ts';
import type { Instrument, Part } from '../../session/session.ts';
import type { Actions } from '../../store/store.ts';
import { EntryField } from './EntryField.tsx';
import styles from './bench.module.css';

interface Props {
  readonly parts: readonly Part[];
  readonly instruments: readonly Instrument[];
  readonly readOf: (name: string) => EntryRead | undefined;
  readonly problemsOf: (name: string) => readonly Problem[];
  readonly change: Actions['change'];
}

const NAMES = Object.keys(PART_ENTRIES) as readonly PartEntryName[];

export function PartsTable({ parts, instruments, readOf, problemsOf, change }: Props) {
  return (
    <div className={styles.parts}>
      {parts.map((part, index) => {
        const title = part.name === '' ? `part ${index + 1}` : part.name;
        return (
          <fieldset key={part.id} className={styles.part}>
            <legend className="visually-hidden">{title}</legend>
            <div className={styles.partName}>
              <input
                type="text"
                aria-label={`Name of part ${index + 1}`}
                placeholder={`part ${index + 1}`}
                value={part.name}
                onChange={(event) => change(`name of part ${index + 1}`, setPartName(part.id, event.target.value), `part.${part.id}.name`)}
              />
              <button type="button" className="plain-button" onClick={() => change(`take out ${title}`, removePart(part.id))}>
                take out{' '}<span className="visually-hidden">{title}</span>
              </button>
            </div>
            {NAMES.map((name) => {
              const path = `part.${part.id}.${name}`;
              return (
                <EntryField
                  key={name}
                  name={path}
                  kind={PART_ENTRIES[name]}
                  entry={part.entries[name]}
                  read={readOf(path)}
                  problems={problemsOf(path)}
                  measured={{ instruments, dimension: PART_ENTRIES[name].dimension, onChoose: (instrument) => change(`${title}: measured with`, setPartEntryInstrument(part.id, name, instrument)) }}
                  onChange={(patch) => change(`${title}: ${PART_ENTRIES[name].label.toLowerCase()}`, setPartEntry(part.id, name, patch), path)}
                />
              );
            })}
          </fieldset>
        );
      })}
      <button type="button" onClick={() => change('add a part', addPart())}>Add a part</button>
    </div>
  );
}
