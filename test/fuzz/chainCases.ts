/**
 * Random sessions of a whole chain: blocks of any length and signal, values moved and shapes changed in any order, inputs that are no numbers.
 *
 * Bound    `boundV` while values stand; while they move, and in any case, RUNAWAY_V, beyond which the chain says that a state was lost and is silent
 */
import { type Chain, createChain, LARGEST_SAMPLE, moveChain, processChain } from '../../model/chain/chain.ts';
import { type ChainNumbers, compileChain } from '../../model/chain/compile.ts';
import type { FilterSet } from '../../model/chain/halfband.ts';
import { controlRangeV } from '../../model/control/range.ts';
import type { Control, Design } from '../../model/design/types.ts';
import { Dice } from './dice.ts';
import { movedDesign, randomDesign, type Temper } from './randomDesign.ts';

export interface ChainReport {
  sessions: number;
  /** Samples solved at the upper rate, over all channels. */
  solved: number;
  refused: number;
  moves: number;
  lost: number;
  recoveries: number;
  worstRecovery: number;
  /** What was played, by kind, and how often it was set out for. */
  readonly met: Map<Met, number>;
  readonly faults: string[];
}

/** What sessions must meet: values on the move, a fade, one between latencies, a move within a fade; and designs with these. */
export const MEETINGS = ['ramp', 'fade', 'latency', 'move in fade', 'recorded control', 'loop', 'noise', 'real amplifier'] as const;
type Met = (typeof MEETINGS)[number];

export type Process = typeof processChain;

const MOST_FAULTS = 20;
const RUNAWAY_V = 1e6;
/** The most that low-pass filters may overshoot, there and back. */
const OVERSHOOT = 4;
const MOST_UPPER_SAMPLES = 60000;

export function emptyChainReport(): ChainReport {
  return { sessions: 0, solved: 0, refused: 0, moves: 0, lost: 0, recoveries: 0, worstRecovery: 0, met: new Map(), faults: [] };
}

interface Session {
  readonly seed: number;
  readonly dice: Dice;
  /** Apart, so that a kept seed still means the same designs. */
  readonly filterDice: Dice;
  readonly temper: Temper;
  readonly rateHz: number;
  readonly channels: number;
  filters: FilterSet;
  readonly report: ChainReport;
  readonly process: Process;
  design: Design;
  /** A bound on every voltage of the circuits played so far, see `boundV`. */
  sourcesV: number;
  /** Largest gain in samples per volt since the start, so that what still rings down is counted. */
  perV: number;
}

/** Runs the session of one seed. `process` stands in for the chain's own, so that a broken one can be tried. */
export function runChainSeed(seed: number, report: ChainReport, process: Process = processChain): void {
  const dice = new Dice(seed);
  const temper = dice.chance(0.6) ? 'board' : 'wild';
  const design = randomDesign(dice, temper);
  const rateHz = dice.pick([8000, 22050, 44100, 48000, 96000, 192000, 384000, Math.round(dice.decades(8000, 384000))]);
  const channels = dice.whole(1, 2);
  const session: Session = {
    seed,
    dice,
    filterDice: new Dice(seed + 0x5eed),
    temper,
    rateHz,
    channels,
    filters: dice.pick(['lowLatency', 'linearPhase'] as const),
    report,
    process,
    design,
    sourcesV: 0,
    perV: 0,
  };
  const numbers = compiled(session, design);
  report.sessions += 1;
  if (!numbers) return;
  const chain = createChain(numbers);
  meetDesign(report, numbers);
  session.perV = gainPerV(design);
  session.sourcesV = boundV(design);
  const movesBefore = report.moves;
  const until = report.solved + MOST_UPPER_SAMPLES;
  const isMoving = dice.chance(0.75);
  const events = dice.whole(3, 14);
  for (let event = 0; event < events && report.solved < until; event++) {
    if (isMoving && dice.chance(0.35)) change(session, chain);
    else play(session, chain);
    if (report.faults.length >= MOST_FAULTS) return;
  }
  if (report.moves === movesBefore && dice.chance(0.6)) recover(session, chain);
}

/** Null where the design is refused; the sentence must say what was expected. */
function compiled(session: Session, design: Design): ChainNumbers | null {
  try {
    return compileChain(design, 0, session.rateHz, session.channels, session.filters);
  } catch (error) {
    session.report.refused += 1;
    const isSentence = error instanceof RangeError && /^\S.* is .*expected /.test(error.message);
    if (!isSentence) complain(session, `compiling threw ${error}`);
    return null;
  }
}

