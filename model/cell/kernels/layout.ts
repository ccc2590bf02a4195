/**
 * Where a kernel finds its coefficients and its state. Both are flat Float64Arrays; a kernel is written out for its number of trapezoidal and of
 * stiff states.
 *
 * Coefficients: rows of `rowWidth` for the overdrives of the two ends (gate-source, gate-drain), the new states and the output; for each of these
 * the weights of the junction currents; the memory rows; for each of these the weights of the old junction currents; then the device. Last, read by no kernel:
 * what is constant in the memory rows, and in the others beside it.
 * State: the states; of the stiff ones the values one, two and three samples before; then the slots below.
 */

/** Columns of a row: the memories (of the output's row the new states), audio, control, constant, channel current. */
export function rowLayout(stateCount: number) {
  return { u: stateCount, constant: stateCount + 2, current: stateCount + 3, width: stateCount + 4 };
}

/** Columns of a memory row: states, old audio, old control, old channel current. */
export function memoryLayout(stateCount: number) {
  return { oldU: stateCount, oldI: stateCount + 2, width: stateCount + 3 };
}

/** Noise of a sample: one value for each row, then one for the channel, A for a conductance of 1 S. */
export function noiseWidth(stateCount: number): number {
  return stateCount + 4;
}

/** Weights of the junction currents, per row and per memory row. */
export const BY_S = 0;
export const BY_D = 1;
export const JUNCTION_WIDTH = 2;

/** Device constants after the rows: first the law and what is common to all laws. */
export const LAW = 0;
export const GATE_OFF_V = 1;
/** An overdrive above this means that a junction's current is more than its reverse current, V. */
export const ON_V = 2;
export const REVERSE_A = 3;
export const INVERSE_NVT = 4;
/** 1/V, on what lies beyond the knee. */
export const LAMBDA = 5;
/** β (A/V²), G0·W/3 (A), or β·T^Q (A). */
export const SCALE = 6;
/** Gradual: 1/W, and the slope G0, S. Smooth: 1/T, and the slope unit β·T^Q/T, S. */
export const INVERSE_WIDTH = 7;
export const SLOPE = 8;
/** Square law: 2βα and 2βγ, with α and γ the fall and rise of the two overdrives for each ampere. */
export const FALL = 9;
export const RISE = 10;
/** Smooth: pieces in the table, and the exponent Q. */
export const PIECES = 11;
export const EXPONENT = 12;
/** The same threshold for the junctions and for the clamp from gate to source, and the clamp's reverse current and 1/nVT. */
export const JUNCTION_ON_V = 13;
export const CLAMP_ON_V = 14;
export const CLAMP_A = 15;
export const CLAMP_INVERSE_NVT = 16;
/** Step at which Newton's method stops, V. */
export const ENOUGH_V = 17;
/** Capacitances that fall with reverse voltage: exponent m (0: constant), barrier, C0 over a step of gate-source and gate-drain, S. */
export const GRADING = 18;
export const BARRIER_V = 19;
export const STEP_S = 20;
export const STEP_D = 21;
/** 1 for an n-channel part, −1 for a p-channel one. */
export const POLARITY = 22;
export const DEVICE_WIDTH = 23;

export const LAW_NUMBER = { square: 0, gradual: 1, smooth: 2 } as const;

export function coefficientLayout(stateCount: number) {
  const { width } = rowLayout(stateCount);
  const rows = stateCount + 3;
  const junction = rows * width;
  const memory = junction + rows * JUNCTION_WIDTH;
  const memoryJunction = memory + stateCount * memoryLayout(stateCount).width;
  const device = memoryJunction + stateCount * JUNCTION_WIDTH;
  const held = device + DEVICE_WIDTH;
  const own = held + stateCount;
  return { rows, outputRow: stateCount + 2, junction, memory, memoryJunction, device, held, own, length: own + stateCount + 2 };
}

/** Of one number of states, made once: a value that moves needs them on the audio thread. */
export interface Layout {
  readonly row: ReturnType<typeof rowLayout>;
  readonly past: ReturnType<typeof memoryLayout>;
  readonly all: ReturnType<typeof coefficientLayout>;
}

export function layoutOf(stateCount: number): Layout {
  return { row: rowLayout(stateCount), past: memoryLayout(stateCount), all: coefficientLayout(stateCount) };
}

/** Where the slots begin: after the states and the past of the stiff ones. */
export function slotStart(trapezoidal: number, stiff: number): number {
  return trapezoidal + 4 * stiff;
}

/** Slots of the state from `slotStart` on. */
export const OLD_AUDIO = 0;
export const OLD_CONTROL = 1;
export const CHANNEL_A = 2;
/** Junction currents above the reverse current, gate-source and gate-drain, A. */
export const JUNCTION_S = 3;
export const JUNCTION_D = 4;
/** Overdrives of the two ends, V. */
export const OVERDRIVE_S = 5;
export const OVERDRIVE_D = 6;
/** Channel current of the sample before the last, for the first guess, A; EARLIEST_A is that of the sample before. */
export const EARLIER_A = 7;
/** Samples that Newton's method left to the bisection behind it. */
export const FALLBACKS = 8;
/** Working memory of ports.ts: F and F′ of both ends. */
export const TERM_S = 9;
export const TERM_D = 11;
/** Current and slope of both gate ports. */
export const PORT_S = 13;
export const PORT_D = 15;
/** Of each junction: four past charges above C0·v, over C0, then the four places of `deviate` in graded.ts. */
export const CHARGES_S = 17;
export const CHARGES_D = 25;
/** Overdrives of the sample before, and the output's weight of the channel current, for kinks.ts. */
export const BEFORE_S = 33;
export const BEFORE_D = 34;
export const PER_A = 35;
/**
 * For a conductor, and for what channel.ts solves: overdrives without currents, V, and the channel current without the junctions', A; then the argument
 * of an exponential and its value.
 */
export const GIVEN_A = 36;
export const GIVEN_B = 37;
export const GIVEN_FREE = 38;
export const POWER = 39;
/** Working memory of ports.ts: by how much the equations of the two ends are missed, V. */
export const MISSED_S = 40;
export const MISSED_D = 41;
/** Of channel.ts: by how much the channel's current exceeds the one given, A, and the derivative of that. */
export const EXCESS_A = 42;
export const EXCESS_SLOPE = 43;
/** Overdrives of the last three conducting samples, the newest first, for the first guess of the next, V. */
export const LATEST_S = 44;
export const LATEST_D = 45;
export const EARLIER_S = 46;
export const EARLIER_D = 47;
export const EARLIEST_S = 48;
export const EARLIEST_D = 49;
export const EARLIEST_A = 50;
export const STATE_SLOTS = 51;
