/**
 * Envelope follower: rectifier, attack resistor, timing capacitor with the release resistor across it, then an amplifier with bias and clamp.
 *
 * Law      C·de/dt = max(r − e, 0)/Ra − e/Rr, r the rectified voltage, of several channels the largest;
 *          vC = rest + gain·max(e − threshold, 0), no further than the limit
 * Scheme   what is heard between two samples is a parabola through three, over 1 + p·(vC − vC of the sample before), the law of a divider whose lower
 *          leg the control moves: a loop faster than a sample closes within it, and the rectifier's corner stands where it is. TR-BDF2, L-stable, each
 *          stage solved by Newton; in parts of a step where the envelope's slope changes much within it
 * Error    global O(h²); corners are located to an eighth of a step. In a loop: test/model/chain/loop.test.ts
 * Source   TR-BDF2: Bank et al., IEEE Trans. CAD 4 (1985) 436; Hosea & Shampine, Appl. Num. Math. 20 (1996) 21 (from memory)
 */
import type { Control } from '../design/types.ts';

type Envelope = Extract<Control, { source: 'envelope' }>;

/** Movable values of a follower, by place. */
export const REST_V = 0;
export const LIMIT_V = 1;
export const THRESHOLD_V = 2;
export const GAIN = 3;
/** A step over Ra·C and over Rr·C. */
export const ATTACK = 4;
export const RELEASE = 5;

/** Values for `rateHz` steps a second. */
export function followerValues(control: Envelope, rateHz: number): Float64Array {
  const { restV, limitV, thresholdV, gainVPerV, attackOhm, releaseOhm, timingF } = control;
  return Float64Array.of(restV, limitV, thresholdV, gainVPerV, 1 / (rateHz * attackOhm * timingF), 1 / (rateHz * releaseOhm * timingF));
}

/** Memory of a follower, by place, V: envelope and control of the last sample; the control with which the present one was solved; what that gives. */
export const ENVELOPE = 0;
export const CONTROL_V = 1;
export const GIVEN_V = 2;
export const NEXT_ENVELOPE = 3;
export const NEXT_CONTROL_V = 4;
/** Of a stage: what it starts from, its place in the step, its weights of attack and release, and the envelope that solves it. */
const BASE = 5;
const PLACE = 6;
const WEIGHT_ATTACK = 7;
const WEIGHT_RELEASE = 8;
const SOLVED = 9;
/** The envelope's slope where a step begins and ends, V in that step. */
const FIRST_SLOPE = 10;
const LAST_SLOPE = 11;
/** From here on, for each channel: its voltage now, in the last sample and, had the control been the last one's, in the sample before that, V; p, 1/V. */
export const CHANNELS = 12;
export const CHANNEL_WIDTH = 6;
export const HEARD = 0;
export const BEFORE = 1;
export const EARLIER = 2;
export const PER_V = 3;
/** Its voltage now, had the control stayed, and the parabola's bend. */
const STAYED = 4;
const BEND = 5;
export const FOLLOWER_SLOTS = CHANNELS + 2 * CHANNEL_WIDTH;

/** TR-BDF2: where the first stage ends, both stages' weight, and what the second starts with of the first's way. */
const FIRST = 2 - Math.SQRT2;
const WEIGHT = FIRST / 2;
const CARRY = 1 / (FIRST * (2 - FIRST));
/** A step in which the slope changes by more than this part of both its ends' is taken in as many parts. */
const MUCH = 0.125;
const PARTS = 8;
/** The control is taken to leave no more of what is heard than it does at this load. */
const LEAST_LOAD = 0.1;
const MOST_STEPS = 8;
const ENOUGH_V = 1e-11;

/** Envelope and control voltage that HEARD of `channels` channels gives. A step is only taken by `keepStep`. */
export function follow(values: Float64Array, slots: Float64Array, fullWave: boolean, channels: number): void {
  const envelope = slots[ENVELOPE];
  const fallen = envelope / (1 + values[RELEASE]);
  let before = 0;
  let now = 0;
  for (let channel = 0; channel < channels; channel++) {
    const at = CHANNELS + CHANNEL_WIDTH * channel;
    const v0 = slots[at + BEFORE];
    const v1 = slots[at + HEARD];
    slots[at + STAYED] = v1 * Math.max(1 + slots[at + PER_V] * (slots[GIVEN_V] - slots[CONTROL_V]), LEAST_LOAD);
    slots[at + BEND] = slots[at + STAYED] - 2 * v0 + slots[at + EARLIER];
    before = Math.max(before, fullWave ? Math.abs(v0) : v0);
    now = Math.max(now, fullWave ? Math.abs(v1) : v1);
  }
  const heard = before > fallen || now > fallen ? channels : 0;
  slots[FIRST_SLOPE] = values[ATTACK] * Math.max(before - envelope, 0) - values[RELEASE] * envelope;
  advance(values, slots, fullWave, heard, 1);
  if (heard > 0 && turns(values, slots)) advance(values, slots, fullWave, heard, PARTS);
  const rest = values[REST_V];
  const limit = values[LIMIT_V];
  const moved = rest + values[GAIN] * Math.max(slots[NEXT_ENVELOPE] - values[THRESHOLD_V], 0);
  slots[NEXT_CONTROL_V] = limit > rest ? Math.min(moved, limit) : Math.max(moved, limit);
}

