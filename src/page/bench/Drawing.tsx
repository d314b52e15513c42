/** The bench drawn to scale: pivot, pendulum, lever arms, reading and the largest throw at its true angle; a dimension leads to its field. */
import type { MouseEvent, ReactNode } from 'react';
import type { BenchLengths, DrawnEntry, Drawing as Layout, SideWord } from './layDrawing.ts';
import { layDrawing } from './layDrawing.ts';
import type { LaserDrawn, ReadingDrawn } from './layReading.ts';
import styles from './Drawing.module.css';

interface Props {
  readonly bench: BenchLengths;
  /** Value as read and symbol of each drawn entry, for its dimension line. */
  readonly wordsOf: (entry: DrawnEntry) => { readonly symbol: string; readonly value: string | null };
  /** Largest throw in words, null before there is one. */
  readonly throwWords: string | null;
  readonly scaleWords: (metres: number) => string;
  /** Entry whose field has the focus: its dimension is drawn strong. */
  readonly focused: string | null;
  readonly onPick: (entry: DrawnEntry) => void;
}

const SIDE_WORDS: Readonly<Record<SideWord['id'], string>> = {
  thrust: 'thrust', tap: 'tap', centre: 'centre of mass', calibrationMass: 'calibration mass',
};

const degrees = (angle: number): number => (angle * 180) / Math.PI;

export function Drawing({ bench, wordsOf, throwWords, scaleWords, focused, onPick }: Props) {
  const drawing = layDrawing(bench);
  const { pivot, ruler, laser } = drawing;
  const thrustY = drawing.words.find(({ id }) => id === 'thrust')?.y ?? 0;
  const pick = (entry: DrawnEntry) => (event: MouseEvent) => {
    event.preventDefault();
    onPick(entry);
  };
  return (
    <svg
      className={styles.drawing}
      viewBox={`0 0 ${drawing.width} ${drawing.height}`}
      width={drawing.width}
      height={drawing.height}
      role="group"
      aria-label={`The pendulum to scale${throwWords === null ? '' : `, ${throwWords}`}`}
    >
      <desc>{drawing.lines.map(({ entry }) => `${wordsOf(entry).symbol} ${wordsOf(entry).value ?? 'not typed'}`).concat(drawing.told).join('; ')}</desc>
      <g transform={`translate(${pivot.x} ${pivot.y})`}>
        <path className={styles.support} d="M-34 -9H34M-30 -9l-7 -8M-18 -9l-7 -8M-6 -9l-7 -8M6 -9l-7 -8M18 -9l-7 -8M30 -9l-7 -8M0 -9V0" />
        {drawing.lines.map(({ entry, x, y, assumed }) => {
          const { symbol, value } = wordsOf(entry);
          const [letter, below] = symbol.split('_');
          const classes = [styles.dimension, assumed ? styles.assumed : '', focused === entry ? styles.strong : ''].join(' ');
          const right = x - pivot.x;
          return (
            <a key={entry} className={classes} href={`#entry-${entry}`} tabIndex={-1} onClick={pick(entry)} aria-hidden="true">
              <path className={styles.witness} d={`M8 ${y}H${right + 5}`} />
              <path className={styles.line} d={`M${right} 0V${y}M${right - 4} 4L${right + 4} -4M${right - 4} ${y + 4}L${right + 4} ${y - 4}`} />
              <rect className={styles.target} x={right - 24} y={Math.min(0, y)} width="28" height={Math.abs(y)} />
              <text transform={`translate(${right - 6} ${y / 2}) rotate(-90)`}>
                <tspan className={styles.symbol}>{letter}</tspan>
                {below !== undefined && <tspan className={styles.below} dy="3">{below}</tspan>}
                <tspan dy={below === undefined ? 0 : -3}> {value ?? '?'}</tspan>
              </text>
            </a>
          );
        })}
        <path className={styles.witness} d={`M8 0H${drawing.width - pivot.x - 16}`} />
        {ruler !== null && <Ruler ruler={ruler} line={bench.readingWay === 'rulerUnderLine'} angle={drawing.angle} />}
        {laser !== null && <Laser laser={laser} />}
        {drawing.reading !== null && <Reading reading={drawing.reading} />}
        {bench.plume === 'caught' && <path className={styles.plume} d={`M-58 ${thrustY - 4}L-10 ${thrustY - 13}V${thrustY + 13}L-58 ${thrustY + 4}z`} />}
        {bench.plume === 'carried' && <rect className={styles.thruster} x={-11} y={thrustY - 6} width="11" height="12" />}
        {drawing.angle > 0 && <Body drawing={drawing} form={bench.form} ghost />}
        <Body drawing={drawing} form={bench.form} />
        {drawing.calibrationMass !== null && (
          <rect className={`${styles.mass} ${styles[bench.hung] ?? ''}`} x={-6} y={drawing.calibrationMass - 5} width="12" height="10" />
        )}
        {bench.restoring === 'flexureAlone' && <path className={styles.spring} d="M0 0c6 -2 8 6 1 8c-10 2 -13 -9 -5 -14c10 -6 21 3 18 14" />}
        <circle className={styles.pivot} r="3.5" />
        {drawing.words.map((word) => <Side key={word.id} word={word} />)}
        {throwWords !== null && (
          <text className={styles.throw} x="0" y={Math.max(drawing.bodyEnd, ruler?.y ?? 0) + 31}>{throwWords}</text>
        )}
      </g>
      <g className={styles.scale} transform={`translate(8 ${drawing.height - 8})`}>
        <path d={`M0 -5V0H${drawing.scaleBar.px}V-5`} />
        <text x="0" y="-9">{scaleWords(drawing.scaleBar.metres)}</text>
      </g>
    </svg>
  );
}

