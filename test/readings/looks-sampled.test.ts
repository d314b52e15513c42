import { describe, expect, it } from 'vitest';
import { looksSampled } from '../../src/readings/looksSampled.ts';

const lines = (n: number, of: (i: number) => string): string => Array.from({ length: n }, (_, i) => of(i)).join('\n');
const looks = (text: string): boolean => looksSampled(text, text.length);

describe('a sampled record is told from a table of readings', () => {
  it.each([
    ['a sensor with its trigger', `Time (s),Displacement (um),Trigger (V)\n${lines(400, (i) => `${i / 100},${Math.sin(i / 10)},0`)}`],
    ['a camera with a missing frame and two header rows', `frame;t;x;y\n;s;px;px\n${lines(400, (i) => `${i + (i > 60 ? 1 : 0)};${(i / 30).toFixed(4)};${400 + (i % 9)};210`)}`],
    ['without a header, German', lines(400, (i) => `${String(i / 100).replace('.', ',')};${String(Math.sin(i / 10)).replace('.', ',')}`)],
    ['after a long preamble', `${lines(40, (i) => `# note ${i}`)}\nt (ms)\tx (V)\n${lines(400, (i) => `${i}\t${Math.cos(i / 7)}`)}`],
    ['one column at a rate stated elsewhere', lines(500, (i) => String(Math.sin(i / 20)))],
  ])('%s', (_, text) => {
    expect(looks(text)).toBe(true);
  });

  it.each([
    ['thirty shots', `Shot,Rest (mm),First swing (mm)\n${lines(30, (i) => `${i},12.0,15.5`)}`],
    ['many shots, numbered', `Shot;Rest (mm);First swing (mm)\n${lines(600, (i) => `${i};12,0;15,5`)}`],
    ['a short record', `t (s),x (mm)\n${lines(50, (i) => `${i},${i}`)}`],
    ['words', lines(900, () => 'nothing here to read')],
    ['nothing', ''],
  ])('%s is none', (_, text) => {
    expect(looks(text)).toBe(false);
  });
});
