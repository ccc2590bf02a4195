/** The audio graph: source (Tone, or a device) → the cell's processor (native) → loudspeakers. Knows no design, only numbers and clips. */
import workletUrl from '../../worklet/fettle.worklet.ts?worker&url';
import type { CellOptions, FromCell, ToCell } from '../../worklet/protocol.ts';
import { CELL_PROCESSOR, MUTE_SEC } from '../../worklet/protocol.ts';
import type { Clip } from './clip.ts';
import type { Players } from './players.ts';
import type { Feed, SourceForm } from './source.ts';
import { countUnderruns } from './underruns.ts';

export interface SoundEvents {
  message(message: FromCell): void;
  /** The processor died; the node is silent until `rebuild`. */
  broken(): void;
  /** The system or the browser has paused the context, or let it go on. */
  paused(on: boolean): void;
  /** The browser could not go on putting sound out: the device is gone or refuses. */
  outputLost(): void;
  takeEnded(): void;
}

/** Sound that is open. Rate and channels are fixed for its life, but `rebuild` may change the channels. */
export interface Sound {
  readonly sampleRateHz: number;
  send(message: ToCell, transfer?: Transferable[]): void;
  feed(feed: Feed): void;
  /** Where in its clip the feed is, s. */
  positionSec(): number;
  /** From the processor to the device, as the browser states it; null where it does not. */
  outputLatencySec(): number | null;
  playTake(clip: Clip | null): void;
  /** Makes the processor anew; resolves when it has warmed up. */
  rebuild(cell: CellOptions): Promise<void>;
  suspend(): Promise<void>;
  resume(): Promise<void>;
  noteLag(lagMs: number): void;
  underruns(): number;
  close(): Promise<void>;
}

export type SoundForm = Pick<SourceForm, 'sampleRateHz' | 'latency'>;

export type OpenSound = (form: SoundForm, cellFor: (sampleRateHz: number) => CellOptions, events: SoundEvents) => Promise<Sound>;

/** Twice the ramp, since the message takes its time as well. */
const MUTED_AFTER_MS = 2000 * MUTE_SEC;
const READY_WITHIN_MS = 5000;
const RESUME_WITHIN_MS = 3000;

/** Fetches the largest part of what sound needs before it is asked for, so that the first start is quick; the players come with Start. */
export function prepareSound(): Promise<unknown> {
  return fetch(workletUrl);
}

/**
 * Opens a context at the rate, or at the machine's own where it cannot; `cellFor` is asked with the rate that it became.
 * Call it from a user's gesture: the context is made before anything is awaited. Throws an Error with a sentence.
 */
export const openSound: OpenSound = async (form, cellFor, events) => {
  const context = openContext(form);
  // Asked for within the gesture, then put off: a processor that warms up in a running context makes gaps.
  // Whether that was allowed is known only from the resume below.
  context.resume().catch(() => undefined);
  try {
    await context.suspend();
    const { createPlayers } = await loadModules(context);
    const node = await openNode(context, cellFor(context.sampleRate), events);
    await resume(context);
    return createSound(context, node, createPlayers(context), events);
  } catch (error) {
    await context.close();
    throw error;
  }
};

function loadModules(context: AudioContext) {
  const modules = Promise.all([import('./players.ts'), context.audioWorklet.addModule(workletUrl)]);
  return modules.then(
    ([players]) => players,
    () => {
      throw new Error('Part of this page could not be fetched, so sound cannot start. Reload the page, then press Start.');
    },
  );
}

/**
 * For a recording a few hundredths of a second more are no loss, and the wider buffer of `playback` is a gain: with three busy processes beside it on two
 * cores it had no gap in 10 s where the `balanced` one had 1. Live input has the narrowest there is.
 */
function openContext({ sampleRateHz, latency }: SoundForm): AudioContext {
  try {
    return new AudioContext({ sampleRate: sampleRateHz, latencyHint: latency });
  } catch (error) {
    if (error instanceof DOMException && error.name === 'NotSupportedError') return new AudioContext({ latencyHint: latency });
    throw error;
  }
}

