import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { createChain, processChain } from '../../../model/chain/chain.ts';
import { compileChain } from '../../../model/chain/compile.ts';
import type { Cell, Control, Design } from '../../../model/design/types.ts';
import { designOf, variantOf } from '../../support/designs.ts';

interface LoopRecord {
  readonly gainVPerV: number;
  readonly rectifier: 'half' | 'full';
  readonly attackSec: number;
  readonly releaseOhm: number;
  readonly thresholdV: number;
  readonly feedback: string;
  readonly channels: number;
  readonly linked: boolean;
  /** Of each channel. */
  readonly drainV: readonly (readonly number[])[];
}

const { params, controlOhm, feedbacks, rateHz, edgesSec, levelsV, channels, every, records } = JSON.parse(
  readFileSync(new URL('../../reference/loop.json', import.meta.url), 'utf8'),
);

const db = (error: number, truth: number) => 10 * Math.log10(error / truth);

function drive(share: number, hz: number): Float32Array {
  const samples = new Float32Array(Math.round(edgesSec[edgesSec.length - 1] * rateHz));
  levelsV.forEach((level: number, stretch: number) => {
    const from = Math.round(edgesSec[stretch] * rateHz);
    const to = Math.round(edgesSec[stretch + 1] * rateHz);
    for (let i = from; i < to; i++) samples[i] = level * share * Math.sin((2 * Math.PI * hz * (i - from)) / rateHz);
  });
  return samples;
}

function designFor({ gainVPerV, rectifier, attackSec, releaseOhm, thresholdV, feedback, linked }: LoopRecord): Design {
  const { timingF, restV, limitV, seriesOhm, idssA, gateOffV } = params;
  const control: Control = {
    source: 'envelope',
    senses: 'output',
    rectifier,
    attackOhm: attackSec / timingF,
    releaseOhm,
    timingF,
    thresholdV,
    gainVPerV,
    restV,
    limitV,
    linked,
  };
  const [drainOhm, blockingF] = feedbacks[feedback];
  const cell: Partial<Cell> = {
    seriesOhm,
    loadOhm: 1e15,
    controlOhm: feedback === 'none' ? 1 : controlOhm,
    feedback: feedback === 'none' ? { kind: 'none' } : { kind: 'resistor', drainOhm, blockingF },
  };
  return designOf(variantOf(cell, { idssA, gateOffV }, control), { oversampling: 1 });
}

test.each(records as LoopRecord[])(
  'a compressor that listens to its output, $gainVPerV V/V $rectifier wave, attack $attackSec s, release $releaseOhm µs, threshold $thresholdV V, ' +
    'feedback $feedback, $channels channels, linked $linked: under −90 dB from the continuous solution (reference/loop.py)',
  (record) => {
    const inputs = channels.slice(0, record.channels).map(([share, hz]: [number, number]) => drive(share, hz));
    const chain = createChain(compileChain(designFor(record), 0, rateHz, record.channels, 'lowLatency'));
    const outputs = inputs.map((input: Float32Array) => new Float32Array(input.length));
    processChain(chain, inputs, outputs);
    let error = 0;
    let power = 0;
    record.drainV.forEach((truths, channel) => {
      truths.forEach((truth, k) => {
        error += (outputs[channel][k * every] - truth) ** 2;
        power += truth ** 2;
      });
    });
    expect(db(error, power)).toBeLessThan(-90);
  },
);
