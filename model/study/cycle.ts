/**
 * What a cell does to a tone while its LFO runs: over one whole cycle, in the steady state.
 *
 * Law      the tone is a whole multiple m of the LFO's rate, so that the cycle repeats. Lines within ½m of n·m are harmonic n with its
 *          sidebands; the envelope about n·m (`measure/lines.ts`) is that harmonic at every moment of the cycle
 * Scheme   the cycle is solved on its own grid (`steady.ts`), doubled until its lines stop changing (`refine.ts`); moments by quadrature
 *          demodulation. Feedthrough is a run of its own, without the tone (`feedthrough.ts`)
 * Error    `changed`, with `converged` false where the finest grid still changed. `thdError`: the lines halfway between fundamental and second
 *          harmonic over the fundamental, where sidebands of one run into the other. A moment is found to 1/1024 of the
 *          cycle and is a mean over four periods of the tone: its distortion is less sure nearer than two to a corner of the control
 * Valid    make-up gain only, without the amplifier's limits
 */
import { createCell, forReadings } from '../cell/cell.ts';
import { cellNumbers, variantAt } from '../cell/fromDesign.ts';
import type { Design } from '../design/types.ts';
import { cosTurns, dbFromRatio, ratioFromDb } from '../device/math.ts';
import { bandAmplitude, envelopeOf, lineAmplitude, type Lines, linesOf } from '../measure/lines.ts';
import { controlOver, type Feedthrough, feedthroughOf, type Lfo } from './feedthrough.ts';
import { refined } from './refine.ts';
import { requireRange } from './require.ts';
import { periodOf, type RegionShares, regionShares, type SteadyStart } from './steady.ts';

const HARMONICS = 9;
const SIDEBANDS = 16;
const MOMENTS = 1024;
const POINTS_A_PERIOD = 32;
/** Grid points in a cycle: usually enough, and what the longest cycle may take. */
const FINEST = 262144;
const LONGEST = 1048576;
/** With fewer periods in a cycle the sidebands of one harmonic run into the next. */
const FEWEST_PERIODS = 8;
const MOST_PERIODS = LONGEST / (2 * POINTS_A_PERIOD);

export interface CycleOptions {
  /** Hz, rounded to a whole multiple of the LFO's rate; 1000 when left out. */
  readonly toneHz?: number;
  /** Peak, V, at the cell's input; 0.5 when left out. */
  readonly toneV?: number;
  /** `output` counts the make-up gain; `drain`, where the cell ends, when left out. */
  readonly at?: 'drain' | 'output';
  /** 0 left, 1 right, where the devices differ. */
  readonly channel?: number;
}

/** One moment of the cycle, `turns` after the LFO's start. */
export interface Moment {
  readonly turns: number;
  readonly controlV: number;
  readonly gainDb: number;
  /** Harmonics 2 … 9 over the fundamental at that moment, a ratio. */
  readonly thd: number;
}

/** A line of the spectrum, `offset` LFO rates from the tone. */
export interface Sideband {
  readonly offset: number;
  readonly frequencyHz: number;
  readonly amplitudeV: number;
  /** re the tone's own line; null when zero. */
  readonly db: number | null;
}

export interface CycleReading {
  /** The tone that was used, and its periods in a cycle. */
  readonly toneHz: number;
  readonly periods: number;
  readonly rateHz: number;
  readonly spectrum: readonly Sideband[];
  readonly leastGain: Moment;
  readonly mostGain: Moment;
  readonly leastDistorted: Moment;
  readonly mostDistorted: Moment;
  /** Harmonics 2 … 9 with all their sidebands over the fundamental with its, over the cycle, a ratio. */
  readonly thd: number;
  readonly thdError: number;
  readonly feedthrough: Feedthrough;
  readonly regions: RegionShares;
  readonly gridPoints: number;
  readonly changed: number;
  readonly converged: boolean;
  /** Not found directly, but by running until it repeated. */
  readonly settledByTime: boolean;
}

