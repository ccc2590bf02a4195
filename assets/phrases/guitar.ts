import {
  addAt,
  BEAT_SEC,
  BEATS_PER_BAR,
  bandpass,
  bell,
  createLoop,
  filter,
  filterLoop,
  lowpass,
  midiToHz,
  SAMPLE_RATE_HZ,
} from './loop.ts';
import { createRandom, type Random } from './random.ts';
import { type Pluck, renderString, type StringSpec } from './string.ts';

/** Six strings from low E, as an f-hole guitar with one pickup at the neck hears them: straight from the instrument, no room, no amplifier. */

const OPEN_NOTES = [40, 45, 50, 55, 59, 64];
/** Stiffness and decay per string, low to high: wound strings are duller and last longer. From memory, rounded. */
const STIFFNESS = [1.1e-4, 7e-5, 4.5e-5, 4e-5, 3e-5, 2e-5];
const SUSTAIN_SEC = [11, 10.5, 10, 8, 7.5, 7];
const TREBLE_SEC = [1.8, 2, 2.2, 2.4, 2.6, 2.6];
/** How far each string is out of tune, in cents. */
const OFF_CENTS = [-1.5, 1.2, -0.6, 1.8, -1, 0.8];

/** Frets from the low string up; null is not played. A with added ninth, E over G sharp, F sharp minor eleventh, D major ninth. */
const CHORDS: (number | null)[][] = [
  [null, 0, 7, 6, 0, 0],
  [4, 2, 2, 4, 0, 0],
  [2, null, 2, 2, 0, 0],
  [null, 5, 4, 6, 0, 0],
];

type Stroke = { beat: number; loud: number } & (
  | { way: 'down' | 'up'; spreadSec: number; strings: [number, number] }
  | { string: number; fret?: number }
);

const down = (beat: number, loud: number, spreadSec = 0.05, from = 0): Stroke => ({
  beat,
  loud,
  way: 'down',
  spreadSec,
  strings: [from, 5],
});
const up = (beat: number, loud: number, spreadSec = 0.03, from = 2): Stroke => ({ beat, loud, way: 'up', spreadSec, strings: [from, 5] });
const pick = (beat: number, string: number, loud: number, fret?: number): Stroke => ({
  beat,
  loud,
  string,
  ...(fret === undefined ? {} : { fret }),
});

/** Four bars, a chord each; string 0 is low E. The tune lies on the two upper strings. */
const BARS: Stroke[][] = [
  [
    down(0, 0.82, 0.075),
    pick(1, 4, 0.5, 2),
    pick(1.5, 5, 0.55),
    up(2, 0.42),
    pick(2.5, 1, 0.5),
    pick(3, 4, 0.55, 3),
    pick(3.5, 4, 0.45, 2),
  ],
  [down(0, 0.7, 0.06), pick(1, 4, 0.42), pick(1.5, 3, 0.45), down(2, 0.5, 0.04, 2), up(2.5, 0.38), pick(3, 5, 0.6), pick(3.5, 4, 0.42)],
  [
    down(0, 0.92, 0.062),
    up(0.75, 0.5),
    down(1.5, 0.75, 0.03, 2),
    up(2, 0.46),
    pick(2.5, 0, 0.55),
    pick(3, 4, 0.62, 2),
    pick(3.5, 5, 0.6, 2),
  ],
  [down(0, 0.6, 0.11), pick(1, 5, 0.5), pick(1.5, 4, 0.42, 2), pick(2, 3, 0.4), pick(2.5, 2, 0.38), pick(3, 4, 0.34), pick(3.5, 5, 0.3)],
];

export function renderGuitar(): Float64Array {
  const random = createRandom(11);
  const perString = playStrings(random);
  const direct = createLoop();
  const bridge = createLoop();
  perString.forEach((plucks, index) => {
    const sound = renderString(specOf(index), plucks, random);
    for (let n = 0; n < direct.length; n++) {
      direct[n] += sound.pickup[n];
      bridge[n] += sound.bridge[n];
    }
  });
  addSqueaks(direct, perString, random);
  const electric = filterLoop(direct, bell(2900, 1.1, 4), lowpass(4600, 0.8), lowpass(9000, 0.6));
  const body = bodyOf(bridge);
  return electric.map((value, n) => value + body[n]);
}