/** Whether within the step the envelope's slope changes much, or the control sets in or reaches its limit. */
function turns(values: Float64Array, slots: Float64Array): boolean {
  const first = slots[FIRST_SLOPE];
  const last = slots[LAST_SLOPE];
  if (Math.abs(last - first) > MUCH * (Math.abs(first) + Math.abs(last))) return true;
  const over = slots[ENVELOPE] - values[THRESHOLD_V];
  const nextOver = slots[NEXT_ENVELOPE] - values[THRESHOLD_V];
  const most = (values[LIMIT_V] - values[REST_V]) / values[GAIN];
  return over > 0 !== nextOver > 0 || over > most !== nextOver > most;
}

/** The step in `parts`; with no channels the rectifier is blocked all along. */
function advance(values: Float64Array, slots: Float64Array, fullWave: boolean, channels: number, parts: number): void {
  slots[WEIGHT_ATTACK] = (WEIGHT * values[ATTACK]) / parts;
  slots[WEIGHT_RELEASE] = (WEIGHT * values[RELEASE]) / parts;
  const weight = WEIGHT / parts;
  let e = slots[ENVELOPE];
  let gained = weight * slots[FIRST_SLOPE];
  for (let part = 0; part < parts; part++) {
    slots[BASE] = e + gained;
    slots[PLACE] = (part + FIRST) / parts;
    solveStage(values, slots, fullWave, channels);
    slots[BASE] = e + CARRY * (slots[SOLVED] - e);
    slots[PLACE] = (part + 1) / parts;
    solveStage(values, slots, fullWave, channels);
    e = slots[SOLVED];
    gained = e - slots[BASE];
  }
  slots[NEXT_ENVELOPE] = e;
  slots[LAST_SLOPE] = gained / weight;
}

/** The envelope that solves a stage, e = base + attack·max(r(e) − e, 0) − release·e, by Newton from where the rectifier is blocked. */
function solveStage(values: Float64Array, slots: Float64Array, fullWave: boolean, channels: number): void {
  const base = slots[BASE];
  const attack = slots[WEIGHT_ATTACK];
  const falls = 1 + slots[WEIGHT_RELEASE];
  const place = slots[PLACE];
  const gain = values[GAIN];
  const most = values[LIMIT_V] - values[REST_V];
  let e = base / falls;
  for (let step = 0; channels > 0 && step < MOST_STEPS; step++) {
    const moved = gain * Math.max(e - values[THRESHOLD_V], 0);
    const stops = most > 0 ? moved >= most : moved <= most;
    const change = values[REST_V] + (stops ? most : moved) - slots[CONTROL_V];
    const perE = moved === 0 || stops ? 0 : gain;
    let heard = 0;
    let heardPerE = 0;
    for (let channel = 0; channel < channels; channel++) {
      const at = CHANNELS + CHANNEL_WIDTH * channel;
      const v0 = slots[at + BEFORE];
      const stayed = v0 + place * (slots[at + STAYED] - v0 - 0.5 * (1 - place) * slots[at + BEND]);
      const load = 1 + slots[at + PER_V] * change;
      const v = (fullWave ? Math.abs(stayed) : stayed) / Math.max(load, LEAST_LOAD);
      if (v <= heard) continue;
      heard = v;
      heardPerE = load > LEAST_LOAD ? (-v * slots[at + PER_V] * perE) / load : 0;
    }
    const charges = heard > e;
    const miss = falls * e - base - (charges ? attack * (heard - e) : 0);
    const way = miss / (charges ? Math.max(falls + attack * (1 - heardPerE), LEAST_LOAD) : falls);
    e -= way;
    if (Math.abs(way) < ENOUGH_V) break;
  }
  slots[SOLVED] = e;
}

/** Takes the step that `follow` has worked out. */
export function keepStep(slots: Float64Array): void {
  const change = slots[NEXT_CONTROL_V] - slots[CONTROL_V];
  slots[ENVELOPE] = slots[NEXT_ENVELOPE];
  slots[CONTROL_V] = slots[NEXT_CONTROL_V];
  for (let at = CHANNELS; at < FOLLOWER_SLOTS; at += CHANNEL_WIDTH) {
    slots[at + EARLIER] = slots[at + BEFORE] / Math.max(1 + slots[at + PER_V] * change, LEAST_LOAD);
    slots[at + BEFORE] = slots[at + HEARD];
  }
}

/** Time constants of attack and release, s. */
export function followerTimesSec({ attackOhm, releaseOhm, timingF }: Envelope): { attackSec: number; releaseSec: number } {
  return { attackSec: attackOhm * timingF, releaseSec: releaseOhm * timingF };
}
