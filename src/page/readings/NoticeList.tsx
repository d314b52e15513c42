/** What there is to say about the files that came in, told aloud by a screen reader, each until it is put away. */
import { useStore, useActions } from '../../store/hooks.tsx';
import { useNoticeList, useNotices } from './notices.ts';
import type { Notice } from './notices.ts';
import { sheetElement } from './sheetRows.ts';
import styles from './readings.module.css';

export function NoticeList() {
  const notices = useNotices();
  const list = useNoticeList();
  const refused = list.filter(({ tone }) => tone === 'refused');
  const told = list.filter(({ tone }) => tone !== 'refused');
  const items = (some: readonly Notice[]) => some.map((notice) => <NoticeItem key={notice.id} notice={notice} onTaken={() => notices.take(notice.id)} />);
  return (
    <>
      <div role="alert" className={styles.notices}>{items(refused)}</div>
      <div role="status" className={styles.notices}>{items(told)}</div>
    </>
  );
}

function NoticeItem({ notice, onTaken }: { readonly notice: Notice; readonly onTaken: () => void }) {
  const { change } = useActions();
  const { offer, sheet } = notice;
  const isThere = useStore((state) => state.session.sheets.some(({ id }) => id === sheet));
  const offerStands = useStore((state) => offer !== undefined && offer.stands(state.session));
  return (
    <div className={notice.tone === 'told' ? styles.notice : `${styles.notice} ${styles.lookHere}`} data-notice={notice.id}>
      <p>{notice.sentences.join(' ')}</p>
      {offer !== undefined && offerStands && (
        <button type="button" className="plain-button" onClick={() => {
          change(offer.what, offer.edit);
          onTaken();
        }}>
          {offer.label}
        </button>
      )}
      {sheet !== undefined && isThere && (
        <button type="button" className="plain-button" onClick={() => document.getElementById(sheetElement(sheet))?.scrollIntoView()}>to the sheet</button>
      )}
      <button type="button" className="plain-button" onClick={onTaken}>put away</button>
    </div>
  );
}
