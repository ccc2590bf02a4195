/**
 * What a cell does to a tone, in the steady state, at a fixed control voltage.
 *
 * Scheme   the period is solved on its own grid (`steady.ts`), doubled until fundamental and harmonics stop changing (`refine.ts`)
 * Error    `fundamentalError` and `harmonicsError`: what the last doubling changed, under 1e-7 of the fundamental and 1e-4 dB of every harmonic above
 *          −160 dB, or what arithmetic leaves of one where picofarads meet tenths of an ohm; `converged` is false where the finest grid did not reach that. Harmonics under −260 dB re the fundamental are the arithmetic's own and reported as zero
 */
import { createCell, gateSourceV, settle, forReadings } from '../cell/cell.ts';
import { cellNumbers, deviceOf, variantAt } from '../cell/fromDesign.ts';
import type { Design } from '../design/types.ts';
import { lawConstants, restingResistanceOhm } from '../device/law.ts';
import { dbFromRatio, ratioFromDb, turnsOf } from '../device/math.ts';
import { amplifiedDcV, amplifiedPeriod } from './amplified.ts';
import { harmonicsOf } from '../measure/harmonics.ts';
import { type OperatingOptions, restingControlV } from './operating.ts';
import { refined, TO_DRAW, TO_READ } from './refine.ts';
import { requireRange } from './require.ts';
import { type RegionShares, regionShares, type SteadyPeriod, type SteadyStart, steadyPeriod } from './steady.ts';

const HARMONICS = 9;
const COARSEST = { read: 256, draw: 64 };
const STOP = { read: TO_READ, draw: TO_DRAW };
const FINEST = 32768;
/** What a tone may be: least and most, Hz, and V peak. */
export const TONE_HZ_RANGE = [0.1, 1e6] as const;
export const TONE_V_RANGE = [1e-9, 1e3] as const;
const TURN = 6.283185307179586;
/** −260 dB: below it a double holds rounding only. */
const NOTHING = 1e-13;

export interface ToneOptions extends OperatingOptions {
  /** Hz; 1000 when left out. */
  readonly toneHz?: number;
  /** Peak, V, at the cell's input; 0.5 when left out. */
  readonly toneV?: number;
  /** `output` is after the make-up amplifier, with its gain, pole, slew rate and swing. */
  readonly at?: 'drain' | 'output';
  /** What it is for: a figure to be read (when left out), or a point of a curve, to 0.01 dB and in a fraction of the time. */
  readonly to?: 'read' | 'draw';
}

export interface Harmonic {
  readonly n: number;
  readonly amplitudeV: number;
  /** re the fundamental; null when zero. */
  readonly db: number | null;
  /** re the input's cosine, rad, −π … π. */
  readonly phaseRad: number;
}

export interface ToneReading {
  readonly gainDb: number;
  readonly fundamentalV: number;
  readonly dcV: number;
  readonly restDcV: number;
  /** Harmonics 2 … 9 over the fundamental, a ratio. */
  readonly thdFundamental: number;
  /** Harmonics 2 … 9 over the root of all squares, 1 … 9 (the divisor of IEC 60268-3), a ratio. */
  readonly thdTotal: number;
  readonly harmonics: readonly Harmonic[];
  /** Slope resistance of the channel at rest, Ω; Infinity when cut off. */
  readonly rdsOhm: number;
  /** Gate-source voltage at rest, V. */
  readonly vgsV: number;
  readonly regions: RegionShares;
  /** Samples in the finest period, and whether the reading had stopped changing there. */
  readonly gridPoints: number;
  readonly converged: boolean;
  /** What the last doubling changed the fundamental by, over it; and the harmonic above −160 dB that it changed most. What is left is smaller. */
  readonly fundamentalError: number;
  readonly harmonicsError: number;
  /** The steady state was not found directly, but by running until it repeated. */
  readonly settledByTime: boolean;
}

/** Measures one variant. Throws a RangeError naming an option or a value that cannot be used. */
export function measureTone(design: Design, variantIndex: number, options: ToneOptions = {}): ToneReading {
  const { toneHz = 1000, toneV = 0.5, at = 'drain', channel = 0, to = 'read' } = options;
  const variant = variantAt(design, variantIndex);
  requireRange('toneHz', toneHz, ...TONE_HZ_RANGE, 'Hz');
  requireRange('toneV', toneV, ...TONE_V_RANGE, 'V', ' peak');
  const numbers = forReadings(cellNumbers(design, variantIndex, channel));
  const controlV = restingControlV(design, variantIndex, numbers, options);
  let start: SteadyStart | null = null;
  const solveOn = (size: number): SteadyPeriod => {
    const period = steadyPeriod(createCell(numbers, 1 / (toneHz * size)), toneV, controlV, size, start);
    start = period.start;
    if (at === 'drain') return period;
    const amplified = amplifiedPeriod(variant.output, period.output, toneHz * size);
    const noiseV = period.noiseV * ratioFromDb(variant.output.gainDb);
    return { ...period, output: amplified.period, settled: period.settled && amplified.settled, noiseV };
  };
  const { value, gridPoints, converged, changed, changedLargest } = refined(
    COARSEST[to],
    FINEST,
    (size) => {
      const period = solveOn(size);
      const spectrum = harmonicsOf(period.output, HARMONICS);
      return { value: { period, spectrum }, watched: amplitudes(spectrum), settled: period.settled, noiseV: period.noiseV };
    },
    STOP[to],
  );
  const { period, spectrum } = value;
  const rest = createCell(numbers, 1 / (toneHz * gridPoints));
  const drainRestV = settle(rest, 0, controlV);
  const restDcV = at === 'drain' ? drainRestV : amplifiedDcV(variant.output, drainRestV);
  const law = lawConstants(deviceOf(variant, channel), design.tempC);
  const vgsV = gateSourceV(rest);
  return {
    ...describe(spectrum, toneV),
    dcV: spectrum.mean,
    restDcV,
    rdsOhm: restingResistanceOhm(law, numbers.polarity * vgsV),
    vgsV,
    regions: regionShares(period),
    gridPoints,
    converged,
    fundamentalError: changedLargest,
    harmonicsError: changed,
    settledByTime: period.byTime,
  };
}

function amplitudes(set: { real: Float64Array; imaginary: Float64Array }): Float64Array {
  return Float64Array.from(set.real, (re, i) => Math.sqrt(re * re + set.imaginary[i] * set.imaginary[i]));
}

function describe(set: { real: Float64Array; imaginary: Float64Array }, toneV: number) {
  const amplitude = amplitudes(set);
  const harmonics = Array.from(amplitude, (value, i): Harmonic => {
    const ratio = value / amplitude[0];
    const zero = !(ratio > NOTHING);
    const phaseRad = turnsOf(set.imaginary[i], set.real[i]) * TURN;
    return zero ? { n: i + 1, amplitudeV: 0, db: null, phaseRad: 0 } : { n: i + 1, amplitudeV: value, db: dbFromRatio(ratio), phaseRad };
  });
  let above = 0;
  for (const { n, amplitudeV } of harmonics) if (n > 1) above += amplitudeV * amplitudeV;
  const fundamentalV = amplitude[0];
  return {
    gainDb: dbFromRatio(fundamentalV / toneV),
    fundamentalV,
    thdFundamental: Math.sqrt(above) / fundamentalV,
    thdTotal: Math.sqrt(above / (above + fundamentalV * fundamentalV)),
    harmonics,
  };
}
