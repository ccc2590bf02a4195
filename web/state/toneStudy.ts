/** What the page's worker reads of the shadow tone, as a pure plan of small steps that a test in Node can run too. */
import { deviceOf } from '../../model/cell/fromDesign.ts';
import { controlRangeV } from '../../model/control/range.ts';
import { feedbackFraction, type Moves, withFeedbackFraction } from '../../model/design/feedback.ts';
import type { Channel, Variant } from '../../model/design/types.ts';
import { noiseReading } from '../../model/study/noiseDensity.ts';
import { signedHarmonic } from '../../model/study/signed.ts';
import { controlSwing } from '../../model/study/swing.ts';
import type { ToneReading } from '../../model/study/tone.ts';
import { measureTone } from '../../model/study/tone.ts';
import { fractionsWithin, thdWithin } from '../draw/tolerance.ts';
import type { FeedbackCurve, FeedbackPoint, Moment, NoisePoint, SwingPoint, VariantSummary, WorstReading } from './bench.ts';
import type { ToneQuestion } from './workers.ts';

const SWING_STEPS = 24;
/** Of an LFO's period, to find the ends of the gate's swing. */
const SWING_POINTS = 512;
const CURVE_FROM = 0.4;
const CURVE_TO = 0.6;
const CURVE_STEPS = 40;

/** The shadow tone at a gate voltage; null is the gate with the control at rest. Throws a RangeError where the cell cannot be read. */
export function readTone(question: ToneQuestion, gateV: number | null): ToneReading {
  const { design, variantIndex, toneHz, toneV } = question;
  return measureTone(design, variantIndex, { toneHz, toneV, ...(gateV === null ? {} : { gateV }) });
}

/** The same, with what parts of 1 % make of it at that gate voltage. */
export function readMoment(question: ToneQuestion, gateV: number | null): Pick<Moment, 'thdBand'> & { readonly reading: ToneReading } {
  const reading = readTone(question, gateV);
  const variant = question.design.variants[question.variantIndex];
  if (variant.cell.feedback.kind === 'none') return { reading, thdBand: null };
  const k = feedbackFraction(variant.cell);
  const { channel } = deviceOf(variant, 0);
  const [low, high] = fractionsWithin(k).map((end) => {
    const moved = questionAt(question, end);
    return moved === null ? [] : [feedbackPoint(end, readTone(moved, reading.vgsV), channel)];
  });
  return { reading, thdBand: thdWithin([...low, feedbackPoint(k, reading, channel), ...high]) };
}

/**
 * The shadow tone over the gate's swing: 25 gate voltages, and the highest THD, for which the gap around it is halved four times. Yields between
 * readings.
 */
export function* readSwing(question: ToneQuestion): Generator<void, { worst: WorstReading; points: readonly SwingPoint[] }> {
  const [from, to] = gateRangeV(question);
  const points: SwingPoint[] = [];
  const measure = (gateV: number): WorstReading => {
    const { thdFundamental, gainDb, rdsOhm } = readTone(question, gateV);
    points.push({ gateV, gainDb, rdsOhm });
    return { thdFundamental, gainDb, gateV };
  };
  let worst = measure(from);
  let stepV = (to - from) / SWING_STEPS;
  for (let i = 1; i <= SWING_STEPS && stepV > 0; i++) {
    yield;
    worst = higher(worst, measure(from + i * stepV));
  }
  for (let halving = 0; halving < 4 && stepV > 0; halving++) {
    stepV /= 2;
    const { gateV } = worst;
    for (const nearV of [gateV - stepV, gateV + stepV]) {
      yield;
      if (nearV >= from && nearV <= to) worst = higher(worst, measure(nearV));
    }
  }
  return { worst, points: points.sort((a, b) => a.gateV - b.gateV) };
}

/** The shadow tone at rest, and the worst over the swing. Yields between readings. */
export function* readSummary(question: ToneQuestion): Generator<void, VariantSummary> {
  const restThd = readTone(question, null).thdFundamental;
  yield;
  const { worst } = yield* readSwing(question);
  return { restThd, worstThd: worst.thdFundamental };
}