/** Throws a RangeError naming an option or a value that cannot be used, or a control that is no LFO. */
export function measureOverCycle(design: Design, variantIndex: number, options: CycleOptions = {}): CycleReading {
  const { toneV = 0.5, at = 'drain', channel = 0 } = options;
  const { control, output } = variantAt(design, variantIndex);
  if (control.source !== 'lfo') throw new RangeError(`control.source is ${control.source}; expected lfo, whose cycle this reading is of`);
  requireRange('toneV', toneV, 1e-9, 1e3, 'V', ' peak');
  const periods = wholePeriods(options.toneHz ?? 1000, control.rateHz);
  const gain = at === 'output' ? ratioFromDb(output.gainDb) : 1;
  const numbers = forReadings(cellNumbers(design, variantIndex, channel));
  const coarsest = powerOfTwoFrom(POINTS_A_PERIOD * periods);
  let start: SteadyStart | null = null;
  const cycle = refined(coarsest, Math.max(FINEST, 2 * coarsest), (points) => {
    const audio = Float64Array.from({ length: points }, (_, i) => toneV * cosTurns((((i + 1) * periods) % points) / points));
    const period = periodOf(createCell(numbers, 1 / (control.rateHz * points)), audio, controlOver(control, points).ends, start);
    start = period.start;
    const lines = linesOf(period.output);
    return {
      value: { lines, regions: regionShares(period), byTime: period.byTime },
      watched: watchedIn(lines, periods),
      settled: period.settled,
      noiseV: period.noiseV,
    };
  });
  const { lines, regions, byTime } = cycle.value;
  const moments = momentsOf(lines, periods, control, toneV / gain);
  const fundamental = harmonicAmplitude(lines, periods, 1);
  return {
    toneHz: periods * control.rateHz,
    periods,
    rateHz: control.rateHz,
    spectrum: sidebands(lines, periods, control.rateHz, gain),
    leastGain: least(moments, ({ gainDb }) => gainDb),
    mostGain: least(moments, ({ gainDb }) => -gainDb),
    leastDistorted: least(moments, ({ thd }) => thd),
    mostDistorted: least(moments, ({ thd }) => -thd),
    thd: rootOfSquares(Array.from({ length: HARMONICS - 1 }, (_, i) => harmonicAmplitude(lines, periods, i + 2))) / fundamental,
    thdError: bandAmplitude(lines, Math.floor(1.4 * periods), Math.ceil(1.6 * periods)) / fundamental,
    feedthrough: feedthroughOf(design, variantIndex, channel, control, gain),
    regions,
    gridPoints: cycle.gridPoints,
    changed: cycle.changed,
    converged: cycle.converged,
    settledByTime: byTime,
  };
}

function wholePeriods(toneHz: number, rateHz: number): number {
  requireRange(
    'toneHz',
    toneHz,
    FEWEST_PERIODS * rateHz,
    MOST_PERIODS * rateHz,
    'Hz',
    `, ${FEWEST_PERIODS} to ${MOST_PERIODS} periods in a cycle`,
  );
  return Math.round(toneHz / rateHz);
}

function powerOfTwoFrom(least: number): number {
  let size = 1;
  while (size < least) size *= 2;
  return size;
}

function watchedIn(lines: Lines, periods: number): Float64Array {
  const side = Math.min(SIDEBANDS, Math.ceil(periods / 2) - 1);
  const around = Array.from({ length: 2 * side + 1 }, (_, i) => lineAmplitude(lines, periods + i - side));
  const harmonics = Array.from({ length: HARMONICS - 1 }, (_, i) => harmonicAmplitude(lines, periods, i + 2));
  return Float64Array.of(...around, ...harmonics);
}

function rootOfSquares(values: readonly number[]): number {
  return Math.sqrt(values.reduce((sum, value) => sum + value * value, 0));
}

function harmonicAmplitude(lines: Lines, periods: number, n: number): number {
  return bandAmplitude(lines, Math.ceil((n - 0.5) * periods), Math.ceil((n + 0.5) * periods) - 1);
}

function momentsOf(lines: Lines, periods: number, control: Lfo, unityV: number): Moment[] {
  const controlV = controlOver(control, MOMENTS).starts;
  const fundamental = envelopeOf(lines, periods, periods, MOMENTS);
  const above = new Float64Array(MOMENTS);
  for (let n = 2; n <= HARMONICS; n++) {
    envelopeOf(lines, n * periods, periods, MOMENTS).forEach((value, k) => {
      above[k] += value * value;
    });
  }
  return Array.from(fundamental, (value, k) => ({
    turns: k / MOMENTS,
    controlV: controlV[k],
    gainDb: dbFromRatio(value / unityV),
    thd: Math.sqrt(above[k]) / value,
  }));
}

function least(moments: readonly Moment[], measure: (moment: Moment) => number): Moment {
  return moments.reduce((best, moment) => (measure(moment) < measure(best) ? moment : best));
}

function sidebands(lines: Lines, periods: number, rateHz: number, gain: number): Sideband[] {
  const side = Math.min(SIDEBANDS, Math.ceil(periods / 2) - 1);
  const carrier = lineAmplitude(lines, periods);
  return Array.from({ length: 2 * side + 1 }, (_, i) => {
    const offset = i - side;
    const amplitude = lineAmplitude(lines, periods + offset);
    const db = amplitude > 0 && carrier > 0 ? dbFromRatio(amplitude / carrier) : null;
    return { offset, frequencyHz: (periods + offset) * rateHz, amplitudeV: amplitude * gain, db };
  });
}
