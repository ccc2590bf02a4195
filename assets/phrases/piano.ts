import {
  addAt,
  BEAT_SEC,
  BEATS_PER_BAR,
  bell,
  createLoop,
  filter,
  filterLoop,
  highpass,
  lowpass,
  midiToHz,
  SAMPLE_RATE_HZ,
} from './loop.ts';
import { createRandom, type Random } from './random.ts';
import { renderKey } from './tine.ts';

/** An electric piano, straight from its output: no room, no amplifier. */

/** Beat in the bar, keys (MIDI numbers), velocity, length in beats. */
export type Strike = [beat: number, keys: number[], velocity: number, beats: number];

const F_MINOR_9 = [56, 60, 63, 67];
const B_FLAT_13 = [56, 60, 62, 67];
const E_FLAT_MAJOR_9 = [55, 58, 62, 65];
const C_ALTERED = [52, 58, 63, 68];

/** Four bars: second, fifth, first and the altered sixth that leads round again. Loud and soft strikes alternate on purpose. */
const BARS: Strike[][] = [
  [
    [0, [41], 0.62, 1.9],
    [0, F_MINOR_9, 0.6, 1.35],
    [1.5, F_MINOR_9, 0.3, 0.28],
    [2, [48], 0.42, 0.9],
    [2.5, F_MINOR_9, 0.55, 1.3],
    [3, [72], 0.5, 0.45],
    [3.5, [75, 36], 0.55, 0.5],
  ],
  [
    [0, [34], 0.66, 1.4],
    [0, [79], 0.62, 1.4],
    [0.02, B_FLAT_13, 0.52, 1.1],
    [1.5, B_FLAT_13, 0.74, 0.4],
    [2.25, [74], 0.4, 0.22],
    [2.5, [46], 0.5, 1.2],
    [2.5, B_FLAT_13, 0.46, 0.9],
    [3, [72], 0.5, 0.45],
    [3.5, [70, ...E_FLAT_MAJOR_9], 0.86, 2.2],
  ],
  [
    [0, [39], 0.72, 1.9],
    [2, [46], 0.4, 0.9],
    [2, [67, 74], 0.36, 0.5],
    [2.5, [70, 77], 0.44, 0.9],
    [3.5, E_FLAT_MAJOR_9, 0.3, 0.35],
  ],
  [
    [0, [36], 0.7, 2.4],
    [0, C_ALTERED, 0.68, 1.7],
    [2, C_ALTERED, 0.95, 0.3],
    [2.75, [75], 0.5, 0.3],
    [3, [43], 0.38, 0.9],
    [3, [58, 63, 68], 0.42, 0.9],
    [3.5, [72], 0.46, 0.4],
  ],
];

export function renderPiano(): Float64Array {
  return playKeys(BARS, createRandom(23));
}

/** The bars on the instrument: keys, the knock of its action, and the pickups' and preamplifier's response. */
export function playKeys(bars: Strike[][], random: Random): Float64Array {
  const keys = createLoop();
  bars.forEach((strikes, bar) => {
    for (const [beat, notes, velocity, beats] of strikes) {
      for (const note of notes) {
        const atSec = (bar * BEATS_PER_BAR + beat) * BEAT_SEC + 0.004 + 0.009 * random.fraction();
        const touch = Math.min(1, velocity * (1 + 0.1 * random.bipolar()));
        addAt(keys, renderKey({ hz: midiToHz(note + 0.02 * random.bipolar()), velocity: touch, holdSec: beats * BEAT_SEC }, random), atSec);
        addAt(keys, knock(random), atSec - 0.003, 0.035 * touch);
      }
    }
  });
  return filterLoop(keys, highpass(68, 0.7), bell(300, 0.6, -2), bell(2200, 0.7, 3), lowpass(6500, 0.7));
}

/** Wood and felt of one key going down. */
function knock(random: Random): Float64Array {
  const thud = Float64Array.from({ length: Math.round(0.05 * SAMPLE_RATE_HZ) }, (_, n) => {
    const sec = n / SAMPLE_RATE_HZ;
    return random.bipolar() * (1 - Math.exp(-sec / 0.001)) * Math.exp(-sec / 0.008);
  });
  return filter(thud, bell(240, 1.5, 12), lowpass(900, 0.7));
}