/** The noise at the drain over the gate's swing, at 25 gate voltages. Yields between readings. */
export function* readNoise(question: ToneQuestion): Generator<void, readonly NoisePoint[]> {
  const { design, variantIndex } = question;
  const [from, to] = gateRangeV(question);
  const steps = from === to ? 0 : SWING_STEPS;
  const points: NoisePoint[] = [];
  for (let i = 0; i <= steps; i++) {
    yield;
    const gateV = steps === 0 ? from : from + ((to - from) * i) / steps;
    points.push({ gateV, drainV: noiseReading(design, variantIndex, { gateV, frequenciesHz: [] }).drain.flatV });
  }
  return points;
}

/** The ends of the gate's swing, V: an LFO's with what a blocking capacitor makes of its rate, any other control's one by one. */
function gateRangeV({ design, variantIndex }: ToneQuestion): readonly [number, number] {
  const { control } = design.variants[variantIndex];
  const gate =
    control.source === 'lfo'
      ? controlSwing(design, variantIndex, SWING_POINTS).gateV
      : controlRangeV(control).map((controlV) => measureTone(design, variantIndex, { controlV }).vgsV);
  return [Math.min(...gate), Math.max(...gate)];
}

/**
 * THD against k at a gate voltage; null is where the control at rest puts it now. 41 values from 0.40 to 0.60, widened so that the present k
 * lies inside; a k that parts within their limits cannot give is left out. A cell without feedback has no such curve: null.
 */
export function* readFeedbackCurve(question: ToneQuestion, gateV: number | null): Generator<void, FeedbackCurve | null> {
  const variant = question.design.variants[question.variantIndex];
  const { cell } = variant;
  const { channel } = deviceOf(variant, 0);
  if (cell.feedback.kind === 'none') return null;
  const keptV = gateV ?? readTone(question, null).vgsV;
  const points: FeedbackPoint[] = [];
  for (const k of curveFractions(feedbackFraction(cell))) {
    yield;
    const moved = questionAt(question, k);
    if (moved !== null) points.push(feedbackPoint(k, readTone(moved, keptV), channel));
  }
  return { gateV: keptV, points };
}

/** The same question of a cell with another k; null where parts within their limits cannot give it. */
function questionAt(question: ToneQuestion, k: number): ToneQuestion | null {
  const { design, variantIndex, moves } = question;
  const moved = variantAtFraction(design.variants[variantIndex], k, moves);
  if (moved === null) return null;
  return { ...question, design: { ...design, variants: design.variants.map((other, i) => (i === variantIndex ? moved : other)) } };
}

function variantAtFraction(variant: Variant, k: number, moves: Moves): Variant | null {
  try {
    return withFeedbackFraction(variant, k, 'control', moves);
  } catch (error) {
    if (error instanceof RangeError) return null;
    throw error;
  }
}

/** 41 even values and the present k, ascending. */
export function curveFractions(present: number): number[] {
  const margin = 0.02;
  const from = Math.min(CURVE_FROM, Math.max(0, present - margin));
  const to = Math.max(CURVE_TO, Math.min(1, present + margin));
  const even = Array.from({ length: CURVE_STEPS + 1 }, (_, i) => from + ((to - from) * i) / CURVE_STEPS);
  const apart = (to - from) / CURVE_STEPS / 1000;
  return [...even.filter((k) => Math.abs(k - present) > apart), present].sort((a, b) => a - b);
}

function feedbackPoint(k: number, reading: ToneReading, channel: Channel): FeedbackPoint {
  const signed = (n: number) => signedHarmonic(reading, n, channel) ?? 0;
  return { k, thd: reading.thdFundamental, h2Signed: signed(2), h3: Math.abs(signed(3)) };
}

function higher(a: WorstReading, b: WorstReading): WorstReading {
  return b.thdFundamental > a.thdFundamental ? b : a;
}
