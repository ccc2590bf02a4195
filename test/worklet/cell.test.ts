import { describe, expect, test } from 'vitest';
import { createChain, processChain } from '../../model/chain/chain.ts';
import { compileChain } from '../../model/chain/compile.ts';
import { defaultDesign } from '../../model/design/defaults.ts';
import { setAt } from '../../model/design/path.ts';
import type { CellOptions, Report, ToCell } from '../../worklet/protocol.ts';
import { createNoise } from '../support/noise.ts';
import { createCellProcessor, type RunningCell } from './workletScope.ts';

const RATE = 48000;
const BLOCK = 128;

function optionsFor(channels: number, change: Partial<CellOptions> = {}): CellOptions {
  const numbers = compileChain(defaultDesign(), 0, RATE, channels, 'lowLatency');
  return { numbers, channels, heard: 'cell', gain: 1, ceilingPeak: 1, muted: false, ...change };
}

/** Runs lines through the processor in blocks; returns what left. */
function play(cell: RunningCell, lines: Float32Array[], asides?: Float32Array[], size = BLOCK): Float32Array[] {
  const outputs = lines.map((line) => new Float32Array(line.length));
  for (let at = 0; at < lines[0].length; at += size) {
    const block = (line: Float32Array) => line.subarray(at, at + size);
    cell.run(lines.map(block), outputs.map(block), asides?.map(block));
  }
  return outputs;
}

const noise = (seed: number, blocks = 100) => createNoise(seed, BLOCK * blocks, 0.3);

