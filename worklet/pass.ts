/** Passes its input on unchanged: what the machine's own dropouts are counted with, beside the cell's. */
import type { ToPass } from './protocol.ts';

export class PassProcessor extends AudioWorkletProcessor {
  private alive = true;

  constructor() {
    super();
    this.port.onmessage = (event: MessageEvent<ToPass>) => {
      event.data.type satisfies 'dispose';
      this.alive = false;
    };
  }

  process(inputs: Float32Array[][], outputs: Float32Array[][]): boolean {
    for (let c = 0; c < outputs[0].length; c++) {
      const input = inputs[0][c];
      if (input === undefined) outputs[0][c].fill(0);
      else outputs[0][c].set(input);
    }
    return this.alive;
  }
}
