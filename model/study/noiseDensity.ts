/**
 * Noise of a cell at rest: how much each part sends to the output.
 *
 * Law      resistor 4kT/R; channel 4kT·(mean of its two ends' slopes); each junction 2q·(forward + reverse current), leakage and clamp included.
 *          Every part's current acts alone through the linear circuit (`network.ts`); squares add. The amplifier adds none of its own
 * Scheme   a band is integrated by Simpson's rule over the logarithm of frequency, its grid doubled until the square stops changing
 * Error    of a band, `errorRatio`: what the last doubling changed the voltage by, over it; under 1e-9 or the finest grid's. Of a density, the reading's
 *          `errorRatio`: the largest that the linear solutions had been wrong by before their refinement
 * Valid    audio frequencies: flicker noise is left out. The channel's law is exact at VDS = 0
 * Source   Johnson, Nyquist, Phys. Rev. 32 (1928) 97, 110; channel: van der Ziel, Proc. IRE 50 (1962) 1808; shot noise: Schottky, Ann. Phys.
 *          362 (1918) 541 (from memory)
 */
import { variantAt } from '../cell/fromDesign.ts';
import type { Design, Output } from '../design/types.ts';
import { exp, log } from '../device/math.ts';
import { ZERO_CELSIUS_K } from '../device/temperature.ts';
import { magnitude } from './complex.ts';
import { BOLTZMANN, CHARGE_C, type Linearised, linearise, type OperatingOptions, type OperatingPoint } from './operating.ts';
import { requireRange } from './require.ts';
import { outputEffects, tenADecade } from './response.ts';
import { aWeighting } from './weighting.ts';

const BAND_LOW_HZ = 20;
const BAND_HIGH_HZ = 20e3;
const COARSEST = 32;
const FINEST = 2048;
const STOPPED = 1e-9;

export interface NoiseOptions extends OperatingOptions {
  /** Of `densities`; ten a decade from 10 Hz to 100 kHz when left out. */
  readonly frequenciesHz?: readonly number[];
}

/** A part's name is the element's in `cell/shunt.ts`, or `channel`, `gateSource`, `gateDrain`. */
export interface PartNoise {
  readonly part: string;
  /** At the output, V/√Hz. */
  readonly densityV: number;
}

/** At the output, after make-up, V/√Hz. */
export interface NoiseDensity {
  readonly frequencyHz: number;
  readonly totalV: number;
  /** The total over the audio's gain: at the signal's source. Infinity where the audio does not pass. */
  readonly inputReferredV: number;
  readonly parts: readonly PartNoise[];
}

/** From 20 Hz to 20 kHz, V rms. */
export interface BandNoise {
  readonly flatV: number;
  readonly aWeightedV: number;
  readonly errorRatio: number;
}

export interface NoiseReading {
  readonly point: OperatingPoint;
  readonly densities: readonly NoiseDensity[];
  /** Where the cell ends, before make-up. */
  readonly drain: BandNoise;
  /** After make-up. */
  readonly output: BandNoise;
  /** `flatV` at the output, part by part, largest first; their squares add up to its square. */
  readonly parts: readonly { readonly part: string; readonly flatV: number }[];
  readonly errorRatio: number;
}

interface Source {
  readonly part: string;
  readonly from: string;
  readonly to: string;
  /** A²/Hz, white. */
  readonly density: number;
}

/** Throws a RangeError naming an option or a value that cannot be used. */
export function noiseReading(design: Design, variantIndex: number, options: NoiseOptions = {}): NoiseReading {
  const { frequenciesHz = tenADecade() } = options;
  for (const hz of frequenciesHz) requireRange('frequenciesHz', hz, 1e-3, 1e9, 'Hz');
  const { output } = variantAt(design, variantIndex);
  const linear = linearise(design, variantIndex, options);
  const sources = noiseSources(linear, design.tempC + ZERO_CELSIUS_K);
  const squaresAt = (hz: number, amplifier: Output | null) => squares(linear, sources, hz, amplifier);
  const atOutput = integrated((hz) => squaresAt(hz, output).byPart);
  const parts = sources.map(({ part }, index) => ({ part, flatV: Math.sqrt(atOutput.flat[index]) }));
  let errorRatio = 0;
  const densities = frequenciesHz.map((frequencyHz): NoiseDensity => {
    const { byPart, audio, errorRatio: error } = squaresAt(frequencyHz, output);
    errorRatio = Math.max(errorRatio, error);
    const totalV = Math.sqrt(total(byPart));
    return {
      frequencyHz,
      totalV,
      inputReferredV: audio > 0 ? totalV / audio : Number.POSITIVE_INFINITY,
      parts: sources.map(({ part }, index) => ({ part, densityV: Math.sqrt(byPart[index]) })),
    };
  });
  return {
    point: linear.point,
    densities,
    drain: bandOf(integrated((hz) => squaresAt(hz, null).byPart)),
    output: bandOf(atOutput),
    parts: parts.sort((a, b) => b.flatV - a.flatV),
    errorRatio,
  };
}

