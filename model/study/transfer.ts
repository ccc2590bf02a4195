/**
 * The plane of drain current against drain-source voltage: the channel's own curves, and the path that a tone takes across them.
 *
 * Law      device/law.ts at the two overdrives; VDS is their difference
 * Scheme   the path is the steady period of the tone on one grid: it is for a drawing, not for a reading
 */
import { createCell, forReadings } from '../cell/cell.ts';
import { cellNumbers, deviceOf, variantAt } from '../cell/fromDesign.ts';
import { channelCurrentA, lawConstants } from '../device/law.ts';
import type { Design } from '../design/types.ts';
import { restingControlV } from './operating.ts';
import { requireRange } from './require.ts';
import { steadyPeriod } from './steady.ts';
import { TONE_HZ_RANGE, TONE_V_RANGE, type ToneOptions } from './tone.ts';

/** Voltages and currents carry the sign of the part's channel. */
export interface TransferPath {
  readonly drainSourceV: Float64Array;
  readonly drainA: Float64Array;
}

const POINTS = 256;
const HALVINGS = 60;

/** One period of the tone, 256 points and the first again: the path is closed. Throws a RangeError as `measureTone` does. */
export function tonePath(design: Design, variantIndex: number, options: Omit<ToneOptions, 'at'> = {}): TransferPath {
  const { toneHz = 1000, toneV = 0.5, channel = 0 } = options;
  requireRange('toneHz', toneHz, ...TONE_HZ_RANGE, 'Hz');
  requireRange('toneV', toneV, ...TONE_V_RANGE, 'V', ' peak');
  const device = deviceOf(variantAt(design, variantIndex), channel);
  const law = lawConstants(device, design.tempC);
  const numbers = forReadings(cellNumbers(design, variantIndex, channel));
  const controlV = restingControlV(design, variantIndex, numbers, options);
  const { sourceOverdrive, drainOverdrive } = steadyPeriod(createCell(numbers, 1 / (toneHz * POINTS)), toneV, controlV, POINTS);
  const closed = (at: (n: number) => number) => Float64Array.from({ length: POINTS + 1 }, (_, n) => numbers.polarity * at(n % POINTS));
  return {
    drainSourceV: closed((n) => sourceOverdrive[n] - drainOverdrive[n]),
    drainA: closed((n) => channelCurrentA(law, device.lambdaPerV, sourceOverdrive[n], drainOverdrive[n])),
  };
}

/** The channel of one variant, its device alone. */
export interface ChannelCurves {
  /** The current at a fixed gate-source voltage. */
  currentA(gateV: number, drainSourceV: number): number;
  /** The current where the channel leaves its ohmic region at this drain-source voltage: the gate of the far end stands at VGS(off). */
  edgeA(drainSourceV: number): number;
  /** The gate-source voltage whose curve goes through this point, V; between VGS(off) and 0 V, or the nearer of these. */
  gateThroughV(drainSourceV: number, drainA: number): number;
}

export function channelCurves(design: Design, variantIndex: number, channel = 0): ChannelCurves {
  const device = deviceOf(variantAt(design, variantIndex), channel);
  const law = lawConstants(device, design.tempC);
  const sign = device.channel === 'n' ? 1 : -1;
  const current = (sourceV: number, drainV: number) => channelCurrentA(law, device.lambdaPerV, sourceV, drainV);
  const currentA = (gateV: number, drainSourceV: number) => {
    const sourceV = sign * gateV - law.gateOffV;
    return sign * current(sourceV, sourceV - sign * drainSourceV);
  };
  return {
    currentA,
    edgeA: (drainSourceV) => sign * current(Math.max(sign * drainSourceV, 0), Math.max(-sign * drainSourceV, 0)),
    // By halving: the size of the current never falls as the gate goes from VGS(off) to 0 V.
    gateThroughV(drainSourceV, drainA) {
      let [offV, onV] = [sign * law.gateOffV, 0];
      for (let n = 0; n < HALVINGS; n++) {
        const middle = (offV + onV) / 2;
        if (Math.abs(currentA(middle, drainSourceV)) < Math.abs(drainA)) offV = middle;
        else onV = middle;
      }
      return (offV + onV) / 2;
    },
  };
}
