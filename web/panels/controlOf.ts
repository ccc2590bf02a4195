/** One control made into another that moves the gate between the same two voltages. */
import { deviceOf } from '../../model/cell/fromDesign.ts';
import { controlRangeV } from '../../model/control/range.ts';
import type { Control, Variant } from '../../model/design/types.ts';

type Lfo = Extract<Control, { source: 'lfo' }>;
export type ControlKind = 'fixed' | Lfo['shape'] | 'envelope' | 'external';

export const CONTROL_KINDS: readonly { readonly value: ControlKind; readonly words: string }[] = [
  { value: 'fixed', words: 'fixed' },
  { value: 'sine', words: 'sine' },
  { value: 'triangle', words: 'triangle' },
  { value: 'square', words: 'square' },
  { value: 'rising', words: 'rising ramp' },
  { value: 'falling', words: 'falling ramp' },
  { value: 'envelope', words: 'envelope' },
  { value: 'external', words: 'recorded' },
];

export function kindOf(control: Control): ControlKind {
  return control.source === 'lfo' ? control.shape : control.source;
}

/** Volts of control for each volt of a follower that has just been fitted. */
const FIRST_GAIN = 6;

/** What is left out takes its default when the document is checked. An LFO keeps rate and ends in another shape. */
export function controlOf(kind: ControlKind, variant: Variant): object {
  const { control } = variant;
  const [low, high] = swingOf(control);
  const [off, on] = deviceOf(variant, 0).gateOffV < 0 ? [low, high] : [high, low];
  switch (kind) {
    case 'fixed':
      return { source: 'fixed', controlV: rounded((low + high) / 2) };
    case 'envelope':
      return { source: 'envelope', restV: off, limitV: on, gainVPerV: on >= off ? FIRST_GAIN : -FIRST_GAIN };
    case 'external':
      return { source: 'external', offsetV: rounded((low + high) / 2), fullScaleV: rounded((high - low) / 2) };
    default:
      return control.source === 'lfo' ? withShape(control, kind) : { source: 'lfo', shape: kind, fromV: on, toV: off };
  }
}

/** A shape with edges needs edges that fit into its period. */
function withShape(control: Lfo, shape: Lfo['shape']): Lfo {
  return { ...control, shape, edgeSec: Math.min(control.edgeSec, 0.25 / control.rateHz) };
}

/** A fixed control swings half of itself either way. */
function swingOf(control: Control): readonly [number, number] {
  if (control.source !== 'fixed') return controlRangeV(control);
  const [a, b] = [rounded(control.controlV / 2), rounded(control.controlV * 1.5)];
  return a <= b ? [a, b] : [b, a];
}

const rounded = (volts: number) => Number(volts.toPrecision(4));
