/** One seed for every property, so that a run can be run again; FIRSTSWING_SEED=random or a number looks elsewhere. */
import fc from 'fast-check';

const asked = process.env['FIRSTSWING_SEED'] ?? '20261201';
if (asked !== 'random') fc.configureGlobal({ seed: Number(asked) });
