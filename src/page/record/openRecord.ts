/** Brings the record section to the reader, and the keys with it. */
export const RECORD_SECTION = 'record';

export function openRecord(): void {
  const section = document.getElementById(RECORD_SECTION);
  section?.scrollIntoView({ block: 'start' });
  section?.focus({ preventScroll: true });
}
