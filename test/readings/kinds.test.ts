/** Words for kinds of record. */
import { expect, test } from 'vitest';
import { kindOfWord } from '../../src/readings/kinds.ts';

// Words of the trade: common practice, no source.
test.each([
  ['shot', 'shot fire PULSE Schuss tir disparo sparo schot strzał výstřel выстрел ショット 发射 Shots'],
  ['tap', 'tap hammer cal Schlag coup golpe taratura tik uderzenie úder удар 打撃 标定 Taps'],
  ['blank', 'blank dummy blocked Blindschuss bloqué bloqueado bianco slepý холостой ダミー'],
  ['zero', 'zero Null zéro cero nula ноль ゼロ 零点'],
  ['freeSwing', 'free ring-down ringdown Freischwingung Ausschwingen 自由振動'],
] as const)('%s', (kind, words) => {
  for (const word of words.split(' ')) expect([word, kindOfWord(word)]).toEqual([word, kind]);
});

test('phrases, numbers after the word, spaces and capitals', () => {
  expect(['free swing', ' TAP 3 ', 'plume blocked', 'dummy load', 'tir à blanc', 'Shot #12'].map(kindOfWord)).toEqual(['freeSwing', 'tap', 'blank', 'blank', 'blank', 'shot']);
});

test('other words are none', () => {
  expect(['', '12', 'fine', 'no fire', 'double flash', '?'].map(kindOfWord)).toEqual([null, null, null, null, null, null]);
});
