import { LOOP_SAMPLES, SAMPLE_RATE_HZ, wrap } from './loop.ts';
import type { Random } from './random.ts';

/**
 * A plucked steel string as a digital waveguide: two polarisations, each one delay line closed through a loss filter and
 * a chain of all-passes for stiffness.
 *
 * Law     partial n lies near n·f0·√(1 + B·n²); a plucked string's velocity partials fall as sin(nπβ)/n, β the place of the pluck
 * Scheme  delay read by third-order Lagrange interpolation; one-pole loss fitted to two decay times; pluck and pickup
 *         places are combs; the loop carries the time derivative of velocity, so the outputs are integrated (leaky, 40 Hz)
 * Source  D. Jaffe and J. Smith, «Extensions of the Karplus-Strong plucked-string algorithm», Computer Music Journal 7 (2),
 *         1983; material numbers from memory
 */
export interface StringSpec {
  openHz: number;
  /** B of the open string. */
  inharmonicity: number;
  /** Time for 60 dB of decay, at the fundamental of the open string and at 3 kHz. */
  sustainSec: number;
  trebleSustainSec: number;
  /** Place of the pickup on the open string, as a fraction of its length from the bridge. */
  pickupFraction: number;
}

export interface Pluck {
  atSec: number;
  fret: number;
  /** 0…1: loudness, and with it brightness. */
  velocity: number;
  /** Place of the pluck on the open string, as a fraction of its length from the bridge. */
  pluckFraction: number;
  /** Time in which the string leaves the pick or finger at velocity 1. */
  releaseSec: number;
  /** When the string is stopped, after atSec; left ringing without it. */
  holdSec?: number;
}

interface Tuning {
  delay: number;
  loss: number;
  pole: number;
  stiffness: number;
}

const STIFFNESS_STAGES = 4;
const LINE = 2048;
/** Samples in which a finger comes down on the string or leaves it. */
const EDGE = 96;
/** Rounds of the loop that are played; the last is kept, when nothing of the beginning is left. */
const ROUNDS = 3;
/** The string's motion across the top dies away sooner than that along it and is a little lower. */
const POLARISATIONS = [
  { sustain: 0.6, detune: 1, heard: 1 },
  { sustain: 1, detune: 1.0009, heard: 0.55 },
];

/** One round of what the pickup hears and what the bridge is pushed by. Plucks in order of time, within the loop. */
export function renderString(spec: StringSpec, plucks: Pluck[], random: Random): { pickup: Float64Array; bridge: Float64Array } {
  const pickup = new Float64Array(LOOP_SAMPLES);
  const bridge = new Float64Array(LOOP_SAMPLES);
  if (plucks.length === 0) return { pickup, bridge };
  const mute = muting(plucks, spec);
  const pushes = plucks.map((pluck) => ({ ...push(pluck, spec, random), angle: 0.6 + 0.25 * random.bipolar() }));
  POLARISATIONS.forEach(({ sustain, detune, heard }, index) => {
    const frets = new Map(plucks.map(({ fret }) => [fret, tune(spec, fret, sustain, detune)]));
    const weights = pushes.map(({ angle }) => (index === 0 ? Math.cos(angle) : Math.sin(angle)));
    const tunings = plucks.map(({ fret }) => frets.get(fret) as Tuning);
    const force = excitation(plucks, pushes, weights);
    runLine(spec, plucks, tunings, force, mute, (n, atPickup, atBridge) => {
      pickup[n] += heard * atPickup;
      bridge[n] += heard * atBridge;
    });
  });
  return { pickup, bridge };
}

