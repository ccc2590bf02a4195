/**
 * Tone's players on a native context: what goes into the chain, a looping clip or live input, and the take that is played instead, with their fades.
 * Loaded apart from the rest, at the first Start. Tone's classes come from their own files, so importing them makes no context;
 * its clock is a plain timer because the page's policy allows no worker made from a blob.
 */
import { Context } from 'tone/build/esm/core/context/Context.js';
import { setContext } from 'tone/build/esm/core/context/GlobalContext.js';
import { Player } from 'tone/build/esm/source/buffer/Player.js';
import type { Clip } from './clip.ts';
import { clipSeconds } from './clip.ts';
import type { Feed } from './source.ts';

const FADE_SEC = 0.02;
const LOOKAHEAD_SEC = 0.02;

export interface Players {
  /** Sends it into the node's first input; what was sent before fades out. */
  feed(feed: Feed, node: AudioNode): void;
  /** Where in its clip the feed is, s; 0 of live input. */
  positionSec(): number;
  /** Plays a clip once into the node's second input, then calls `ended`; null ends the one that plays. */
  once(clip: Clip | null, node: AudioNode, ended: () => void): void;
  /** Closes the context too: Tone's context takes that upon itself. */
  close(): Promise<void>;
}

/** What goes into the chain now. */
interface Fed {
  /** Fades it out, then disposes of it. */
  end(): void;
  dispose(): void;
  positionSec(): number;
}

export function createPlayers(raw: AudioContext): Players {
  const context = new Context({ context: raw, clockSource: 'timeout', lookAhead: LOOKAHEAD_SEC });
  setContext(context);
  let fed: Fed | null = null;
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
  const begin = (player: Player, started: (atSec: number) => void = () => undefined, offsetSec = 0) => {
    const start = () => {
      const atSec = raw.currentTime + LOOKAHEAD_SEC;
      player.start(atSec, offsetSec);
      started(atSec);
    };
    if (raw.state === 'running') {
      start();
      return;
    }
    const whenRunning = () => {
      if (raw.state !== 'running') return;
      raw.removeEventListener('statechange', whenRunning);
      if (!player.disposed) start();
    };
    raw.addEventListener('statechange', whenRunning);
  };

  const loop = (clip: Clip, fromSec: number, node: AudioNode): Fed => {
    const lengthSec = clipSeconds(clip);
    const player = open(clip, true).connect(node as never, 0, 0);
    let startedSec = Number.POSITIVE_INFINITY;
    begin(
      player,
      (atSec) => {
        startedSec = atSec;
      },
      fromSec % lengthSec,
    );
    return {
      end: () => retire(player),
      dispose: () => player.dispose(),
      positionSec: () => (fromSec + Math.max(0, raw.currentTime - startedSec)) % lengthSec,
    };
  };

  return {
    feed(feed, node) {
      fed?.end();
      fed = feed.kind === 'clip' ? loop(feed.clip, feed.atSec, node) : feedLive(raw, feed.stream, node);
    },
    positionSec: () => fed?.positionSec() ?? 0,
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
      fed?.dispose();
      single?.dispose();
      await context.close();
      context.dispose();
    },
  };
}

/** A device's stream, faded in; it is the caller's to stop. */
function feedLive(raw: AudioContext, stream: MediaStream, node: AudioNode): Fed {
  const source = new MediaStreamAudioSourceNode(raw, { mediaStream: stream });
  const fade = new GainNode(raw, { gain: 0 });
  source.connect(fade).connect(node, 0, 0);
  fade.gain.setValueAtTime(0, raw.currentTime);
  fade.gain.linearRampToValueAtTime(1, raw.currentTime + FADE_SEC);
  const dispose = () => {
    source.disconnect();
    fade.disconnect();
  };
  return {
    end() {
      fade.gain.setValueAtTime(1, raw.currentTime);
      fade.gain.linearRampToValueAtTime(0, raw.currentTime + FADE_SEC);
      setTimeout(dispose, 2000 * FADE_SEC);
    },
    dispose,
    positionSec: () => 0,
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
