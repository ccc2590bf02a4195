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
import { channelCurves, tonePath, type TransferPath } from '../../model/study/transfer.ts';
import { fractionsWithin, thdWithin } from '../draw/tolerance.ts';
import type { FeedbackCurve, FeedbackPoint, Moment, NoisePoint, SwingPoint, TransferPlane, VariantSummary, WorstReading } from './bench.ts';
import type { ToneQuestion } from './workers.ts';

const SWING_STEPS = 24;
/** Of an LFO's period, to find the ends of the gate's swing. */
const SWING_POINTS = 512;
const CURVE_FROM = 0.4;
const CURVE_TO = 0.6;
const CURVE_STEPS = 40;

/** The shadow tone at a gate voltage; null is the gate with the control at rest. Throws a RangeError where the cell cannot be read. */
export function readTone(question: ToneQuestion, gateV: number | null, to: 'read' | 'draw' = 'read'): ToneReading {
  const { design, variantIndex, toneHz, toneV } = question;
  return measureTone(design, variantIndex, { toneHz, toneV, to, ...(gateV === null ? {} : { gateV }) });
}

/** The same, with its path on the transfer plane and what parts of 1 % make of it at that gate voltage. */
export function readMoment(question: ToneQuestion, gateV: number | null): Omit<Moment, 'levels'> & { readonly reading: ToneReading } {
  const reading = readTone(question, gateV);
  return { reading, path: pathAt(question, reading.vgsV), thdBand: bandOf(question, reading) };
}

function pathAt({ design, variantIndex, toneHz, toneV }: ToneQuestion, gateV: number): TransferPath {
  return tonePath(design, variantIndex, { toneHz, toneV, gateV });
}

function bandOf(question: ToneQuestion, reading: ToneReading): Moment['thdBand'] {
  const variant = question.design.variants[question.variantIndex];
  if (variant.cell.feedback.kind === 'none') return null;
  const k = feedbackFraction(variant.cell);
  const { channel } = deviceOf(variant, 0);
  const [low, high] = fractionsWithin(k).map((end) => {
    const moved = questionAt(question, end);
    return moved === null ? [] : [feedbackPoint(end, readTone(moved, reading.vgsV, 'draw'), channel)];
  });
  return thdWithin([...low, feedbackPoint(k, reading, channel), ...high]);
}

/**
 * The shadow tone over the gate's swing: 25 gate voltages, and the highest THD, for which the gap around it is halved four times. Yields between
 * readings.
 */
export function* readSwing(question: ToneQuestion): Generator<void, { worst: WorstReading; points: readonly SwingPoint[] }> {
  const [from, to] = gateRangeV(question);
  const points: SwingPoint[] = [];
  const measure = (gateV: number): WorstReading => {
    const { thdFundamental, gainDb, rdsOhm } = readTone(question, gateV, 'draw');
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
  yield;
  const { thdFundamental, gainDb } = readTone(question, worst.gateV);
  return { worst: { thdFundamental, gainDb, gateV: worst.gateV }, points: points.sort((a, b) => a.gateV - b.gateV) };
}

/** How far past VGS(off) and past the swing's ends the readings beyond it go, of VGS(off) and of the swing; and in how many steps on either side. */
const PAST_OFF = 1.25;
const PAST_SWING = 0.1;
const BEYOND_STEPS = { off: 3, on: 10 } as const;

/** The shadow tone from past VGS(off) up to the swing, and from there to 0 V, ascending in the gate's voltage. Yields between readings. */
export function* readBeyond(question: ToneQuestion): Generator<void, readonly SwingPoint[]> {
  const { gateOffV } = deviceOf(question.design.variants[question.variantIndex], 0);
  const [from, to] = gateRangeV(question);
  const pastV = PAST_SWING * (to - from);
  const [low, high] = [
    Math.min(0, PAST_OFF * gateOffV, from - (gateOffV < 0 ? pastV : 0)),
    Math.max(0, PAST_OFF * gateOffV, to + (gateOffV < 0 ? 0 : pastV)),
  ];
  const side = (fromV: number, toV: number, isOff: boolean) => {
    const steps = isOff ? BEYOND_STEPS.off : BEYOND_STEPS.on;
    return fromV < toV ? Array.from({ length: steps }, (_, n) => fromV + ((toV - fromV) * n) / steps) : [];
  };
  const below = side(low, from, gateOffV < 0);
  const above = side(-high, -to, gateOffV > 0)
    .map((v) => -v)
    .reverse();
  const points: SwingPoint[] = [];
  for (const gateV of [...below, ...above]) {
    yield;
    const { gainDb, rdsOhm } = readTone(question, gateV, 'draw');
    points.push({ gateV, gainDb, rdsOhm });
  }
  return points;
}

/** Where the plane's curves leave it, steepest first, as shares of its highest voltage and current: the labels then stand apart. */
const EXITS = [
  [0.12, 1],
  [0.42, 1],
  [1, 0.85],
  [1, 0.55],
  [1, 0.3],
  [1, 0.12],
] as const;
const PLANE_POINTS = 81;
/** Room about the widest path. */
const PLANE_ROOM = 1.12;
/** A cell that is cut off all the time has a plane of its own all the same, A. */
const LEAST_TOP_A = 1e-9;

/** The transfer plane, as wide as the shadow tone goes at the two ends of the swing. */
export function readPlane(question: ToneQuestion): TransferPlane {
  const { design, variantIndex } = question;
  const ends = gateRangeV(question).map((gateV) => pathAt(question, gateV));
  const most = (pick: (path: TransferPath) => Float64Array) => Math.max(...ends.flatMap((path) => Array.from(pick(path), Math.abs)));
  const topV = PLANE_ROOM * most(({ drainSourceV }) => drainSourceV);
  const topA = Math.max(LEAST_TOP_A, PLANE_ROOM * most(({ drainA }) => drainA));
  const { currentA, edgeA, gateThroughV } = channelCurves(design, variantIndex);
  const drainSourceV = Float64Array.from({ length: PLANE_POINTS }, (_, n) => topV * ((2 * n) / (PLANE_POINTS - 1) - 1));
  const sign = deviceOf(design.variants[variantIndex], 0).channel === 'n' ? 1 : -1;
  const gates = EXITS.map(([across, up]) => Number(gateThroughV(sign * across * topV, sign * up * topA).toFixed(2)));
  return {
    drainSourceV,
    curves: [...new Set(gates)].map((gateV) => ({ gateV, drainA: drainSourceV.map((v) => currentA(gateV, v)) })),
    edgeA: drainSourceV.map(edgeA),
    topA,
  };
}

/** The shadow tone at rest, and the worst over the swing. Yields between readings. */
export function* readSummary(question: ToneQuestion): Generator<void, VariantSummary> {
  const restThd = readTone(question, null).thdFundamental;
  yield;
  const { worst, points } = yield* readSwing(question);
  const gains = points.map(({ gainDb }) => gainDb);
  return { restThd, worstThd: worst.thdFundamental, gainDb: [Math.min(...gains), Math.max(...gains)] };
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
    if (moved !== null) points.push(feedbackPoint(k, readTone(moved, keptV, 'draw'), channel));
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
