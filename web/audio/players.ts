/**
 * Tone's players on a native context: the looping source and the take that is played instead, with their fades.
 * Loaded apart from the rest, at the first Start. Tone's classes come from their own files, so importing them makes no context;
 * its clock is a plain timer because the page's policy allows no worker made from a blob.
 */
import { Context } from 'tone/build/esm/core/context/Context.js';
import { setContext } from 'tone/build/esm/core/context/GlobalContext.js';
import { Player } from 'tone/build/esm/source/buffer/Player.js';
import type { Clip } from './clip.ts';

const FADE_SEC = 0.02;
const LOOKAHEAD_SEC = 0.02;

export interface Players {
  /** Loops a clip into the node's first input; the clip before fades out. */
  loop(clip: Clip, node: AudioNode): void;
  /** Plays a clip once into the node's second input, then calls `ended`; null ends the one that plays. */
  once(clip: Clip | null, node: AudioNode, ended: () => void): void;
  /** Closes the context too: Tone's context takes that upon itself. */
  close(): Promise<void>;
}

export function createPlayers(raw: AudioContext): Players {
  const context = new Context({ context: raw, clockSource: 'timeout', lookAhead: LOOKAHEAD_SEC });
  setContext(context);
  let looping: Player | null = null;
  let single: Player | null = null;

  const open = (clip: Clip, loop: boolean) => {
    const buffer = new AudioBuffer({
      length: clip.channels[0].length,
      numberOfChannels: clip.channels.length,
      sampleRate: clip.sampleRateHz,
    });
    for (const [c, samples] of clip.channels.entries()) buffer.copyToChannel(samples, c);
    return new Player({ context, url: buffer, loop, fadeIn: FADE_SEC, fadeOut: FADE_SEC });
  };

  /** Starts it now, or once the context runs: before that Tone complains of it on the console. */
  const begin = (player: Player) => {
    if (raw.state === 'running') {
      player.start();
      return;
    }
    const whenRunning = () => {
      if (raw.state !== 'running') return;
      raw.removeEventListener('statechange', whenRunning);
      if (!player.disposed) player.start();
    };
    raw.addEventListener('statechange', whenRunning);
  };

  return {
    loop(clip, node) {
      retire(looping);
      looping = open(clip, true).connect(node as never, 0, 0);
      begin(looping);
    },
    once(clip, node, ended) {
      retire(single);
      single = null;
      if (clip === null) return;
      const player = open(clip, false).connect(node as never, 0, 1);
      single = player;
      player.onstop = () => {
        if (single !== player) return;
        single = null;
        player.dispose();
        ended();
      };
      begin(player);
    },
    async close() {
      looping?.dispose();
      single?.dispose();
      await context.close();
      context.dispose();
    },
  };
}

/** Fades a player out and disposes of it once it is silent. */
function retire(player: Player | null): void {
  if (player === null) return;
  if (player.state !== 'started') {
    player.dispose();
    return;
  }
  player.onstop = () => player.dispose();
  player.stop();
}
