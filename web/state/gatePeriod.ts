import type { Design } from '../../model/design/types.ts';
import { lawConstants } from '../../model/device/law.ts';
import { controlSwing } from '../../model/study/swing.ts';
import type { GatePeriod } from './bench.ts';

const STEPS = 240;

/** One period of the heard variant's control without audio, or why there is none: an envelope and an external signal have no period. */
export function gatePeriod(design: Design, variantIndex: number): GatePeriod | { readonly fault: string } {
  const { device } = design.variants[variantIndex];
  try {
    const { periodSec, controlV, gateV, drainV } = controlSwing(design, variantIndex, STEPS);
    return {
      seconds: periodSec || 1,
      steady: periodSec === 0,
      control: closed(controlV),
      gate: closed(gateV),
      drain: closed(drainV),
      gateOffV: Math.sign(device.gateOffV) * Math.abs(lawConstants(device, design.tempC).gateOffV),
    };
  } catch (error) {
    if (error instanceof RangeError) return { fault: error.message };
    throw error;
  }
}

function closed(values: Float64Array): Float64Array {
  return Float64Array.of(...values, values[0]);
}
