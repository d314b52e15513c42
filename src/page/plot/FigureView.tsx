/** A figure on the sheet: drawn, pointed at, walked through by keys where it has marks, read aloud, and repeated as a table. */
import { useCallback, useEffect, useId, useLayoutEffect, useRef, useState } from 'react';
import type { CSSProperties, KeyboardEvent, RefObject } from 'react';
import type { Figure, Inks, Mark } from '../../plots/figure.ts';
import { mountFigure } from '../../plots/mount.ts';
import type { Mounted } from '../../plots/mount.ts';
import { NumbersOf } from './NumbersOf.tsx';
import { useDrawn } from './useDrawn.ts';
import styles from './FigureView.module.css';

interface Props {
  readonly figure: Figure;
  readonly inks: Inks;
  readonly selected?: string | null;
  readonly onSelect?: (record: string) => void;
  /** What Enter does: to where the selected record is open. */
  readonly onOpen?: () => void;
  /** Little height: the selected record is named above; the summary is for assistive technology only, and the table opens in a corner. */
  readonly slim?: boolean;
}

interface Hover {
  readonly mark: Mark;
  /** To the right of the mark, or to its left where it stands far right. */
  readonly place: CSSProperties;
}

/** A readout is shown to the left of its mark where the mark is further right than this part of the width. */
const TURN_AT = 0.6;

const BESIDE = 12;
const placeBeside = (left: number, top: number, width: number): CSSProperties =>
  left > width * TURN_AT ? { right: width - left + BESIDE, top } : { left: left + BESIDE, top };

/** The mark that a key leads to from the present one, or null where the key is not ours. */
function markAfter(key: string, marks: readonly Mark[], present: number): Mark | null {
  const last = marks.length - 1;
  switch (key) {
    case 'ArrowRight':
    case 'ArrowUp': return marks[Math.min(last, present + 1)] ?? null;
    case 'ArrowLeft':
    case 'ArrowDown': return marks[Math.max(0, present - 1)] ?? null;
    case 'PageUp': return marks[Math.min(last, present + 10)] ?? null;
    case 'PageDown': return marks[Math.max(0, present - 10)] ?? null;
    case 'Home': return marks[0] ?? null;
    case 'End': return marks[last] ?? null;
    default: return null;
  }
}

const nothing = (): void => undefined;

export function FigureView({ figure, inks, selected = null, onSelect = nothing, onOpen = nothing, slim = false }: Props) {
  const surface = useRef<HTMLDivElement>(null);
  const latest = useRef({ selected, onSelect });
  const [hover, setHover] = useState<Hover | null>(null);
  const [told, setTold] = useState('');
  const summary = useId();

  useEffect(() => {
    latest.current = { selected, onSelect };
  });

  const draw = useCallback((into: HTMLElement, width: RefObject<number>): Mounted => {
    const drawn = mountFigure(figure, inks, into, width.current, latest.current.selected, {
      hover: (mark, left, top) => setHover(mark === null ? null : { mark, place: placeBeside(left, top, width.current) }),
      pick: (mark) => {
        latest.current.onSelect(mark.id);
        setTold(mark.reading);
      },
    });
    return {
      ...drawn,
      remove: () => {
        setHover(null);
        drawn.remove();
      },
    };
  }, [figure, inks]);
  const { canvas, mounted } = useDrawn(draw);

  useLayoutEffect(() => mounted.current?.select(selected), [mounted, selected]);

  const { marks } = figure;
  const present = marks.findIndex((mark) => mark.id === selected);
  const mark = marks[present];

  function onKeyDown(event: KeyboardEvent): void {
    if (event.altKey || event.ctrlKey || event.metaKey) return;
    if (event.key === 'Enter' && mark !== undefined) {
      event.preventDefault();
      onOpen();
      return;
    }
    const next = markAfter(event.key, marks, present);
    if (next === null) return;
    event.preventDefault();
    onSelect(next.id);
    setTold('');
  }

  return (
    <figure className={slim ? `${styles.figure} ${styles.slim}` : styles.figure} aria-label={figure.title} aria-describedby={summary}>
      {slim && <p className={`quiet ${styles.present}`} aria-hidden="true">{mark?.reading ?? 'No record chosen'}</p>}
      <div
        ref={surface}
        className={styles.surface}
        {...(marks.length === 0 ? {} : {
          role: 'slider', tabIndex: 0, 'aria-label': `${figure.title}: selected record`, 'aria-valuemin': 0, 'aria-valuemax': marks.length, 'aria-valuenow': present + 1,
          'aria-valuetext': mark?.reading ?? 'none selected', onKeyDown,
        })}
      >
        <div ref={canvas} className={styles.canvas} aria-hidden="true" style={{ minHeight: figure.options.height }} />
        {hover !== null && (
          <div
            className={styles.readout}
            aria-hidden="true"
            style={hover.place}
          >
            {hover.mark.reading}
          </div>
        )}
      </div>
      <figcaption id={summary} className={slim ? 'visually-hidden' : 'quiet'}>{figure.summary}</figcaption>
      <p role="status" className="visually-hidden">{told}</p>
      <NumbersOf title={figure.title} table={figure.table} slim={slim} />
    </figure>
  );
}