function Body({ drawing, form, ghost = false }: { readonly drawing: Layout; readonly form: BenchLengths['form']; readonly ghost?: boolean }) {
  const classes = [styles.body, ghost ? styles.ghost : '', drawing.bodyAssumed ? styles.assumed : ''].join(' ');
  const turn = ghost ? { transform: `rotate(${-degrees(drawing.angle)})` } : {};
  let shape: ReactNode;
  if (form === 'uniformStrip' || form === 'stripWithPlate') {
    shape = (
      <>
        <rect x="-3.5" y="0" width="7" height={drawing.bodyEnd} />
        {drawing.plate !== null && <rect className={styles.plate} x="-6" y={drawing.plate - 12} width="12" height="24" />}
      </>
    );
  } else if (form === 'filmStrip') {
    shape = (
      <>
        <path className={styles.film} d={`M0 0V${drawing.bodyEnd}`} />
        {drawing.zone !== null && <path className={styles.zone} d={`M-5 ${drawing.zone.from}H5M-5 ${drawing.zone.to}H5M-5 ${drawing.zone.from}V${drawing.zone.to}`} />}
        {drawing.plate !== null && <rect className={styles.plate} x="-5" y={drawing.plate - 8} width="10" height="16" />}
      </>
    );
  } else if (form === 'periodAndStiffness') shape = <path className={styles.assumed} d={`M0 0V${drawing.bodyEnd}`} />;
  else if (form === 'pointBob') {
    shape = (
      <>
        <path d={`M0 0V${drawing.bodyEnd}`} />
        <circle cy={drawing.bodyEnd} r="11" />
      </>
    );
  } else {
    shape = (
      <>
        <path d={`M0 ${drawing.bodyTop}V${drawing.bodyEnd}`} />
        {drawing.parts.map((part) => <circle key={part.key} cy={part.y} r={part.radius} />)}
      </>
    );
  }
  return <g className={classes} {...turn}>{shape}</g>;
}

function Laser({ laser: { mirror, source, rest, spot, screen, screenX, window } }: { readonly laser: LaserDrawn }) {
  return (
    <g className={styles.laser}>
      <path className={styles.beam} d={`M${source.x} ${source.y}L${mirror.x} ${mirror.y}L${rest.x} ${rest.y}M${mirror.x} ${mirror.y}L${spot.x} ${spot.y}`} />
      <path d={screen} />
      {window !== null && <path className={styles.glass} d={window} />}
      <path className={styles.gap} d={`M${screenX / 2 - 4} ${mirror.y + 9}l3 -18M${screenX / 2 + 3} ${mirror.y + 9}l3 -18`} />
      <path className={styles.mirror} d={`M${mirror.x - 2} ${mirror.y - 7}v14`} />
      <text x={screenX - 6} y={mirror.y - 10} className={styles.end}>screen</text>
    </g>
  );
}

