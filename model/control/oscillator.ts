/**
 * A control that needs no signal: fixed, or a low-frequency oscillator between two voltages.
 *
 * Law      v = middle + half·shape(phase), phase from 0 upwards: the LFO starts midway and moves towards `toV`
 *          sine      sin(2π·phase)
 *          triangle  ±1 in straight lines
 *          square    the triangle multiplied and cut, so that each edge lasts `edgeSec`
 * Scheme   phase added up sample by sample in turns, so that blocks of any length give the same bits
 */
import type { Control } from '../design/types.ts';
import { sinTurns } from '../device/math.ts';

export type Shape = 'fixed' | 'sine' | 'triangle' | 'square';

/** Plain numbers. All but `shape` may move while it runs. */
export interface OscillatorNumbers {
  readonly shape: Shape;
  readonly middleV: number;
  /** Signed: (to − from)/2. */
  readonly halfV: number;
  readonly turnsPerSample: number;
  /** Gain on the triangle before it is cut to ±1. */
  readonly steepness: number;
}

/** Slots of a running oscillator: the numbers in force, then the phase. */
export const MIDDLE_V = 0;
export const HALF_V = 1;
export const TURNS = 2;
export const STEEPNESS = 3;
export const OSCILLATOR_VALUES = 4;
export const PHASE = 4;

/** Numbers at `rateHz` samples a second. Throws a RangeError for a control that is not an oscillator or cannot be realised. */
export function compileOscillator(control: Control, rateHz: number): OscillatorNumbers {
  if (control.source === 'fixed') return { shape: 'fixed', middleV: control.controlV, halfV: 0, turnsPerSample: 0, steepness: 1 };
  if (control.source !== 'lfo')
    throw new RangeError(`control.source is ${control.source}; the engine moves the gate by fixed or lfo so far`);
  const { shape, fromV, toV, rateHz: lfoHz, edgeSec } = control;
  const longest = 0.5 / lfoHz;
  if (shape === 'square' && edgeSec > longest) {
    throw new RangeError(`control.edgeSec is ${edgeSec}; expected at most half a period, ${longest} s at ${lfoHz} Hz`);
  }
  const shortest = 1 / rateHz;
  const steepness = shape === 'square' ? 0.5 / (Math.max(edgeSec, shortest) * lfoHz) : 1;
  return { shape, middleV: (fromV + toV) / 2, halfV: (toV - fromV) / 2, turnsPerSample: lfoHz / rateHz, steepness };
}

export function createOscillator(numbers: OscillatorNumbers): Float64Array {
  return Float64Array.of(numbers.middleV, numbers.halfV, numbers.turnsPerSample, numbers.steepness, 0);
}

/** Fills `output` from `from` to `to` with volts. */
export function runOscillator(shape: Shape, oscillator: Float64Array, output: Float64Array, from: number, to: number): void {
  const middle = oscillator[MIDDLE_V];
  const half = oscillator[HALF_V];
  if (shape === 'fixed') {
    for (let i = from; i < to; i++) output[i] = middle;
    return;
  }
  const turns = oscillator[TURNS];
  const steepness = oscillator[STEEPNESS];
  let phase = oscillator[PHASE];
  for (let i = from; i < to; i++) {
    output[i] = middle + half * shapeAt(shape, phase, steepness);
    phase += turns;
    if (phase >= 1) phase -= 1;
  }
  oscillator[PHASE] = phase;
}

/** The shape at a phase of 0 to 1, −1 … 1. */
export function shapeAt(shape: Shape, phase: number, steepness: number): number {
  if (shape === 'sine') return sinTurns(phase);
  const triangle = phase < 0.25 ? 4 * phase : phase < 0.75 ? 2 - 4 * phase : 4 * phase - 4;
  if (shape === 'triangle') return triangle;
  return Math.min(1, Math.max(-1, triangle * steepness));
}
