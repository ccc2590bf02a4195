/**
 * What a cell at rest does to small signals: from the audio and from the control to the output, from the control to the gate, and what it is to
 * the source that drives it.
 *
 * Law      the circuit with its FET replaced by its exact slopes at rest (`operating.ts`), solved at each frequency (`network.ts`); after the cell
 *          the make-up amplifier, G/(1 + jf/fp) with fp = GBW/max(G, 1)
 * Error    `errorRatio`: the largest that the linear solutions had been wrong by before their refinement; a −3 dB point is bisected to 1e-12 of
 *          itself. A real signal differs by its level: the fundamental of the shunt cell grows by 1 + 1.5x², x = |β(2k − 1)|·Vin/(R·g²) (from memory)
 * Valid    signals towards zero
 */
import { GROUND } from '../cell/circuit.ts';
import { variantAt } from '../cell/fromDesign.ts';
import type { Cell, Design, Output } from '../design/types.ts';
import { dbFromRatio, ratioFromDb, turnsOf } from '../device/math.ts';
import { type Complex, difference, magnitude, ONE, product, quotient } from './complex.ts';
import { effectsOn, type Network } from './network.ts';
import { linearise, type OperatingOptions, type OperatingPoint } from './operating.ts';
import { requireRange } from './require.ts';

const TURN = 6.283185307179586;
/** Where −3 dB points are looked for, Hz, and by what ratio from one look to the next. */
const LOWEST_HZ = 1e-3;
const HIGHEST_HZ = 1e9;
const STRIDE = 1.1220184543019633;

export interface ResponseOptions extends OperatingOptions {
  /** 0 Hz and up; ten a decade from 10 Hz to 100 kHz when left out. */
  readonly frequenciesHz?: readonly number[];
  /** `output` counts the make-up amplifier; `drain`, where the cell ends, when left out. */
  readonly at?: 'drain' | 'output';
  /** Where the audio's gain is whole, for its −3 dB points; 1000 when left out. */
  readonly referenceHz?: number;
}

export interface Transfer {
  /** V/V. */
  readonly ratio: number;
  /** null when there is nothing. */
  readonly db: number | null;
  readonly phaseRad: number;
}

export interface ResponsePoint {
  readonly frequencyHz: number;
  readonly audio: Transfer;
  /** From the control's driver to the output: feedthrough. */
  readonly control: Transfer;
  /** From the control's driver to the gate-source voltage. */
  readonly gate: Transfer;
  /** What loads the source, behind its own resistance (and a pickup's inductance), Ω; the real part is Infinity where nothing flows. */
  readonly inputOhm: Complex;
}

/** The nearest frequencies below and above the reference at which the gain is 1/√2 of that there; null beyond 1 mHz and 1 GHz. */
export interface Band {
  readonly referenceHz: number;
  readonly lowHz: number | null;
  readonly highHz: number | null;
}

export interface ResponseReading {
  readonly point: OperatingPoint;
  readonly points: readonly ResponsePoint[];
  readonly audioBand: Band;
  /** Of the gate re a control that does not move. */
  readonly gateBand: Band;
  readonly errorRatio: number;
}

