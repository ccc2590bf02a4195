/** The source that is put through the chain, the part of it that loops, and where in it the sound is. */
import { signal } from '@preact/signals';
import type { Clip } from '../audio/clip.ts';
import { clipSeconds } from '../audio/clip.ts';
import { loopOf } from '../audio/loop.ts';
import type { LiveInput } from '../audio/input.ts';
import type { Sound } from '../audio/sound.ts';
import type { Feed, Source } from '../audio/source.ts';
import type { Bench, InputInfo, SourceInfo } from './bench.ts';

/** Shorter than this a loop is a tone of its own. */
const SHORTEST_SEC = 0.05;
/** Ends that are being dragged are not cut before they rest. */
const REST_MS = 100;

export interface SourceState extends Pick<Bench, 'source' | 'input' | 'region' | 'setRegion' | 'seek' | 'positionSec' | 'sourceSamples'> {
  current(): Source | null;
  /** The whole of it; null for live input and while there is none. */
  clip(): Clip | null;
  /** Takes another source, from its beginning and whole. */
  set(source: Source): void;
  /** What the players are to be given now. */
  feed(): Feed;
}

const NOTHING: SourceInfo = { title: '', seconds: 0, kind: 'phrase' };

export function createSourceState(sound: () => Sound | null): SourceState {
  const source = signal(NOTHING);
  const input = signal<InputInfo | null>(null);
  const region = signal<Bench['region']['value']>(null);
  let current: Source | null = null;
  /** Where playing goes on at the next feed, and where the loop that was fed last begins; s from the start of the clip. */
  let nextSec = 0;
  let loopFromSec: number | null = null;
  let timer: ReturnType<typeof setTimeout> | undefined;

  const clip = () => (current === null || current.kind === 'live' ? null : current.clip);
  const ends = () => region.peek() ?? { fromSec: 0, toSec: source.peek().seconds };
  const positionSec = () => {
    const open = sound();
    return open === null || loopFromSec === null ? nextSec : loopFromSec + open.positionSec();
  };

  const feed = (): Feed => {
    if (current === null) throw new Error('There is nothing to play. Choose a phrase or open a file.');
    if (current.kind === 'live') return { kind: 'live', stream: current.input.stream };
    const { fromSec, toSec } = ends();
    const atSec = nextSec >= fromSec && nextSec < toSec ? nextSec : fromSec;
    loopFromSec = fromSec;
    return { kind: 'clip', clip: loopOf(current.clip, region.peek()), atSec: atSec - fromSec };
  };

  const feedAgain = () => {
    clearTimeout(timer);
    if (loopFromSec !== null) sound()?.feed(feed());
  };

  return {
    source,
    input,
    region,
    current: () => current,
    clip,
    feed,
    positionSec,
    sourceSamples: () => clip()?.channels ?? [],
    set(next) {
      clearTimeout(timer);
      current = next;
      nextSec = 0;
      loopFromSec = null;
      region.value = null;
      input.value = next.kind === 'live' ? infoOf(next.input) : null;
      source.value =
        next.kind === 'live'
          ? { kind: 'live', title: next.input.title, seconds: 0 }
          : { kind: next.kind, title: next.clip.title, seconds: clipSeconds(next.clip) };
    },
    setRegion(next) {
      const { seconds, title, kind } = source.peek();
      if (clip() === null) return `${kind === 'live' ? 'Live input' : 'Nothing'} has no part to loop; choose a phrase or a file.`;
      if (next !== null && !(next.fromSec >= 0 && next.toSec <= seconds && next.toSec - next.fromSec >= SHORTEST_SEC)) {
        return `The loop is ${next.fromSec.toFixed(2)} s to ${next.toSec.toFixed(2)} s; expected ${SHORTEST_SEC} s or more, within the ${seconds.toFixed(2)} s of “${title}”.`;
      }
      nextSec = positionSec();
      const whole = next !== null && next.fromSec === 0 && next.toSec >= seconds;
      region.value = whole ? null : next;
      clearTimeout(timer);
      // Where playing is goes on being asked of the loop that is still heard.
      timer = setTimeout(() => {
        nextSec = positionSec();
        feedAgain();
      }, REST_MS);
      return null;
    },
    seek(seconds) {
      const { fromSec, toSec } = ends();
      if (clip() === null) return 'Live input has no other place to play from; choose a phrase or a file.';
      if (!(seconds >= fromSec && seconds <= toSec)) {
        return `The place to play from is ${seconds.toFixed(2)} s; expected ${fromSec.toFixed(2)} s to ${toSec.toFixed(2)} s, where it loops.`;
      }
      nextSec = seconds;
      feedAgain();
      return null;
    },
  };
}

function infoOf({ title, deviceId, sampleRateHz, channels, latencySec }: LiveInput): InputInfo {
  return { title, deviceId, sampleRateHz, channels, latencySec };
}
