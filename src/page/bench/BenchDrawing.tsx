/** Ties the drawing to the session and its reduction: lengths as read, the largest throw, and the way to a field. */
import { useMemo } from 'react';
import type { EntryRead } from '../../reduction/results.ts';
import { ENTRIES } from '../../session/entries.ts';
import type { Choices, Part } from '../../session/session.ts';
import { useStore } from '../../store/hooks.tsx';
import { chooseUnit, plain } from '../../units/format.ts';
import { unitNamed } from '../../units/units.ts';
import styles from './bench.module.css';
import { Drawing } from './Drawing.tsx';
import { valueRead } from './echo.ts';
import { toldOf, type BenchLengths, type DrawnEntry } from './layDrawing.ts';

interface Props {
  readonly choices: Choices;
  readonly parts: readonly Part[];
  readonly reads: ReadonlyMap<string, EntryRead>;
  readonly focused: string | null;
}

const inDegrees = (angle: number): string => {
  const degree = unitNamed('°', 'angle');
  return degree === null ? '' : plain(angle, degree, 3);
};

export function BenchDrawing({ choices, parts, reads, focused }: Props) {
  const records = useStore((state) => state.reduction?.records);
  const throwAngle = useMemo(() => {
    const angles = (records ?? []).flatMap(({ angle, setAside }) => (angle === null || setAside !== null ? [] : [Math.abs(angle.value)]));
    return angles.length === 0 ? null : Math.max(...angles);
  }, [records]);
  const bench: BenchLengths = {
    form: choices.form,
    readingWay: choices.readingWay,
    restoring: choices.restoring,
    screenShape: choices.screenShape,
    plume: choices.plume,
    beam: { tilt: reads.get('screenTilt')?.value ?? 0, incidence: reads.get('beamIncidence')?.value ?? 0, outOfPlane: reads.get('beamOutOfPlane')?.value ?? 0, window: reads.get('windowThickness')?.value ?? 0 },
    hasPlate: (reads.get('plateMass')?.value ?? 0) > 0,
    mass: (name) => reads.get(name)?.value ?? null,
    hung: choices.calibrationMassHung,
    length: (name) => reads.get(name)?.value ?? null,
    parts: parts.map((part) => ({
      name: part.name,
      mass: reads.get(`part.${part.id}.mass`)?.value ?? null,
      distance: reads.get(`part.${part.id}.distance`)?.value ?? null,
    })),
    throwAngle,
  };
  const told = toldOf(bench);
  const wordsOf = (entry: DrawnEntry) => {
    const read = reads.get(entry);
    return { symbol: ENTRIES[entry].symbol, value: read === undefined ? null : valueRead(read) };
  };
  return (
    <div className={styles.drawingPlace}>
      <Drawing
        bench={bench}
        wordsOf={wordsOf}
        throwWords={throwAngle === null ? null : `largest throw ${inDegrees(throwAngle)}`}
        scaleWords={(metres) => plain(metres, chooseUnit([metres], 'length'))}
        focused={focused}
        onPick={(entry) => document.getElementById(`entry-${entry}`)?.focus()}
      />
      {told.length > 0 && <p className="quiet">{told.join(' · ')}</p>}
    </div>
  );
}
