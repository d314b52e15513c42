/** The closed table of units that people write at a pendulum, each as its number of SI units. */

export type Dimension =
  | 'length' | 'mass' | 'angle' | 'latitude' | 'time' | 'impulse' | 'angularImpulse' | 'pressure' | 'voltage'
  | 'momentOfInertia' | 'rotationalStiffness' | 'angularFrequency' | 'calibrationFactor' | 'acceleration' | 'number';