/** Values of the same shape, another design, or the same design again; now and then twice in a row, in the middle of a fade or ramp. */
function change(session: Session, chain: Chain): void {
  const { dice, temper } = session;
  if (session.filterDice.chance(0.1)) session.filters = session.filters === 'lowLatency' ? 'linearPhase' : 'lowLatency';
  const design = dice.chance(0.6)
    ? movedDesign(session.design, dice, temper)
    : dice.chance(0.7)
      ? randomDesign(dice, temper)
      : session.design;
  const numbers = compiled(session, design);
  if (!numbers) return;
  const { latencySamples, next } = chain;
  try {
    moveChain(chain, numbers);
  } catch (error) {
    complain(session, `moving threw ${error}`);
    return;
  }
  meetDesign(session.report, numbers);
  if (next) meet(session.report, 'move in fade');
  else meet(session.report, chain.next ? 'fade' : 'ramp');
  if (!next && chain.next && chain.latencySamples !== latencySamples) meet(session.report, 'latency');
  session.design = design;
  session.perV = Math.max(session.perV, gainPerV(design));
  session.sourcesV = Number.POSITIVE_INFINITY;
  session.report.moves += 1;
}

function meet({ met }: ChainReport, what: Met): void {
  met.set(what, (met.get(what) ?? 0) + 1);
}

function meetDesign(report: ChainReport, { control, noiseSeed, idealAmplifier }: ChainNumbers): void {
  if (control.kind === 'external') meet(report, 'recorded control');
  if (control.kind === 'follower' && control.senses === 'output') meet(report, 'loop');
  if (noiseSeed !== null) meet(report, 'noise');
  if (!idealAmplifier) meet(report, 'real amplifier');
}

function play(session: Session, chain: Chain): void {
  const { dice, rateHz, channels } = session;
  const factor = chain.voice.numbers.oversampling;
  const longest = Math.max(1, Math.min(4096, Math.floor(MOST_UPPER_SAMPLES / (4 * factor * channels))));
  const length = dice.chance(0.2) ? dice.whole(1, 3) : dice.whole(1, longest);
  const given = dice.chance(0.1) ? dice.whole(0, 2) : channels;
  const inputs = Array.from({ length: given }, () => randomSignal(dice, length, rateHz));
  const external = dice.chance(0.5) ? randomSignal(dice, length, rateHz) : null;
  block(session, chain, inputs, length, external);
}

function block(session: Session, chain: Chain, inputs: readonly Float32Array[], length: number, external: Float32Array | null): void {
  const { report, channels } = session;
  const before = inputs.map((input) => Float32Array.from(input));
  const outputs = Array.from({ length: channels }, () => new Float32Array(length).fill(Number.NaN));
  const faults = chain.readings.faults;
  try {
    session.process(chain, inputs, outputs, external);
  } catch (error) {
    complain(session, `processing threw ${error}`);
    return;
  }
  report.solved += length * channels * (chain.voice.numbers.oversampling + (chain.next?.numbers.oversampling ?? 0));
  const isUnusable = (line: Float32Array) => line.some((sample) => !(Math.abs(sample) <= LARGEST_SAMPLE));
  const unusable = inputs.slice(0, channels).some(isUnusable);
  /** Whether it is counted depends on the control that the chain has at that sample. */
  const recordedUnusable = external !== null && isUnusable(external);
  const counted = chain.readings.faults > faults;
  if (unusable && !counted) complain(session, 'an unusable input was not counted');
  if (!unusable && !recordedUnusable && counted) report.lost += 1;
  inputs.forEach((input, channel) => {
    if (!input.every((sample, i) => Object.is(sample, before[channel][i]))) complain(session, `input ${channel} was written to`);
  });
  const bound = OVERSHOOT * Math.min(RUNAWAY_V, session.sourcesV) * session.perV;
  for (const output of outputs) {
    const wrong = output.findIndex((sample) => !(Math.abs(sample) <= bound));
    if (wrong >= 0) complain(session, `sample ${wrong} is ${output[wrong]}; expected a number within ${bound}`);
  }
}

/** Samples at the output for a volt at the cell. */
function gainPerV(design: Design): number {
  return 10 ** (Math.max(0, design.variants[0].output.gainDb) / 20) / design.fullScaleV;
}

/**
 * No voltage in the circuit can be larger, V. Sources, supplies and the control add up; what is passive adds none, but a current that is forced through a
 * resistor (bias, the control's draw) and a resonance, whose quality is at most R·√(C/L). Where the drain is fed back by a buffer the bound is not tight.
 */
