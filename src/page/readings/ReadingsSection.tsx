/** The readings: files, pastes and rows typed by hand come in here, and are looked at, corrected and set aside. */
import { useEffect, useMemo, useRef, useState } from 'react';
import type { Problem } from '../../problems/problems.ts';
import { setAside } from '../../session/edits.ts';
import type { RecordResult } from '../../reduction/results.ts';
import { impulseUnit } from '../../plots/impulseUnit.ts';
import { useActions, useStore } from '../../store/hooks.tsx';
import { AsideDialog } from './AsideDialog.tsx';
import { IntakeRow } from './IntakeRow.tsx';
import { NoticeList } from './NoticeList.tsx';
import { SheetView } from './SheetView.tsx';
import { useNoticeList } from './notices.ts';
import { lineWords } from './sheetRows.ts';
import type { ShownRow } from './sheetRows.ts';
import { KIND_LABELS } from './tradeWords.ts';
import styles from './readings.module.css';

const NO_RECORDS: readonly RecordResult[] = [];
const NO_PROBLEMS: readonly Problem[] = [];

export function ReadingsSection() {
  const { change } = useActions();
  const sheets = useStore((state) => state.session.sheets);
  const marks = useStore((state) => state.session.marks);
  const records = useStore((state) => state.reduction?.records ?? NO_RECORDS);
  const run = useStore((state) => state.reduction?.run ?? null);
  const problems = useStore((state) => state.reduction?.problems ?? NO_PROBLEMS);
  const [asked, setAsked] = useState<ShownRow | null>(null);
  const section = useRef<HTMLElement>(null);
  const results = useMemo(() => new Map(records.map((record) => [record.id, record])), [records]);
  const unit = useMemo(() => impulseUnit({ run, records }), [run, records]);
  useLatestInSight(section);

  const nameOf = (row: ShownRow): string => {
    const result = results.get(row.record);
    const sheet = sheets.find(({ id }) => row.record.startsWith(`${id}/`))?.name ?? '';
    const place = sheets.length > 1 ? `${lineWords(row.line)} of ${sheet}` : lineWords(row.line);
    return result === undefined ? place : `${`${KIND_LABELS[result.kind]} ${result.label}`.trim()}, ${place}`;
  };

  return (
    <section id="readings" ref={section} className={styles.section} aria-labelledby="readings-heading">
      <h2 id="readings-heading">Readings</h2>
      <IntakeRow hasSheets={sheets.length > 0} />
      <NoticeList />
      {sheets.map((sheet, i) => (
        <SheetView
          key={sheet.id}
          sheet={sheet}
          isFirst={i === 0}
          isLast={i === sheets.length - 1}
          results={results}
          marks={marks}
          impulseUnit={unit}
          problems={problems.filter(({ place }) => place.sheet === sheet.id && place.record === undefined)}
          askReason={setAsked}
        />
      ))}
      {asked !== null && (
        <AsideDialog
          record={nameOf(asked)}
          reason={marks[asked.record]?.setAside?.reason ?? ''}
          onReason={(reason) => change(`set aside ${nameOf(asked)}`, setAside(asked.record, reason))}
          onClose={() => setAsked(null)}
        />
      )}
    </section>
  );
}

/** Scrolls to what came in last, wherever on the page it was dropped. */
function useLatestInSight(section: { readonly current: HTMLElement | null }) {
  const latest = useNoticeList().at(-1)?.id;
  const seen = useRef(latest);
  useEffect(() => {
    if (latest === undefined || latest === seen.current) return;
    seen.current = latest;
    const notice = section.current?.querySelector(`[data-notice="${latest}"]`);
    notice?.scrollIntoView({ block: 'nearest' });
  }, [latest, section]);
}
