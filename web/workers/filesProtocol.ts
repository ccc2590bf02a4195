/** The wire between the page and the worker that writes its files. Every question has an id and one answer with the same id. */
export type Question =
  | { readonly type: 'list' }
  | { readonly type: 'append'; readonly name: string; readonly channels: readonly Float32Array<ArrayBuffer>[] }
  /** The file is opened; from then on chunks come through the port, are written at once and go back. */
  | { readonly type: 'record'; readonly name: string; readonly port: MessagePort }
  | { readonly type: 'close'; readonly name: string }
  | { readonly type: 'read samples'; readonly name: string; readonly channelCount: number }
  | { readonly type: 'write bytes'; readonly name: string; readonly bytes: ArrayBuffer }
  | { readonly type: 'read bytes'; readonly name: string }
  | { readonly type: 'remove'; readonly name: string };

/** What a question is answered with when nothing fails. */
export interface Answers {
  list: readonly { readonly name: string; readonly bytes: number }[];
  append: null;
  record: null;
  close: null;
  'read samples': readonly Float32Array<ArrayBuffer>[];
  'write bytes': null;
  'read bytes': ArrayBuffer;
  remove: null;
}

export interface ToFiles {
  readonly id: number;
  readonly question: Question;
}

/** A chunk has come through a port. Once a file refuses, its chunks are handed on to the page, in order, from the one that was refused on. */
export interface Recorded {
  readonly recorded: string;
  readonly frames: number;
  readonly last: boolean;
  readonly handedOn: readonly Float32Array<ArrayBuffer>[] | null;
}

/** `error` and `message` are those of the browser's exception; samples that were not written come back. */
export type FromFiles =
  | Recorded
  | { readonly id: number; readonly answer: Answers[keyof Answers] }
  | {
      readonly id: number;
      readonly error: string;
      readonly message: string;
      readonly channels?: readonly Float32Array<ArrayBuffer>[];
    };
