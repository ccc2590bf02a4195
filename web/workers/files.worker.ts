/**
 * Writes and reads the page's own files (origin-private file system). Samples stand interleaved, 32-bit float, little-endian, with no header: the length is
 * that of the file, so a file whose page was killed is whole up to its last write. It is pressed on to the disk when it is closed and not before, since
 * that can take seconds on a busy disk, and what a killed page has written stays without it. Only a worker may write in place (`createSyncAccessHandle`); a
 * stream that the page writes to is thrown away when the page is killed.
 */
import type { Chunk, ReturnedChunk } from '../../worklet/protocol.ts';
import type { Answers, FromFiles, Question, ToFiles } from './filesProtocol.ts';

const FOLDER = 'fettle';

interface OpenFile {
  readonly handle: FileSystemSyncAccessHandle;
  size: number;
}

const open = new Map<string, OpenFile>();
/** Through which a file is recorded. */
const ports = new Map<string, MessagePort>();
/** Questions about one file are answered in order. */
const turns = new Map<string, Promise<void>>();

self.onmessage = ({ data: { id, question } }: MessageEvent<ToFiles>) =>
  inTurn('name' in question ? question.name : '', () => reply(id, question));

function inTurn(name: string, work: () => Promise<void>): void {
  turns.set(name, (turns.get(name) ?? Promise.resolve()).then(work));
}

async function reply(id: number, question: Question): Promise<void> {
  try {
    const given = await answer(question);
    tell({ id, answer: given }, buffersOf(given));
  } catch (error) {
    const { name, message } = error instanceof Error ? error : new Error(String(error));
    const channels = question.type === 'append' ? question.channels : undefined;
    tell({ id, error: name, message, ...(channels === undefined ? {} : { channels }) }, buffersOf(channels ?? null));
  }
}

async function answer(question: Question): Promise<Answers[keyof Answers]> {
  switch (question.type) {
    case 'list':
      return list();
    case 'append':
      return append(question.name, question.channels);
    case 'record':
      return record(question.name, question.port);
    case 'close':
      return close(question.name);
    case 'read samples':
      return split(new Float32Array(wholeFrames(await read(question.name), question.channelCount)), question.channelCount);
    case 'write bytes':
      return write(question.name, question.bytes);
    case 'read bytes':
      return read(question.name);
    case 'remove':
      return remove(question.name);
    default:
      question satisfies never;
      throw new TypeError(`The worker for files does not know the question ${JSON.stringify(question)}`);
  }
}

async function list() {
  const found: { name: string; bytes: number }[] = [];
  for await (const [name, entry] of (await folder()).entries()) {
    if (entry.kind === 'file') found.push({ name, bytes: (await (entry as FileSystemFileHandle).getFile()).size });
  }
  return found;
}

async function append(name: string, channels: readonly Float32Array<ArrayBuffer>[]): Promise<null> {
  const file = open.get(name) ?? (await openFile(name));
  const samples = interleave(channels);
  try {
    const written = file.handle.write(samples, { at: file.size });
    if (written < samples.byteLength) throw new DOMException('not all of it was written', 'QuotaExceededError');
  } catch (error) {
    file.handle.truncate(file.size);
    throw error;
  }
  file.size += samples.byteLength;
  return null;
}

async function record(name: string, port: MessagePort): Promise<null> {
  let refused = false;
  ports.set(name, port);
  port.onmessage = ({ data }: MessageEvent<Chunk>) =>
    inTurn(name, async () => {
      const { slot, frames, last, channels } = data;
      const samples = channels.map((line) => line.subarray(0, frames));
      if (frames > 0 && !refused) {
        refused = await append(name, samples).then(
          () => false,
          () => true,
        );
      }
      const handedOn = refused && frames > 0 ? samples.map((line) => line.slice()) : null;
      tell({ recorded: name, frames, last, handedOn }, buffersOf(handedOn));
      const back: ReturnedChunk = { type: 'return chunk', slot, channels };
      if (slot >= 0) port.postMessage(back, buffersOf(channels));
    });
  await openFile(name);
  return null;
}

async function openFile(name: string): Promise<OpenFile> {
  const handle = await (await (await folder()).getFileHandle(name, { create: true })).createSyncAccessHandle();
  const file = { handle, size: handle.getSize() };
  open.set(name, file);
  return file;
}

function close(name: string): null {
  ports.get(name)?.close();
  ports.delete(name);
  const file = open.get(name);
  open.delete(name);
  file?.handle.flush();
  file?.handle.close();
  return null;
}

async function read(name: string): Promise<ArrayBuffer> {
  const handle = await (await folder()).getFileHandle(name);
  return (await handle.getFile()).arrayBuffer();
}

async function write(name: string, bytes: ArrayBuffer): Promise<null> {
  const { handle } = await openFile(name);
  try {
    handle.truncate(0);
    const written = handle.write(bytes, { at: 0 });
    if (written < bytes.byteLength) throw new DOMException('not all of it was written', 'QuotaExceededError');
  } finally {
    close(name);
  }
  return null;
}

async function remove(name: string): Promise<null> {
  close(name);
  await (await folder()).removeEntry(name).catch((error) => {
    if (!(error instanceof DOMException && error.name === 'NotFoundError')) throw error;
  });
  return null;
}

async function folder(): Promise<FileSystemDirectoryHandle> {
  return (await navigator.storage.getDirectory()).getDirectoryHandle(FOLDER, { create: true });
}

function interleave(channels: readonly Float32Array<ArrayBuffer>[]): Float32Array<ArrayBuffer> {
  if (channels.length === 1) return channels[0];
  const samples = new Float32Array(channels.length * channels[0].length);
  channels.forEach((line, channel) => {
    for (let frame = 0; frame < line.length; frame++) samples[frame * channels.length + channel] = line[frame];
  });
  return samples;
}

/** A page may be killed in the middle of a frame. */
function wholeFrames(bytes: ArrayBuffer, channelCount: number): ArrayBuffer {
  const width = 4 * channelCount;
  return bytes.slice(0, bytes.byteLength - (bytes.byteLength % width));
}

function split(samples: Float32Array<ArrayBuffer>, channelCount: number): Float32Array<ArrayBuffer>[] {
  if (channelCount === 1) return [samples];
  return Array.from({ length: channelCount }, (_, channel) => {
    const line = new Float32Array(samples.length / channelCount);
    for (let frame = 0; frame < line.length; frame++) line[frame] = samples[frame * channelCount + channel];
    return line;
  });
}

function buffersOf(given: Answers[keyof Answers]): Transferable[] {
  if (given instanceof ArrayBuffer) return [given];
  if (!Array.isArray(given)) return [];
  return given.filter((line) => line instanceof Float32Array).map((line) => line.buffer);
}

function tell(message: FromFiles, transfer: Transferable[]): void {
  self.postMessage(message, { transfer });
}
