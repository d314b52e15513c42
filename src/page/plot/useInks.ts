/** The colours of figures, read again when the page turns light, dark or to paper. */
import { useEffect, useState } from 'react';
import { flushSync } from 'react-dom';
import { readInks, watchInks } from '../../plots/inks.ts';
import type { Inks } from '../../plots/figure.ts';

export function useInks(): Inks {
  const [inks, setInks] = useState(readInks);
  // A printer does not wait: the figure must stand in the paper's colours when the change has been told.
  useEffect(() => watchInks(() => flushSync(() => setInks(readInks()))), []);
  return inks;
}
