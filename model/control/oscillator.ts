/**
 * A control that needs no signal: fixed, or a low-frequency oscillator between two voltages.
 *
 * Law      v = middle + half·shape(phase), phase from 0 upwards: the LFO starts midway and moves towards `toV`
 *          sine      sin(2π·phase), to 4e-16
 *          triangle  ±1 in straight lines
 *          square    the triangle multiplied and cut, so that each edge lasts `edgeSec`
 *          rising    a straight line from one end to the other, back within `edgeSec`; falling is its mirror image in time
 * Scheme   phase added up sample by sample in turns, so that blocks of any length give the same bits
 */
import type { Control } from '../design/types.ts';

export type Shape = 'fixed' | 'sine' | 'triangle' | 'square' | 'rising' | 'falling';

/** Plain numbers. All but `shape` may move while it runs. */
export interface OscillatorNumbers {
  readonly shape: Shape;
  readonly middleV: number;
  /** Signed: (to − from)/2. */
  readonly halfV: number;
  readonly turnsPerSample: number;
  /** Share of the period that one edge (square) or the flyback (ramps) takes. */
  readonly edgeTurns: number;
}

/** Movable values of an oscillator, by place. */
export const MIDDLE_V = 0;
export const HALF_V = 1;
export const TURNS = 2;
export const EDGE_TURNS = 3;

/** Numbers at `rateHz` samples a second. Throws a RangeError for a control that is not an oscillator or cannot be realised. */
export function compileOscillator(control: Control, rateHz: number): OscillatorNumbers {
  if (control.source === 'fixed') return { shape: 'fixed', middleV: control.controlV, halfV: 0, turnsPerSample: 0, edgeTurns: 1 };
  if (control.source !== 'lfo')
    throw new RangeError(`control.source is ${control.source}; expected fixed or lfo: the others have no period of their own`);
  const { shape, fromV, toV, rateHz: lfoHz, edgeSec } = control;
  const longest = 0.5 / lfoHz;
  const hasEdges = shape === 'square' || shape === 'rising' || shape === 'falling';
  if (hasEdges && edgeSec > longest) {
    throw new RangeError(`control.edgeSec is ${edgeSec}; expected at most half a period, ${longest} s at ${lfoHz} Hz`);
  }
  const edgeTurns = hasEdges ? Math.max(edgeSec, 1 / rateHz) * lfoHz : 1;
  return { shape, middleV: (fromV + toV) / 2, halfV: (toV - fromV) / 2, turnsPerSample: lfoHz / rateHz, edgeTurns };
}

/** The movable values. */
export function oscillatorValues(numbers: OscillatorNumbers): Float64Array {
  return Float64Array.of(numbers.middleV, numbers.halfV, numbers.turnsPerSample, numbers.edgeTurns);
}

/** Fills `output` from `from` to `to` with volts; `phase[0]` is carried on, 0 to 1. */
export function runOscillator(
  shape: Shape,
  values: Float64Array,
  phase: Float64Array,
  output: Float64Array,
  from: number,
  to: number,
): void {
  const middle = values[MIDDLE_V];
  if (shape === 'fixed') for (let i = from; i < to; i++) output[i] = middle;
  else if (shape === 'sine') runSine(values, phase, output, from, to);
  else runLines(shape, values, phase, output, from, to);
}

/** Taylor's series of the sine up to the 21st power, odd terms after the first: at a quarter turn it ends under 2e-18. */
const S3 = -1 / 6;
const S5 = 1 / 120;
const S7 = -1 / 5040;
const S9 = 1 / 362880;
const S11 = -1 / 39916800;
const S13 = 1 / 6227020800;
const S15 = -1 / 1307674368000;
const S17 = 1 / 355687428096000;
const S19 = -1 / 121645100408832000;
const S21 = 1 / 51090942171709440000;
const TURN = 6.283185307179586;

/** One loop without a call: a number that a call returns may cost memory, and this runs on the audio thread. */
function runSine(values: Float64Array, phase: Float64Array, output: Float64Array, from: number, to: number): void {
  const middle = values[MIDDLE_V];
  const half = values[HALF_V];
  const turns = values[TURNS];
  let turn = phase[0];
  for (let i = from; i < to; i++) {
    const beyond = turn >= 0.5;
    const inHalf = beyond ? turn - 0.5 : turn;
    const x = TURN * (inHalf > 0.25 ? 0.5 - inHalf : inHalf);
    const z = x * x;
    const square = z * z;
    const low = S3 + z * S5 + square * (S7 + z * S9);
    const high = S11 + z * S13 + square * (S15 + z * S17 + square * (S19 + z * S21));
    const sine = x + x * z * (low + square * square * high);
    output[i] = beyond ? middle - half * sine : middle + half * sine;
    turn += turns;
    if (turn >= 1) turn -= 1;
  }
  phase[0] = turn;
}

function runLines(shape: Shape, values: Float64Array, phase: Float64Array, output: Float64Array, from: number, to: number): void {
  const middle = values[MIDDLE_V];
  const half = values[HALF_V];
  const turns = values[TURNS];
  const edgeTurns = values[EDGE_TURNS];
  let turn = phase[0];
  for (let i = from; i < to; i++) {
    output[i] = middle + half * linesAt(shape, turn, edgeTurns);
    turn += turns;
    if (turn >= 1) turn -= 1;
  }
  phase[0] = turn;
}

/** The shapes made of straight lines, at a phase of 0 to 1, −1 … 1. */
function linesAt(shape: Shape, phase: number, edgeTurns: number): number {
  if (shape === 'rising') return ramp(phase, edgeTurns);
  if (shape === 'falling') return ramp(1 - phase, edgeTurns);
  return shape === 'triangle' ? triangle(phase) : Math.min(1, Math.max(-1, (0.5 / edgeTurns) * triangle(phase)));
}

function triangle(phase: number): number {
  if (phase < 0.25) return 4 * phase;
  return phase < 0.75 ? 2 - 4 * phase : 4 * phase - 4;
}

/** Up through 0 at phase 0 to 1, then back to −1 within `edgeTurns`, centred on phase ½. */
function ramp(phase: number, edgeTurns: number): number {
  const half = (1 - edgeTurns) / 2;
  if (phase <= half) return phase / half;
  return phase >= 1 - half ? (phase - 1) / half : (1 - 2 * phase) / edgeTurns;
}