function specOf(index: number): StringSpec {
  return {
    openHz: midiToHz(OPEN_NOTES[index] + OFF_CENTS[index] / 100),
    inharmonicity: STIFFNESS[index],
    sustainSec: SUSTAIN_SEC[index],
    trebleSustainSec: TREBLE_SEC[index],
    pickupFraction: 0.235,
  };
}

/** What each string is told to do: strokes spread over their strings, with the small unevenness of a hand. */
function playStrings(random: Random): Pluck[][] {
  const perString: Pluck[][] = OPEN_NOTES.map(() => []);
  BARS.forEach((strokes, bar) => {
    const chord = CHORDS[bar];
    for (const stroke of strokes) {
      const atSec = (bar * BEATS_PER_BAR + stroke.beat) * BEAT_SEC + 0.004 + 0.004 * random.fraction();
      const pluckFraction = 0.17 + 0.035 * random.bipolar();
      for (const { string, fret, lateSec, share } of notesOf(stroke, chord)) {
        const velocity = Math.min(1, stroke.loud * share * (1 + 0.09 * random.bipolar()));
        const late = lateSec * (1 + 0.15 * random.bipolar());
        perString[string].push({ atSec: atSec + late, fret, velocity, pluckFraction, releaseSec: 0.00022 });
      }
    }
  });
  return perString;
}

function notesOf(stroke: Stroke, chord: (number | null)[]): { string: number; fret: number; lateSec: number; share: number }[] {
  if ('string' in stroke) return [{ string: stroke.string, fret: stroke.fret ?? chord[stroke.string] ?? 0, lateSec: 0, share: 1 }];
  const struck = chord
    .map((_, string) => string)
    .filter((string) => chord[string] !== null && string >= stroke.strings[0] && string <= stroke.strings[1]);
  if (stroke.way === 'up') struck.reverse();
  return struck.map((string, order) => ({
    string,
    fret: chord[string] ?? 0,
    lateSec: (stroke.spreadSec * order) / struck.length,
    share: 0.92 - (0.22 * order) / struck.length,
  }));
}

/** The wood and the air in it, pushed by the bridge: a few broad resonances. Frequencies: common practice, no source. */
function bodyOf(bridge: Float64Array): Float64Array {
  const modes: [number, number, number][] = [
    [112, 9, 0.05],
    [208, 12, 0.06],
    [288, 14, 0.03],
    [415, 14, 0.035],
    [640, 12, 0.03],
    [1150, 5, 0.025],
  ];
  const parts = modes.map(([hz, q, gain]) => filterLoop(bridge, bandpass(hz, q)).map((value) => value * gain));
  return bridge.map((_, n) => parts.reduce((sum, part) => sum + part[n], 0));
}

/** Fingers sliding along the wound strings to the next chord. */
function addSqueaks(loop: Float64Array, perString: Pluck[][], random: Random): void {
  perString.slice(0, 4).forEach((plucks) => {
    plucks.forEach((pluck, index) => {
      const from = plucks[(index + plucks.length - 1) % plucks.length].fret;
      const way = pluck.fret - from;
      if (Math.abs(way) < 2 || pluck.fret === 0 || from === 0) return;
      const lengthSec = 0.05 + 0.012 * Math.abs(way);
      addAt(loop, squeak(lengthSec, way > 0, random), pluck.atSec - lengthSec - 0.012, 0.012);
    });
  });
}

function squeak(lengthSec: number, rising: boolean, random: Random): Float64Array {
  const length = Math.round(lengthSec * SAMPLE_RATE_HZ);
  let phase = 0;
  const whistle = Float64Array.from({ length }, (_, n) => {
    const part = n / length;
    const hz = rising ? 1100 + 900 * part : 2000 - 900 * part;
    phase += (2 * Math.PI * hz * (1 + 0.25 * random.bipolar())) / SAMPLE_RATE_HZ;
    return (Math.sin(phase) + 0.8 * random.bipolar()) * Math.sin(Math.PI * part) ** 2;
  });
  return filter(whistle, bandpass(1800, 0.8));
}
