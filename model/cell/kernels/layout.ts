/**
 * Where a kernel finds its coefficients and its state. Both are flat Float64Arrays; a kernel is written out for its number of states.
 *
 * Coefficients: rows of `rowWidth` for the overdrives of the two ends (gate-source, gate-drain), the new states and the output; then for each
 * of these rows the four weights of the junction currents; then the device. State: capacitor voltages, then the slots below.
 */

/** Columns of a row: states, new audio, new control, and (with states) old audio, old control, old channel current; constant; new channel current. */
export function rowLayout(stateCount: number) {
  const newU = stateCount;
  const oldU = newU + 2;
  const oldI = oldU + 2;
  const constant = stateCount > 0 ? oldI + 1 : oldU;
  return { newU, oldU, oldI, constant, newI: constant + 1, width: constant + 2 };
}

/** Noise of a sample: one value for each row, then one for the channel, A for a conductance of 1 S. */
export function noiseWidth(stateCount: number): number {
  return stateCount + 4;
}

/** Weights of the junction currents, per row. */
export const NEW_S = 0;
export const NEW_D = 1;
export const OLD_S = 2;
export const OLD_D = 3;
export const JUNCTION_WIDTH = 4;

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
/** Smooth: pieces in the table, and the exponent Q. */
export const PIECES = 12;
export const EXPONENT = 13;
/** Square law: β(α² − γ²), 2βα and 2βγ, with α and γ the fall and rise of the two overdrives for each ampere. */
export const BENT = 9;
export const FALL = 10;
export const RISE = 11;
/** The same threshold for the junctions and for the clamp from gate to source, and the clamp's reverse current and 1/nVT. */
export const JUNCTION_ON_V = 14;
export const CLAMP_ON_V = 15;
export const CLAMP_A = 16;
export const CLAMP_INVERSE_NVT = 17;
export const DEVICE_WIDTH = 18;

export const LAW_NUMBER = { square: 0, gradual: 1, smooth: 2 } as const;

export function coefficientLayout(stateCount: number) {
  const { width } = rowLayout(stateCount);
  const rows = stateCount + 3;
  const junction = rows * width;
  const device = junction + rows * JUNCTION_WIDTH;
  return { rowWidth: width, rows, outputRow: stateCount + 2, junction, device, length: device + DEVICE_WIDTH };
}

/** Slots of the state after the capacitor voltages. */
export const OLD_AUDIO = 0;
export const OLD_CONTROL = 1;
export const CHANNEL_A = 2;
/** Junction currents above the reverse current, gate-source and gate-drain, A. */
export const JUNCTION_S = 3;
export const JUNCTION_D = 4;
/** Overdrives of the two ends, V. */
export const OVERDRIVE_S = 5;
export const OVERDRIVE_D = 6;
/** Channel current of the sample before, for the first guess, A. */
export const EARLIER_A = 7;
/** Samples that Newton's method left to the bisection behind it. */
export const FALLBACKS = 8;
export const STATE_SLOTS = 9;
