/** Enough of an AudioWorkletGlobalScope to make a processor in Node and run its `process`. */
import type { CellOptions, FromCell, ToCell } from '../../worklet/protocol.ts';

interface Scope {
  AudioWorkletProcessor: unknown;
  registerProcessor: unknown;
  currentFrame: number;
  sampleRate: number;
}

/** A port that transfers as the real one does and keeps what was sent. `onSent` sees each message first. */
export class FakePort {
  onmessage: ((event: { data: unknown }) => void) | null = null;
  readonly sent: FromCell[] = [];
  onSent: ((message: FromCell) => void) | null = null;

  postMessage(message: FromCell, transfer: Transferable[] = []): void {
    const copy = structuredClone(message, { transfer });
    this.sent.push(copy);
    this.onSent?.(copy);
  }
}

export interface RunningCell {
  readonly port: FakePort;
  tell(message: ToCell): void;
  /** One block: as many channels as given; none stands for an input that nothing is connected to. */
  run(input: Float32Array[], output: Float32Array[], aside?: Float32Array[]): boolean;
}

const scope = globalThis as unknown as Scope;

let nextPort: unknown;

/** Puts the globals in place; every processor made from now on has this port. (A class keeps the base that it was evaluated with.) */
export function createScope(sampleRateHz: number, port: unknown): Scope {
  nextPort = port;
  scope.AudioWorkletProcessor ??= class {
    readonly port = nextPort;
  };
  scope.currentFrame = 0;
  scope.sampleRate = sampleRateHz;
  return scope;
}

/** Makes the cell's processor at a rate. The module is imported afresh only the first time; the rate is read when it is made. */
export async function createCellProcessor(sampleRateHz: number, options: CellOptions): Promise<RunningCell> {
  const port = new FakePort();
  createScope(sampleRateHz, port);
  const { CellProcessor } = await import('../../worklet/cell.ts');
  const cell = new CellProcessor({ processorOptions: options });
  return {
    port,
    tell: (message) => port.onmessage?.({ data: message }),
    run(input, output, aside = []) {
      const goesOn = cell.process([input, aside], [output]);
      scope.currentFrame += output[0].length;
      return goesOn;
    },
  };
}