describe('the cell’s processor', () => {
  test('gives the chain’s own samples, whatever the block’s length', async () => {
    const input = [noise(1), noise(2)];
    const expected = input.map((line) => new Float32Array(line.length));
    processChain(createChain(optionsFor(2).numbers), input, expected);
    for (const size of [BLOCK, 64, 1600]) {
      const cell = await createCellProcessor(RATE, optionsFor(2));
      expect(play(cell, input, undefined, size)).toEqual(expected);
    }
  });

  test('is ready once it has warmed up, and says how late it is', async () => {
    const options = optionsFor(1);
    const cell = await createCellProcessor(RATE, options);
    expect(cell.port.sent).toEqual([{ type: 'ready', latencySamples: createChain(options.numbers).latencySamples }]);
  });

  test('the bypass is the input itself, as late as the chain', async () => {
    const cell = await createCellProcessor(RATE, optionsFor(2, { heard: 'bypass' }));
    const late = Math.round(createChain(optionsFor(2).numbers).latencySamples);
    const input = [noise(3), noise(4)];
    const expected = input.map((line) => Float32Array.from(line, (_, n) => (n < late ? 0 : line[n - late])));
    expect(play(cell, input)).toEqual(expected);
  });

  test('the bypass stays in step when the oversampling changes', async () => {
    const cell = await createCellProcessor(RATE, optionsFor(1, { heard: 'bypass' }));
    const numbers = compileChain(setAt(defaultDesign(), 'oversampling', 2), 0, RATE, 1, 'lowLatency');
    cell.tell({ type: 'move', numbers });
    const latencySamples = createChain(numbers).latencySamples;
    expect(cell.port.sent.at(-1)).toEqual({ type: 'latency', latencySamples });
    const [out] = play(cell, [noise(5)]);
    expect(out.subarray(Math.round(latencySamples))).toEqual(noise(5).subarray(0, out.length - Math.round(latencySamples)));
  });

  test('plays a take in place of the chain, bit for bit', async () => {
    const cell = await createCellProcessor(RATE, optionsFor(1, { heard: 'aside' }));
    expect(play(cell, [noise(6)], [noise(7)])[0]).toEqual(noise(7));
  });

  test('an input that nothing is connected to is silence', async () => {
    const cell = await createCellProcessor(RATE, optionsFor(2));
    const output = [new Float32Array(BLOCK), new Float32Array(BLOCK)];
    for (let block = 0; block < 50; block++) expect(cell.run([], output)).toBe(true);
    expect(cell.port.sent.find((message) => message.type === 'report')).toMatchObject({ inputPeak: 0, faults: 0 });
  });

  test('every message that makes no sense comes back as a fault, and the sound does not change', async () => {
    const cell = await createCellProcessor(RATE, optionsFor(1));
    const bad: [ToCell | { type: string }, string][] = [
      [{ type: 'gain', gain: Number.NaN }, 'The listening gain is NaN'],
      [{ type: 'ceiling', peak: 3 }, 'The ceiling is 3'],
      [{ type: 'hear', heard: 'all' as 'cell' }, 'heard is “all”'],
      [{ type: 'move', numbers: compileChain(defaultDesign(), 0, 44100, 1, 'lowLatency') }, '44100'],
      [{ type: 'move', numbers: compileChain(defaultDesign(), 0, RATE, 2, 'lowLatency') }, '2 channels'],
      [{ type: 'return report', slot: 77, input: new Float32Array(1), output: new Float32Array(1) }, 'Report 77'],
      [{ type: 'return chunk', slot: 77, channels: [] }, 'Chunk 77'],
      [{ type: 'nonsense' }, '"nonsense"'],
    ];
    for (const [message, words] of bad) {
      cell.tell(message as ToCell);
      const last = cell.port.sent.at(-1);
      expect(last?.type).toBe('fault');
      expect(last?.type === 'fault' && last.sentence).toContain(words);
    }
    const expected = [new Float32Array(BLOCK * 100)];
    processChain(createChain(optionsFor(1).numbers), [noise(8)], expected);
    expect(play(cell, [noise(8)])).toEqual(expected);
  });

  test('no order of messages lets a broken or too loud sample out', async () => {
    const ceilingPeak = 0.25;
    const cell = await createCellProcessor(RATE, optionsFor(1, { ceilingPeak }));
    const random = createNoise(99, 4000, 1);
    const variants = [1, 4, 8].map((oversampling) =>
      compileChain(setAt(defaultDesign(), 'oversampling', oversampling), 0, RATE, 1, 'lowLatency'),
    );
    const messages: ToCell[] = [
      ...variants.map((numbers): ToCell => ({ type: 'move', numbers })),
      { type: 'hear', heard: 'bypass' },
      { type: 'hear', heard: 'aside' },
      { type: 'hear', heard: 'cell' },
      { type: 'mute', on: true },
      { type: 'mute', on: false },
      { type: 'gain', gain: 0.1 },
      { type: 'gain', gain: 1 },
      { type: 'record', on: true },
      { type: 'record', on: false },
    ];
    const input = createNoise(100, BLOCK, 50);
    for (let block = 0; block < 2000; block++) {
      input[block % BLOCK] = [Number.NaN, Number.POSITIVE_INFINITY, 3e38, -1, 1e-40][block % 5];
      if (block % 3 === 0) cell.tell(messages[Math.floor(((random[block] + 1) / 2) * messages.length) % messages.length]);
      const output = new Float32Array(BLOCK);
      cell.run([input], [output], [input]);
      for (const x of output) expect(Math.abs(x)).toBeLessThanOrEqual(ceilingPeak);
    }
  });

  test('reports the chain’s voltages and the level that leaves', async () => {
    const cell = await createCellProcessor(RATE, optionsFor(1, { gain: 0.5 }));
    const constant = new Float32Array(BLOCK * 60).fill(0.5);
    play(cell, [constant]);
    const reports = cell.port.sent.filter((message): message is Report => message.type === 'report');
    const last = reports[reports.length - 1];
    expect(last.controlV).toBe(-1.2);
    expect(last.inputPeakV).toBeCloseTo(0.5 * defaultDesign().fullScaleV, 9);
    expect(last.heardPeak).toBeCloseTo(last.outputPeak / 2, 6);
  });

  test('once disposed it asks to be let go', async () => {
    const cell = await createCellProcessor(RATE, optionsFor(1));
    const output = [new Float32Array(BLOCK)];
    expect(cell.run([], output)).toBe(true);
    cell.tell({ type: 'dispose' });
    expect(cell.run([], output)).toBe(false);
  });
});
