import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { createChain, processChain } from '../../../model/chain/chain.ts';
import { compileChain } from '../../../model/chain/compile.ts';
import type { Control } from '../../../model/design/types.ts';
import { designOf, variantOf } from '../../support/designs.ts';

interface LoopRecord {
  readonly attackSec: number;
  readonly envelopeV: readonly number[];
  readonly drainV: readonly number[];
}

const { params, rateHz, edgesSec, levelsV, every, records } = JSON.parse(
  readFileSync(new URL('../../reference/loop.json', import.meta.url), 'utf8'),
);

const db = (error: number, truth: number) => 10 * Math.log10(error / truth);

function drive(): Float32Array {
  const samples = new Float32Array(Math.round(edgesSec[edgesSec.length - 1] * rateHz));
  levelsV.forEach((level: number, stretch: number) => {
    const from = Math.round(edgesSec[stretch] * rateHz);
    const to = Math.round(edgesSec[stretch + 1] * rateHz);
    for (let i = from; i < to; i++) samples[i] = level * Math.sin((2 * Math.PI * 1000 * (i - from)) / rateHz);
  });
  return samples;
}

test.each(records as LoopRecord[])(
  'a compressor that listens to its output, attack $attackSec s: under −85 dB from the continuous solution (reference/loop.py)',
  (record) => {
    const control: Control = {
      source: 'envelope',
      senses: 'output',
      rectifier: 'full',
      attackOhm: record.attackSec / params.timingF,
      releaseOhm: params.releaseOhm,
      timingF: params.timingF,
      thresholdV: params.thresholdV,
      gainVPerV: params.gainVPerV,
      restV: params.restV,
      limitV: params.limitV,
      linked: true,
    };
    const variant = variantOf(
      { seriesOhm: params.seriesOhm, loadOhm: 1e15, controlOhm: 1 },
      { idssA: params.idssA, gateOffV: params.gateOffV },
      control,
    );
    const chain = createChain(compileChain(designOf(variant, { oversampling: 1 }), 0, rateHz, 1, 'lowLatency'));
    const output = new Float32Array(drive().length);
    processChain(chain, [drive()], [output]);
    let error = 0;
    let power = 0;
    record.drainV.forEach((truth, k) => {
      error += (output[k * every] - truth) ** 2;
      power += truth ** 2;
    });
    expect(db(error, power)).toBeLessThan(-85);
  },
);
