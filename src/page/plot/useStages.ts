/** Figures one after another: each in a task of its own, so that the page stays awake while many are drawn. */
import { useEffect, useState } from 'react';

/** How many may stand by now, from 1 on. */
export function useStages(many: number): number {
  const [stage, setStage] = useState(1);
  useEffect(() => {
    if (stage >= many) return undefined;
    const next = setTimeout(() => setStage(stage + 1), 0);
    return () => clearTimeout(next);
  }, [stage, many]);
  return stage;
}
