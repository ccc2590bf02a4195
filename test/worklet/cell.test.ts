import { describe, expect, test } from 'vitest';
import { createChain, processChain, setResidual } from '../../model/chain/chain.ts';
import { type ChainNumbers, compileChain } from '../../model/chain/compile.ts';
import { defaultDesign } from '../../model/design/defaults.ts';
import { setAt } from '../../model/design/path.ts';
import type { CellOptions, Chunk, Match, Report, ToCell } from '../../worklet/protocol.ts';
import { PREVIOUS_SLOT } from '../../worklet/protocol.ts';
import { createNoise } from '../support/noise.ts';
import { createCellProcessor, type RunningCell } from './workletScope.ts';

const RATE = 48000;
const BLOCK = 128;

const AS_IT_IS: Match = { slots: [1, 1, 1, 1, 1], bypass: 1 };
const NO_RESIDUAL = { part: null, gain: 1 };

const compiled = (path: string, value: unknown, channels = 1) =>
  compileChain(setAt(defaultDesign(), path, value), 0, RATE, channels, 'lowLatency');
const series = (ohm: number, channels = 1) => compiled('variants[0].cell.seriesOhm', ohm, channels);

function optionsFor(channels: number, change: Partial<CellOptions> = {}): CellOptions {
  const numbers = compileChain(defaultDesign(), 0, RATE, channels, 'lowLatency');
  const level = { match: AS_IT_IS, residual: NO_RESIDUAL, gain: 1, ceilingPeak: 1, muted: false };
  return { chains: [numbers], focus: 0, channels, heard: 'cell', ...level, ...change };
}

