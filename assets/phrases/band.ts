import { type BassNote, bassStrings, playStrings } from './bass.ts';
import { createHat, renderBrushes, renderKick, renderSnare } from './drum.ts';
import { addAt, BEAT_SEC, BEATS_PER_BAR, bell, createLoop, filterLoop, highpass, lowpass, SAMPLE_RATE_HZ } from './loop.ts';
import { playKeys, type Strike } from './piano.ts';
import { createRandom, type Random } from './random.ts';
import { renderRoom } from './room.ts';

/** A small band in one room, in D dorian: bass, drums with sticks and a brush, electric piano. Not squeezed: the drums stand well above the rest. */

/** Beat in the bar and velocity. Offbeat sixteenths are late by this part of a sixteenth. */
type Hit = [beat: number, velocity: number];
const SWING = 0.14;

const KICKS: Hit[][] = [
  [
    [0, 0.9],
    [1.75, 0.5],
    [2.5, 0.8],
  ],
  [
    [0, 0.85],
    [0.75, 0.45],
    [2.5, 0.82],
  ],
  [
    [0, 0.92],
    [1.75, 0.5],
    [2.5, 0.78],
    [3.75, 0.5],
  ],
  [
    [0, 0.85],
    [2, 0.7],
    [2.5, 0.85],
  ],
];
const SNARES: Hit[][] = [
  [
    [1, 0.85],
    [2.25, 0.14],
    [3, 0.9],
  ],
  [
    [1, 0.86],
    [1.75, 0.16],
    [3, 0.88],
    [3.75, 0.2],
  ],
  [
    [1, 0.85],
    [2.25, 0.14],
    [3, 0.92],
  ],
  [
    [1, 0.86],
    [1.75, 0.2],
    [3, 0.95],
    [3.25, 0.25],
    [3.5, 0.5],
    [3.75, 0.62],
  ],
];
/** Closed strokes on every eighth, loud and soft in turn, a few sixteenths between. */
const HATS: Hit[] = [
  [0, 0.62],
  [0.5, 0.36],
  [1, 0.58],
  [1.25, 0.2],
  [1.5, 0.4],
  [2, 0.6],
  [2.5, 0.36],
  [2.75, 0.22],
  [3, 0.56],
  [3.5, 0.42],
];

const BASS: BassNote[][] = [
  [
    [0, 1, 5, 0.85, 0.9],
    [1.5, 1, 5, 0.45, 0.3],
    [1.75, 1, 3, 0.5, 0.35],
    [2.5, 1, 5, 0.72, 0.6],
    [3.5, 1, 0, 0.62, 0.4],
  ],
  [
    [0, 0, 3, 0.85, 1.1],
    [1.5, 0, 3, 0.45, 0.25],
    [2, 1, 2, 0.55, 0.4],
    [2.5, 1, 5, 0.72, 0.7],
    [3.5, 0, 3, 0.5, 0.4],
  ],
  [
    [0, 1, 5, 0.88, 0.9],
    [1.5, 1, 5, 0.45, 0.3],
    [1.75, 1, 7, 0.5, 0.35],
    [2.5, 1, 8, 0.72, 0.6],
    [3.5, 1, 7, 0.6, 0.4],
  ],
  [
    [0, 0, 6, 0.85, 1.6],
    [2, 0, 6, 0.6, 0.4],
    [2.5, 0, 5, 0.8, 0.9],
    [3.5, 1, 4, 0.62, 0.45],
  ],
];
const D_MINOR_9 = [53, 57, 60, 64];
const G_13 = [53, 57, 59, 64];
const B_FLAT_MAJOR_9 = [57, 60, 62, 65];
const A_SEVENTH = [55, 61, 64, 70];
const CHORDS: Strike[][] = [
  [
    [0, D_MINOR_9, 0.5, 0.8],
    [1.5, D_MINOR_9, 0.38, 0.3],
    [2.75, [...D_MINOR_9, 72], 0.5, 0.9],
  ],
  [
    [0.5, G_13, 0.42, 0.5],
    [1.5, [...G_13, 71], 0.5, 1.1],
    [3.25, [74], 0.4, 0.3],
    [3.5, [76], 0.48, 0.5],
  ],
  [
    [0, [...D_MINOR_9, 77], 0.52, 0.9],
    [1.5, D_MINOR_9, 0.36, 0.3],
    [2.75, [...D_MINOR_9, 74], 0.5, 0.9],
  ],
  [
    [0, [...B_FLAT_MAJOR_9, 72], 0.5, 1.6],
    [2, B_FLAT_MAJOR_9, 0.36, 0.3],
    [2.5, [...A_SEVENTH, 73], 0.6, 1.2],
  ],
];

