/** What drives a part past its limit, with the number. Being cut off is none: that is how a cell turns the sound on. */
import { deviceOf } from '../../model/cell/fromDesign.ts';
import { feedbackFraction } from '../../model/design/feedback.ts';
import type { Variant } from '../../model/design/types.ts';
import type { ToneReading } from '../../model/study/tone.ts';
import { decimals } from './words.ts';

/** Share of the tone below which a region is not spoken of. */
const LEAST_SHARE = 0.0005;

export interface Passed {
  readonly kind: 'saturated' | 'gateOn' | 'reverse' | 'rail';
  /** A share of the tone, 0 to 1, or V. */
  readonly size: number;
}

/** What passes a limit of the FET, the gravest first; null while nothing does. */
export function deviceLimit(variant: Variant, reading: ToneReading, drainPeakV: number, reverseLimitV: number): Passed | null {
  const reverse = reverseV(variant, reading, drainPeakV);
  if (reverse > reverseLimitV) return { kind: 'reverse', size: reverse };
  const { saturated, gateOn } = reading.regions;
  const most: Passed = gateOn > saturated ? { kind: 'gateOn', size: gateOn } : { kind: 'saturated', size: saturated };
  return most.size > LEAST_SHARE ? most : null;
}

/**
 * The highest reverse voltage of either gate junction, V: the gate at rest, and the larger share of the drain's peak, k of which rides on the gate.
 * Where the source pin stands on a supply, the drain's peak is the tone's alone: what is measured there is from 0 V.
 */
export function reverseV(variant: Variant, { vgsV, fundamentalV }: ToneReading, drainPeakV: number): number {
  const k = feedbackFraction(variant.cell);
  const restV = deviceOf(variant, 0).channel === 'n' ? -vgsV : vgsV;
  const peakV = variant.cell.reference.kind === 'ground' ? Math.max(drainPeakV, fundamentalV) : fundamentalV;
  return restV + Math.max(k, 1 - k) * peakV;
}

/** What passes the amplifier's swing; `outputPeakV` is what it puts out now, 0 while sound is stopped. */
export function amplifierLimit({ output }: Variant, { fundamentalV }: ToneReading, outputPeakV: number): Passed | null {
  const { swingV, gainDb } = output;
  if (swingV === null) return null;
  const toneV = fundamentalV * 10 ** (gainDb / 20);
  if (toneV > swingV) return { kind: 'rail', size: toneV };
  // The amplifier's own output never passes its rail: standing on it is the sign.
  return outputPeakV >= 0.999 * swingV ? { kind: 'rail', size: swingV } : null;
}

/** For the drawing; what stands at the FET is on two or three short lines. */
export function limitWords({ kind, size }: Passed, limitV: number): string {
  const volts = (v: number) => `${decimals(v, v < 9.95 ? 2 : 1)}\u2009V`;
  switch (kind) {
    case 'saturated':
      return `saturates for up to\n${share(size)} of the tone`;
    case 'gateOn':
      return `gate conducts\nfor up to ${share(size)}\nof the tone`;
    case 'reverse':
      return `gate reversed by\n${volts(size)}, limit ${volts(limitV)}`;
    case 'rail':
      return size > limitV ? `would need ${volts(size)}, its rail is ${volts(limitV)}` : `at its rail of ${volts(limitV)}`;
  }
}

function share(size: number): string {
  return `${Math.max(1, Math.round(100 * size))}\u2009%`;
}
