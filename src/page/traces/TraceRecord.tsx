/** The whole record on the sheet: looked along by mouse, touch and keys; its shots moved, added and taken out; bad stretches marked. */
import { useCallback, useEffect, useId, useLayoutEffect, useRef, useState } from 'react';
import type { CSSProperties, KeyboardEvent, RefObject } from 'react';
import type { Inks } from '../../plots/figure.ts';
import { afterKey, broughtIn, eventBeside, sameSight } from '../../plots/tracePanZoom.ts';
import type { Sight } from '../../plots/tracePanZoom.ts';
import { mountRecord } from '../../plots/traceMount.ts';
import type { Looking, MountedRecord } from '../../plots/traceMount.ts';
import { RECORD_HEIGHT } from '../../plots/traceRecord.ts';
import type { RecordEvent, RecordFigure } from '../../plots/traceRecord.ts';
import { timeDigits, timeWords } from '../../plots/traceWords.ts';
import { readQuantity } from '../../units/quantity.ts';
import { NumbersOf } from '../plot/NumbersOf.tsx';
import { useDrawn } from '../plot/useDrawn.ts';
import figureStyles from '../plot/FigureView.module.css';
import styles from './traceRecord.module.css';

interface Props {
  readonly figure: RecordFigure;
  readonly inks: Inks;
  /** Id of the chosen event. */
  readonly selected: string | null;
  readonly onSelect: (id: string | null) => void;
  readonly onMove: (id: string, time: number) => void;
  readonly onAdd: (time: number, kind: 'shot' | 'tap') => void;
  readonly onRemove: (id: string) => void;
  readonly onBad: (from: number, to: number) => void;
}

/** A readout stands to the left of its sign where that is further right than this part of the width. */
const TURN_AT = 0.6;
const BESIDE = 12;

/** Where the record is looked at: kept while the record itself stays. */
function useLooking(figure: RecordFigure): readonly [Looking, (change: Partial<Looking>) => void] {
  const { from, to } = figure.bounds;
  const [kept, setKept] = useState<{ readonly from: number; readonly to: number; readonly looking: Looking } | null>(null);
  const fresh: Looking = { sight: { from, to }, fitsHeight: false, selected: null, moving: null, place: null, chosen: null };
  const looking = kept !== null && kept.from === from && kept.to === to ? kept.looking : fresh;
  return [looking, (change) => setKept((before) => ({ from, to, looking: { ...(before !== null && before.from === from && before.to === to ? before.looking : fresh), ...change } }))];
}

