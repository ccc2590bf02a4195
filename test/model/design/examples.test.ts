import { readdirSync, readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { feedbackFraction, restGateFraction } from '../../../model/design/feedback.ts';
import { readDesign } from '../../../model/design/read.ts';
import type { Design, Variant } from '../../../model/design/types.ts';

const folder = new URL('../../../assets/designs/', import.meta.url);
const contents = (file: string) => readFileSync(new URL(file, folder), 'utf8');
const manifest: { name: string; title: string; scenario: string; listenFor: string }[] = JSON.parse(contents('manifest.json'));

function example(name: string): Design {
  const result = readDesign(contents(`${name}.json`));
  if ('faults' in result) throw new Error(result.faults.map((fault) => fault.sentence).join('\n'));
  return result.design;
}

/** The ends of the gate's swing at DC, by the divider. */
function gateEnds({ control, cell }: Variant): [number, number] {
  if (control.source !== 'lfo') throw new Error('not an LFO');
  return [control.fromV * restGateFraction(cell), control.toV * restGateFraction(cell)];
}

test('the manifest lists every example with its title, and every file is complete as a saved one is', () => {
  const files = readdirSync(folder).filter((file) => file.endsWith('.json') && file !== 'manifest.json');
  expect(manifest.map((entry) => `${entry.name}.json`).sort()).toEqual(files.sort());
  for (const { name, title, scenario, listenFor } of manifest) {
    expect(example(name)).toEqual(JSON.parse(contents(`${name}.json`)));
    expect(example(name).title).toBe(title);
    expect(scenario.match(/[.?]( |$)/g)).toHaveLength(2);
    expect(listenFor).toMatch(/\.$/);
  }
});

test('the harbour tremolo compares k 0.476, ½ and 0 over one swing of the gate, −0.6 V to −1.8 V', () => {
  const [a, b, c] = example('harbour-tremolo').variants;
  expect([a, b, c].map(({ cell }) => Number(feedbackFraction(cell).toFixed(3)))).toEqual([0.476, 0.5, 0]);
  expect(gateEnds(b)).toEqual([-0.6, -1.8]);
  expect(gateEnds(c)).toEqual([-0.6, -1.8]);
  expect(swingThroughCapacitor(a)).toEqual([expect.closeTo(-0.6, 2), expect.closeTo(-1.8, 2)]);
});

/** Bias as it is, swing divided by |(R2 + 1/jωC)/(R2 + R3 + 1/jωC)|: the pair with a blocking capacitor, drain at 0 V. */
function swingThroughCapacitor({ cell, control }: Variant): [number, number] {
  const { feedback, controlOhm } = cell;
  if (feedback.kind !== 'resistor' || feedback.blockingF === null || control.source !== 'lfo') throw new Error('not a blocked pair');
  const reactance = 1 / (2 * Math.PI * control.rateHz * feedback.blockingF);
  const divided = Math.hypot(feedback.drainOhm, reactance) / Math.hypot(feedback.drainOhm + controlOhm, reactance);
  const middle = (control.fromV + control.toV) / 2;
  const half = ((control.fromV - control.toV) / 2) * divided;
  return [middle + half, middle - half];
}

test('every tremolo goes past off: VGS below VGS(off) by the share of the full-scale swing that still turns the FET on', () => {
  for (const name of ['harbour-tremolo', 'lantern-pulse']) {
    const { fullScaleV, variants } = example(name);
    for (const variant of variants.filter((each) => each.cell.feedback.kind !== 'resistor' || each.cell.feedback.blockingF === null)) {
      const still = (1 - feedbackFraction(variant.cell)) * fullScaleV;
      expect(gateEnds(variant)[1], `${name} ${variant.name}`).toBeLessThan(variant.device.gateOffV - still);
    }
  }
});

test('the pad holds one gate voltage in all its variants, ohmic over the whole swing', () => {
  for (const { control, cell, device } of example('stage-box-pad').variants) {
    if (control.source !== 'fixed') throw new Error('not fixed');
    expect(control.controlV * restGateFraction(cell)).toBeCloseTo(-1.5, 2);
    expect(device.gateOffV).toBe(-2);
  }
});
