/** Colours for figures in tests: each named by what it is for. */
import type { Inks } from '../../src/plots/figure.ts';

export const INKS: Inks = {
  paper: 'paper', ink: 'ink', quiet: 'quiet', rule: 'rule', shot: 'warm', tap: 'cool', blank: 'grey', look: 'look', band: 'band', font: 'sans-serif',
};
