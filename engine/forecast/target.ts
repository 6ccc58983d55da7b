/** The machine the engineer will run on. Defaults are round figures of an ordinary workstation of the 2020s (common practice, no source). */
export interface Target {
  readonly memoryBytes: number;
  /** operations per second of one core in large dense fronts */
  readonly largeRate: number;
  /** operations per second of one core in small fronts and scattered work */
  readonly smallRate: number;
  /** bytes per second from memory */
  readonly bandwidth: number;
  readonly cores: number;
  readonly indexBytes: 4 | 8;
  /** bytes of a real scalar */
  readonly scalarBytes: 4 | 8;
}

export const defaultTarget: Target = {
  memoryBytes: 16 * 2 ** 30,
  largeRate: 10e9,
  smallRate: 1e9,
  bandwidth: 20e9,
  cores: 4,
  indexBytes: 4,
  scalarBytes: 8,
};

/** What will be done with the pattern. */
export interface Workload {
  /** factorizations with this pattern */
  readonly factorizations: number;
  /** right-hand sides for each factorization */
  readonly rightHandSides: number;
  /** refinement steps for each right-hand side */
  readonly refinementSteps: number;
}

export const defaultWorkload: Workload = { factorizations: 1, rightHandSides: 1, refinementSteps: 1 };
