import { createHat, renderKick, renderSnare, renderTom } from './drum.ts';
import { addAt, BEAT_SEC, BEATS_PER_BAR, createLoop, filterLoop, highpass, SAMPLE_RATE_HZ } from './loop.ts';
import { createRandom, type Random } from './random.ts';
import { renderRoom } from './room.ts';

/** A drum kit through one microphone in a small room: hard and soft bars, ghost notes, a roll over the toms. Nothing is squeezed. */

type Hit = [beat: number, velocity: number];
/** Beat, velocity, frequency of the head in Hz. */
type TomHit = [beat: number, velocity: number, hz: number];

const KICKS: Hit[][] = [
  [
    [0, 0.95],
    [0.75, 0.4],
    [1.5, 0.72],
    [2.5, 0.85],
  ],
  [
    [0, 0.9],
    [1.75, 0.5],
    [2.25, 0.8],
    [3.5, 0.45],
  ],
  [
    [0, 0.5],
    [2.5, 0.4],
  ],
  [
    [0, 1],
    [0.75, 0.6],
    [1.5, 0.9],
    [2, 0.6],
    [3, 0.7],
  ],
];
const SNARES: Hit[][] = [
  [
    [1, 0.9],
    [1.75, 0.13],
    [2.25, 0.17],
    [3, 0.94],
    [3.75, 0.15],
  ],
  [
    [0.75, 0.14],
    [1, 0.9],
    [1.5, 0.18],
    [2.75, 0.16],
    [3, 0.96],
    [3.25, 0.13],
  ],
  [
    [1, 0.3],
    [2.25, 0.08],
    [3, 0.34],
    [3.75, 0.1],
  ],
  [
    [1, 1],
    [1.75, 0.4],
    [2, 0.55],
    [2.25, 0.7],
  ],
];
const TOMS: TomHit[] = [
  [2.5, 0.75, 176],
  [2.75, 0.85, 176],
  [3, 0.85, 132],
  [3.25, 0.95, 132],
  [3.5, 1, 92],
];
/** Eighths, the offbeats softer, with a sixteenth here and there. */
const HATS: Hit[] = [
  [0, 0.6],
  [0.5, 0.34],
  [1, 0.55],
  [1.5, 0.38],
  [1.75, 0.2],
  [2, 0.58],
  [2.5, 0.36],
  [3, 0.54],
  [3.25, 0.22],
  [3.5, 0.4],
];
const HAT_LEVELS = [1, 1, 0.5, 1];
/** The roll takes both hands: no hi-hat from here on in the last bar. */
const ROLL_BEAT = 2.25;

export function renderDrums(): Float64Array {
  const random = createRandom(67);
  const strike = createHat(random);
  const kick = play(KICKS, random, (velocity) => renderKick(velocity, random));
  const snare = play(SNARES, random, (velocity) => renderSnare(velocity, random));
  const bars = HAT_LEVELS.map((level, bar) =>
    HATS.filter(([beat]) => bar < 3 || beat < ROLL_BEAT).map(([beat, velocity]): Hit => [beat, velocity * level]),
  );
  const hat = play(bars, random, (velocity) => strike(velocity, 0.026 + 0.012 * random.fraction()));
  addAt(hat, openHat(strike), timeOf(1, 3.5, random));
  const toms = createLoop();
  for (const [beat, velocity, hz] of TOMS) addAt(toms, renderTom(velocity, hz, random), timeOf(3, beat, random));
  const close = createLoop().map((_, n) => 0.78 * kick[n] + 0.66 * snare[n] + 0.62 * hat[n] + 0.44 * toms[n]);
  const send = filterLoop(
    close.map((value, n) => 0.4 * value - 0.25 * kick[n]),
    highpass(160, 0.7),
  );
  const [wet] = renderRoom(send, send);
  return close.map((value, n) => value + 0.4 * wet[n]);
}

/** Half open until the foot closes it. */
function openHat(strike: (velocity: number, decaySec: number) => Float64Array): Float64Array {
  return strike(0.55, 0.2).map((value, n) => value * Math.min(1, Math.exp((0.23 - n / SAMPLE_RATE_HZ) / 0.01)));
}

function timeOf(bar: number, beat: number, random: Random): number {
  return (bar * BEATS_PER_BAR + beat) * BEAT_SEC + 0.002 + 0.004 * random.fraction();
}

function play(bars: Hit[][], random: Random, render: (velocity: number) => Float64Array): Float64Array {
  const loop = createLoop();
  bars.forEach((hits, bar) => {
    for (const [beat, velocity] of hits) addAt(loop, render(velocity * (1 + 0.05 * random.bipolar())), timeOf(bar, beat, random));
  });
  return loop;
}
