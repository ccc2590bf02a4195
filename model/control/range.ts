/** The voltages between which a control moves its driver, and where it rests. */
import type { Control } from '../design/types.ts';

/** Both ends of the swing, V, lower first; equal for a fixed control. */
export function controlRangeV(control: Control): readonly [number, number] {
  const [a, b] = ends(control);
  return a <= b ? [a, b] : [b, a];
}

/** Where the control stands when nothing moves it, V: an LFO midway between its ends, an envelope follower without signal. */
export function restControlV(control: Control): number {
  if (control.source === 'envelope') return control.restV;
  const [a, b] = ends(control);
  return (a + b) / 2;
}

function ends(control: Control): readonly [number, number] {
  switch (control.source) {
    case 'fixed':
      return [control.controlV, control.controlV];
    case 'lfo':
      return [control.fromV, control.toV];
    case 'envelope':
      return [control.restV, control.limitV];
    case 'external':
      return [control.offsetV - control.fullScaleV, control.offsetV + control.fullScaleV];
  }
}
