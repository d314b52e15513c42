/** The hammer's force records: added as files, listed with the pulses found in them, and taken out again. */
import { useId, useState } from 'react';
import { readTableFile } from '../../platform/readFile.ts';
import { sentence } from '../../problems/sentences.ts';
import type { ForceRecordTold } from '../../reduction/evidenceResults.ts';
import { addForceRecord, removeForceRecord, type Edit } from '../../session/edits.ts';
import type { ForceRecord } from '../../session/session.ts';
import { chooseUnit, withPlusMinus } from '../../units/format.ts';
import styles from './bench.module.css';

interface Props {
  readonly records: readonly ForceRecord[];
  readonly told: readonly ForceRecordTold[];
  readonly change: (what: string, edit: Edit) => void;
}

const AFTER: Readonly<Record<string, string>> = { ringing: 'ringing taken in', secondContact: 'struck twice', undershoot: 'contact alone', cutOff: 'cut off' };

export function ForceRecords({ records, told, change }: Props) {
  const id = useId();
  const [said, setSaid] = useState<readonly string[]>([]);
  async function take(files: readonly File[]): Promise<void> {
    const sentences: string[] = [];
    for (const file of files) {
      const { name, text, sha256, problems } = await readTableFile(file);
      if (text === '') sentences.push(...problems.map(sentence));
      else change(`force record ${name}`, addForceRecord({ name, text, sha256 }));
    }
    setSaid(sentences);
  }
  return (
    <div className={styles.forceRecords}>
      <label htmlFor={id}>Force records of the taps <span className="quiet">time and force, one or more taps in each, in the order of the taps; for taps that state no impulse</span></label>
      <input
        id={id}
        type="file"
        multiple
        className="unprinted"
        onChange={(event) => {
          const files = [...(event.target.files ?? [])];
          event.target.value = '';
          void take(files);
        }}
      />
      <div role="status">{said.map((line) => <p key={line} className="look">{line}</p>)}</div>
      {records.length > 0 && (
        <ul>
          {records.map((record) => {
            const pulses = told.find((one) => one.id === record.id)?.pulses ?? [];
            const unit = chooseUnit(pulses.map(({ impulse }) => impulse.value), 'impulse');
            return (
              <li key={record.id}>
                {record.name}: {pulses.length === 0 ? 'no pulse' : pulses.map(({ impulse, after }) => `${withPlusMinus(impulse.value, impulse.u, unit)}${AFTER[after] === undefined ? '' : ` (${AFTER[after]})`}`).join(', ')}{' '}
                <button type="button" className="plain-button unprinted" aria-label={`Take out force record ${record.name}`} onClick={() => change(`take out force record ${record.name}`, removeForceRecord(record.id))}>take out</button>
              </li>
            );
          })}
        </ul>
      )}
    </div>
  );
}
