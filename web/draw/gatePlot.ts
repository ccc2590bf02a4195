/** Fig. 3: the gate against VGS(off), over one period of the control without audio, over the level of a tone that a follower hears, or over time. */
import type { ControlPicture, FollowerCurve, GatePeriod } from '../state/bench.ts';
import { linePath, type Point } from './line.ts';
import { plotArea, type PlotArea, type Tick } from './plotArea.ts';
import { linearScale, linearTicks, logScale, type Scale, toPixel } from './scale.ts';
import { dbuFromPeak, decimals, peakFromDbu } from './words.ts';

export type Region = 'ohmic' | 'off' | 'conducting';

export interface GatePlot {
  readonly area: PlotArea;
  readonly x: Scale;
  readonly y: Scale;
  readonly xTicks: readonly Tick[];
  readonly yTicks: readonly Tick[];
  readonly gate: string;
  /** Where the period starts, or a tone is silent. */
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

export function regionAt(gateV: number, { gateOffV, gateOnV }: Pick<ControlPicture, 'gateOffV' | 'gateOnV'>): Region {
  const towardsOn = gateOffV < 0 ? gateV : -gateV;
  if (towardsOn < -Math.abs(gateOffV)) return 'off';
  return towardsOn > gateOnV ? 'conducting' : 'ohmic';
}

const MARGINS = { left: 46, right: 10, top: 8, bottom: 34 };

export function isFollower(picture: ControlPicture): picture is FollowerCurve {
  return 'levelV' in picture;
}

/** With `sweepSec` the frame is that of the same gate over so much time: without a curve of its own or regions. */
export function plotGate(picture: ControlPicture, width: number, height: number, sweepSec: number | null = null): GatePlot {
  const { gate, gateOffV } = picture;
  const area = plotArea(width, height, MARGINS);
  const values = [...gate, gateOffV, 0];
  const pad = 0.22 * (Math.max(...values) - Math.min(...values));
  const y = linearScale(
    Math.min(...values) - (gateOffV < 0 ? pad : 0),
    Math.max(...values) + (gateOffV < 0 ? 0 : pad),
    area.bottom,
    area.top,
  );
  const own = acrossScale(picture, area);
  const x = sweepSec === null ? own : linearScale(0, sweepSec, area.left, area.right);
  const across = Array.from(gate, (_, n) =>
    toPixel(own, isFollower(picture) ? picture.levelV[n] : (n / (gate.length - 1)) * picture.seconds),
  );
  const points = Array.from(gate, (v, n) => ({ x: across[n], y: toPixel(y, v) }));
  const past = (v: number) => (gateOffV < 0 ? gateOffV - v : v - gateOffV);
  const deepest = gate.reduce((best, v, n) => (past(v) > past(gate[best]) + 1e-12 ? n : best), 0);
  const offY = toPixel(y, gateOffV);
  return {
    area,
    x,
    y,
    xTicks: sweepSec !== null ? timeTicks(x) : ticksOf(picture, x),
    yTicks: voltTicks(y),
    gate: sweepSec === null ? linePath(points) : '',
    start: !isFollower(picture) && picture.steady ? { x: (area.left + area.right) / 2, y: points[0].y } : points[0],
    labelAbove: gateOffV < 0 !== Math.abs(points[0].y - (gateOffV < 0 ? offY - 11 : offY + 11)) < 14,
    offY,
    offArea: gateOffV < 0 ? { top: offY, height: area.bottom - offY } : { top: area.top, height: offY - area.top },
    regions: sweepSec === null ? regionRuns(picture, across) : [],
    deepest: { ...points[deepest], pastV: past(gate[deepest]) },
  };
}

function acrossScale(picture: ControlPicture, area: PlotArea): Scale {
  if (!isFollower(picture)) return linearScale(0, picture.seconds, area.left, area.right);
  return logScale(Math.min(...picture.levelV), Math.max(...picture.levelV), area.left, area.right);
}

function levelTicks(x: Scale): Tick[] {
  const ticks = linearTicks(dbuFromPeak(x.from), dbuFromPeak(x.to), 5);
  return ticks.map((dbu, n) => ({
    at: toPixel(x, peakFromDbu(dbu)),
    words: n === ticks.length - 1 ? `${decimals(dbu, 0)}\u2009dBu` : decimals(dbu, 0),
  }));
}

function ticksOf(picture: ControlPicture, x: Scale): Tick[] {
  if (isFollower(picture)) return levelTicks(x);
  return picture.steady ? [] : timeTicks(x);
}

function timeTicks(x: Scale): Tick[] {
  const seconds = x.to;
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

function regionRuns(picture: ControlPicture, across: readonly number[]): { region: Region; from: number; to: number }[] {
  const { gate } = picture;
  const steps = gate.length - 1;
  const runs: { region: Region; from: number; to: number }[] = [];
  for (let n = 0; n < steps; n++) {
    const region = regionAt((gate[n] + gate[n + 1]) / 2, picture);
    const to = across[n + 1];
    const last = runs.at(-1);
    if (last?.region === region) runs[runs.length - 1] = { ...last, to };
    else runs.push({ region, from: last?.to ?? across[0], to });
  }
  return runs;
}

/** Share of the period at which the control has this value, moving this way: where the present point stands. */
export function turnOf(period: GatePeriod, controlV: number, falling: boolean): number {
  const steps = period.control.length - 1;
  let best = 0;
  let miss = Number.POSITIVE_INFINITY;
  for (let n = 0; n < steps; n++) {
    const slope = period.control[n + 1] - period.control[n];
    const wrongWay = falling ? slope > 0 : slope < 0;
    const distance = Math.abs(period.control[n] - controlV) + (wrongWay ? 1e6 : 0);
    if (distance < miss) [best, miss] = [n, distance];
  }
  return best / steps;
}

interface Moved {
  readonly controlV: number;
  readonly gateSourceV: number;
}

/**
 * Where the gate is on the way from one report to the next: its share of the period goes evenly, and it keeps to the curve's own shape between what the
 * two reports say.
 */
export function onPeriod(
  period: GatePeriod,
  { before, now, share }: { readonly before: Moved; readonly now: Moved; readonly share: number },
): { turn: number; gateV: number } {
  const falling = now.controlV < before.controlV;
  const [from, to] = [turnOf(period, before.controlV, falling), turnOf(period, now.controlV, falling)];
  const way = to - from - Math.round(to - from);
  const turn = (from + share * way + 1) % 1;
  const off = (1 - share) * (before.gateSourceV - gateAt(period, from)) + share * (now.gateSourceV - gateAt(period, to));
  return { turn, gateV: gateAt(period, turn) + off };
}

function gateAt({ gate }: GatePeriod, turn: number): number {
  const at = turn * (gate.length - 1);
  const n = Math.min(gate.length - 2, Math.floor(at));
  return gate[n] + (at - n) * (gate[n + 1] - gate[n]);
}