export function TraceRecord({ figure, inks, selected, onSelect, onMove, onAdd, onRemove, onBad }: Props) {
  const id = useId();
  const surface = useRef<HTMLDivElement>(null);
  const [looking, look] = useLooking(figure);
  const [choosing, setChoosing] = useState(false);
  const [told, setTold] = useState('');
  const [readout, setReadout] = useState<{ readonly event: RecordEvent; readonly beside: CSSProperties } | null>(null);
  const present: Looking = { ...looking, selected };
  const latest = useRef({ looking: present, look, choosing, onSelect, onMove });
  useEffect(() => {
    latest.current = { looking: present, look, choosing, onSelect, onMove };
  });

  const draw = useCallback((into: HTMLElement, width: RefObject<number>): MountedRecord => {
    const drawn = mountRecord(figure, inks, into, width.current, latest.current.looking, {
      // A wheel over the picture is the page's until the picture has been taken up.
      isWheelOurs: (event) => event.ctrlKey || event.metaKey || surface.current?.contains(document.activeElement) === true,
      isChoosing: () => latest.current.choosing,
      look: (sight) => latest.current.look({ sight }),
      moving: (which, time) => latest.current.look({ moving: { id: which, time } }),
      moved: (which, time) => {
        latest.current.look({ moving: null });
        if (time !== null) latest.current.onMove(which, time);
      },
      choosing: (chosen) => latest.current.look({ chosen }),
      chosen: (chosen) => {
        latest.current.look({ chosen });
        setChoosing(false);
        setTold(`From ${timeWords(chosen.from, figure.spacing)} to ${timeWords(chosen.to, figure.spacing)} is chosen.`);
      },
      pick: (event) => {
        latest.current.onSelect(event.id);
        setTold(event.reading);
      },
      point: (place) => {
        latest.current.look({ place, chosen: null });
        setTold(timeWords(place, figure.spacing));
      },
      hover: (event, left, top) => setReadout(event === null ? null : { event, beside: left > width.current * TURN_AT ? { right: width.current - left + BESIDE, top } : { left: left + BESIDE, top } }),
    });
    return {
      ...drawn,
      remove: () => {
        setReadout(null);
        drawn.remove();
      },
    };
  }, [figure, inks]);
  const { canvas, mounted } = useDrawn(draw);

  useLayoutEffect(() => mounted.current?.show({ ...looking, selected }), [mounted, looking, selected]);

  const event = figure.events.find((one) => one.id === selected) ?? null;
  const { sight, place, chosen } = looking;
  const middle = (sight.from + sight.to) / 2;
  const about = place !== null && place >= sight.from && place <= sight.to ? place : middle;
  const isWhole = sameSight(sight, figure.bounds);
  const inView = `${timeWords(sight.from, figure.spacing)} to ${timeWords(sight.to, figure.spacing)}`;

  function go(to: Sight | null): void {
    if (to !== null) look({ sight: to });
  }
  function select(next: RecordEvent | null): void {
    if (next === null) return;
    onSelect(next.id);
    look({ sight: broughtIn(sight, next.time, figure.bounds) });
    setTold(next.reading);
  }
  const beside = (step: 1 | -1): RecordEvent | null => eventBeside(figure.events, event?.time ?? (step > 0 ? -Infinity : Infinity), step);

  function onKeyDown(key: KeyboardEvent): void {
    if (key.altKey || key.ctrlKey || key.metaKey) return;
    if (key.key === 'PageDown' || key.key === 'PageUp') {
      key.preventDefault();
      select(beside(key.key === 'PageDown' ? 1 : -1));
      return;
    }
    if (key.key === 'Delete' && event !== null) {
      key.preventDefault();
      onRemove(event.id);
      onSelect(null);
      return;
    }
    if (key.key === 'Escape' && (chosen !== null || choosing)) {
      key.preventDefault();
      setChoosing(false);
      look({ chosen: null });
      return;
    }
    const next = afterKey(key.key, sight, about, figure.bounds);
    if (next === null) return;
    key.preventDefault();
    go(next);
  }

  const bad = chosen ?? (isWhole ? null : sight);
  return (
    <figure className={figureStyles.figure} aria-label={figure.title} aria-describedby={`${id}-summary`}>
      <div className={`${styles.tools} unprinted`} role="toolbar" aria-label={`${figure.title}: look along it`}>
        <button type="button" onClick={() => go(afterKey('+', sight, about, figure.bounds))}>Nearer</button>
        <button type="button" disabled={isWhole} onClick={() => go(afterKey('-', sight, about, figure.bounds))}>Farther</button>
        <button type="button" disabled={isWhole} onClick={() => go(afterKey('0', sight, about, figure.bounds))}>Whole record</button>
        <button type="button" disabled={beside(-1) === null} onClick={() => select(beside(-1))}>Shot before</button>
        <button type="button" disabled={beside(1) === null} onClick={() => select(beside(1))}>Shot after</button>
        <label className={styles.check}>
          <input type="checkbox" checked={looking.fitsHeight} onChange={({ target: { checked } }) => look({ fitsHeight: checked })} />
          height of what is in sight
        </label>
      </div>
      <div
        ref={surface}
        className={`${figureStyles.surface} ${styles.surface}`}
        role="slider"
        tabIndex={0}
        aria-label={`${figure.title}: what is in sight`}
        aria-valuemin={figure.bounds.from}
        aria-valuemax={figure.bounds.to}
        aria-valuenow={middle}
        aria-valuetext={`${inView}${event === null ? '' : `; ${event.reading}`}`}
        aria-describedby={`${id}-keys`}
        onKeyDown={onKeyDown}
        onPointerDown={() => surface.current?.focus({ preventScroll: true })}
      >
        <div ref={canvas} className={figureStyles.canvas} aria-hidden="true" style={{ minHeight: RECORD_HEIGHT }} />
        {readout !== null && <div className={figureStyles.readout} aria-hidden="true" style={readout.beside}>{readout.event.reading}</div>}
      </div>
      <div className={`${styles.tools} unprinted`} role="group" aria-label={`${figure.title}: its shots`}>
        {event === null ? <span className="quiet">{figure.events.length === 0 ? 'No shot yet.' : 'Choose a shot by its sign along the top.'}</span> : (
          <EventField key={`${event.id} ${event.time}`} event={event} spacing={figure.spacing} onMove={onMove} onRemove={() => {
            onRemove(event.id);
            onSelect(null);
          }} />
        )}
        <span className={styles.apart}>
          <button type="button" disabled={place === null} onClick={() => place !== null && onAdd(place, 'shot')}>Add a shot{place === null ? '' : ` at ${timeWords(place, figure.spacing)}`}</button>
          <button type="button" disabled={place === null} onClick={() => place !== null && onAdd(place, 'tap')}>Add a tap</button>
          <button type="button" aria-pressed={choosing} onClick={() => setChoosing(!choosing)}>Choose a stretch</button>
          <button type="button" disabled={bad === null} onClick={() => {
            if (bad === null) return;
            onBad(bad.from, bad.to);
            look({ chosen: null });
          }}>{chosen !== null || bad === null ? 'Mark it as bad' : 'Mark what is in sight as bad'}</button>
        </span>
      </div>
      <figcaption id={`${id}-summary`} className="quiet">{figure.summary}</figcaption>
      <p id={`${id}-keys`} className="quiet unprinted">In sight: {inView}. Drag along it, wheel or two fingers to come nearer, a click points to a place, a sign can be dragged; keys: ← → along, + − nearer and farther, 0 whole, Page Down and Page Up from shot to shot, Delete takes one out.</p>
      <p role="status" className="visually-hidden">{told}</p>
      <NumbersOf title={figure.title} slim={false} table={{ head: ['Event', 'Time (s)', 'What it is'], rows: figure.events.map(({ id: which, name, time, reading }) => ({ id: which, cells: [name, timeDigits(time, figure.spacing), reading] })) }} />
    </figure>
  );
}

interface EventFieldProps {
  readonly event: RecordEvent;
  readonly spacing: number;
  readonly onMove: (id: string, time: number) => void;
  readonly onRemove: () => void;
}

/** The chosen event's time as a field: Enter moves it. */
function EventField({ event, spacing, onMove, onRemove }: EventFieldProps) {
  const id = useId();
  const [text, setText] = useState(timeDigits(event.time, spacing));
  const typed = readQuantity(text, 'time', 's');
  function put(): void {
    if (typed.ok && text !== timeDigits(event.time, spacing)) onMove(event.id, typed.value);
  }
  return (
    <span className={styles.event}>
      <label htmlFor={`${id}-time`}>{event.name} at</label>
      <input id={`${id}-time`} type="text" size={10} autoComplete="off" spellCheck={false} value={text} aria-invalid={!typed.ok} onChange={({ target: { value } }) => setText(value)} onBlur={put} onKeyDown={({ key }) => {
        if (key === 'Enter') put();
        if (key === 'Escape') setText(timeDigits(event.time, spacing));
      }} />
      <span className="unit">s</span>
      <button type="button" onClick={onRemove}>Take it out</button>
    </span>
  );
}
