/**
 * Fig. 3: the gate over one period of the control, the drain at rest.
 *
 * Law      gate = (1 − k)·vC + k·lowpass(vC, τ), τ = (R2 + R3)·C1, for resistors with a blocking capacitor; without one the gate is the
 *          rest fraction of vC at every rate
 * Valid    while the gate draws no current
 */
import type { Cell, Control } from '../../model/design/types.ts';
import { feedbackFraction, restGateFraction } from '../../model/design/feedback.ts';
import { linePath, type Point } from './line.ts';
import { plotArea, type PlotArea, type Tick } from './plotArea.ts';
import { linearScale, linearTicks, type Scale, toPixel } from './scale.ts';
import { decimals } from './words.ts';

export const PERIOD_STEPS = 240;

/** Forward gate voltage from which this figure calls the gate conducting, V: 0.7 V at 1 mA (data sheets), about 0.5 V at microamperes. */
const GATE_ON_V = 0.5;

export interface GatePeriod {
  /** One period, s; of a control that does not move, 1 s to draw it over. */
  readonly seconds: number;
  /** PERIOD_STEPS + 1 values, V, the last equal to the first. */
  readonly control: Float64Array;
  readonly gate: Float64Array;
  readonly steady: boolean;
}

export type Region = 'ohmic' | 'off' | 'conducting';

export interface GatePlot {
  readonly area: PlotArea;
  readonly x: Scale;
  readonly y: Scale;
  readonly xTicks: readonly Tick[];
  readonly yTicks: readonly Tick[];
  readonly gate: string;
  /** Where the period starts. */
  readonly start: Point;
  readonly offY: number;
  /** Its label stands above the line of VGS(off), else below: on the side of the off region only when the gate is in the way. */
  readonly labelAbove: boolean;
  /** The half of the frame where the channel is off. */
  readonly offArea: { readonly top: number; readonly height: number };
  readonly regions: readonly { readonly region: Region; readonly from: number; readonly to: number }[];
  /** The end of the swing deepest in cut-off (or nearest to it): its place and how far past VGS(off), V, negative when short of it. */
  readonly deepest: Point & { readonly pastV: number };
}

/** Null for controls whose period is not known before the sound: an envelope, an external signal. */
export function gatePeriod(control: Control, cell: Cell): GatePeriod | null {
  if (control.source === 'fixed') {
    const values = new Float64Array(PERIOD_STEPS + 1).fill(control.controlV);
    return { seconds: 1, control: values, gate: values.map((v) => v * restGateFraction(cell)), steady: true };
  }
  if (control.source !== 'lfo') return null;
  const seconds = 1 / control.rateHz;
  const values = Float64Array.from({ length: PERIOD_STEPS + 1 }, (_, n) => {
    const half = (control.toV - control.fromV) / 2;
    return control.fromV + half + half * waveAt(control.shape, n / PERIOD_STEPS, control.edgeSec * control.rateHz);
  });
  return { seconds, control: values, gate: gateFrom(values, seconds, cell), steady: false };
}

/** −1 to 1 over a period that starts midway upwards; `edge` is the share of the period that an edge of the square takes, or a ramp's flyback. */
function waveAt(shape: Extract<Control, { source: 'lfo' }>['shape'], turn: number, edge: number): number {
  const phase = turn - Math.floor(turn);
  if (shape === 'sine') return Math.sin(2 * Math.PI * phase);
  const triangle = phase < 0.25 ? 4 * phase : phase < 0.75 ? 2 - 4 * phase : 4 * phase - 4;
  if (shape === 'triangle') return triangle;
  const share = Math.max(edge, 1e-3);
  if (shape === 'square') return Math.max(-1, Math.min(1, (triangle * 0.5) / share));
  const turned = phase < 0.5 ? phase : phase - 1;
  const ramp =
    (0.5 - Math.abs(turned)) / share < 0.5 ? (Math.sign(turned) * (1 - 2 * Math.abs(turned))) / share : (2 * turned) / (1 - share);
  return shape === 'rising' ? ramp : -ramp;
}

function gateFrom(control: Float64Array, seconds: number, cell: Cell): Float64Array {
  const { feedback } = cell;
  if (feedback.kind !== 'resistor' || feedback.blockingF === null) return control.map((v) => v * restGateFraction(cell));
  const k = feedbackFraction(cell);
  const keep = Math.exp(-seconds / PERIOD_STEPS / ((feedback.drainOhm + cell.controlOhm) * feedback.blockingF));
  const low = new Float64Array(control.length);
  for (let n = 1; n < control.length; n++) low[n] = keep * low[n - 1] + (1 - keep) * 0.5 * (control[n - 1] + control[n]);
  const start = low[PERIOD_STEPS] / (1 - keep ** PERIOD_STEPS);
  return control.map((v, n) => (1 - k) * v + k * (low[n] + start * keep ** n));
}

