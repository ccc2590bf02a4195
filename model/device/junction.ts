/**
 * When a gate junction is said to conduct: one threshold for readings, figures and words.
 *
 * Law      I = IS·(exp(V/(n·VT)) − 1)
 */
import type { Device } from '../design/types.ts';
import { log } from './math.ts';
import { atTemperature, thermalVoltage } from './temperature.ts';

/** Forward current above which a gate junction is said to conduct, A. */
export const CONDUCTS_A = 1e-9;

/** The forward voltage that gives this current, V, in the n-channel frame; Infinity for a part without junctions. */
export function conductsFromV(device: Device, tempC: number): number {
  const { reverseA, ideality } = atTemperature(device, tempC).device.junction;
  return reverseA > 0 ? ideality * thermalVoltage(tempC) * log(1 + CONDUCTS_A / reverseA) : Number.POSITIVE_INFINITY;
}