function resume(context: AudioContext): Promise<void> {
  return within(context.resume(), RESUME_WITHIN_MS, 'The browser would not let sound start. Press Start once more.');
}

function createSound(context: AudioContext, first: AudioWorkletNode, players: Players, events: SoundEvents): Sound {
  let node = first;
  let fed: Feed | null = null;
  let wanted = true;
  const underruns = countUnderruns(context);
  node.connect(context.destination);
  // Tone's context has taken `onstatechange`, so this listens beside it.
  context.addEventListener('statechange', () => {
    if (wanted && context.state !== 'closed') events.paused(context.state !== 'running');
  });

  // Of the Web Audio specification, not yet in the standard type library.
  context.addEventListener('error', () => events.outputLost());

  /** Mutes and waits for the end of the ramp, so that nothing is cut off with a click. */
  const quieten = async () => {
    if (context.state !== 'running') return;
    node.port.postMessage({ type: 'mute', on: true } satisfies ToCell);
    await new Promise((resolve) => setTimeout(resolve, MUTED_AFTER_MS));
  };

  return {
    sampleRateHz: context.sampleRate,
    send: (message, transfer = []) => node.port.postMessage(message, transfer),
    feed(next) {
      fed = next;
      players.feed(next, node);
    },
    positionSec: players.positionSec,
    outputLatencySec() {
      // Older browsers have not both.
      const { baseLatency, outputLatency } = context as { baseLatency?: number; outputLatency?: number };
      return baseLatency === undefined || outputLatency === undefined ? null : baseLatency + outputLatency;
    },
    playTake: (take) => players.once(take, node, events.takeEnded),
    async rebuild(cell) {
      await quieten();
      retireNode(node);
      const goesOn = wanted;
      wanted = false;
      await context.suspend();
      node = await openNode(context, cell, events);
      node.connect(context.destination);
      if (goesOn) {
        wanted = true;
        await resume(context);
      }
      if (fed !== null) players.feed(fed.kind === 'clip' ? { ...fed, atSec: players.positionSec() } : fed, node);
    },
    async suspend() {
      wanted = false;
      await context.suspend();
    },
    async resume() {
      wanted = true;
      await resume(context);
    },
    noteLag: underruns.note,
    underruns: underruns.count,
    async close() {
      wanted = false;
      await quieten();
      retireNode(node);
      await players.close();
    },
  };
}

/** A node whose processor has been made and has run every branch. A module that threw shows only here, in the constructor. */
async function openNode(context: AudioContext, cell: CellOptions, events: SoundEvents): Promise<AudioWorkletNode> {
  const node = new AudioWorkletNode(context, CELL_PROCESSOR, {
    numberOfInputs: 2,
    numberOfOutputs: 1,
    outputChannelCount: [cell.channels],
    channelCount: cell.channels,
    channelCountMode: 'explicit',
    processorOptions: cell,
  });
  const ready = new Promise<void>((resolve, reject) => {
    node.port.onmessage = ({ data }: MessageEvent<FromCell>) => {
      if (data.type === 'ready') resolve();
      events.message(data);
    };
    node.onprocessorerror = () => reject(new Error('The audio processor could not be started.'));
  });
  await within(ready, READY_WITHIN_MS, 'The audio processor did not answer within 5 s.');
  node.onprocessorerror = () => events.broken();
  return node;
}

function retireNode(node: AudioWorkletNode): void {
  node.port.onmessage = null;
  node.onprocessorerror = null;
  node.port.postMessage({ type: 'dispose' } satisfies ToCell);
  node.disconnect();
}

function within<T>(promise: Promise<T>, limitMs: number, sentence: string): Promise<T> {
  return new Promise((resolve, reject) => {
    const timer = setTimeout(() => reject(new Error(sentence)), limitMs);
    promise.then(resolve, reject).finally(() => clearTimeout(timer));
  });
}