export function regionAt(gateV: number, gateOffV: number): Region {
  const towardsOn = gateOffV < 0 ? gateV : -gateV;
  if (towardsOn < -Math.abs(gateOffV)) return 'off';
  return towardsOn > GATE_ON_V ? 'conducting' : 'ohmic';
}

const MARGINS = { left: 46, right: 10, top: 8, bottom: 34 };

export function plotGate(period: GatePeriod, gateOffV: number, width: number, height: number): GatePlot {
  const area = plotArea(width, height, MARGINS);
  const values = [...period.gate, gateOffV, 0];
  const pad = 0.22 * (Math.max(...values) - Math.min(...values));
  const y = linearScale(
    Math.min(...values) - (gateOffV < 0 ? pad : 0),
    Math.max(...values) + (gateOffV < 0 ? 0 : pad),
    area.bottom,
    area.top,
  );
  const x = linearScale(0, period.seconds, area.left, area.right);
  const points = Array.from(period.gate, (v, n) => ({ x: toPixel(x, (n / PERIOD_STEPS) * period.seconds), y: toPixel(y, v) }));
  const past = (v: number) => (gateOffV < 0 ? gateOffV - v : v - gateOffV);
  const deepest = period.gate.reduce((best, v, n) => (past(v) > past(period.gate[best]) + 1e-12 ? n : best), 0);
  const offY = toPixel(y, gateOffV);
  return {
    area,
    x,
    y,
    xTicks: timeTicks(x, period),
    yTicks: voltTicks(y),
    gate: linePath(points),
    start: period.steady ? { x: (area.left + area.right) / 2, y: points[0].y } : points[0],
    labelAbove: gateOffV < 0 !== Math.abs(points[0].y - (gateOffV < 0 ? offY - 11 : offY + 11)) < 14,
    offY,
    offArea: gateOffV < 0 ? { top: offY, height: area.bottom - offY } : { top: area.top, height: offY - area.top },
    regions: regionRuns(period.gate, gateOffV, x, period.seconds),
    deepest: { ...points[deepest], pastV: past(period.gate[deepest]) },
  };
}

function timeTicks(x: Scale, { seconds, steady }: GatePeriod): Tick[] {
  if (steady) return [];
  const milli = seconds < 1;
  const ticks = linearTicks(0, milli ? seconds * 1000 : seconds, 4);
  return ticks.map((t, n) => ({
    at: toPixel(x, milli ? t / 1000 : t),
    words: n === ticks.length - 1 ? `${t}\u2009${milli ? 'ms' : 's'}` : String(t),
  }));
}

function voltTicks(y: Scale): Tick[] {
  const ticks = linearTicks(y.from, y.to, 5);
  const digits = ticks.some((v) => Math.abs(v - Number(v.toFixed(1))) > 1e-9) ? 2 : 1;
  return ticks.map((v, n) => ({
    at: toPixel(y, v),
    words: n === ticks.length - 1 ? `${decimals(v, v === 0 ? 0 : digits)}\u2009V` : decimals(v, digits),
  }));
}

function regionRuns(gate: Float64Array, gateOffV: number, x: Scale, seconds: number): { region: Region; from: number; to: number }[] {
  const runs: { region: Region; from: number; to: number }[] = [];
  for (let n = 0; n < PERIOD_STEPS; n++) {
    const region = regionAt((gate[n] + gate[n + 1]) / 2, gateOffV);
    const to = toPixel(x, ((n + 1) / PERIOD_STEPS) * seconds);
    const last = runs.at(-1);
    if (last?.region === region) runs[runs.length - 1] = { ...last, to };
    else runs.push({ region, from: last?.to ?? x.start, to });
  }
  return runs;
}

/** Share of the period at which the control has this value, moving this way: where the present point stands. */
export function turnOf(period: GatePeriod, controlV: number, falling: boolean): number {
  let best = 0;
  let miss = Number.POSITIVE_INFINITY;
  for (let n = 0; n < PERIOD_STEPS; n++) {
    const slope = period.control[n + 1] - period.control[n];
    const wrongWay = falling ? slope > 0 : slope < 0;
    const distance = Math.abs(period.control[n] - controlV) + (wrongWay ? 1e6 : 0);
    if (distance < miss) [best, miss] = [n, distance];
  }
  return best / PERIOD_STEPS;
}
