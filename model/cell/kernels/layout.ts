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

/** Weights of the junction currents, per row. */
export const NEW_S = 0;
export const NEW_D = 1;
export const OLD_S = 2;
export const OLD_D = 3;
export const JUNCTION_WIDTH = 4;

/** Device constants after the rows. */
export const BETA = 0;
/** β(α² − γ²), 2βα and 2βγ, with α and γ the fall and rise of the two overdrives for each ampere. */
export const BENT = 1;
export const FALL = 2;
export const RISE = 3;
/** −VGS(off), V: an overdrive above ON_V means that a junction's current is more than its reverse current. */
export const GATE_OFF_V = 4;
export const ON_V = 5;
export const REVERSE_A = 6;
export const INVERSE_NVT = 7;
export const DEVICE_WIDTH = 8;

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
/** Samples for which no solution was found (kept at zero by the monotonic fallback). */
export const FAULTS = 7;
export const STATE_SLOTS = 8;
