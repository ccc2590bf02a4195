/** A store in memory: it outlives the bench that writes to it, as a browser's outlives a page, and refuses what a test tells it to. */
import type { Files, KeptRecord, Recorded, Refusal, Samples, Store } from '../../../web/store/store.ts';
import type { Chunk } from '../../../worklet/protocol.ts';

export class FakeStore implements Store {
  readonly records = new Map<string, unknown>();
  /** Keys whose reading fails, with the reason. */
  readonly unreadable = new Map<string, string>();
  /** Why nothing is written, or read; null when all is well. */
  writeRefusal: string | null = null;
  readRefusal: string | null = null;
  readonly files = new FakeFiles();
  filesRefusal: string | null = null;
  persistAsked = 0;
  lost: () => void = () => undefined;
  leave: () => void = () => undefined;
  holds = Promise.resolve(true);
  held: Promise<void> = Promise.resolve();

  /** Stands for another tab that keeps; what is returned closes it. */
  holdElsewhere(): () => void {
    let close = () => {};
    this.holds = Promise.resolve(false);
    this.held = new Promise((resolve) => {
      close = resolve;
    });
    return close;
  }

  async readRecords(): Promise<readonly KeptRecord[]> {
    if (this.readRefusal !== null) throw new Error(this.readRefusal);
    return [...this.records].map(([key, value]) => {
      const fault = this.unreadable.get(key);
      return fault === undefined ? { key, value: structuredClone(value) } : { key, fault };
    });
  }

  async put(key: string, value: unknown): Promise<void> {
    if (this.writeRefusal !== null) throw new Error(this.writeRefusal);
    this.records.set(key, structuredClone(value));
  }

  async remove(key: string): Promise<void> {
    this.records.delete(key);
  }

  async openFiles(): Promise<Files> {
    if (this.filesRefusal !== null) throw new Error(this.filesRefusal);
    return this.files;
  }

  async persist(): Promise<boolean> {
    this.persistAsked++;
    return true;
  }

  async persisted(): Promise<boolean> {
    return this.persistAsked > 0;
  }

  beforeLeaving(work: () => void): void {
    const others = this.leave;
    this.leave = () => {
      others();
      work();
    };
  }
}

/** Files of interleaved samples, as the browser's are, with so much room. */
export class FakeFiles implements Files {
  readonly contents = new Map<string, Uint8Array<ArrayBuffer>>();
  roomBytes = Number.POSITIVE_INFINITY;

  bytes(): number {
    return [...this.contents.values()].reduce((sum, { length }) => sum + length, 0);
  }

  async list(): Promise<{ name: string; bytes: number }[]> {
    return [...this.contents].map(([name, { length }]) => ({ name, bytes: length }));
  }

  async append(name: string, channels: Samples): Promise<Refusal | null> {
    const added = new Uint8Array(interleave(channels).buffer);
    if (this.bytes() + added.length > this.roomBytes) return { sentence: 'it has no more room for this page', full: true, channels };
    const before = this.contents.get(name) ?? new Uint8Array();
    const whole = new Uint8Array(before.length + added.length);
    whole.set(before);
    whole.set(added, before.length);
    this.contents.set(name, whole);
    return null;
  }

  /** Ports that were opened, by file: a test sends chunks through the other end. */
  readonly ports: MessagePort[] = [];

  async record(name: string, port: MessagePort, heard: (recorded: Recorded) => void): Promise<void> {
    this.ports.push(port);
    let refused = false;
    port.onmessage = async ({ data: { frames, last, channels } }: MessageEvent<Chunk>) => {
      refused ||= frames > 0 && (await this.append(name, channels)) !== null;
      heard({ frames, last, handedOn: refused && frames > 0 ? channels : null });
      if (last) port.close();
    };
  }

  async close(): Promise<void> {}

  async readSamples(name: string, channelCount: number): Promise<Samples> {
    const samples = new Float32Array(await this.readBytes(name));
    const frames = Math.floor(samples.length / channelCount);
    return Array.from({ length: channelCount }, (_, c) => Float32Array.from({ length: frames }, (_, n) => samples[n * channelCount + c]));
  }

  async writeBytes(name: string, bytes: ArrayBuffer): Promise<void> {
    if (this.bytes() + bytes.byteLength > this.roomBytes) throw new Error('it has no more room for this page');
    this.contents.set(name, new Uint8Array(bytes));
  }

  async readBytes(name: string): Promise<ArrayBuffer> {
    const bytes = this.contents.get(name);
    if (bytes === undefined) throw new Error('it is no longer there');
    return bytes.slice().buffer;
  }

  async remove(name: string): Promise<void> {
    this.contents.delete(name);
  }
}

function interleave(channels: Samples): Float32Array<ArrayBuffer> {
  return Float32Array.from({ length: channels.length * channels[0].length }, (_, n) => {
    const channel = n % channels.length;
    return channels[channel][(n - channel) / channels.length];
  });
}
