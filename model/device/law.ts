/**
 * Laws of the junction FET, symmetrical in drain and source, n-channel; a p-channel part is mirrored at its ports, not here.
 *
 * Law      ID = F(VGS) − F(VGD), with the overdrive v = VG? − VGS(off) of each end:
 *          square    F = β·max(v, 0)²                                     β = IDSS/VGS(off)²
 *          gradual   F = −G0·(u − ⅔·u^1.5/√W), u = clip(W − v, 0, W)       W = barrier − VGS(off); linear for v > W
 *          smooth    F = B·[ln(1 + exp(v/T))]^Q                            T the tail's width, Q the exponent
 *          each with β, G0 or B set so that ID = IDSS at VGS = 0 in saturation
 * Valid    any overdrive; F is continuous, with a continuous first derivative, and never falls
 * Source   square: Shichman & Hodges, IEEE JSSC SC-3 (1968) 285; gradual: Shockley, Proc. IRE 40 (1952) 1365;
 *          smooth: after Parker & Skellern, IEEE MTT 45 (1997) 1563 (all from memory)
 */
import type { Device, Law } from '../design/types.ts';
import { smoothShape, smoothSlope } from './table.ts';
import { atTemperature } from './temperature.ts';

/** One law with its constants, in the n-channel frame. `scale` is β (A/V²), G0 (S) or B (A). */
export interface LawConstants {
  readonly law: Law;
  readonly scale: number;
  /** VGS(off), V, negative. */
  readonly gateOffV: number;
  /** W of the gradual channel, V. */
  readonly depletionV: number;
  readonly tailV: number;
  readonly exponent: number;
}

/** The constants of a device at `tempC`; the values that it was read at give the scale, temperature then moves VGS(off) and the mobility. */
export function lawConstants(device: Device, tempC: number): LawConstants {
  const gateOffV = -Math.abs(device.gateOffV);
  const { law, tailV, exponent, barrierV } = device;
  const read = { law, scale: 1, gateOffV, depletionV: barrierV - gateOffV, tailV, exponent };
  const saturated = channelTerm(read, -gateOffV) - channelTerm(read, Number.NEGATIVE_INFINITY);
  const { device: warm, mobilityFactor } = atTemperature(device, tempC);
  const warmGateOffV = -Math.abs(warm.gateOffV);
  return { ...read, gateOffV: warmGateOffV, depletionV: barrierV - warmGateOffV, scale: (device.idssA / saturated) * mobilityFactor };
}

/** F(v), A, at the overdrive `v` = gate-to-end voltage − VGS(off), V. */
export function channelTerm(constants: LawConstants, v: number): number {
  const { law, scale } = constants;
  if (law === 'square') return v > 0 ? scale * v * v : 0;
  if (law === 'gradual') {
    const w = constants.depletionV;
    const u = v > 0 ? w - v : w;
    if (u <= 0) return -scale * u;
    return -scale * u * (1 - (2 / 3) * Math.sqrt(u / w));
  }
  return scale * smoothShape(v / constants.tailV, constants.exponent);
}

/** dF/dv, S, at the overdrive `v`. */
export function channelSlope(constants: LawConstants, v: number): number {
  const { law, scale } = constants;
  if (law === 'square') return v > 0 ? 2 * scale * v : 0;
  if (law === 'gradual') {
    const w = constants.depletionV;
    if (v <= 0) return 0;
    return v >= w ? scale : scale * (1 - Math.sqrt((w - v) / w));
  }
  return (scale / constants.tailV) * smoothSlope(v / constants.tailV, constants.exponent);
}

/** Current from drain to source, A, at the two overdrives, V, with channel-length modulation beyond the knee only. */
export function channelCurrentA(constants: LawConstants, lambdaPerV: number, sourceOverdriveV: number, drainOverdriveV: number): number {
  const floor = channelTerm(constants, Number.NEGATIVE_INFINITY);
  const past = 1 + lambdaPerV * Math.max(-drainOverdriveV, 0);
  const pastReversed = 1 + lambdaPerV * Math.max(-sourceOverdriveV, 0);
  return (channelTerm(constants, sourceOverdriveV) - floor) * past - (channelTerm(constants, drainOverdriveV) - floor) * pastReversed;
}

/** Which region the channel is in at the two overdrives (gate-source and gate-drain less VGS(off)), V. They exclude one another. */
export function channelRegion(sourceOverdriveV: number, drainOverdriveV: number): 'ohmic' | 'saturated' | 'cutoff' {
  const sourceOn = sourceOverdriveV > 0;
  const drainOn = drainOverdriveV > 0;
  if (sourceOn && drainOn) return 'ohmic';
  return sourceOn || drainOn ? 'saturated' : 'cutoff';
}

/** Slope resistance of the channel at VDS = 0 and the given gate voltage in the n-channel frame, Ω; Infinity when cut off. */
export function restingResistanceOhm(constants: LawConstants, gateSourceV: number): number {
  return 1 / channelSlope(constants, gateSourceV - constants.gateOffV);
}
