/**
 * The level diagram as rows: nominal, peak, noise and clip margin at each point of the chain.
 *
 * Law      every level is that of a sine of the same peak: dBu = 20·log(peak/√2 / √0.6 V), dBFS = 20·log(peak/full scale). Noise is given by the sine of
 *          the same rms. The drain clips where the channel pinches off at one end, VGD or VGS at VGS(off): at (VGS − VGS(off))/max(k, 1 − k), the
 *          gate riding on k times the drain's voltage
 * Source   0 dBu: 1 mW in 600 Ω; 0 dBFS: AES17, a sine that reaches full scale (both from memory)
 */
import { feedbackFraction } from '../../model/design/feedback.ts';
import type { Variant } from '../../model/design/types.ts';
import type { ToneReading } from '../../model/study/tone.ts';
import type { LiveLevels } from '../state/bench.ts';
import { dbuFromPeak, decimals, voltsText } from './words.ts';

export interface LevelNode {
  readonly name: string;
  /** What stands behind the clip level. */
  readonly clipsBy: string;
  /** Sine peaks, V; null where there is none or it is not known. */
  readonly nominalV: number | null;
  readonly peakV: number | null;
  readonly noiseV: number | null;
  readonly clipV: number | null;
  /** Clip over peak, or over nominal where no sound plays, dB; negative past it. */
  readonly marginDb: number | null;
}

export interface LevelParts {
  readonly variant: Variant;
  readonly fullScaleV: number;
  /** The shadow tone, which is the nominal level. */
  readonly toneV: number;
  readonly reading: ToneReading | null;
  /** Null while no sound plays. */
  readonly live: LiveLevels | null;
  /** At the drain, V rms. */
  readonly noiseRmsV: number | null;
  /** VGS(off) at the working temperature. */
  readonly gateOffV: number | null;
  readonly listenDb: number;
  readonly ceilingDbfs: number;
}

export function levelNodes(parts: LevelParts): LevelNode[] {
  const { variant, fullScaleV, toneV, reading, live, listenDb, ceilingDbfs } = parts;
  const gain = ratio(variant.output.gainDb);
  const drainV = reading?.fundamentalV ?? null;
  const noiseV = times(parts.noiseRmsV, Math.SQRT2);
  const swingV = variant.output.swingV;
  // A source pin on half a supply puts its direct voltage on what is measured there.
  const drainPeakV = variant.cell.reference.kind === 'ground' ? (live?.drainPeakV ?? null) : null;
  const digital = (dbfs: number | undefined) => (dbfs === undefined ? null : fullScaleV * ratio(dbfs));
  const listen = ratio(listenDb);
  const railed = swingV !== null && swingV < fullScaleV;
  return [
    node('Cell’s input', 'full scale', toneV, live?.inputPeakV ?? null, null, fullScaleV),
    node('Drain', 'end of the ohmic region', drainV, drainPeakV, noiseV, pinchOffV(variant, reading, parts.gateOffV)),
    node(
      'Output, after make-up',
      railed ? 'the amplifier’s rail' : 'full scale',
      times(drainV, gain),
      digital(live?.outputPeakDbfs),
      times(noiseV, gain),
      railed ? swingV : fullScaleV,
    ),
    node(
      'Heard, after the listening level',
      'the ceiling, which turns it down',
      times(drainV, gain * listen),
      digital(live?.heardPeakDbfs),
      times(noiseV, gain * listen),
      fullScaleV * ratio(ceilingDbfs),
    ),
  ];
}

function node(
  name: string,
  clipsBy: string,
  nominalV: number | null,
  peakV: number | null,
  noiseV: number | null,
  clipV: number | null,
): LevelNode {
  const against = peakV !== null && peakV > 0 ? peakV : nominalV;
  const marginDb = clipV === null || against === null || against <= 0 ? null : 20 * Math.log10(clipV / against);
  return { name, clipsBy, nominalV, peakV, noiseV, clipV, marginDb };
}

/** Peak of a sine at the drain at which the channel leaves the ohmic region; null where it is cut off at rest. */
function pinchOffV({ cell, device }: Variant, reading: ToneReading | null, gateOffV: number | null): number | null {
  if (reading === null || gateOffV === null) return null;
  const over = device.channel === 'n' ? reading.vgsV - gateOffV : gateOffV - reading.vgsV;
  const k = feedbackFraction(cell);
  return over > 0 ? over / Math.max(k, 1 - k) : null;
}

export type LevelUnit = 'V' | 'dBu' | 'dBFS';

/** A level as it is printed in a unit; `rms` for noise, which has no peak. */
export function levelText(peakV: number | null, unit: LevelUnit, fullScaleV: number, rms = false): string {
  if (peakV === null) return '';
  if (unit === 'V') return voltsText(rms ? peakV / Math.SQRT2 : peakV);
  if (peakV <= 0) return '−∞';
  return decimals(unit === 'dBu' ? dbuFromPeak(peakV) : 20 * Math.log10(peakV / fullScaleV), 1);
}

function ratio(db: number): number {
  return 10 ** (db / 20);
}

function times(value: number | null, factor: number): number | null {
  return value === null ? null : value * factor;
}
