import { BEAT_SEC, BEATS_PER_BAR, bell, createLoop, filterLoop, highpass, lowpass, midiToHz } from './loop.ts';
import { createRandom, type Random } from './random.ts';
import { type Pluck, renderString, type StringSpec } from './string.ts';

/** A bass guitar with a long scale, played with two fingers, straight from its pickup. */

/** Beat in the bar, string (0 low E), fret, velocity, length in beats. */
export type BassNote = [beat: number, string: number, fret: number, velocity: number, beats: number];

/** Open strings by their MIDI numbers. */
export function bassStrings(notes: number[]): StringSpec[] {
  return notes.map((note) => ({
    openHz: midiToHz(note),
    inharmonicity: 1.6e-4,
    sustainSec: 7,
    trebleSustainSec: 1.1,
    pickupFraction: 0.17,
  }));
}

/** All strings together; `timeOf` says when a beat of a bar is played, s. */
export function playStrings(
  strings: StringSpec[],
  bars: BassNote[][],
  timeOf: (bar: number, beat: number, random: Random) => number,
  random: Random,
): Float64Array {
  const perString: Pluck[][] = strings.map(() => []);
  bars.forEach((notes, bar) => {
    for (const [beat, string, fret, velocity, beats] of notes) {
      perString[string].push({
        atSec: timeOf(bar, beat, random),
        fret,
        velocity: velocity * (1 + 0.06 * random.bipolar()),
        pluckFraction: 0.2 + 0.02 * random.bipolar(),
        releaseSec: 0.0007,
        holdSec: beats * BEAT_SEC,
      });
    }
  });
  const sum = createLoop();
  perString.forEach((plucks, index) => {
    const { pickup } = renderString(strings[index], plucks, random);
    for (let n = 0; n < sum.length; n++) sum[n] += pickup[n];
  });
  return sum;
}

/** E minor. Stopped notes of a fifth of a hard note's velocity lie between; bar 3 climbs softly, bar 4 digs in and rings. */
const BARS: BassNote[][] = [
  [
    [0, 0, 0, 0.9, 0.7],
    [0.75, 0, 0, 0.2, 0.06],
    [1, 1, 7, 0.66, 0.4],
    [1.5, 0, 0, 0.22, 0.06],
    [1.75, 0, 3, 0.5, 0.22],
    [2, 0, 5, 0.72, 0.45],
    [2.75, 1, 2, 0.48, 0.2],
    [3, 1, 5, 0.62, 0.4],
    [3.5, 1, 7, 0.7, 0.42],
  ],
  [
    [0, 0, 0, 0.86, 0.9],
    [1, 2, 2, 0.95, 0.2],
    [1.25, 0, 0, 0.24, 0.06],
    [1.5, 0, 0, 0.5, 0.35],
    [2, 0, 3, 0.7, 0.6],
    [2.75, 2, 5, 0.82, 0.2],
    [3, 1, 0, 0.6, 0.4],
    [3.5, 1, 1, 0.5, 0.2],
    [3.75, 1, 2, 0.45, 0.2],
  ],
  [
    [0, 2, 9, 0.36, 0.9],
    [1, 3, 7, 0.34, 0.45],
    [1.5, 3, 9, 0.38, 0.45],
    [2, 2, 9, 0.3, 0.45],
    [2.5, 3, 4, 0.34, 0.9],
    [3.5, 2, 5, 0.42, 0.22],
    [3.75, 2, 4, 0.5, 0.22],
  ],
  [
    [0, 1, 3, 1, 0.7],
    [0.75, 1, 3, 0.24, 0.06],
    [1, 1, 3, 0.8, 0.7],
    [2, 1, 2, 0.98, 0.4],
    [2.5, 0, 0, 0.9, 1.3],
  ],
];

/** Sixteenths behind the beat by this part of themselves. */
const SWING = 0.08;

export function renderBass(): Float64Array {
  const timeOf = (bar: number, beat: number, random: Random) => {
    const late = Math.round(beat * 4) % 2 === 1 ? (SWING * BEAT_SEC) / 4 : 0;
    return (bar * BEATS_PER_BAR + beat) * BEAT_SEC + late + 0.002 + 0.005 * random.fraction();
  };
  const strings = playStrings(bassStrings([28, 33, 38, 43]), BARS, timeOf, createRandom(53));
  return filterLoop(strings, highpass(36, 0.7), bell(85, 0.8, 1.5), bell(900, 0.7, 5), bell(2400, 0.9, 3), lowpass(4200, 0.7));
}
