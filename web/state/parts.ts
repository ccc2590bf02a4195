/** What the bench stands on, gathered here so that a test in Node can give it others. */
import type { Clip } from '../audio/clip.ts';
import { decodeAudio } from '../audio/decode.ts';
import { missingFeature } from '../audio/features.ts';
import type { Inputs } from '../audio/input.ts';
import { browserInputs } from '../audio/input.ts';
import type { OpenSound } from '../audio/sound.ts';
import { openSound, prepareSound } from '../audio/sound.ts';
import { openStore } from '../store/browserStore.ts';
import type { OfflineEvents } from '../store/offline.ts';
import { keepOffline } from '../store/offline.ts';
import type { Store } from '../store/store.ts';
import BenchWorker from './bench.worker.ts?worker';
import type { FromLoudness, FromReading, FromRender, ToLoudness, ToReading, ToRender, WorkerPort } from './workers.ts';

export interface Parts {
  openSound: OpenSound;
  /** Fetches what the first start needs. */
  prepareSound(): Promise<unknown>;
  missingFeature(): string | null;
  readonly inputs: Inputs;
  decodeAudio(bytes: ArrayBuffer, title: string): Promise<Clip>;
  /** Reads one of the page's own files; throws an Error with a sentence. */
  fetchBytes(path: string): Promise<ArrayBuffer>;
  openReadingWorker(): WorkerPort<ToReading, FromReading>;
  openRenderWorker(): WorkerPort<ToRender, FromRender>;
  openLoudnessWorker(): WorkerPort<ToLoudness, FromLoudness>;
  download(name: string, bytes: Uint8Array<ArrayBuffer>, mediaType: string): void;
  /** What is kept between visits; `lost` is told when the browser has removed the records while the page is open. */
  openStore(lost: () => void): Store;
  /** Fetches what the page needs to open without a network; called when nothing else is being fetched. */
  keepOffline(events: OfflineEvents): void;
}

export function browserParts(): Parts {
  return {
    openSound,
    prepareSound,
    missingFeature,
    inputs: browserInputs(),
    decodeAudio,
    fetchBytes,
    openReadingWorker: () => portOf(new BenchWorker()),
    openRenderWorker: () => portOf(new BenchWorker()),
    openLoudnessWorker: () => portOf(new BenchWorker()),
    download,
    openStore,
    keepOffline,
  };
}

async function fetchBytes(path: string): Promise<ArrayBuffer> {
  const response = await fetch(path).catch(() => null);
  if (response === null) throw new Error(`“${path}” could not be fetched: there is no answer from where this page came from.`);
  if (!response.ok) throw new Error(`“${path}” could not be fetched: the answer was ${response.status}.`);
  return response.arrayBuffer();
}

function portOf<Out, In>(worker: Worker): WorkerPort<Out, In> {
  return {
    post: (message, transfer = []) => worker.postMessage(message, transfer),
    receive(handler, failed) {
      worker.onmessage = ({ data }: MessageEvent<In>) => handler(data);
      worker.onerror = ({ message }) => failed(`The page's worker failed: ${message || 'it could not be loaded'}. Reload the page.`);
    },
    end: () => worker.terminate(),
  };
}

function download(name: string, bytes: Uint8Array<ArrayBuffer>, mediaType: string): void {
  const url = URL.createObjectURL(new Blob([bytes], { type: mediaType }));
  const link = document.createElement('a');
  link.href = url;
  link.download = name;
  link.click();
  // The browser has the blob once the click has been handled; a minute is far more than that.
  setTimeout(() => URL.revokeObjectURL(url), 60_000);
}
