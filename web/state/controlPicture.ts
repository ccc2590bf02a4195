import { deviceOf } from '../../model/cell/fromDesign.ts';
import type { Design } from '../../model/design/types.ts';
import { conductsFromV } from '../../model/device/junction.ts';
import { lawConstants } from '../../model/device/law.ts';
import { controlSwing } from '../../model/study/swing.ts';
import type { ControlPicture, GatePeriod } from './bench.ts';
import { followerCurve } from './followerCurve.ts';

const STEPS = 240;

/** What the heard variant's control does: a follower to a steady tone, any other by itself over a period. A sentence where neither can be said. */
export function controlPicture(design: Design, variantIndex: number, toneHz: number): ControlPicture | { readonly fault: string } {
  const { control } = design.variants[variantIndex];
  if (control.source === 'external') return { fault: 'A recorded control is read by the command line so far; here the gate rests.' };
  try {
    return control.source === 'envelope' ? followerCurve(design, variantIndex, control, toneHz) : gatePeriod(design, variantIndex);
  } catch (error) {
    if (error instanceof RangeError) return { fault: error.message };
    throw error;
  }
}

/** One period of a control that needs no signal, without audio. Throws a RangeError for one that does. */
export function gatePeriod(design: Design, variantIndex: number): GatePeriod {
  const device = deviceOf(design.variants[variantIndex], 0);
  const { periodSec, controlV, gateV, drainV } = controlSwing(design, variantIndex, STEPS);
  return {
    seconds: periodSec || 1,
    steady: periodSec === 0,
    control: closed(controlV),
    gate: closed(gateV),
    drain: closed(drainV),
    gateOffV: Math.sign(device.gateOffV) * Math.abs(lawConstants(device, design.tempC).gateOffV),
    gateOnV: conductsFromV(device, design.tempC),
  };
}

function closed(values: Float64Array): Float64Array {
  return Float64Array.of(...values, values[0]);
}
