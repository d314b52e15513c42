/** What reaches the sheet as a whole: keys, files dropped anywhere, and pastes outside a field. */
import { useEffect, useEffectEvent, useState } from 'react';

export interface SheetEvents {
  readonly onUndo: () => void;
  readonly onRedo: () => void;
  readonly onSave: () => void;
  readonly onOpen: () => void;
  readonly onHelp: () => void;
  readonly onFiles: (files: readonly File[]) => void;
  readonly onText: (text: string) => void;
}

const isField = (target: EventTarget | null): boolean =>
  target instanceof HTMLElement && (target.isContentEditable || target.matches('input:not([type=radio], [type=checkbox]), textarea, select'));

/** The grid of the readings takes its own pastes. */
const takesPastes = (target: EventTarget | null): boolean => isField(target) || (target instanceof Element && target.closest('[role=grid]') !== null);

const inDialog = (): boolean => document.querySelector('dialog[open]') !== null;

/** Returns whether a file is being dragged over the page. */
export function useSheetEvents(events: SheetEvents): boolean {
  const [dragging, setDragging] = useState(false);

  const onKey = useEffectEvent((event: KeyboardEvent) => {
    if (event.defaultPrevented || inDialog()) return;
    const command = event.ctrlKey || event.metaKey;
    const key = event.key.toLowerCase();
    const does: Record<string, () => void> = { z: event.shiftKey ? events.onRedo : events.onUndo, y: events.onRedo, s: events.onSave, o: events.onOpen };
    const doing = command && !event.altKey ? does[key] : undefined;
    if (doing !== undefined) {
      event.preventDefault();
      doing();
    } else if (event.key === '?' && !command && !isField(event.target)) {
      event.preventDefault();
      events.onHelp();
    }
  });

  const onPaste = useEffectEvent((event: ClipboardEvent) => {
    if (event.defaultPrevented || takesPastes(event.target) || inDialog()) return;
    const files = [...(event.clipboardData?.files ?? [])];
    const text = event.clipboardData?.getData('text/plain') ?? '';
    if (text === '' && files.length === 0) return;
    event.preventDefault();
    if (text === '') events.onFiles(files);
    else events.onText(text);
  });

  const onDrop = useEffectEvent((event: DragEvent) => {
    setDragging(false);
    const files = [...(event.dataTransfer?.files ?? [])];
    const text = event.dataTransfer?.getData('text/plain') ?? '';
    if (files.length > 0) {
      event.preventDefault();
      events.onFiles(files);
    } else if (text !== '' && !isField(event.target)) {
      event.preventDefault();
      events.onText(text);
    }
  });

  useEffect(() => {
    const carriesFiles = (event: DragEvent) => event.dataTransfer?.types.includes('Files') === true;
    const over = (event: DragEvent) => {
      if (!carriesFiles(event) && isField(event.target)) return;
      event.preventDefault();
      if (carriesFiles(event)) setDragging(true);
    };
    const leave = (event: DragEvent) => {
      if (event.relatedTarget === null) setDragging(false);
    };
    const key = (event: KeyboardEvent) => onKey(event);
    const paste = (event: ClipboardEvent) => onPaste(event);
    const drop = (event: DragEvent) => onDrop(event);
    document.addEventListener('keydown', key);
    document.addEventListener('paste', paste);
    document.addEventListener('dragover', over);
    document.addEventListener('dragleave', leave);
    document.addEventListener('drop', drop);
    return () => {
      document.removeEventListener('keydown', key);
      document.removeEventListener('paste', paste);
      document.removeEventListener('dragover', over);
      document.removeEventListener('dragleave', leave);
      document.removeEventListener('drop', drop);
    };
  }, []);

  return dragging;
}
