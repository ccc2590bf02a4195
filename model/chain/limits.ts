/**
 * One step of the make-up amplifier in which a limit holds, sets in or lets go.
 *
 * Law      free: dy/dt = a(u − y), or y = u; slewing: dy/dt = ±S, until a(u − y) is no longer beyond S; cut: y = ±W, until u comes back within W
 * Scheme   u(t) = driven + rise·t + bend·t² over the step 0 … 1; within it from event to event: roots of parabolas where slewing or cut, false position
 *          where free. At each event the output's new course leaves the old one by  α·τ + β·ψ(τ) + γ·(τ² − 2ψ(τ)/a),  ψ(τ) = τ − (1 − e^−aτ)/a,
 *          which is marked for kinks.ts by its shapes
 * Error    a limit that is passed and left again within one step is not seen
 *
 * All numbers stand in slots of the state: a fraction that goes to a call or comes from it may cost memory on the audio thread.
 */
import { KINK_WIDTH } from '../cell/kernels/kinks.ts';
import { expAt } from '../device/math.ts';

/** Places of the amplifier's values: gain; ω·h; the largest step, V; the swing, V. */
export const GAIN = 0;
export const POLE = 1;
export const STEP_V = 2;
export const SWING_V = 3;
/** At this ω·h and above the output follows at once. */
export const AT_ONCE = 1e6;

/** Last output, the last two driven values G·x, V; 0 free, ±1 slewing, ±2 cut. */
export const OUTPUT_V = 0;
export const DRIVEN_V = 1;
export const EARLIER_V = 2;
export const MODE = 3;
/** Of the present step. */
export const RISE_V = 4;
export const BEND_V = 5;
/** Weights of a whole step: of y, of what drives, of its rise, of its bend. */
export const WHOLE_STEP = 6;
/** Working memory: the instant of the last event, the driven value and its slope there; the time asked about, output and rate then. */
const NOW = 10;
const HERE_V = 11;
const SLOPE_V = 12;
const TIME = 13;
const THEN_V = 14;
const RATE_V = 15;
const PART_STEP = 16;
/** Times of the next swing and slew event, from the last event on. */
const CUT_TIME = 20;
const SLEW_TIME = 21;
/** A parabola and its root; bracket of a false position. */
const W0 = 22;
const W1 = 23;
const W2 = 24;
const LOW = 25;
const HIGH = 26;
const AT_LOW = 27;
const AT_HIGH = 28;
/** Of a kink: its shape, and the amount. */
const SHAPE = 29;
const AMOUNT = 30;
export const AMPLIFIER_SLOTS = 31;

const MOST_EVENTS = 8;
const MOST_PASSES = 60;
const NEVER = 2;
/** Of a step. */
const NEAR = 1e-12;
/** Below this aτ weights are series. */
const SMALL = 0.1;
/** Below this a, what the bend of the driven value adds to a kink is of third order. */
const SLOW = 0.2;

/** For y(t) = e^−x·y + w₀·u + w₁·u′t + w₂·½u″t², x = at in `state[at]`: e^−x in its place, then w₀ = 1 − e^−x, w₁ = 1 − w₀/x, w₂ = 1 − 2w₁/x. */
export function weigh(state: Float64Array, at: number): void {
  const x = state[at];
  state[at] = -x;
  expAt(state, at);
  state[at + 1] = 1 - state[at];
  if (x > SMALL) {
    state[at + 2] = 1 - state[at + 1] / x;
    state[at + 3] = 1 - (2 * state[at + 2]) / x;
    return;
  }
  let term = 1;
  state[at + 1] = 0;
  state[at + 2] = 0;
  state[at + 3] = 0;
  for (let k = 1; k < 12; k++) {
    term *= k === 1 ? x : -x / k;
    state[at + 1] += term;
    state[at + 2] += term / (k + 1);
    state[at + 3] += (2 * term) / ((k + 1) * (k + 2));
  }
}

/** Advances the output over the step, with the kinks of sample `i`. */
export function advanceLimited(values: Float64Array, state: Float64Array, kinks: Float64Array, i: number): void {
  state[NOW] = 0;
  for (let event = 0; event < MOST_EVENTS; event++) {
    const now = state[NOW];
    state[HERE_V] = state[DRIVEN_V] + now * (state[RISE_V] + now * state[BEND_V]);
    state[SLOPE_V] = state[RISE_V] + 2 * now * state[BEND_V];
    const mode = state[MODE];
    const goesOn =
      mode === 0 ? runFree(values, state, kinks, i) : mode * mode === 1 ? slew(values, state, kinks, i) : stayCut(values, state, kinks, i);
    if (!goesOn) return;
  }
}