/** Fits the loop of one fret: loss to the two decay times, all-passes to the stiffness, delay to what is left of the period. */
function tune(spec: StringSpec, fret: number, sustainFactor: number, detune: number): Tuning {
  const hz = spec.openHz * 2 ** (fret / 12) * detune;
  const period = SAMPLE_RATE_HZ / hz;
  const shorter = 2 ** (-fret / 24) * sustainFactor;
  const lossAt = (sec: number) => 10 ** (-3 / (hz * sec));
  const low = lossAt(spec.sustainSec * shorter);
  const high = lossAt(spec.trebleSustainSec * shorter);
  const pole = bisect(0, 0.95, (p) => onePole(p, 3000).size / onePole(p, hz).size - high / low);
  const loss = low / onePole(pole, hz).size;
  const stiffness = fitStiffness(hz, spec.inharmonicity * 2 ** (fret / 6));
  const delay = period - onePole(pole, hz).delay - STIFFNESS_STAGES * allPassDelay(stiffness, hz);
  return { delay, loss, pole, stiffness };
}

/** The coefficient for which partial 12 stands as sharp against the fundamental as the stiff string's does. */
function fitStiffness(hz: number, inharmonicity: number): number {
  const n = Math.min(12, Math.floor(8000 / hz));
  const stretch = Math.sqrt((1 + inharmonicity * n * n) / (1 + inharmonicity));
  const wanted = (SAMPLE_RATE_HZ / hz) * (1 - 1 / stretch);
  return bisect(-0.95, 0, (a) => STIFFNESS_STAGES * (allPassDelay(a, hz) - allPassDelay(a, hz * n * stretch)) - wanted);
}

