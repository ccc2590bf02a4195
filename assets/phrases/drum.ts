import { addAt, bandpass, createLoop, filter, filterLoop, highpass, LOOP_SEC, lowpass, SAMPLE_RATE_HZ } from './loop.ts';
import { createMode, turn } from './mode.ts';
import type { Random } from './random.ts';

/** Drums from decaying modes and shaped noise. Frequencies and decay times: common practice, no source. */

const TURN = 2 * Math.PI;

/** Sounds of a given length in s, from a function of the time in s. */
function sound(lengthSec: number, at: (sec: number) => number): Float64Array {
  return Float64Array.from({ length: Math.round(lengthSec * SAMPLE_RATE_HZ) }, (_, n) => at(n / SAMPLE_RATE_HZ));
}

function noise(lengthSec: number, random: Random): Float64Array {
  return sound(lengthSec, () => random.bipolar());
}

function mix(length: number, parts: [Float64Array, number][]): Float64Array {
  return Float64Array.from({ length }, (_, n) => parts.reduce((sum, [part, gain]) => sum + gain * (part[n] ?? 0), 0));
}

/** A bass drum: the head falls in pitch as its swing dies, above it one more mode and the felt beater. */
export function renderKick(velocity: number, random: Random): Float64Array {
  let phase = 0;
  let second = 0;
  const head = sound(0.7, (sec) => {
    const hz = 50 + (34 + 30 * velocity) * Math.exp(-sec / 0.028);
    phase += (TURN * hz) / SAMPLE_RATE_HZ;
    second += (TURN * hz * 1.72) / SAMPLE_RATE_HZ;
    const rise = 1 - Math.exp(-sec / 0.0012);
    return rise * (Math.sin(phase) * Math.exp(-sec / 0.13) + 0.3 * Math.sin(second) * Math.exp(-sec / 0.045));
  });
  const beater = filter(noise(0.03, random), bandpass(2600, 0.7), lowpass(6000, 0.7)).map(
    (value, n) => value * Math.exp(-n / SAMPLE_RATE_HZ / 0.0035),
  );
  const knock = sound(0.06, (sec) => Math.sin(TURN * 330 * sec) * Math.exp(-sec / 0.009));
  const mixed = mix(head.length, [
    [head, 1],
    [beater, 1.1 * velocity],
    [knock, 0.3 * velocity],
  ]);
  return mixed.map((value) => velocity * Math.tanh(1.3 * value));
}

/** Ratios of a circular membrane's modes to its first (zeros of Bessel functions, 2.405 = 1); and how strongly an off-centre blow starts them. */
const HEAD_MODES = [
  [1, 1],
  [1.593, 0.8],
  [2.136, 0.5],
  [2.296, 0.45],
  [2.653, 0.3],
  [2.917, 0.25],
  [3.156, 0.2],
  [3.6, 0.15],
];

/** A snare drum: the head, the blow of the stick, and the wires that the head throws about. */
export function renderSnare(velocity: number, random: Random): Float64Array {
  const lengthSec = 0.55;
  const tuned = HEAD_MODES.map(([ratio, gain]) => ({
    hz: 188 * ratio * (1 + 0.01 * random.bipolar()),
    gain,
    decay: 0.085 / Math.sqrt(ratio),
  }));
  const head = sound(lengthSec, (sec) => {
    const glide = 1 + 0.06 * velocity * Math.exp(-sec / 0.02);
    return tuned.reduce((sum, { hz, gain, decay }) => sum + gain * Math.sin(TURN * hz * glide * sec) * Math.exp(-sec / decay), 0);
  });
  const wires = filter(noise(lengthSec, random), highpass(900, 0.6), bandpass(3000, 0.35), lowpass(8500, 0.6)).map((value, n) => {
    const sec = n / SAMPLE_RATE_HZ;
    const thrown = (1 - Math.exp(-sec / 0.0015)) * (0.75 * Math.exp(-sec / 0.05) + 0.3 * Math.exp(-sec / (0.1 + 0.06 * velocity)));
    return value * thrown * (0.8 + 0.4 * Math.min(1, Math.abs(head[n])));
  });
  const stick = filter(noise(0.02, random), highpass(900, 0.7), lowpass(7500, 0.7)).map(
    (value, n) => value * Math.exp(-n / SAMPLE_RATE_HZ / 0.002),
  );
  return mix(head.length, [
    [head, 0.44 * velocity],
    [wires, 1.3 * velocity],
    [stick, 0.5 * velocity * velocity],
  ]);
}