/** What one chain alone makes of the lines. */
function alone(numbers: ChainNumbers, lines: Float32Array[]): Float32Array[] {
  const outputs = lines.map((line) => new Float32Array(line.length));
  processChain(createChain(numbers), lines, outputs);
  return outputs;
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

const largestStep = (samples: Float32Array) => samples.reduce((most, x, n) => Math.max(most, n > 0 ? Math.abs(x - samples[n - 1]) : 0), 0);
const noise = (seed: number, blocks = 100) => createNoise(seed, BLOCK * blocks, 0.3);

describe('the cell’s processor', () => {
  test('gives the chain’s own samples, whatever the block’s length', async () => {
    const input = [noise(1), noise(2)];
    const expected = input.map((line) => new Float32Array(line.length));
    processChain(createChain(optionsFor(2).chains[0] as ChainNumbers), input, expected);
    for (const size of [BLOCK, 64, 1600]) {
      const cell = await createCellProcessor(RATE, optionsFor(2));
      expect(play(cell, input, undefined, size)).toEqual(expected);
    }
  });

  test('is ready once it has warmed up, and says how late it is', async () => {
    const options = optionsFor(1);
    const cell = await createCellProcessor(RATE, options);
    expect(cell.port.sent).toEqual([
      { type: 'ready', latencySamples: Math.round(createChain(options.chains[0] as ChainNumbers).latencySamples) },
    ]);
  });

  test('the bypass is the input itself, as late as the chain', async () => {
    const cell = await createCellProcessor(RATE, optionsFor(2, { heard: 'bypass' }));
    const late = Math.round(createChain(optionsFor(2).chains[0] as ChainNumbers).latencySamples);
    const input = [noise(3), noise(4)];
    const expected = input.map((line) => Float32Array.from(line, (_, n) => (n < late ? 0 : line[n - late])));
    expect(play(cell, input)).toEqual(expected);
  });

  test('the bypass stays in step when the oversampling changes, without a click', async () => {
    const cell = await createCellProcessor(RATE, optionsFor(1, { heard: 'bypass' }));
    const numbers = compiled('oversampling', 2);
    const late = Math.round(createChain(numbers).latencySamples);
    const ramp = Float32Array.from({ length: BLOCK * 100 }, (_, n) => n / 12800);
    play(cell, [ramp.map((x) => x - 1)]);
    cell.tell({ type: 'move', slot: 0, numbers });
    const [out] = play(cell, [ramp]);
    // One sample of a ramp is 1/12800; the fade adds the few samples of the change, spread over 1440.
    for (let n = 1; n < out.length; n++) expect(Math.abs(out[n] - out[n - 1])).toBeLessThan(1.1 / 12800);
    expect(out.subarray(6400)).toEqual(ramp.subarray(6400 - late, ramp.length - late));
    const reports = cell.port.sent.filter((message): message is Report => message.type === 'report');
    expect(reports.at(-1)?.latencySamples).toBe(late);
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
      [{ type: 'hear', heard: 'previous' }, 'Slot 4 is empty'],
      [{ type: 'focus', slot: 1 }, 'Slot 1 is empty'],
      [{ type: 'focus', slot: 7 }, 'The slot is 7'],
      [{ type: 'drop', slot: 0 }, 'Slot 0 is heard'],
      [{ type: 'match', match: { slots: [1, 1, 1, 1, -1], bypass: 1 } }, 'A gain is -1'],
      [{ type: 'move', slot: 9, numbers: series(5000) }, 'The slot is 9'],
      [{ type: 'move', slot: 0, numbers: compileChain(defaultDesign(), 0, 44100, 1, 'lowLatency') }, '44100'],
      [{ type: 'move', slot: 1, numbers: compileChain(defaultDesign(), 0, 44100, 1, 'lowLatency') }, '44100'],
      [{ type: 'move', slot: 0, numbers: compileChain(defaultDesign(), 0, RATE, 2, 'lowLatency') }, '2 channels'],
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
    processChain(createChain(optionsFor(1).chains[0] as ChainNumbers), [noise(8)], expected);
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
      ...variants.map((numbers, slot): ToCell => ({ type: 'move', slot, numbers })),
      { type: 'move', slot: PREVIOUS_SLOT, numbers: variants[1] },
      ...[0, 1, 2].map((slot): ToCell => ({ type: 'focus', slot })),
      ...[0, 1, 2, PREVIOUS_SLOT].map((slot): ToCell => ({ type: 'drop', slot })),
      { type: 'match', match: { slots: [3, 0.1, 1, 100, 0], bypass: 0.5 } },
      { type: 'hear', heard: 'previous' },
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

  test('while four variants run, each is heard as it sounds alone, in step with the bypass', async () => {
    const chains = [3000, 5000, 10000].map((ohm) => series(ohm, 2));
    chains.push(compiled('oversampling', 1, 2));
    const input = [noise(11, 400), noise(12, 400)];
    const late = Math.max(...chains.map((numbers) => Math.round(createChain(numbers).latencySamples)));
    const cell = await createCellProcessor(RATE, optionsFor(2, { chains }));
    const out = input.map((line) => new Float32Array(line.length));
    const order = [0, 3, 1, 2];
    for (let block = 0; block < 400; block++) {
      if (block % 100 === 0) cell.tell({ type: 'focus', slot: order[block / 100] });
      const part = (line: Float32Array) => line.subarray(block * BLOCK, (block + 1) * BLOCK);
      cell.run(input.map(part), out.map(part));
    }
    order.forEach((slot, quarter) => {
      const own = late - Math.round(createChain(chains[slot]).latencySamples);
      alone(chains[slot], input).forEach((line, c) => {
        // Past the fade of 480 samples.
        const from = quarter * 100 * BLOCK + 512;
        const to = (quarter + 1) * 100 * BLOCK;
        expect(out[c].subarray(from, to)).toEqual(line.subarray(from - own, to - own));
      });
    });
  });

  test('switched at every block, no step is larger than the steepest of the variants and the fade’s own slope', async () => {
    const chains = [1000, 5000, 20000].map((ohm) => series(ohm));
    const sine = Float32Array.from({ length: BLOCK * 600 }, (_, n) => 0.5 * Math.sin((2 * Math.PI * 100 * n) / RATE));
    const late = Math.round(createChain(chains[0]).latencySamples);
    const bypass = Float32Array.from(sine, (_, n) => (n < late ? 0 : sine[n - late]));
    const lines = [bypass, ...chains.map((numbers) => alone(numbers, [sine])[0])];
    const cell = await createCellProcessor(RATE, optionsFor(1, { chains }));
    const out = new Float32Array(sine.length);
    for (let block = 0; block < 600; block++) {
      if (block % 4 === 3) cell.tell({ type: 'hear', heard: 'bypass' });
      else cell.tell({ type: 'focus', slot: block % 4 });
      if (block % 4 === 0) cell.tell({ type: 'hear', heard: 'cell' });
      const part = (line: Float32Array) => line.subarray(block * BLOCK, (block + 1) * BLOCK);
      cell.run([part(sine)], [part(out)]);
    }
    const steepest = Math.max(...lines.map(largestStep));
    const apart = Math.max(...lines.flatMap((a) => lines.map((b) => a.reduce((most, x, n) => Math.max(most, Math.abs(x - b[n])), 0))));
    expect(largestStep(out)).toBeLessThan(steepest + apart / 480 + 2e-7);
    // The fade is the smaller part: this bound would find a jump of a hundredth.
    expect(steepest + apart / 480).toBeLessThan(0.01);
  });

  test('a variant that is added, edited or dropped leaves the heard one as it is, bit for bit', async () => {
    const input = [noise(13, 400)];
    const [expected] = alone(series(5000), input);
    const cell = await createCellProcessor(RATE, optionsFor(1, { chains: [series(5000)] }));
    const out = new Float32Array(expected.length);
    for (let block = 0; block < 400; block++) {
      if (block === 20) cell.tell({ type: 'move', slot: 1, numbers: series(1000) });
      if (block === 40) cell.tell({ type: 'move', slot: 1, numbers: series(2000) });
      if (block === 60) cell.tell({ type: 'move', slot: 2, numbers: compiled('variants[0].device.law', 'smooth') });
      if (block === 80) cell.tell({ type: 'drop', slot: 1 });
      const part = (line: Float32Array) => line.subarray(block * BLOCK, (block + 1) * BLOCK);
      cell.run([part(input[0])], [part(out)]);
    }
    expect(cell.port.sent.filter(({ type }) => type === 'fault')).toEqual([]);
    expect(out).toEqual(expected);
    cell.tell({ type: 'focus', slot: 1 });
    expect(cell.port.sent.at(-1)).toMatchObject({ type: 'fault', sentence: expect.stringContaining('Slot 1 is empty') });
  });

  test('a variant that is added and heard at once is silent not for a sample: the fade waits until it runs', async () => {
    const constant = new Float32Array(BLOCK * 100).fill(0.5);
    const cell = await createCellProcessor(RATE, optionsFor(1));
    play(cell, [constant]);
    const [settled] = play(cell, [constant]);
    cell.tell({ type: 'move', slot: 3, numbers: optionsFor(1).chains[0] as ChainNumbers });
    cell.tell({ type: 'focus', slot: 3 });
    const [out] = play(cell, [constant]);
    for (const x of out) expect(Math.abs(x - settled[settled.length - 1])).toBeLessThan(1e-3 * Math.abs(x));
  });

  test('reports hold the readings of the variant in focus, and peak and faults of each', async () => {
    const chains = [series(1000), series(20000)];
    const cell = await createCellProcessor(RATE, optionsFor(1, { chains }));
    const input = createNoise(14, BLOCK * 200, 0.3);
    input[BLOCK * 50] = Number.NaN;
    cell.port.onSent = (message) => {
      if (message.type === 'report') cell.tell({ ...message, type: 'return report' });
    };
    const last = () => cell.port.sent.filter((message): message is Report => message.type === 'report').at(-1) as Report;
    play(cell, [input]);
    const first = last();
    expect(first.slotPeaks[0]).toBeGreaterThan(2 * first.slotPeaks[1]);
    expect(first.slotPeaks[1]).toBeGreaterThan(0);
    expect([...first.slotPeaks.subarray(2)]).toEqual([0, 0, 0]);
    expect([...first.slotFaults]).toEqual([1, 1, 0, 0, 0]);
    expect(Math.abs(first.outputPeak / first.slotPeaks[0] - 1)).toBeLessThan(1e-6);
    cell.tell({ type: 'focus', slot: 1 });
    play(cell, [input]);
    expect(Math.abs(last().outputPeak / last().slotPeaks[1] - 1)).toBeLessThan(1e-6);
    expect(last().faults).toBe(2);
  });

  test.each(['bypass', 'previous', 'aside'] as const)(
    'a take holds what is heard, before level and ceiling: %s, matched',
    async (heard) => {
      const chains = [series(5000), null, null, null, series(1000)];
      const match = { slots: [1, 1, 1, 1, 0.5], bypass: 0.25 };
      const cell = await createCellProcessor(RATE, optionsFor(1, { chains, heard, match, gain: 0.1, ceilingPeak: 0.01 }));
      const input = noise(15, 64);
      const aside = noise(16, 64);
      cell.tell({ type: 'record', on: true });
      play(cell, [input], [aside]);
      cell.tell({ type: 'record', on: false });
      const chunk = cell.port.sent.find((message): message is Chunk => message.type === 'chunk') as Chunk;
      const late = Math.round(createChain(series(5000)).latencySamples);
      const bypass = Float32Array.from(input, (_, n) => (n < late ? 0 : 0.25 * input[n - late]));
      const expected = { bypass, previous: alone(series(1000), [input])[0].map((x) => 0.5 * x), aside }[heard];
      expect(chunk.channels[0]).toEqual(expected);
    },
  );

  describe('the residual', () => {
    const RESIDUAL = { part: 'distortion', gain: 100 } as const;

    test('is that of the chain in focus, with its gain, and its level is reported before that', async () => {
      const input = noise(21);
      const cell = await createCellProcessor(RATE, optionsFor(1, { heard: 'residual', residual: RESIDUAL }));
      const [out] = play(cell, [input]);
      const chain = createChain(optionsFor(1).chains[0] as ChainNumbers);
      setResidual(chain, 'distortion');
      const left = [new Float32Array(input.length)];
      processChain(chain, [input], [new Float32Array(input.length)], null, left);
      expect(out.subarray(1440)).toEqual(left[0].map((x) => 100 * x).subarray(1440));
      const reports = cell.port.sent.filter((message): message is Report => message.type === 'report');
      const { frame, output, residualSquare } = reports[3];
      const square = left[0].subarray(frame, frame + output.length).reduce((sum, x) => sum + x * x, 0) / output.length;
      expect(Math.abs(residualSquare / square - 1)).toBeLessThan(0.1);
    });

    test('another part, another chain and no longer being heard make no click', async () => {
      const chains = [series(5000), series(22000)];
      const cell = await createCellProcessor(RATE, optionsFor(1, { chains, heard: 'residual', residual: RESIDUAL }));
      const tone = (from: number) => Float32Array.from({ length: BLOCK * 40 }, (_, n) => 0.3 * Math.sin((n + from) * 0.05));
      let at = 0;
      const next = () => {
        const [out] = play(cell, [tone(at)]);
        at += BLOCK * 40;
        return out;
      };
      next();
      const usual = largestStep(next());
      const whole = Math.max(...next().map(Math.abs));
      for (const message of [
        { type: 'focus', slot: 1 },
        { type: 'residual', residual: { ...RESIDUAL, part: 'feedthrough' } },
        { type: 'residual', residual: RESIDUAL },
        { type: 'focus', slot: 0 },
      ] as const) {
        cell.tell(message);
        expect(largestStep(next())).toBeLessThan(2 * usual + whole / 200);
      }
      cell.tell({ type: 'hear', heard: 'bypass' });
      cell.tell({ type: 'residual', residual: { ...RESIDUAL, part: null } });
      next();
      cell.tell({ type: 'hear', heard: 'residual' });
      next();
      expect(next()).toEqual(new Float32Array(BLOCK * 40));
    });
  });

  test('says what part of its time it needs, and what left for the loudspeakers', async () => {
    const cell = await createCellProcessor(RATE, optionsFor(1, { heard: 'bypass', gain: 0.5 }));
    play(cell, [new Float32Array(BLOCK * 600).fill(0.5)]);
    const reports = cell.port.sent.filter((message): message is Report => message.type === 'report');
    expect(Math.sqrt(reports.at(-1)?.heardSquare ?? 0)).toBeCloseTo(0.25, 6);
    const load = reports.reduce((sum, report) => sum + report.loadFraction, 0) / reports.length;
    expect(load).toBeGreaterThanOrEqual(0);
    expect(load).toBeLessThan(5);
  });

  test('once disposed it asks to be let go', async () => {
    const cell = await createCellProcessor(RATE, optionsFor(1));
    const output = [new Float32Array(BLOCK)];
    expect(cell.run([], output)).toBe(true);
    cell.tell({ type: 'dispose' });
    expect(cell.run([], output)).toBe(false);
  });
});
