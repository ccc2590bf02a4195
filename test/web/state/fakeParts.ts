/** Parts for a bench in Node: sound that only notes what it is told, workers that do their work when asked, files in memory. */
import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { renderClip } from '../../../model/chain/render.ts';
import { loudnessOf } from '../../../model/measure/loudness.ts';
import type { Clip } from '../../../web/audio/clip.ts';
import { decodeAudio } from '../../../web/audio/decode.ts';
import type { InputDevice, Inputs, LiveInput } from '../../../web/audio/input.ts';
import type { Feed, SourceForm } from '../../../web/audio/source.ts';
import type { Sound, SoundEvents } from '../../../web/audio/sound.ts';
import type { OfflineEvents } from '../../../web/store/offline.ts';
import type { Parts } from '../../../web/state/parts.ts';
import type { FromLoudness, FromReading, FromRender, ToLoudness, ToReading, ToRender, WorkerPort } from '../../../web/state/workers.ts';
import type { CellOptions, FromCell, ToCell } from '../../../worklet/protocol.ts';
import { FakeStore } from '../store/fakeStore.ts';

export class FakeSound implements Sound {
  readonly told: ToCell[] = [];
  readonly loops: Clip[] = [];
  readonly feeds: Feed[] = [];
  playedSec = 0;
  readonly played: (Clip | null)[] = [];
  readonly cells: CellOptions[] = [];
  state: 'running' | 'suspended' | 'closed' = 'running';
  readonly sampleRateHz: number;
  readonly latency: SourceForm['latency'];
  readonly events: SoundEvents;

  constructor(sampleRateHz: number, latency: SourceForm['latency'], cell: CellOptions, events: SoundEvents) {
    this.sampleRateHz = sampleRateHz;
    this.latency = latency;
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

  feed(feed: Feed): void {
    this.feeds.push(feed);
    if (feed.kind !== 'clip') return;
    this.loops.push(feed.clip);
    this.playedSec = feed.atSec;
  }

  positionSec(): number {
    return this.playedSec;
  }

  outputLatencySec(): number {
    return 0.02;
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

/** Two inputs that can be unplugged. */
export class FakeInputs implements Inputs {
  devices: InputDevice[] = [
    { id: 'built-in', title: 'Built-in microphone' },
    { id: 'interface', title: 'Two-channel interface' },
  ];
  refusal: Error | null = null;
  rate = 48000;
  readonly opened: { readonly input: LiveInput; readonly unplug: () => void; ended: boolean }[] = [];
  changed: () => void = () => {};
  keptOn: readonly string[] = [];

  async list() {
    return this.devices;
  }

  async open(deviceId: string | null, ended: (input: LiveInput) => void): Promise<LiveInput> {
    if (this.refusal !== null) throw this.refusal;
    const { id, title } = this.devices.find((device) => device.id === deviceId) ?? this.devices[0];
    const of = {
      title,
      deviceId: id,
      sampleRateHz: this.rate,
      channels: id === 'interface' ? 2 : 1,
      latencySec: 0.01,
      keptOn: this.keptOn,
    };
    const input: LiveInput = { ...of, stream: {} as MediaStream, end: () => Object.assign(record, { ended: true }) };
    const record = { input, unplug: () => ended(input), ended: false };
    this.opened.push(record);
    return input;
  }

  rateHz(): number {
    return this.rate;
  }

  watch(changed: () => void): void {
    this.changed = changed;
  }
}

export interface FakeParts extends Parts {
  readonly inputs: FakeInputs;
  readonly sounds: FakeSound[];
  readonly readingWorker: FakeWorker<ToReading, FromReading>;
  readonly renderWorkers: FakeWorker<ToRender, FromRender>[];
  readonly loudnessWorkers: FakeWorker<ToLoudness, FromLoudness>[];
  readonly downloads: { name: string; bytes: Uint8Array; mediaType: string }[];
  readonly store: FakeStore;
  offline: OfflineEvents | null;
  missing: string | null;
  /** What opening sound rejects with; the machine's rate where it cannot run at the one asked for. */
  refusal: Error | null;
  onlyRateHz: number | null;
}

const asset = (path: string) => fileURLToPath(new URL(`../../../assets/${path}`, import.meta.url));

export function createFakeParts(store = new FakeStore()): FakeParts {
  const parts: FakeParts = {
    sounds: [],
    readingWorker: new FakeWorker(),
    renderWorkers: [],
    loudnessWorkers: [],
    downloads: [],
    store,
    offline: null,
    missing: null,
    refusal: null,
    onlyRateHz: null,
    async openSound({ sampleRateHz, latency }, cellFor, events) {
      if (parts.refusal !== null) throw parts.refusal;
      const rateHz = parts.onlyRateHz ?? sampleRateHz;
      const sound = new FakeSound(rateHz, latency, cellFor(rateHz), events);
      parts.sounds.push(sound);
      events.message({ type: 'ready', latencySamples: 48 } satisfies FromCell);
      return sound;
    },
    prepareSound: async () => {},
    missingFeature: () => parts.missing,
    inputs: new FakeInputs(),
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
    openStore(lost) {
      store.lost = lost;
      return store;
    },
    keepOffline(events) {
      parts.offline = events;
    },
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