/** False at the step's end; true at an event, where the mode has changed. */
function runFree(values: Float64Array, state: Float64Array, kinks: Float64Array, i: number): boolean {
  const rest = 1 - state[NOW];
  state[TIME] = rest;
  drift(values, state);
  const endV = state[THEN_V];
  const cutSide = endV > values[SWING_V] ? 1 : endV < -values[SWING_V] ? -1 : 0;
  const slewSide = state[RATE_V] > values[STEP_V] ? 1 : state[RATE_V] < -values[STEP_V] ? -1 : 0;
  state[CUT_TIME] = NEVER;
  state[SLEW_TIME] = NEVER;
  if (cutSide !== 0) findFree(values, state, CUT_TIME, THEN_V, SWING_V, cutSide);
  if (slewSide !== 0) findFree(values, state, SLEW_TIME, RATE_V, STEP_V, slewSide);
  if (cutSide === 0 && slewSide === 0) {
    state[OUTPUT_V] = endV;
    return false;
  }
  const cuts = state[CUT_TIME] < state[SLEW_TIME];
  state[TIME] = cuts ? state[CUT_TIME] : state[SLEW_TIME];
  drift(values, state);
  const slope = state[SLOPE_V] + 2 * state[BEND_V] * state[TIME];
  state[NOW] += state[TIME];
  state[AMOUNT] = state[RATE_V] - slope;
  markLagged(values, state, kinks, i, -1);
  // Slewing begins at its own rate, unless the driven value already falls as another limit lets go.
  state[AMOUNT] = (cuts ? 0 : slewSide * values[STEP_V]) - state[RATE_V];
  markCorner(state, kinks, i);
  state[OUTPUT_V] = cuts ? cutSide * values[SWING_V] : state[THEN_V];
  state[MODE] = cuts ? 2 * cutSide : slewSide;
  return true;
}

/** Output and its rate a while after the last event, free. */
function drift(values: Float64Array, state: Float64Array): void {
  const t = state[TIME];
  const there = state[HERE_V] + t * (state[SLOPE_V] + t * state[BEND_V]);
  if (values[POLE] >= AT_ONCE) {
    state[THEN_V] = there;
    state[RATE_V] = state[SLOPE_V] + 2 * t * state[BEND_V];
    return;
  }
  state[PART_STEP] = values[POLE] * t;
  weigh(state, PART_STEP);
  state[THEN_V] =
    state[PART_STEP] * state[OUTPUT_V] +
    state[PART_STEP + 1] * state[HERE_V] +
    t * (state[PART_STEP + 2] * state[SLOPE_V] + t * state[PART_STEP + 3] * state[BEND_V]);
  state[RATE_V] = values[POLE] * (there - state[THEN_V]);
}

/** When `side` times what `drift` leaves in `slot` passes `values[limit]`, known to have passed it at the step's end; into `state[into]`. */
function findFree(values: Float64Array, state: Float64Array, into: number, slot: number, limit: number, side: number): void {
  state[LOW] = 0;
  state[HIGH] = 1 - state[NOW];
  state[AT_HIGH] = side * state[slot] - values[limit];
  state[TIME] = 0;
  drift(values, state);
  state[AT_LOW] = side * state[slot] - values[limit];
  if (state[AT_LOW] >= 0) state[HIGH] = 0;
  let last = 0;
  for (let pass = 0; pass < MOST_PASSES && state[HIGH] - state[LOW] > NEAR; pass++) {
    state[TIME] = state[LOW] - (state[AT_LOW] * (state[HIGH] - state[LOW])) / (state[AT_HIGH] - state[AT_LOW]);
    drift(values, state);
    const beyond = side * state[slot] - values[limit];
    if (beyond >= 0) {
      state[HIGH] = state[TIME];
      state[AT_HIGH] = beyond;
      // An end that stays twice running is given half its weight (Illinois rule).
      if (last > 0) state[AT_LOW] *= 0.5;
      last = 1;
    } else {
      state[LOW] = state[TIME];
      state[AT_LOW] = beyond;
      if (last < 0) state[AT_HIGH] *= 0.5;
      last = -1;
    }
    if (beyond * beyond < NEAR * NEAR * values[limit] * values[limit]) break;
  }
  state[into] = state[HIGH];
  // What is asked next begins anew at the step's end.
  state[TIME] = 1 - state[NOW];
  drift(values, state);
}

