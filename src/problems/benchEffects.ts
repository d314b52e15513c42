/** What to check at the bench: the names of the things that fool people there, what makes each, and what to do about it. */

export const BENCH_EFFECT_IDS = [
  'leads', 'earthField', 'chargedArm', 'chargedTarget', 'pivotFriction', 'edgeRolling', 'wires', 'tilt', 'axisTilt', 'heatedBracket', 'warmedFlexure', 'yaw', 'doublePendulum', 'plumeWander', 'feedHose',
] as const;
export type BenchEffectId = (typeof BENCH_EFFECT_IDS)[number];

export interface BenchEffectWords {
  readonly name: string;
  /** What the size is of: "moves the rest by". */
  readonly does: string;
  readonly toDo: string;
}

export const BENCH_EFFECT_WORDS: Readonly<Record<BenchEffectId, BenchEffectWords>> = {
  leads: {
    name: 'Discharge leads', does: 'leads to a capacitor off the pendulum push with',
    toDo: 'Keep the whole discharge loop on the pendulum, where its forces cancel; fire into a dummy load as a blank, with the leads as fired.',
  },
  earthField: {
    name: 'Charge through the Earth’s field', does: 'the charge of one shot along a lead takes up',
    toDo: 'Lay the two leads of the discharge close together.',
  },
  chargedArm: {
    name: 'Pull on the charged pendulum', does: 'the charge voltage moves the rest by',
    toDo: 'Screen what is charged, and note zeros both charged and not fired. The rest that counts is the one without charge: the pull lets go as the shot fires.',
  },
  chargedTarget: {
    name: 'Pull on a charged target', does: 'at the charge voltage, as much as it can take up, the rest moves by',
    toDo: 'Ground the target, and fire a blank with the plume blocked.',
  },
  pivotFriction: {
    name: 'Friction of the pivot', does: 'the pendulum may rest anywhere within ±',
    toDo: 'Look at how the swing dies: by equal steps it rubs. Clean the edge, and set it down anew between zeros to see how far they wander.',
  },
  edgeRolling: {
    name: 'Knife edge rolling on its flat', does: 'the edge’s radius adds a stiffness of',
    toDo: 'Use a sharp edge in a groove, time the period, or tap in place.',
  },
  wires: {
    name: 'Wires and hoses', does: 'one wire, clamped at both ends, adds a stiffness of up to',
    toDo: 'Time the period, hang the weights and take the zeros with every lead as fired; lead wires in along the pivot axis, thin and long. Insulation creeps: wait.',
  },
  tilt: {
    name: 'Tilt of the stand', does: 'a tilt of the stand in the swing plane moves the rest by',
    toDo: 'Take a zero before each shot, keep off the floor about the stand, and watch a level while the chamber is pumped.',
  },
  axisTilt: {
    name: 'Tilt of the torsion axis', does: 'a tilt from upright adds a stiffness of up to',
    toDo: 'Level the axis, bring the centre of mass onto it, and time the period as fired.',
  },
  heatedBracket: {
    name: 'Heat in a bracket', does: 'a bracket along the swing that warms moves the rest by',
    toDo: 'Wait until the zeros stand still, and take a zero before each shot.',
  },
  warmedFlexure: {
    name: 'Heat in the flexure', does: 'a warmer flexure changes its stiffness by',
    toDo: 'Time the period, or tap, at the temperature of the shots.',
  },
  yaw: {
    name: 'Yaw, where it hangs on two wires', does: 'a push off the centre of mass adds a yaw, read as',
    toDo: 'Push and tap on the line of the centre of mass, and read there. One wire alone does not hold it.',
  },
  doublePendulum: {
    name: 'Plate on a limp strip', does: 'it swings as a double pendulum, read up to',
    toDo: 'Read at the plate’s centre of mass, or stiffen the strip; below it the first local maximum misleads too.',
  },
  plumeWander: {
    name: 'Plume’s centre wandering', does: 'a shift of the plume along the arm is worth',
    toDo: 'Look where it strikes, before and after. At random it scatters the shots; a receding propellant makes a trend.',
  },
  feedHose: {
    name: 'Hose of a gas feed, where there is one', does: 'a drop of the feed’s pressure, in a hose along the thrust, pushes with',
    toDo: 'Lead the hose in along the pivot axis, and fire blanks with the valve alone.',
  },
};
