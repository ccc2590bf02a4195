/** Parts for a bench in Node: sound that only notes what it is told, workers that do their work when asked, files in memory. */
import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { renderClip } from '../../../model/chain/render.ts';
import { loudnessOf } from '../../../model/measure/loudness.ts';
import type { Clip } from '../../../web/audio/clip.ts';
import { decodeAudio } from '../../../web/audio/decode.ts';
import type { Sound, SoundEvents } from '../../../web/audio/sound.ts';
import type { Parts } from '../../../web/state/parts.ts';
import type { FromLoudness, FromReading, FromRender, ToLoudness, ToReading, ToRender, WorkerPort } from '../../../web/state/workers.ts';
import type { CellOptions, FromCell, ToCell } from '../../../worklet/protocol.ts';

export class FakeSound implements Sound {
  readonly told: ToCell[] = [];
  readonly loops: Clip[] = [];
  readonly played: (Clip | null)[] = [];
  readonly cells: CellOptions[] = [];
  state: 'running' | 'suspended' | 'closed' = 'running';
  readonly sampleRateHz: number;
  readonly events: SoundEvents;

  constructor(sampleRateHz: number, cell: CellOptions, events: SoundEvents) {
    this.sampleRateHz = sampleRateHz;
    this.events = events;
    this.cells.push(cell);
  }

  send(message: ToCell): void {
    this.told.push(message);
  }

  /** The last message of a type that the processor was told. */
  last<T extends ToCell['type']>(type: T): (ToCell & { type: T }) | undefined {
    return this.told.filter((message): message is ToCell & { type: T } => message.type === type).at(-1);
  }

  loop(clip: Clip): void {
    this.loops.push(clip);
  }

  playTake(clip: Clip | null): void {
    this.played.push(clip);
  }

  async rebuild(cell: CellOptions): Promise<void> {
    this.cells.push(cell);
  }

  async suspend(): Promise<void> {
    this.state = 'suspended';
  }

  async resume(): Promise<void> {
    this.state = 'running';
  }

  async close(): Promise<void> {
    this.state = 'closed';
  }

  noteLag(): void {}

  underruns(): number {
    return 0;
  }
}

export class FakeWorker<Out, In> implements WorkerPort<Out, In> {
  readonly posted: Out[] = [];
  ended = false;
  answer: (message: In) => void = () => {};
  fail: (sentence: string) => void = () => {};

  post(message: Out): void {
    this.posted.push(message);
  }

  receive(handler: (message: In) => void, failed: (sentence: string) => void): void {
    this.answer = handler;
    this.fail = failed;
  }

  end(): void {
    this.ended = true;
  }
}

export interface FakeParts extends Parts {
  readonly sounds: FakeSound[];
  readonly readingWorker: FakeWorker<ToReading, FromReading>;
  readonly renderWorkers: FakeWorker<ToRender, FromRender>[];
  readonly loudnessWorkers: FakeWorker<ToLoudness, FromLoudness>[];
  readonly downloads: { name: string; bytes: Uint8Array; mediaType: string }[];
  missing: string | null;
  /** What opening sound rejects with; the machine's rate where it cannot run at the one asked for. */
  refusal: Error | null;
  onlyRateHz: number | null;
}

const asset = (path: string) => fileURLToPath(new URL(`../../../assets/${path}`, import.meta.url));

export function createFakeParts(): FakeParts {
  const parts: FakeParts = {
    sounds: [],
    readingWorker: new FakeWorker(),
    renderWorkers: [],
    loudnessWorkers: [],
    downloads: [],
    missing: null,
    refusal: null,
    onlyRateHz: null,
    async openSound(sampleRateHz, cellFor, events) {
      if (parts.refusal !== null) throw parts.refusal;
      const rateHz = parts.onlyRateHz ?? sampleRateHz;
      const sound = new FakeSound(rateHz, cellFor(rateHz), events);
      parts.sounds.push(sound);
      events.message({ type: 'ready', latencySamples: 48 } satisfies FromCell);
      return sound;
    },
    prepareSound: async () => {},
    missingFeature: () => parts.missing,
    decodeAudio,
    async fetchBytes(path) {
      const bytes = readFileSync(asset(path));
      return bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.byteLength) as ArrayBuffer;
    },
    openReadingWorker: () => parts.readingWorker,
    openRenderWorker() {
      const worker = new FakeWorker<ToRender, FromRender>();
      parts.renderWorkers.push(worker);
      return worker;
    },
    openLoudnessWorker() {
      const worker = new FakeWorker<ToLoudness, FromLoudness>();
      parts.loudnessWorkers.push(worker);
      return worker;
    },
    download: (name, bytes, mediaType) => parts.downloads.push({ name, bytes, mediaType }),
  };
  return parts;
}

/** Does a worker's render: progress, then the clip. */
export function runRender(worker: FakeWorker<ToRender, FromRender>): void {
  const { design, variantIndex, channels, sampleRateHz } = worker.posted[0];
  const rendered = renderClip(design, variantIndex, channels, sampleRateHz, {
    onProgress: (fraction) => worker.answer({ type: 'progress', fraction }),
  });
  worker.answer({ type: 'done', channels: rendered as Float32Array<ArrayBuffer>[] });
}

/** Does a worker's measurement. */
export function runLoudness(worker: FakeWorker<ToLoudness, FromLoudness>): void {
  const { about, channels, sampleRateHz } = worker.posted[0];
  const lines = about === null ? channels : renderClip(about.design, about.index, channels, sampleRateHz);
  worker.answer({ type: 'loudness', lufs: loudnessOf(lines, sampleRateHz) });
}
