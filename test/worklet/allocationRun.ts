/**
 * Runs by itself, bundled as the page's worklet is: counts garbage collections over blocks of the cell's processor, four variants in it and another
 * heard at every block, then over as many turns of a loop that makes one object each. The argument says which four. Prints both as JSON. Needs
 * --expose-gc.
 */
import { PerformanceObserver } from 'node:perf_hooks';
import { compileChain } from '../../model/chain/compile.ts';
import { defaultDesign } from '../../model/design/defaults.ts';
import { setAt } from '../../model/design/path.ts';
import type { Design } from '../../model/design/types.ts';
import type { FromCell, ToCell } from '../../worklet/protocol.ts';
import { createNoise } from '../support/noise.ts';
import { createScope } from './workletScope.ts';

const BLOCK = 128;
const RATE = 48000;

const FEEDBACK = { kind: 'resistor', drainOhm: 1e6, blockingF: 1e-7 };
const SWING = { source: 'lfo', shape: 'sine', rateHz: 5, fromV: -2.4, toV: -1, edgeSec: 0 };
const FOLLOWER = {
  source: 'envelope',
  senses: 'output',
  rectifier: 'full',
  attackOhm: 1000,
  releaseOhm: 1e5,
  timingF: 1e-6,
  thresholdV: 0.1,
  gainVPerV: 5,
  restV: -3,
  limitV: 0,
  linked: true,
};
const AMPLIFIER = { gainDb: 12, gainBandwidthHz: 3e6, slewVPerSec: 1.3e7, swingV: 12 };

/** The default with feedback, a control that swings, and these values. */
function designWith(values: Readonly<Record<string, unknown>>): Design {
  const start = { 'variants[0].cell.feedback': FEEDBACK, 'variants[0].control': SWING, ...values };
  return Object.entries(start).reduce((design, [path, value]) => setAt(design, path, value), defaultDesign());
}

interface Run {
  readonly blocks: number;
  readonly designs: readonly Design[];
  /** Blocks from one move of the first variant's series resistor to the next; 0 for none. */
  readonly moveEvery: number;
}

const RUNS: Readonly<Record<string, Run>> = {
  /** Low oversampling, because a block allocates the same whatever it costs. */
  plain: {
    blocks: 200_000,
    designs: [5000, 6800, 10_000, 22_000].map((ohm) => designWith({ oversampling: 2, 'variants[0].cell.seriesOhm': ohm })),
    moveEvery: 0,
  },
  /** Noise while values move, the loop with a real amplifier, graded capacitances of a part that conducts, λ in the gradual law. */
  everything: {
    blocks: 20_000,
    designs: [
      designWith({ oversampling: 8, noise: { kind: 'thermal', seed: 1 } }),
      designWith({ oversampling: 8, 'variants[0].control': FOLLOWER, 'variants[0].output': AMPLIFIER }),
      designWith({ oversampling: 8, 'variants[0].device.grading': 0.33, 'variants[0].control.toV': 0.5 }),
      designWith({ oversampling: 8, 'variants[0].device.law': 'gradual', 'variants[0].device.lambdaPerV': 0.05 }),
    ],
    moveEvery: 500,
  },
};

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
const { blocks: BLOCKS, designs, moveEvery } = RUNS[process.argv[2]];
const compiled = (design: Design) => compileChain(design, 0, RATE, 2, 'lowLatency');
const chains = designs.map(compiled);
const moves: { data: ToCell }[] = [4700, 5600].map((ohm) => ({
  data: { type: 'move', slot: 0, numbers: compiled(setAt(designs[0], 'variants[0].cell.seriesOhm', ohm)) },
}));
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
    if (moveEvery > 0 && block % moveEvery === 0) port.onmessage?.(moves[(block / moveEvery) % 2]);
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
