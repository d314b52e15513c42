/** What the columns of a record are taken for: by header words, by units, by the shape of their values. */
import { describe, expect, it } from 'vitest';
import { readSampledText } from '../../../src/readings/sampled/sampledRecord.ts';
import { proposeUses, rateInNotes } from '../../../src/readings/sampled/sampledUses.ts';

const N = 200;
const swing = (i: number): string => (5 + Math.sin(i / 9) * Math.exp(-i / 300)).toFixed(4);
const trigger = (i: number): string => (i % 50 >= 10 && i % 50 < 14 ? (4.98 + 0.01 * Math.sin(7 * i)).toFixed(3) : (0.01 * Math.sin(5 * i)).toFixed(3));
const KINDS: Readonly<Record<string, (i: number) => string | number>> = {
  seconds: (i) => (i / 100).toFixed(3), count: (i) => i + 1, swing, trigger, gate: (i) => (i % 50 === 10 ? 1 : 0), volts: (i) => 1500 + (i % 3) * 10, still: () => 3, clock: (i) => `10:00:${(i / 10).toFixed(1).padStart(4, '0')}`, spiked: (i) => (i === 77 ? '250.0' : swing(i)),
};

function uses(header: string, kinds: readonly string[], preamble: readonly string[] = []): ReturnType<typeof proposeUses> {
  return proposeUses(readSampledText([...preamble, ...(header === '' ? [] : [header]), ...Array.from({ length: N }, (_, i) => kinds.map((kind) => KINDS[kind]!(i)).join(';'))].join('\n')));
}

describe('by headers', () => {
  it.each([
    ['Time (s);Displacement (um)', ['seconds', 'swing'], { time: 0, reading: 1 }, 'time'],
    ['Displacement (um);Time (s)', ['swing', 'seconds'], { time: 1, reading: 0 }, 'time'],
    ['Time (s);Sensor (V);Trigger (V)', ['seconds', 'swing', 'trigger'], { time: 0, reading: 1, trigger: 2 }, 'time'],
    ['t;trig;x', ['seconds', 'gate', 'swing'], { time: 0, trigger: 1, reading: 2 }, 'time'],
    ['Time (s);Position (mm);Charge voltage (V)', ['seconds', 'swing', 'volts'], { time: 0, reading: 1, voltage: 2 }, 'time'],
    ['Sample;Displacement (mm)', ['count', 'swing'], { time: 0, reading: 1 }, 'count'],
    ['frame;x;y', ['count', 'swing', 'swing'], { time: 0, reading: 1, down: 2 }, 'count'],
    ['frame;t;x;y', ['count', 'seconds', 'swing', 'swing'], { time: 1, reading: 2, down: 3 }, 'time'],
    ['t;Marker x (px);Marker y (px);Pivot x (px);Pivot y (px)', ['seconds', 'swing', 'swing', 'swing', 'swing'], { time: 0, reading: 1, down: 2, pivotAcross: 3, pivotDown: 4 }, 'time'],
    ['Clock;Time (ms);x', ['clock', 'seconds', 'swing'], { time: 1, reading: 2 }, 'time'],
    ['Uhrzeit;x', ['clock', 'swing'], { time: 0, reading: 1 }, 'time'],
    ['Zeit (s);Auslenkung (mm);Auslöser (V)', ['seconds', 'swing', 'gate'], { time: 0, reading: 1, trigger: 2 }, 'time'],
    ['Temps;Déplacement;Déclencheur', ['seconds', 'swing', 'gate'], { time: 0, reading: 1, trigger: 2 }, 'time'],
    ['Tiempo;Desplazamiento;Disparo', ['seconds', 'swing', 'gate'], { time: 0, reading: 1, trigger: 2 }, 'time'],
    ['Tempo;Spostamento;Scatto', ['seconds', 'swing', 'gate'], { time: 0, reading: 1, trigger: 2 }, 'time'],
    ['Czas;Przemieszczenie;Wyzwalanie', ['seconds', 'swing', 'gate'], { time: 0, reading: 1, trigger: 2 }, 'time'],
    ['Čas;Výchylka;Spoušť', ['seconds', 'swing', 'gate'], { time: 0, reading: 1, trigger: 2 }, 'time'],
    ['Время;Смещение;Запуск', ['seconds', 'swing', 'gate'], { time: 0, reading: 1, trigger: 2 }, 'time'],
    ['時間;変位;トリガー', ['seconds', 'swing', 'gate'], { time: 0, reading: 1, trigger: 2 }, 'time'],
    ['时间;位移;触发', ['seconds', 'swing', 'gate'], { time: 0, reading: 1, trigger: 2 }, 'time'],
    ['y (mm)', ['swing'], { reading: 0 }, 'none'],
  ] as const)('%s', (header, kinds, expected, timeBy) => {
    const found = uses(header, kinds);
    expect(found.uses).toEqual(expected);
    expect(found.timeBy).toBe(timeBy);
    expect(found.byValues).toEqual([]);
  });

  it('the unit of the time is the header’s', () => {
    expect(uses('Time (ms);x', ['seconds', 'swing']).timeUnit?.symbol).toBe('ms');
    expect(uses('Time (h);x', ['seconds', 'swing']).timeUnit?.factor).toBe(3600);
    expect(uses('Time;x', ['seconds', 'swing']).timeUnit).toBeNull();
  });
});