/** The root of a function that falls from low to high; an end of the range when it does not cross zero. */
function bisect(low: number, high: number, f: (x: number) => number): number {
  for (let step = 0; step < 50; step++) {
    const middle = (low + high) / 2;
    if (f(middle) > 0) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

function onePole(pole: number, hz: number): { size: number; delay: number } {
  const w = (2 * Math.PI * hz) / SAMPLE_RATE_HZ;
  const re = 1 - pole * Math.cos(w);
  const im = pole * Math.sin(w);
  return { size: (1 - pole) / Math.sqrt(re * re + im * im), delay: Math.atan2(im, re) / w };
}

function allPassDelay(a: number, hz: number): number {
  const w = (2 * Math.PI * hz) / SAMPLE_RATE_HZ;
  return 1 - (2 * Math.atan2(a * Math.sin(w), 1 + a * Math.cos(w))) / w;
}

/** What a pluck puts into the loop: the release, rounded by pick or finger, some noise of its surface, and the comb of its place. */
function push(pluck: Pluck, spec: StringSpec, random: Random): { shape: Float64Array; start: number } {
  const width = Math.max(4, Math.round((pluck.releaseSec * SAMPLE_RATE_HZ) / (0.35 + 0.65 * pluck.velocity)));
  const period = SAMPLE_RATE_HZ / spec.openHz;
  const comb = Math.round(period * Math.min(pluck.pluckFraction, 0.5 * 2 ** (-pluck.fret / 12)));
  const shape = new Float64Array(width + comb + 1);
  for (let n = 0; n < width; n++) {
    const window = (1 - Math.cos((2 * Math.PI * (n + 0.5)) / width)) / width;
    const value = pluck.velocity * window * (1 + 0.35 * random.bipolar());
    shape[n] += value;
    shape[n + comb] -= value;
  }
  return { shape, start: Math.round(pluck.atSec * SAMPLE_RATE_HZ) };
}

function excitation(plucks: Pluck[], pushes: { shape: Float64Array; start: number }[], weights: number[]): Float64Array {
  const force = new Float64Array(LOOP_SAMPLES * ROUNDS + LINE * 2);
  for (let round = 0; round < ROUNDS; round++) {
    plucks.forEach((_, index) => {
      const { shape, start } = pushes[index];
      for (let n = 0; n < shape.length; n++) force[round * LOOP_SAMPLES + start + n] += weights[index] * shape[n];
    });
  }
  return force;
}

/** Gain of the loop over one round: below 1 while a finger stops the string, changes fret or the pick rests on it before a pluck. */
function muting(plucks: Pluck[], spec: StringSpec): Float64Array {
  const mute = new Float64Array(LOOP_SAMPLES).fill(1);
  const press = (fromSec: number, toSec: number, gain: number) => {
    const from = Math.round(fromSec * SAMPLE_RATE_HZ);
    const to = Math.round(toSec * SAMPLE_RATE_HZ);
    for (let n = from; n < to; n++) {
      const edge = Math.min(1, (n - from) / EDGE, (to - n) / EDGE);
      mute[wrap(n)] = Math.min(mute[wrap(n)], 1 - (1 - gain) * edge);
    }
  };
  plucks.forEach((pluck, index) => {
    const before = plucks[(index + plucks.length - 1) % plucks.length];
    const periodSec = 1 / (spec.openHz * 2 ** (before.fret / 12));
    if (before.fret !== pluck.fret) press(pluck.atSec - Math.max(0.03, 2.2 * periodSec), pluck.atSec, 0.3);
    else press(pluck.atSec - 0.006, pluck.atSec, 0.5);
    if (pluck.holdSec === undefined) return;
    const next = index + 1 < plucks.length ? plucks[index + 1].atSec : plucks[0].atSec + LOOP_SAMPLES / SAMPLE_RATE_HZ;
    press(pluck.atSec + pluck.holdSec, Math.max(next, pluck.atSec + pluck.holdSec), 0.8);
  });
  return mute;
}

function runLine(
  spec: StringSpec,
  plucks: Pluck[],
  tunings: Tuning[],
  force: Float64Array,
  mute: Float64Array,
  emit: (n: number, atPickup: number, atBridge: number) => void,
): void {
  const line = new Float64Array(LINE);
  const comb = Math.round((SAMPLE_RATE_HZ / spec.openHz) * spec.pickupFraction);
  const stages = new Float64Array(STIFFNESS_STAGES);
  const starts = plucks.map((pluck) => Math.round(pluck.atSec * SAMPLE_RATE_HZ));
  const leak = 1 - (2 * Math.PI * 40) / SAMPLE_RATE_HZ;
  const relax = 1 - 1 / (0.07 * SAMPLE_RATE_HZ);
  let tuning = tunings[0];
  let next = 0;
  let loss = 0;
  let bend = 0;
  let atPickup = 0;
  let atBridge = 0;
  for (let n = 0; n < LOOP_SAMPLES * ROUNDS; n++) {
    const inRound = n % LOOP_SAMPLES;
    if (inRound === starts[next]) {
      tuning = tunings[next];
      bend = 0.0035 * plucks[next].velocity ** 2;
      next = (next + 1) % starts.length;
    }
    bend *= relax;
    loss = tuning.loss * (1 - tuning.pole) * readDelay(line, n, tuning.delay * (1 - bend)) + tuning.pole * loss;
    let value = loss;
    for (let stage = 0; stage < STIFFNESS_STAGES; stage++) {
      const inner = value - tuning.stiffness * stages[stage];
      value = tuning.stiffness * inner + stages[stage];
      stages[stage] = inner;
    }
    value = value * mute[inRound] + force[n];
    line[n % LINE] = value;
    atPickup = leak * atPickup + value - line[(n - comb + LINE) % LINE];
    atBridge = leak * atBridge + value;
    if (n >= LOOP_SAMPLES * (ROUNDS - 1)) emit(inRound, atPickup, atBridge);
  }
}

/** The line a fractional number of samples ago, by third-order Lagrange interpolation. */
function readDelay(line: Float64Array, now: number, delay: number): number {
  const whole = Math.floor(delay) - 1;
  const d = delay - whole;
  const at = now - whole + LINE * 2;
  const c0 = (-(d - 1) * (d - 2) * (d - 3)) / 6;
  const c1 = (d * (d - 2) * (d - 3)) / 2;
  const c2 = (-d * (d - 1) * (d - 3)) / 2;
  const c3 = (d * (d - 1) * (d - 2)) / 6;
  return c0 * line[at % LINE] + c1 * line[(at - 1) % LINE] + c2 * line[(at - 2) % LINE] + c3 * line[(at - 3) % LINE];
}
