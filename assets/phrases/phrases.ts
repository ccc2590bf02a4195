import { renderBand } from './band.ts';
import { renderBass } from './bass.ts';
import { renderDrums } from './drums.ts';
import { finish } from './finish.ts';
import { renderGuitar } from './guitar.ts';
import { renderPiano } from './piano.ts';
import { renderVoice } from './voice.ts';

/** A phrase and how it is made: 16-bit samples of one loop, channels interleaved. */
export interface Phrase {
  name: string;
  title: string;
  listenFor: string;
  channels: 1 | 2;
  render(): Int16Array;
}

export const PHRASES: Phrase[] = [
  {
    name: 'guitar',
    title: 'Guitar chords',
    listenFor:
      'Long notes show the shape of a tremolo and any tick in it; the loud strums of bars 1 and 3 against the soft ones of bar 4 show what a compressor does.',
    channels: 1,
    render: () => finish([renderGuitar()], 101),
  },
  {
    name: 'piano',
    title: 'Electric piano',
    listenFor:
      'Nearly pure tones in the soft notes: distortion of the cell is heard here first; the hard chord of bar 4 shows how fast it recovers.',
    channels: 1,
    render: () => finish([renderPiano()], 102),
  },
  {
    name: 'bass',
    title: 'Bass line',
    listenFor:
      'Hard, soft and stopped notes on strings of different weight: a compressor should even them out and leave the fingers audible. A release that is too short follows the wave itself, and the low notes turn rough.',
    channels: 1,
    render: () => finish([renderBass()], 104),
  },
  {
    name: 'drums',
    title: 'Drum kit',
    listenFor:
      'Real peaks: the attack decides how much stick is left, the release whether ghost notes and room rise between the blows. Bar 3 is soft, bar 4 loud.',
    channels: 1,
    render: () => finish([renderDrums()], 105),
  },
  {
    name: 'voice',
    title: 'Sung line',
    listenFor:
      'Hear whether consonants jump out before the gain has come down, whether breaths come up in the pauses, and whether long notes stay clean: vibrato moves every harmonic.',
    channels: 1,
    render: () => finish([renderVoice()], 106),
  },
  {
    name: 'band',
    title: 'Small band',
    listenFor:
      'Kick and bass together move the gain of a compressor most: listen to the hats and the brush for pumping, to the snare for the attack.',
    channels: 2,
    render: () => finish(renderBand(), 103),
  },
];