function boundV(design: Design): number {
  const { cell, control } = design.variants[0];
  const controlV = controlBoundV(control);
  const { feed, buffer, reference, sharedGround, feedback } = cell;
  const quality = feed.kind === 'pickup' ? 1 + 2 * feed.volumeOhm * Math.sqrt((feed.windingF + feed.cableF) / feed.inductanceH) : 1;
  const sourceOhm = cell.sourceOhm + (feed.kind === 'pickup' ? feed.volumeOhm : feed.kind === 'stage' ? feed.bleedOhm : 0);
  const padOhm = cell.pad.kind === 'divider' ? cell.pad.upperOhm + cell.pad.lowerOhm : 0;
  const bufferV = buffer.kind === 'follower' ? Math.abs(buffer.offsetV) + Math.abs(buffer.biasA) * (sourceOhm + padOhm) * quality : 0;
  const supplyV = reference.kind === 'halfSupply' ? Math.abs(reference.supplyV) : 0;
  const groundV = sharedGround.kind === 'shared' ? Math.abs(sharedGround.drawAPerV) * sharedGround.groundOhm * controlV : 0;
  if (feedback.kind === 'buffered' && feedback.fraction > 0.9) return Number.POSITIVE_INFINITY;
  const sum = LARGEST_SAMPLE * design.fullScaleV * OVERSHOOT * quality + bufferV + supplyV + groundV + controlV + 10;
  return feedback.kind === 'buffered' ? sum / (1 - feedback.fraction) : sum;
}

function controlBoundV(control: Control): number {
  const [low, high] = controlRangeV(control);
  const recordedV = control.source === 'external' ? Math.abs(control.fullScaleV) * LARGEST_SAMPLE * OVERSHOOT : 0;
  return Math.max(Math.abs(low), Math.abs(high)) + recordedV;
}

/**
 * One second of silence, after which a chain that began afresh with the same values and phase must agree. Asked only where the circuit forgets at all: a
 * fresh chain that is knocked by the largest sample must be back within a second too. Not after a move, which may leave another operating point to be
 * reached through the slowest capacitor.
 */
function recover(session: Session, chain: Chain): void {
  const { dice, rateHz, report, design } = session;
  if (rateHz * design.oversampling > 400000 || design.noise.kind !== 'none') return;
  const numbers = compiled(session, design);
  if (!numbers) return;
  if (dice.chance(0.5)) block(session, chain, [Float32Array.of(Number.NaN, Number.POSITIVE_INFINITY, 1e38, -1e38)], 4, null);
  const fresh = createChain(numbers);
  const knocked = createChain(numbers);
  const knock = new Float32Array(Math.round(rateHz * KNOCK_SEC)).fill(LARGEST_SAMPLE);
  session.process(knocked, [knock], [new Float32Array(knock.length)]);
  for (const each of [fresh, knocked, chain]) silence(session, each, 1);
  for (const each of [fresh, knocked]) each.voice.drive.phase[0] = chain.voice.drive.phase[0];
  for (const each of [fresh, knocked, chain]) silence(session, each, 0.1);
  const [rest, back, now] = [fresh, knocked, chain].map((each) => silence(session, each, 0.02));
  const allowed = RECOVERED_V * session.perV;
  if (!(distance(rest, back) <= allowed / 10)) return;
  report.recoveries += 1;
  report.worstRecovery = Math.max(report.worstRecovery, distance(rest, now) / allowed);
  if (!(distance(rest, now) <= allowed))
    complain(session, `after 1 s of silence it is ${distance(rest, now)} from rest; expected ${allowed} or less`);
}

/** A direct voltage of the largest sample for as long as any session lasts. */
const KNOCK_SEC = 0.1;
/** V at the cell: −80 dB of a volt. */
const RECOVERED_V = 1e-4;

function silence({ rateHz, channels, process, report }: Session, chain: Chain, seconds: number): Float32Array[] {
  const outputs = Array.from({ length: channels }, () => new Float32Array(Math.round(rateHz * seconds)));
  process(chain, [], outputs);
  report.solved += outputs[0].length * channels * chain.voice.numbers.oversampling;
  return outputs;
}

function distance(a: readonly Float32Array[], b: readonly Float32Array[]): number {
  return a.reduce((most, output, c) => output.reduce((far, v, i) => Math.max(far, Math.abs(v - b[c][i])), most), 0);
}

/** Samples of 1.0 for full scale: silence, tones, noise, steps of up to 1 kV and more, and what is no audio at all. */
function randomSignal(dice: Dice, length: number, rateHz: number): Float32Array {
  const kind = dice.pick(['silence', 'tone', 'noise', 'steps', 'faint', 'wild'] as const);
  const peak = dice.decades(1e-3, dice.chance(0.2) ? 9999 : 10);
  const hz = dice.decades(10, rateHz / 2);
  const wild = [Number.NaN, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY, 1e38, -1e38, 1e-45, -0, 9999, 10001];
  let held = 0;
  return Float32Array.from({ length }, (_, i) => {
    if (kind === 'silence') return 0;
    if (kind === 'tone') return peak * Math.sin((2 * Math.PI * hz * i) / rateHz);
    if (kind === 'faint') return 1e-42 * dice.sign();
    if (kind === 'wild' && dice.chance(0.02)) return dice.pick(wild);
    if (kind !== 'steps' || dice.chance(0.02)) held = peak * dice.sign();
    return held;
  });
}

function complain({ report, seed }: Session, sentence: string): void {
  if (report.faults.length < MOST_FAULTS) report.faults.push(`seed ${seed}: ${sentence}`);
}
