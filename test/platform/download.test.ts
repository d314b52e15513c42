import { expect, test } from 'vitest';
import { fileName } from '../../src/platform/download.ts';

test('a session’s name becomes a file name that every file system takes', () => {
  expect(fileName('Run 7: 8 kV / Kälte', 'session', 'json')).toBe('Run-7-8-kV-Kälte.json');
  expect(fileName('..\\..', 'session', 'json')).toBe('session.json');
  expect(fileName('', 'impulse-bits', 'csv')).toBe('impulse-bits.csv');
});