/** A tom: a head of `hz` that falls a little in pitch after the blow, tuned for a long note, and the stick. */
export function renderTom(velocity: number, hz: number, random: Random): Float64Array {
  const modes = HEAD_MODES.slice(0, 5).map(([ratio, gain]) => ({
    turns: hz * ratio * (1 + 0.006 * random.bipolar()),
    gain: gain / ratio ** (2.2 - velocity),
    decay: 0.26 / (ratio * Math.sqrt(hz / 130)),
  }));
  const head = sound(1.1, (sec) => {
    const glided = sec + 0.12 * velocity * 0.05 * (1 - Math.exp(-sec / 0.05));
    const rise = 1 - Math.exp(-sec / 0.0008);
    return rise * modes.reduce((sum, { turns, gain, decay }) => sum + gain * Math.sin(TURN * turns * glided) * Math.exp(-sec / decay), 0);
  });
  const stick = filter(noise(0.02, random), bandpass(2200, 0.6), lowpass(6500, 0.7)).map(
    (value, n) => value * Math.exp(-n / SAMPLE_RATE_HZ / 0.0025),
  );
  return mix(head.length, [
    [head, velocity],
    [stick, 1.1 * velocity * velocity],
  ]);
}

/** A pair of hi-hat cymbals: many dense modes that a blow of a wooden stick starts; closed they die at once. */
export function createHat(random: Random): (velocity: number, decaySec: number) => Float64Array {
  const partials = Array.from({ length: 90 }, () => {
    const hz = 2400 * 6.4 ** random.fraction() * (1 + 0.02 * random.bipolar());
    const gain = (0.4 + 0.6 * random.fraction()) * (hz / 6000) ** 0.35;
    return { hz, gain, phase: TURN * random.fraction(), length: (0.5 + random.fraction()) / (0.5 + hz / 9000) };
  });
  return (velocity, decaySec) => {
    const modes = partials.map(({ hz, gain, phase, length }) => {
      const mode = createMode(hz, decaySec * length, SAMPLE_RATE_HZ);
      return { ...mode, re: gain * Math.cos(phase), im: gain * Math.sin(phase) };
    });
    const ring = sound(
      Math.min(0.9, decaySec * 6),
      (sec) => modes.reduce((sum, mode) => sum + turn(mode), 0) * (1 - Math.exp(-sec / 0.0006)),
    );
    const tick = filter(noise(0.05, random), highpass(5200, 0.6)).map((value, n) => value * Math.exp(-n / SAMPLE_RATE_HZ / 0.006));
    const together = mix(ring.length, [
      [ring, 0.045],
      [tick, 0.55],
    ]);
    return filter(together, highpass(3200 + 900 * (1 - velocity), 0.7), lowpass(9500 + 5000 * velocity, 0.6)).map(
      (value) => velocity * value,
    );
  };
}

/**
 * A wire brush going round on the head for the whole loop: grainy noise, loudest where the hand is fastest.
 * Returns left and right: the hand crosses the head once a stroke.
 */
export function renderBrushes(strokeSec: number, random: Random): [Float64Array, Float64Array] {
  const grain = createLoop();
  for (let sec = 0; sec < LOOP_SEC; sec += 0.0011 * (0.4 + 1.2 * random.fraction())) {
    const wire = sound(0.004, (t) => random.bipolar() * Math.exp(-t / 0.0007));
    addAt(grain, wire, sec, 0.3 + random.fraction());
  }
  const coloured = filterLoop(grain, highpass(900, 0.7), bandpass(3800, 0.3), lowpass(9000, 0.6));
  const strokes = Math.round(LOOP_SEC / strokeSec);
  const stroke = (n: number) => {
    const turn = (strokes * n) / coloured.length;
    const part = turn - Math.floor(turn);
    const speed = 0.16 + 0.84 * Math.sin(Math.PI * part ** 0.8) ** 2.4;
    return { speed: speed * (Math.floor(turn) % 2 === 0 ? 0.8 : 1), side: 0.35 * Math.sin(TURN * (turn / 2)) };
  };
  const hear = (sign: number) =>
    coloured.map((value, n) => {
      const { speed, side } = stroke(n);
      return value * speed * Math.sqrt((1 + sign * side) / 2);
    });
  return [hear(-1), hear(1)];
}
