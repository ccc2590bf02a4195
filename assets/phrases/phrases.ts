import { renderBand } from './band.ts';
import { finish } from './finish.ts';
import { renderGuitar } from './guitar.ts';
import { renderPiano } from './piano.ts';

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
    name: 'band',
    title: 'Small band',
    listenFor:
      'Kick and bass together move the gain of a compressor most: listen to the hats and the brush for pumping, to the snare for the attack.',
    channels: 2,
    render: () => finish(renderBand(), 103),
  },
];