/** One instrument of the mix: side −1 left … 1 right at equal power; send is the part that also reaches the room. */
interface Stem {
  source: Float64Array;
  gain: number;
  side: number;
  send: number;
}

function renderStems(): Stem[] {
  const random = createRandom(37);
  const kick = playHits(KICKS, random, (velocity) => renderKick(velocity, random));
  const snare = playHits(SNARES, random, (velocity) => renderSnare(velocity, random));
  const hat = playHat(random);
  const [brushLeft, brushRight] = renderBrushes(BEAT_SEC * 2, random);
  const bass = playBass(random);
  const keys = filterLoop(playKeys(CHORDS, random), highpass(140, 0.7), bell(300, 0.7, -3), bell(1500, 0.5, 6));
  return [
    { source: kick, gain: 0.78, side: 0, send: 0.1 },
    { source: snare, gain: 0.62, side: -0.12, send: 0.5 },
    { source: hat, gain: 0.75, side: 0.4, send: 0.25 },
    { source: brushLeft, gain: 0.2, side: -1, send: 0.3 },
    { source: brushRight, gain: 0.2, side: 1, send: 0.3 },
    { source: bass, gain: 0.4, side: 0, send: 0.02 },
    { source: keys, gain: 0.85, side: -0.35, send: 0.4 },
  ];
}

/** Left and right. */
export function renderBand(): [Float64Array, Float64Array] {
  const [left, right, sendLeft, sendRight] = Array.from({ length: 4 }, createLoop);
  for (const { source, gain, side, send } of renderStems()) {
    const toLeft = gain * Math.sqrt((1 - side) / 2);
    const toRight = gain * Math.sqrt((1 + side) / 2);
    for (let n = 0; n < source.length; n++) {
      left[n] += toLeft * source[n];
      right[n] += toRight * source[n];
      sendLeft[n] += send * toLeft * source[n];
      sendRight[n] += send * toRight * source[n];
    }
  }
  const [wetLeft, wetRight] = renderRoom(filterLoop(sendLeft, highpass(160, 0.7)), filterLoop(sendRight, highpass(160, 0.7)));
  return [left.map((value, n) => value + 0.35 * wetLeft[n]), right.map((value, n) => value + 0.35 * wetRight[n])];
}

function timeOf(bar: number, beat: number, random: Random): number {
  const late = Math.round(beat * 4) % 2 === 1 ? (SWING * BEAT_SEC) / 4 : 0;
  return (bar * BEATS_PER_BAR + beat) * BEAT_SEC + late + 0.002 + 0.004 * random.fraction();
}

function playHits(bars: Hit[][], random: Random, render: (velocity: number) => Float64Array): Float64Array {
  const loop = createLoop();
  bars.forEach((hits, bar) => {
    for (const [beat, velocity] of hits) addAt(loop, render(velocity * (1 + 0.06 * random.bipolar())), timeOf(bar, beat, random));
  });
  return loop;
}

/** The hi-hat; the last stroke of the last bar is left half open until the foot closes it. */
function playHat(random: Random): Float64Array {
  const strike = createHat(random);
  const bars = [HATS, HATS, HATS, HATS.slice(0, -1)];
  const loop = playHits(bars, random, (velocity) => strike(velocity, 0.03 + 0.012 * random.fraction()));
  const open = strike(0.5, 0.2).map((value, n) => value * Math.min(1, Math.exp((0.23 - n / SAMPLE_RATE_HZ) / 0.01)));
  addAt(loop, open, timeOf(3, 3.5, random));
  return loop;
}

function playBass(random: Random): Float64Array {
  const sum = playStrings(bassStrings([28, 33]), BASS, timeOf, random);
  return filterLoop(sum, highpass(38, 0.7), bell(90, 0.8, 2), bell(800, 0.8, 3), lowpass(3200, 0.7));
}