describe('by values, where headers say nothing', () => {
  it.each([
    ['', ['seconds', 'swing'], { time: 0, reading: 1 }, 'time', ['time', 'reading']],
    ['', ['count', 'swing'], { time: 0, reading: 1 }, 'count', ['time', 'reading']],
    ['', ['swing', 'seconds', 'gate'], { time: 1, trigger: 2, reading: 0 }, 'time', ['time', 'trigger', 'reading']],
    ['a;b;c', ['seconds', 'trigger', 'swing'], { time: 0, trigger: 1, reading: 2 }, 'time', ['time', 'trigger', 'reading']],
    ['a;b;c', ['seconds', 'still', 'swing'], { time: 0, reading: 2 }, 'time', ['time', 'reading']],
    ['a;b;c', ['seconds', 'spiked', 'gate'], { time: 0, trigger: 2, reading: 1 }, 'time', ['time', 'trigger', 'reading']],
    ['', ['swing'], { reading: 0 }, 'none', ['reading']],
    ['', ['still'], {}, 'none', []],
  ] as const)('“%s” %j', (header, kinds, expected, timeBy, byValues) => {
    const found = uses(header, kinds);
    expect(found.uses).toEqual(expected);
    expect([found.timeBy, found.byValues]).toEqual([timeBy, byValues]);
  });

  it('a swing with a spike of its discharge is no trigger', () => {
    expect(uses('a;b;c', ['seconds', 'spiked', 'swing']).uses).toEqual({ time: 0, reading: 1 });
  });
});

describe('a rate in the notes', () => {
  it.each([
    ['Sample rate: 1000 Hz', 1000], ['Sampling rate,2.5 kHz', 2500], ['# fps = 59.94', 59.94], ['Frame rate; 240 fps', 240], ['Sampling interval: 2 ms', 500], ['Abtastfrequenz: 500 Hz', 500],
    ['Fréquence d’échantillonnage : 200 Hz', 200], ['采样率: 100', 100], ['Sample time: 2 s', 0.5],
  ] as const)('%s', (line, perSecond) => {
    const found = rateInNotes(['Made up', line]);
    expect(found!.perSecond / perSecond).toBeCloseTo(1, 12);
    expect(found!.text).toBe(line);
  });

  it.each(['Samples: 5000', 'Rate of change, none', 'Operator: nobody 12', 'Sample rate: 0 Hz', 'Sample rate: 3 s'])('is not in “%s”', (line) => {
    expect(rateInNotes([line])).toBeNull();
  });
});