function slew(values: Float64Array, state: Float64Array, kinks: Float64Array, i: number): boolean {
  const side = state[MODE];
  const stepV = values[STEP_V];
  state[W0] = side * (state[HERE_V] - state[OUTPUT_V]) - (values[POLE] >= AT_ONCE ? 0 : stepV / values[POLE]);
  state[W1] = side * state[SLOPE_V] - stepV;
  state[W2] = side * state[BEND_V];
  state[CUT_TIME] = Math.max(0, (values[SWING_V] - side * state[OUTPUT_V]) / stepV);
  fallOf(state, SLEW_TIME);
  const rest = 1 - state[NOW];
  if (state[CUT_TIME] > rest && state[SLEW_TIME] > rest) {
    state[OUTPUT_V] += side * stepV * rest;
    return false;
  }
  const cuts = state[CUT_TIME] < state[SLEW_TIME];
  const time = cuts ? state[CUT_TIME] : state[SLEW_TIME];
  state[NOW] += time;
  state[OUTPUT_V] = cuts ? side * values[SWING_V] : state[OUTPUT_V] + side * stepV * time;
  state[AMOUNT] = -side * stepV + (cuts ? 0 : state[SLOPE_V] + 2 * state[BEND_V] * time);
  if (cuts) markCorner(state, kinks, i);
  else markLagged(values, state, kinks, i, 1);
  state[MODE] = cuts ? 2 * side : 0;
  return true;
}

function stayCut(values: Float64Array, state: Float64Array, kinks: Float64Array, i: number): boolean {
  const side = 0.5 * state[MODE];
  state[OUTPUT_V] = side * values[SWING_V];
  state[W0] = side * state[HERE_V] - values[SWING_V];
  state[W1] = side * state[SLOPE_V];
  state[W2] = side * state[BEND_V];
  fallOf(state, CUT_TIME);
  if (state[CUT_TIME] > 1 - state[NOW]) return false;
  state[NOW] += state[CUT_TIME];
  state[AMOUNT] = state[SLOPE_V] + 2 * state[BEND_V] * state[CUT_TIME];
  markLagged(values, state, kinks, i, 1);
  state[MODE] = 0;
  return true;
}

/** When the parabola falls to zero before the step's end, or NEVER; into `state[into]`. */
function fallOf(state: Float64Array, into: number): void {
  const rest = 1 - state[NOW];
  const w0 = state[W0];
  const w1 = state[W1];
  const w2 = state[W2];
  state[into] = NEVER;
  if (w0 + rest * (w1 + rest * w2) > 0) return;
  const root = Math.sqrt(Math.max(0, w1 * w1 - 4 * w0 * w2));
  const time = w1 > 0 ? (-w1 - root) / (2 * w2) : (2 * w0) / (root - w1);
  // At rest on the limit it is nothing over nothing.
  state[into] = 0;
  if (time > 0) state[into] = time;
}

/** The amount times ψ, and `side` times the driven value's bend by (τ² − 2ψ/a), from the present event on. */
function markLagged(values: Float64Array, state: Float64Array, kinks: Float64Array, i: number, side: number): void {
  const pole = values[POLE];
  const bend = pole >= SLOW ? side * state[BEND_V] : 0;
  state[SHAPE] = pole >= AT_ONCE ? 1 : pole / (1 + pole);
  state[AMOUNT] = state[SHAPE] * (state[AMOUNT] - (2 * bend) / pole);
  mark(state, kinks, i);
  if (bend === 0) return;
  state[SHAPE] = 0;
  state[AMOUNT] = 2 * bend;
  mark(state, kinks, i);
}

/** The amount times τ. */
function markCorner(state: Float64Array, kinks: Float64Array, i: number): void {
  state[SHAPE] = 1;
  mark(state, kinks, i);
}

function mark(state: Float64Array, kinks: Float64Array, i: number): void {
  if (kinks.length === 0) return;
  const at = 1 + KINK_WIDTH * kinks[0];
  if (at + KINK_WIDTH > kinks.length) return;
  kinks[at] = i;
  kinks[at + 1] = 1;
  kinks[at + 2] = state[NOW];
  kinks[at + 3] = state[SHAPE];
  kinks[at + 4] = state[AMOUNT];
  kinks[0] += 1;
}
