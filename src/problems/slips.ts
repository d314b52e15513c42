/** What a slip of the pen is called, and what was measured that it would reconcile. */

export const SLIP_WORDS = {
  lengthUnit: 'stands in the wrong unit of length',
  massUnit: 'stands in the wrong unit of mass',
  inertiaUnit: 'stands in the wrong unit',
  stiffnessUnit: 'stands in the wrong unit',
  diameterForRadius: 'is a diameter, or a whole width, where half of it is asked',
  radiusForDiameter: 'is a half where the whole is asked',
  tipForArm: 'was measured to another point: one length stands for another',
  degreesForRadians: 'stands in degrees and is radians',
  radiansForDegrees: 'stands in radians and is degrees',
  beamAngle: 'forgets that the beam turns twice as far as the mirror',
  halfBeamAngle: 'counts the doubled angle of the beam twice',
  sideToSide: 'was read from side to side, not from rest',
  fromRest: 'was read from rest, not from side to side',
  halfPeriod: 'is half a period: one way, not there and back',
  manySwings: 'is the time of several swings',
  halfCycles: 'counts half cycles as cycles, or cycles as half cycles',
  impulseUnit: 'stands in the wrong unit of impulse',
  weightUnit: 'stands in the wrong unit',
  reboundForFollow: 'holds the follow-through, not the rebound',
  followForRebound: 'holds the rebound, not the follow-through',
} as const;

export const CHECK_WORDS = { period: 'timed period', stiffness: 'static deflection', maximumTime: 'time to the first maximum', taps: 'taps' } as const;

export const slipWords = (id: string): string => (SLIP_WORDS as Readonly<Record<string, string>>)[id] ?? 'is not what it stands for';

/** "the timed period and the taps". */
export function checksInWords(ids: readonly string[]): string {
  const words = ids.map((id) => `the ${(CHECK_WORDS as Readonly<Record<string, string>>)[id] ?? id}`);
  return words.length < 2 ? words.join('') : `${words.slice(0, -1).join(', ')} and ${words.at(-1)}`;
}