function noiseSources({ network, shot }: Linearised, temperatureK: number): Source[] {
  const { circuit, slopes } = network;
  const { drain, gate, source } = circuit.jfet;
  const thermal = 4 * BOLTZMANN * temperatureK;
  const resistors = circuit.elements.flatMap((element): Source[] => {
    if (element.kind !== 'conductance' || isLeak(element.name)) return [];
    return [{ part: element.name, from: element.a, to: element.b, density: thermal * element.valueS }];
  });
  return [
    ...resistors,
    { part: 'channel', from: drain, to: source, density: (thermal * (slopes.sourceS + slopes.drainS)) / 2 },
    { part: 'gateSource', from: gate, to: source, density: 2 * CHARGE_C * shot.gateSourceA },
    { part: 'gateDrain', from: gate, to: drain, density: 2 * CHARGE_C * shot.gateDrainA },
  ];
}

/** The junctions' leakage is carried across a barrier: it is counted as shot noise, not as a resistor's. */
function isLeak(name: string): boolean {
  return name === 'gateSourceLeak' || name === 'gateDrainLeak';
}

/** V²/Hz of each source at the output, and the audio's gain to it. */
function squares({ network }: Linearised, sources: readonly Source[], frequencyHz: number, amplifier: Output | null) {
  const effects = outputEffects(network, frequencyHz, amplifier);
  const byPart = sources.map(({ from, to, density }) => {
    const ohm = magnitude(effects.ofCurrent(from, to));
    return ohm * ohm * density;
  });
  return { byPart, audio: magnitude(effects.ofDrive('audio')), errorRatio: effects.errorRatio };
}

interface Integrals {
  /** V², each part's. */
  readonly flat: readonly number[];
  readonly weighted: readonly number[];
  readonly errorRatio: number;
}

/** The integrals of the parts' V²/Hz over the band, flat and A-weighted. */
function integrated(squaresAt: (hz: number) => readonly number[]): Integrals {
  const span = log(BAND_HIGH_HZ / BAND_LOW_HZ);
  const kept = new Map<number, readonly number[]>();
  const look = (fraction: number) => {
    const hz = BAND_LOW_HZ * exp(span * fraction);
    const known = kept.get(fraction) ?? squaresAt(hz);
    kept.set(fraction, known);
    return { hz, known };
  };
  const over = (intervals: number, weighting: (hz: number) => number) => {
    const sums: number[] = [];
    for (let i = 0; i <= intervals; i++) {
      const { hz, known } = look(i / intervals);
      const simpson = i === 0 || i === intervals ? 1 : i % 2 === 1 ? 4 : 2;
      const weight = (simpson * span * hz * weighting(hz) * weighting(hz)) / (3 * intervals);
      known.forEach((square, part) => {
        sums[part] = (sums[part] ?? 0) + weight * square;
      });
    }
    return sums;
  };
  const on = (intervals: number) => ({ flat: over(intervals, () => 1), weighted: over(intervals, aWeighting) });
  let result = on(COARSEST);
  let errorRatio = Number.POSITIVE_INFINITY;
  for (let intervals = 2 * COARSEST; errorRatio > STOPPED && intervals <= FINEST; intervals *= 2) {
    const finer = on(intervals);
    errorRatio = Math.max(change(result.flat, finer.flat), change(result.weighted, finer.weighted));
    result = finer;
  }
  return { ...result, errorRatio };
}

/** Of the root of the totals. */
function change(before: readonly number[], after: readonly number[]): number {
  const size = total(after);
  return size === 0 ? 0 : Math.abs(1 - Math.sqrt(total(before) / size));
}

function total(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0);
}

function bandOf({ flat, weighted, errorRatio }: Integrals): BandNoise {
  return { flatV: Math.sqrt(total(flat)), aWeightedV: Math.sqrt(total(weighted)), errorRatio };
}
