/** What moves the gate, as plain numbers: an oscillator, a follower of the signal, or a recorded control. */
import type { Control } from '../design/types.ts';
import { followerValues } from './follower.ts';
import { compileOscillator, oscillatorValues, type Shape } from './oscillator.ts';

/** `values` may move while it runs; the rest may not. */
export type ControlNumbers =
  | { readonly kind: 'oscillator'; readonly shape: Shape; readonly values: Float64Array }
  | {
      readonly kind: 'follower';
      readonly senses: 'input' | 'output';
      readonly fullWave: boolean;
      readonly linked: boolean;
      readonly values: Float64Array;
    }
  /** Values: volts for a sample of 1.0, and volts at 0. */
  | { readonly kind: 'external'; readonly values: Float64Array };

/** Numbers at `rateHz` steps a second. Throws a RangeError for a control that cannot be realised. */
export function compileControl(control: Control, rateHz: number): ControlNumbers {
  switch (control.source) {
    case 'fixed':
    case 'lfo': {
      const numbers = compileOscillator(control, rateHz);
      return { kind: 'oscillator', shape: numbers.shape, values: oscillatorValues(numbers) };
    }
    case 'envelope':
      return {
        kind: 'follower',
        senses: control.senses,
        fullWave: control.rectifier === 'full',
        linked: control.linked,
        values: followerValues(control, rateHz),
      };
    case 'external':
      return { kind: 'external', values: Float64Array.of(control.fullScaleV, control.offsetV) };
  }
}

/** What must be equal for two controls to differ in values only. */
export function controlShape(control: ControlNumbers): string {
  if (control.kind === 'oscillator') return control.shape;
  if (control.kind === 'external') return control.kind;
  return [control.kind, control.senses, control.fullWave, control.linked].join(' ');
}

/** The control voltage with no signal, V; the phase of an oscillator is at its start. */
export function quietControlV(control: ControlNumbers): number {
  return control.kind === 'external' ? control.values[1] : control.values[0];
}