function Reading({ reading }: { readonly reading: ReadingDrawn }) {
  switch (reading.is) {
    case 'arc': return <path className={styles.ruler} d={reading.path} />;
    case 'chord': return <path className={styles.readingMark} d={`M${reading.from.x} ${reading.from.y}L${reading.to.x} ${reading.to.y}`} />;
    case 'rise': return <path className={styles.readingMark} d={`M${reading.from.x - 5} ${reading.from.y}h10m-5 0V${reading.to.y}m-5 0h10`} />;
    case 'sensor': return (
      <g className={styles.ruler}>
        <rect className={styles.sensor} x={reading.at.x - 16} y={reading.at.y - 6} width="16" height="12" />
        <path className={styles.readingMark} d={`M${reading.at.x} ${reading.at.y}H${reading.target.x}`} />
        <text className={styles.end} x={reading.at.x - 20} y={reading.at.y + 18}>sensor</text>
      </g>
    );
    case 'picture': return (
      <g className={styles.ruler}>
        <rect className={styles.picture} x={reading.corner.x} y={reading.corner.y} width={reading.width} height={reading.height} />
        <path className={styles.readingMark} d={`M${reading.marker.x - 5} ${reading.marker.y}h10m-5 -5v10`} />
        <text x={reading.corner.x} y={reading.withPivot ? reading.corner.y + reading.height + 13 : reading.corner.y - 3}>{reading.withPivot ? 'picture, pivot and marker' : 'picture'}</text>
      </g>
    );
    case 'encoder': return (
      <g className={styles.ruler}>
        <circle className={styles.sensor} r={reading.radius} />
        <path className={styles.readingMark} d={`M0 0L${reading.radius * Math.sin(reading.angle)} ${reading.radius * Math.cos(reading.angle)}`} />
      </g>
    );
  }
}

function Ruler({ ruler, line, angle }: { readonly ruler: NonNullable<Layout['ruler']>; readonly line: boolean; readonly angle: number }) {
  const ticks = ruler.ticks.map((x, index) => `M${x} ${ruler.y}v${index % 5 === 4 ? 9 : 5}`).join('');
  return (
    <g className={styles.ruler}>
      <path d={`M${ruler.from} ${ruler.y}H${ruler.to}${ticks}`} />
      {angle > 0 && (
        <path className={styles.readingMark} d={line ? `M0 0L${ruler.readingX} ${ruler.y}` : `M${ruler.readingX} ${ruler.tip}V${ruler.y}`} />
      )}
    </g>
  );
}

function Side({ word }: { readonly word: SideWord }) {
  const { id, y, wordY } = word;
  const leader = id === 'centre' || id === 'calibrationMass';
  return (
    <g className={styles[id]}>
      {id === 'thrust' && <path className={styles.arrow} d={`M-58 ${y}H-8m-9 -4.5l9 4.5l-9 4.5`} />}
      {id === 'tap' && <path d={`M-12 ${y}l-12 -6.5v13z`} />}
      {id === 'centre' && (
        <>
          <circle className={styles.centreRing} cy={y} r="5.5" />
          <path className={styles.centreFill} d={`M0 ${y}V${y - 5.5}A5.5 5.5 0 0 1 5.5 ${y}zM0 ${y}V${y + 5.5}A5.5 5.5 0 0 1 -5.5 ${y}z`} />
        </>
      )}
      <path className={styles.leader} d={`M-66 ${wordY}L${leader ? -8 : id === 'thrust' ? -60 : -26} ${y}`} />
      <text className={styles.end} x={-70} y={wordY + 4}>{SIDE_WORDS[id]}</text>
    </g>
  );
}
