/** The page's end of the worker that writes its files. */
import FilesWorker from '../workers/files.worker.ts?worker';
import type { Answers, FromFiles, Question, ToFiles } from '../workers/filesProtocol.ts';
import { reasonOf } from './reason.ts';
import type { Files, Recorded, Samples } from './store.ts';

type Given = Extract<FromFiles, { answer: unknown }>;
type Refused = Extract<FromFiles, { error: string }>;
type Settle = (message: Given | Refused) => void;

/** Rejects with a sentence where this browser has no such files, or lets no worker write in them. */
export async function openFiles(): Promise<Files> {
  if (typeof navigator.storage?.getDirectory !== 'function') throw new Error('it has no files for pages');
  await navigator.storage.getDirectory().catch((error) => {
    throw new Error(reasonOf(error));
  });
  const worker = new FilesWorker();
  const waiting = new Map<number, Settle>();
  let nextId = 1;
  const listeners = new Map<string, (recorded: Recorded) => void>();
  worker.onmessage = ({ data }: MessageEvent<FromFiles>) => {
    if ('recorded' in data) {
      listeners.get(data.recorded)?.(data);
      if (data.last) listeners.delete(data.recorded);
      return;
    }
    waiting.get(data.id)?.(data);
    waiting.delete(data.id);
  };
  worker.onerror = ({ message }) => {
    for (const [id, settle] of waiting)
      settle({ id, error: 'Error', message: `its worker failed (${message || 'it could not be loaded'})` });
    waiting.clear();
  };

  const send = (question: Question, transfer: Transferable[] = []) =>
    new Promise<Given | Refused>((settle) => {
      const id = nextId++;
      waiting.set(id, settle);
      worker.postMessage({ id, question } satisfies ToFiles, transfer);
    });
  const ask = async <T extends keyof Answers>(question: Question & { type: T }, transfer: Transferable[] = []) => {
    const message = await send(question, transfer);
    if ('answer' in message) return message.answer as Answers[T];
    throw sentenceOf(message);
  };

  const files: Files = {
    list: () => ask({ type: 'list' }),
    async append(name, channels) {
      const message = await send({ type: 'append', name, channels }, buffersOf(channels));
      if ('answer' in message) return null;
      const full = message.error === 'QuotaExceededError';
      return { sentence: sentenceOf(message).message, full, channels: message.channels ?? channels.map(() => new Float32Array(0)) };
    },
    async record(name, port, heard) {
      listeners.set(name, heard);
      await ask({ type: 'record', name, port }, [port]);
    },
    close: async (name) => void (await ask({ type: 'close', name })),
    readSamples: (name, channelCount) => ask({ type: 'read samples', name, channelCount }),
    writeBytes: async (name, bytes) => void (await ask({ type: 'write bytes', name, bytes }, [bytes])),
    readBytes: (name) => ask({ type: 'read bytes', name }),
    remove: async (name) => void (await ask({ type: 'remove', name })),
  };
  await tryOut(files);
  return files;
}

/** Whether a worker may write is only known once it has. */
async function tryOut(files: Files): Promise<void> {
  const name = 'trial';
  await files.writeBytes(name, new Uint8Array([1]).buffer);
  await files.remove(name);
}

function sentenceOf({ error, message }: Refused): Error {
  return new Error(reasonOf(Object.assign(new Error(message), { name: error })));
}

function buffersOf(channels: Samples): ArrayBuffer[] {
  return channels.map((line) => line.buffer);
}
