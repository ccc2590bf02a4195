/**
 * Runs by itself, bundled as the page's worklet is: counts garbage collections over 200 000 blocks of the cell's processor, four variants in it and
 * another heard at every block, then over as
 * many turns of a loop that makes one object each. Prints both as JSON. Needs --expose-gc.
 */
import { PerformanceObserver } from 'node:perf_hooks';
import { compileChain } from '../../model/chain/compile.ts';
import { defaultDesign } from '../../model/design/defaults.ts';
import { setAt } from '../../model/design/path.ts';
import type { Design } from '../../model/design/types.ts';
import type { FromCell, ToCell } from '../../worklet/protocol.ts';
import { createNoise } from '../support/noise.ts';
import { createScope } from './workletScope.ts';

const BLOCKS = 200_000;
const BLOCK = 128;
const RATE = 48000;

/** Feedback, a moving control, two channels; low oversampling, because a block allocates the same whatever it costs. */
function movingDesign(): Design {
  const feedback = { kind: 'resistor', drainOhm: 1e6, blockingF: 1e-7 };
  const control = { source: 'lfo', shape: 'sine', rateHz: 5, fromV: -2.4, toV: -1, edgeSec: 0 };
  const design = setAt(setAt(defaultDesign(), 'oversampling', 2), 'variants[0].cell.feedback', feedback);
  return setAt(design, 'variants[0].control', control);
}

/** A port that returns reports and chunks at once, in messages made once, so that it allocates nothing itself. */
class ReturningPort {
  onmessage: ((event: { data: ToCell }) => void) | null = null;
  messages = 0;
  private readonly reports: { data: ToCell }[] = [];
  private readonly chunks: { data: ToCell }[] = [];

  postMessage(message: FromCell): void {
    if (message.type === 'report') {
      const { slot, input, output } = message;
      this.reports[slot] ??= { data: { type: 'return report', slot, input, output } };
      this.answer(this.reports[slot]);
    } else if (message.type === 'chunk') {
      const { slot, channels } = message;
      this.chunks[slot] ??= { data: { type: 'return chunk', slot, channels } };
      this.answer(this.chunks[slot]);
    }
  }

  answer(event: { data: ToCell }): void {
    this.messages++;
    this.onmessage?.(event);
  }
}

async function countCollections(work: () => void): Promise<number> {
  let count = 0;
  const observer = new PerformanceObserver((list) => {
    count += list.getEntries().length;
  });
  const pause = () => new Promise((resolve) => setTimeout(resolve, 50));
  globalThis.gc?.();
  await pause();
  observer.observe({ entryTypes: ['gc'] });
  work();
  await pause();
  count += observer.takeRecords().length;
  observer.disconnect();
  return count;
}

const port = new ReturningPort();
const scope = createScope(RATE, port);
const { CellProcessor } = await import('../../worklet/cell.ts');
const chains = [5000, 6800, 10_000, 22_000].map((ohm) =>
  compileChain(setAt(movingDesign(), 'variants[0].cell.seriesOhm', ohm), 0, RATE, 2, 'lowLatency'),
);
const match = { slots: [1, 2, 3, 4, 1], bypass: 0.5 };
const level = { residual: { part: null, gain: 1 }, gain: 0.7, ceilingPeak: 0.05, muted: false };
const cell = new CellProcessor({ processorOptions: { chains, focus: 0, channels: 2, heard: 'cell', match, ...level } });
port.answer({ data: { type: 'record', on: true } });
const inputs = [[createNoise(1, BLOCK, 0.8), createNoise(2, BLOCK, 0.8)], []];
const outputs = [[new Float32Array(BLOCK), new Float32Array(BLOCK)]];
const turns: { data: ToCell }[] = [
  ...[0, 1, 2, 3].map((slot) => ({ data: { type: 'focus', slot } as const })),
  { data: { type: 'hear', heard: 'bypass' } },
  { data: { type: 'hear', heard: 'cell' } },
];
const run = (blocks: number) => {
  for (let block = 0; block < blocks; block++) {
    port.onmessage?.(turns[block % turns.length]);
    cell.process(inputs, outputs);
    scope.currentFrame += BLOCK;
  }
};

run(5000);
port.messages = 0;
const processing = await countCollections(() => run(BLOCKS));
const { messages } = port;
let kept: object = [];
const control = await countCollections(() => {
  for (let turn = 0; turn < BLOCKS; turn++) kept = { samples: new Float64Array(BLOCK), before: turn };
});
console.log(JSON.stringify({ processing, messages, control, kept: Object.keys(kept).length }));
