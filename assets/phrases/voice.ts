import { type Stretch, sing } from './formant.ts';
import { addAt, BEAT_SEC, bell, createLoop, filterLoop, highpass, lowpass } from './loop.ts';
import { createRandom, type Random } from './random.ts';

/** A low woman's voice on syllables without meaning, near a microphone in a dry room: two lines with a breath before each. */

/** First five resonances. Vowels after Peterson & Barney, J. Acoust. Soc. Am. 24 (1952) 175 (women), from memory; the rest: common practice, no source. */
const SOUNDS = {
  a: [830, 1240, 2780, 3700, 4600],
  e: [590, 2150, 2900, 3800, 4700],
  i: [400, 2650, 3250, 3900, 4800],
  o: [560, 930, 2720, 3600, 4500],
  u: [400, 880, 2680, 3600, 4500],
  m: [270, 1050, 2300, 3400, 4400],
  n: [280, 1650, 2500, 3500, 4500],
  l: [370, 1150, 2900, 3700, 4600],
};
type Vowel = 'a' | 'e' | 'i' | 'o' | 'u';
type Onset = 'm' | 'n' | 'l' | 's' | 'h' | 't' | 'k' | 'd' | 'slur';

/** Beat from the start of the loop, MIDI number, length in beats, loudness, how it begins, vowel. */
type Syllable = [beat: number, note: number, beats: number, loud: number, onset: Onset, vowel: Vowel];

const FIRST: Syllable[] = [
  [0, 57, 0.85, 0.5, 's', 'a'],
  [1, 60, 0.45, 0.42, 'l', 'a'],
  [1.5, 62, 1.3, 0.62, 'n', 'o'],
  [3, 64, 0.5, 0.52, 'm', 'e'],
  [3.5, 65, 0.45, 0.55, 'slur', 'e'],
  [4, 64, 0.4, 0.6, 't', 'a'],
  [4.5, 62, 1.7, 0.66, 'd', 'o'],
];
const SECOND: Syllable[] = [
  [7.5, 57, 0.4, 0.34, 'h', 'a'],
  [8, 64, 0.85, 0.72, 'k', 'a'],
  [9, 67, 0.45, 0.7, 'l', 'i'],
  [9.5, 69, 1.75, 0.74, 'n', 'a'],
  [11.5, 67, 0.4, 0.62, 's', 'o'],
  [12, 65, 0.8, 0.55, 't', 'e'],
  [13, 64, 0.45, 0.36, 'l', 'u'],
  [13.5, 62, 1.6, 0.36, 'm', 'a'],
];

/** Time before the first beat of a line in which the breath is taken. */
const LEAD_SEC = 0.55;
const TAIL_SEC = 0.4;

export function renderVoice(): Float64Array {
  const random = createRandom(41);
  const loop = createLoop();
  for (const line of [FIRST, SECOND]) addAt(loop, renderLine(line, random), line[0][0] * BEAT_SEC - LEAD_SEC);
  return filterLoop(loop, highpass(90, 0.7), bell(3000, 0.8, 3), lowpass(13_000, 0.7));
}

function renderLine(line: Syllable[], random: Random): Float64Array {
  const [startBeat, firstNote] = line[0];
  const rest = { voice: 0, breath: 0, paceSec: 0.012, bright: 0, dark: 0, note: firstNote, vibrato: false, formantsHz: SOUNDS.a };
  const stretches: Stretch[] = [
    { ...rest, fromSec: 0 },
    { ...rest, fromSec: 0.06, breath: 0.05 },
    { ...rest, fromSec: 0.2, breath: 0.085 },
    { ...rest, fromSec: 0.34 },
  ];
  let endSec = 0;
  for (const [beat, note, beats, loud, onset, vowel] of line) {
    const atSec = LEAD_SEC + (beat - startBeat) * BEAT_SEC + 0.008 * random.bipolar();
    const formantsHz = SOUNDS[vowel].map((hz) => hz * (1 + 0.015 * random.bipolar()));
    const sung = { ...rest, note, formantsHz };
    const swelling = { ...sung, paceSec: 0.07, breath: 0.02 };
    stretches.push(...onsetOf(onset, loud, atSec, sung), { ...sung, fromSec: atSec, voice: 0.72 * loud, breath: 0.02 });
    stretches.push({ ...swelling, fromSec: atSec + 0.05, voice: loud });
    if (beats > 0.8) stretches.push({ ...swelling, fromSec: atSec + 0.24, voice: 0.95 * loud, vibrato: true });
    if (beats > 1.2) stretches.push({ ...swelling, fromSec: atSec + 0.6 * beats * BEAT_SEC, voice: 0.75 * loud, vibrato: true });
    endSec = atSec + beats * BEAT_SEC;
    stretches.push({ ...sung, fromSec: endSec, paceSec: 0.035, breath: 0.012 }, { ...sung, fromSec: endSec + 0.06, paceSec: 0.035 });
  }
  return sing(inTime(stretches), endSec + TAIL_SEC, random);
}

/** What comes before the vowel, ending at `atSec`. */
function onsetOf(onset: Onset, loud: number, atSec: number, sung: Omit<Stretch, 'fromSec'>): Stretch[] {
  switch (onset) {
    case 'm':
    case 'n':
      return [{ ...sung, fromSec: atSec - 0.085, voice: 0.42 * loud, formantsHz: SOUNDS[onset] }];
    case 'l':
      return [{ ...sung, fromSec: atSec - 0.065, voice: 0.6 * loud, formantsHz: SOUNDS.l }];
    case 's':
      return [
        { ...sung, fromSec: atSec - 0.15, bright: 0.32 * loud },
        { ...sung, fromSec: atSec - 0.025, breath: 0.05 },
      ];
    case 'h':
      return [{ ...sung, fromSec: atSec - 0.09, breath: 0.22 * loud }];
    case 't':
      return [
        { ...sung, fromSec: atSec - 0.085 },
        { ...sung, fromSec: atSec - 0.032, bright: 0.75 * loud, dark: 0.3 * loud },
        { ...sung, fromSec: atSec - 0.022, bright: 0.08 * loud, breath: 0.16 * loud },
      ];
    case 'k':
      return [
        { ...sung, fromSec: atSec - 0.1 },
        { ...sung, fromSec: atSec - 0.042, dark: 1.5 * loud },
        { ...sung, fromSec: atSec - 0.026, breath: 0.2 * loud },
      ];
    case 'd':
      return [
        { ...sung, fromSec: atSec - 0.06, voice: 0.12 * loud, formantsHz: SOUNDS.n },
        { ...sung, fromSec: atSec - 0.01, voice: 0.3 * loud, bright: 0.3 * loud },
      ];
    case 'slur':
      return [];
  }
}

/** In order of time: a consonant cuts the end of the vowel before it short. */
function inTime(stretches: Stretch[]): Stretch[] {
  return stretches.filter(({ fromSec }, index) => stretches.slice(index + 1).every((later) => later.fromSec > fromSec));
}
