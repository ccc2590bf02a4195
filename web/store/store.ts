/**
 * What a browser keeps between visits, as the state sees it: small records by key, and files of samples or bytes by name. A test stands another in its place.
 * Everything that can fail rejects with an Error whose message says why, in words that can follow a colon.
 */
export interface Store {
  /** Whether this tab is the one that keeps; another that is open may be. That one alone writes. */
  readonly holds: Promise<boolean>;
  /** Resolves once this tab is the one: at once, or when the other is closed. */
  readonly held: Promise<void>;
  readRecords(): Promise<readonly KeptRecord[]>;
  put(key: string, value: unknown): Promise<void>;
  remove(key: string): Promise<void>;
  /** Rejects where this browser has no files for a page. */
  openFiles(): Promise<Files>;
  /** Asks that nothing be removed when room runs short; to be called from a user's gesture. */
  persist(): Promise<boolean>;
  /** Whether that was granted before. */
  persisted(): Promise<boolean>;
  /** `work` runs when the page may be about to go: hidden, left or closed. */
  beforeLeaving(work: () => void): void;
}

/** As it was found: nothing of it is checked. */
export type KeptRecord = { readonly key: string; readonly value: unknown } | { readonly key: string; readonly fault: string };

export interface Files {
  list(): Promise<readonly { readonly name: string; readonly bytes: number }[]>;
  /**
   * Adds samples to the end of a file; the arrays are taken over. In order for one file. What is refused comes back, and the file stays as it was;
   * null when all of it is written. Once a page is killed, what was written stays.
   */
  append(name: string, channels: Samples): Promise<Refusal | null>;
  /**
   * As `append`, with chunks that come through `port` from the processor that records, so that a page that is busy holds nothing up. What is refused,
   * and all that follows it, is handed on to `heard`.
   */
  record(name: string, port: MessagePort, heard: (recorded: Recorded) => void): Promise<void>;
  /** No more is added for now. */
  close(name: string): Promise<void>;
  readSamples(name: string, channelCount: number): Promise<Samples>;
  /** Takes the place of the whole file. */
  writeBytes(name: string, bytes: ArrayBuffer): Promise<void>;
  readBytes(name: string): Promise<ArrayBuffer>;
  /** A file that is not there is no fault. */
  remove(name: string): Promise<void>;
}

export interface Recorded {
  readonly frames: number;
  readonly last: boolean;
  /** Null where it was written. */
  readonly handedOn: Samples | null;
}

export type Samples = readonly Float32Array<ArrayBuffer>[];

export interface Refusal {
  readonly sentence: string;
  /** For want of room. */
  readonly full: boolean;
  readonly channels: Samples;
}