/** Throws a RangeError naming an option or a value that cannot be used. */
export function smallSignal(design: Design, variantIndex: number, options: ResponseOptions = {}): ResponseReading {
  const { at = 'drain', frequenciesHz = tenADecade(), referenceHz = 1000 } = options;
  for (const hz of frequenciesHz) requireRange('frequenciesHz', hz, 0, HIGHEST_HZ, 'Hz');
  requireRange('referenceHz', referenceHz, LOWEST_HZ, HIGHEST_HZ, 'Hz');
  const { cell, output } = variantAt(design, variantIndex);
  const { point, network } = linearise(design, variantIndex, options);
  const { gate, source } = network.circuit.jfet;
  const atOutput = (hz: number) => outputEffects(network, hz, at === 'output' ? output : null);
  const atGate = (hz: number) => effectsOn(network, hz, { plus: gate, minus: source });
  let errorRatio = 0;
  const points = frequenciesHz.map((hz): ResponsePoint => {
    const end = atOutput(hz);
    const gateEffects = atGate(hz);
    const start = effectsOn(network, hz, { delivers: 'audio' });
    errorRatio = Math.max(errorRatio, end.errorRatio, gateEffects.errorRatio, start.errorRatio);
    return {
      frequencyHz: hz,
      audio: transferOf(end.ofDrive('audio')),
      control: transferOf(end.ofDrive('control')),
      gate: transferOf(gateEffects.ofDrive('control')),
      inputOhm: difference(quotient(ONE, start.ofDrive('audio')), ownOhm(cell, hz)),
    };
  });
  return {
    point,
    points,
    audioBand: bandOf((hz) => magnitude(atOutput(hz).ofDrive('audio')), referenceHz),
    gateBand: bandOf((hz) => magnitude(atGate(hz).ofDrive('control')), 0),
    errorRatio,
  };
}

/** 10^(k/10) Hz, 10 Hz to 100 kHz. */
export function tenADecade(): number[] {
  return Array.from({ length: 41 }, (_, k) => ratioFromDb(2 * (k + 10)));
}

/** Effects on the cell's output node, through the amplifier where there is one. */
export function outputEffects(network: Network, frequencyHz: number, amplifier: Output | null) {
  const effects = effectsOn(network, frequencyHz, { plus: network.circuit.outputNode, minus: GROUND });
  const gain = amplifier === null ? ONE : amplifierGain(amplifier, frequencyHz);
  return {
    errorRatio: effects.errorRatio,
    ofDrive: (drive: 'audio' | 'control') => product(gain, effects.ofDrive(drive)),
    ofCurrent: (from: string, to: string) => product(gain, effects.ofCurrent(from, to)),
  };
}

/** G/(1 + jf/fp), fp = GBW/max(G, 1). */
export function amplifierGain({ gainDb, gainBandwidthHz }: Output, frequencyHz: number): Complex {
  const gain = ratioFromDb(gainDb);
  if (gainBandwidthHz === null) return { re: gain, im: 0 };
  return quotient({ re: gain, im: 0 }, { re: 1, im: (frequencyHz * Math.max(gain, 1)) / gainBandwidthHz });
}

/** What stands in series inside the source. */
function ownOhm({ feed, sourceOhm }: Cell, frequencyHz: number): Complex {
  return { re: sourceOhm, im: feed.kind === 'pickup' ? TURN * frequencyHz * feed.inductanceH : 0 };
}

function transferOf(value: Complex): Transfer {
  const ratio = magnitude(value);
  return { ratio, db: ratio > 0 ? dbFromRatio(ratio) : null, phaseRad: turnsOf(value.im, value.re) * TURN };
}

function bandOf(ratioAt: (hz: number) => number, referenceHz: number): Band {
  const least = ratioAt(referenceHz) * Math.SQRT1_2;
  const isDown = (hz: number) => ratioAt(hz) < least;
  return {
    referenceHz,
    lowHz: referenceHz > 0 ? crossing(isDown, referenceHz, 1 / STRIDE) : null,
    highHz: crossing(isDown, Math.max(referenceHz, LOWEST_HZ), STRIDE),
  };
}

/** The first frequency from `fromHz` on, going by `stride`, at which `isDown` turns true; null within the limits. */
function crossing(isDown: (hz: number) => boolean, fromHz: number, stride: number): number | null {
  let up = fromHz;
  let down = fromHz;
  while (!isDown(down)) {
    up = down;
    down *= stride;
    if (down < LOWEST_HZ || down > HIGHEST_HZ) return null;
  }
  while (Math.abs(down - up) > 1e-12 * up) {
    const middle = Math.sqrt(up * down);
    if (middle === up || middle === down) break;
    if (isDown(middle)) down = middle;
    else up = middle;
  }
  return down;
}
