/** What every kernel is: see source.ts. `audio` and `output` may be one array. */
export type Kernel = (
  c: Float64Array,
  t: Float64Array,
  w: Float64Array,
  e: Float64Array,
  s: Float64Array,
  audio: Float64Array,
  control: Float64Array,
  output: Float64Array,
  from: number,
  to: number,
) => void;

/** Solves both ports while a gate junction conducts, from what stands in GIVEN_A, GIVEN_B and GIVEN_FREE: see ports.ts. A number as an argument may cost memory. */
export type Conductor = (
  c: Float64Array,
  t: Float64Array,
  device: number,
  aI: number,
  bI: number,
  junction: number,
  s: Float64Array,
  n: number,
) => void;

/** Makes a kernel for numbers of trapezoidal and stiff states, with the scratch memory that it needs. */
export type LoopedKernel = (trapezoidal: number, stiff: number) => Kernel;
