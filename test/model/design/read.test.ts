import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { defaultDesign, defaultVariant } from '../../../model/design/defaults.ts';
import { checkDesign, checkVariant, readDesign } from '../../../model/design/read.ts';
import { edited } from './edited.ts';

const least = { fettle: 1, variants: [{ name: 'A', device: {}, cell: {} }] };

function sentencesOf(result: ReturnType<typeof readDesign>): string[] {
  return 'faults' in result ? result.faults.map((fault) => fault.sentence) : [];
}

describe('what is left out', () => {
  test('takes the documented default, down to the least file that says anything', () => {
    expect(readDesign(JSON.stringify(least))).toEqual({ design: defaultDesign() });
  });

  test('control may be left out (fixed), output too (transparent), and devices stays absent, null or not there', () => {
    const { control, output } = defaultVariant();
    expect(control).toEqual({ source: 'fixed', controlV: -1.2 });
    expect(output).toEqual({ gainDb: 0, gainBandwidthHz: null, slewVPerSec: null, swingV: null });
    const result = checkVariant({ name: 'A', device: {}, cell: {}, devices: null });
    expect('variant' in result && Object.hasOwn(result.variant, 'devices')).toBe(false);
  });

  test('is absent in a file from before the board around the cell could be described, which reads as the cell alone', () => {
    const before = {
      sourceOhm: 600,
      seriesOhm: 22e3,
      loadOhm: 1e6,
      loadF: 1e-10,
      controlOhm: 910e3,
      feedback: { kind: 'resistor', drainOhm: 1e6 },
    };
    const result = checkDesign({
      ...least,
      variants: [{ name: 'A', device: {}, cell: { circuit: 'shunt', ...before }, output: { gainDb: 6 } }],
    });
    expect(result).toEqual({
      design: {
        ...defaultDesign(),
        noise: { kind: 'none' },
        variants: [
          {
            ...defaultVariant(),
            cell: {
              circuit: 'shunt',
              feed: { kind: 'direct' },
              pad: { kind: 'none' },
              buffer: { kind: 'none' },
              coupling: { kind: 'none' },
              drainReturnOhm: null,
              outputCouplingF: null,
              driverOhm: 0,
              smoothing: { kind: 'none' },
              clamp: { kind: 'none' },
              reference: { kind: 'ground' },
              sharedGround: { kind: 'none' },
              strayF: 0,
              ...before,
              feedback: { kind: 'resistor', drainOhm: 1e6, blockingF: null },
            },
            output: { gainDb: 6, gainBandwidthHz: null, slewVPerSec: null, swingV: null },
          },
        ],
      },
    });
  });

  test('is a fault where a design would be invented', () => {
    expect(sentencesOf(checkDesign({}))).toEqual([
      "fettle is missing; expected 1 (version of the document's layout)",
      'variants is missing; expected a list of 1 to 4 variants (up to four sets of circuit values)',
    ]);
    expect(sentencesOf(checkDesign({ fettle: 1, variants: [{}] })).map((sentence) => sentence.split(';')[0])).toEqual([
      'variants[0].name is missing',
      'variants[0].device is missing',
      'variants[0].cell is missing',
    ]);
  });

  test('the design that was read shares nothing with the value it was read from', () => {
    const cell = { seriesOhm: 10e3, feedback: { kind: 'none' } };
    const result = checkDesign({ ...least, variants: [{ name: 'A', device: {}, cell }] });
    Object.assign(cell, { seriesOhm: 1 });
    Object.assign(cell.feedback, { kind: 'buffered' });
    expect(result).toEqual({ design: defaultDesign() });
  });
});

describe('one sentence for each fault', () => {
  test.each<[string, unknown, string | RegExp]>([
    ['cell.seriesOhm', -5, 'is -5; expected 1 Ω to 100 MΩ'],
    ['cell.seriesOhm', 0, 'is 0; expected 1 Ω to 100 MΩ'],
    ['cell.controlOhm', 0.5, 'is 0.5; expected 1 Ω to 1 GΩ'],
    ['cell.loadF', -1e-12, 'is -1e-12; expected 0 F to 1000 μF'],
    ['cell.loadOhm', Number.NaN, 'is NaN; expected 1 Ω to 1 TΩ'],
    ['cell.loadOhm', Infinity, 'is Infinity; expected 1 Ω to 1 TΩ'],
    ['cell.loadOhm', '10k', 'is "10k"; expected 1 Ω to 1 TΩ, as a number without quotes'],
    ['cell.loadOhm', 'NaN', 'is "NaN"; expected 1 Ω to 1 TΩ, as a number without quotes'],
    ['cell.sourceOhm', null, 'is null; expected 0 Ω to 10 MΩ'],
    ['cell.sourceOhm', [1], 'is a list of 1; expected 0 Ω to 10 MΩ'],
    ['cell.circuit', 'series', 'is "series"; expected shunt'],
    ['cell.serieOhm', 1, 'is not a field here; expected seriesOhm, perhaps'],
    ['cell.feedback.drainOhm', 1e6, 'is not a field here; expected only where kind is resistor'],
    ['device', 3, /^is 3; expected an object with law, channel, .* and grading$/],
    ['device.idssA', 2, 'is 2; expected 1 μA to 1 A'],
    ['device.law', 'cubic', 'is "cubic"; expected square, gradual or smooth'],
    ['device.gateOffV', 1.5, 'is 1.5; expected −20 V to −0.1 V for an n-channel part'],
    ['device.gateOffV', -0.05, 'is -0.05; expected −20 V to −0.1 V for an n-channel part'],
    ['device.junction.leakageS', 1, 'is 1; expected 0 S to 1 μS'],
    ['output.colour', 1, 'is not a field here; expected gainDb, gainBandwidthHz, slewVPerSec or swingV'],
    ['device.grading', 0.7, 'is 0.7; expected 0 to 0.6'],
    ['cell.drainReturnOhm', 0, 'is 0; expected 1 Ω to 1 GΩ, or null where there is none'],
    ['cell.outputCouplingF', -1e-6, 'is -0.000001; expected 100 pF to 10 mF, or null where there is none'],
    ['cell.driverOhm', null, 'is null; expected 0 Ω to 10 MΩ'],
    ['cell.strayF', 1e-8, 'is 1e-8; expected 0 F to 1 nF'],
    ['cell.feed', 'pickup', 'is "pickup"; expected an object whose kind is direct, pickup or stage'],
    ['cell.pad', null, 'is null; expected an object whose kind is none or divider'],
    ['cell.buffer.offsetV', 0.01, 'is not a field here; expected only where kind is follower'],
    ['output.gainBandwidthHz', 100, 'is 100; expected 1 kHz to 10 GHz, or null where there is none'],
    ['output.slewVPerSec', 13, 'is 13; expected 100 V/s to 10 GV/s, or null where there is none'],
    ['output.swingV', 0, 'is 0; expected 100 mV to 1 kV, or null where there is none'],
    ['name', ' ', 'is " "; expected 1 to 24 characters in one line'],
    ['devices', [{}], 'is a list of 1; expected a list of 2 devices'],
  ])('in a variant, %s as %j %s', (path, value, rest) => {
    const [sentence, ...more] = sentencesOf(checkDesign(edited(defaultDesign(), `variants.0.${path}`, value)));
    expect(more).toEqual([]);
    expect(sentence.startsWith(`variants[0].${path} `)).toBe(true);
    expect(sentence.slice(`variants[0].${path} `.length)).toMatch(rest);
  });

  test.each<[string, unknown, string]>([
    ['device.channel', 'p', 'device.gateOffV is -1.5; expected 0.1 V to 20 V for a p-channel part'],
    [
      'cell.feedback',
      { drainOhm: 1e6 },
      'cell.feedback.kind is missing; expected none, resistor or buffered (how part of the drain voltage reaches the gate)',
    ],
    ['cell.feedback', { kind: 'buffered', fraction: 1.01 }, 'cell.feedback.fraction is 1.01; expected 0 to 1'],
    [
      'cell.feedback',
      { kind: 'resistor', blockingF: 0 },
      'cell.feedback.blockingF is 0; expected 1 pF to 1000 μF, or null where there is none',
    ],
    [
      'control',
      { source: 'lfo', shape: 'square', rateHz: 100, edgeSec: 6e-3 },
      'control.edgeSec is 0.006; expected at most half a period, 5 ms',
    ],
    [
      'control',
      { source: 'envelope', restV: -1.8, limitV: -0.3, gainVPerV: -1 },
      'control.gainVPerV is -1; expected 0 or more, since limitV (-0.3) is above restV (-1.8)',
    ],
    [
      'control',
      { source: 'lfo', shape: 'rising', rateHz: 4, edgeSec: 0.13 },
      'control.edgeSec is 0.13; expected at most half a period, 125 ms',
    ],
    ['control', { source: 'lfo', shape: 'falling', rateHz: 1000 }, 'control.edgeSec is 0.005; expected at most half a period, 500 μs'],
    [
      'control',
      { source: 'lfo', shape: 'sawtooth', rateHz: 1000 },
      'control.shape is "sawtooth"; expected sine, triangle, square, rising or falling',
    ],
    ['control', { source: 'envelope', attackOhm: 0 }, 'control.attackOhm is 0; expected 1 Ω to 100 MΩ'],
    ['control', { source: 'envelope', releaseOhm: 47 }, 'control.releaseOhm is 47; expected 100 Ω to 1 GΩ'],
    ['control', { source: 'envelope', timingF: 0 }, 'control.timingF is 0; expected 1 pF to 10 mF'],
    ['control', { source: 'envelope', releaseSec: 0.2 }, 'control.releaseSec is not a field here; expected releaseOhm, perhaps'],
    ['cell.feed', { kind: 'pickup', inductanceH: 0 }, 'cell.feed.inductanceH is 0; expected 1 mH to 100 H'],
    ['cell.feed', { kind: 'pickup', windingF: 0 }, 'cell.feed.windingF is 0; expected 0.1 pF to 10 nF'],
    ['cell.feed', { kind: 'pickup', cableF: 1e-6 }, 'cell.feed.cableF is 0.000001; expected 0.1 pF to 100 nF'],
    ['cell.feed', { kind: 'pickup', volumeOhm: 0 }, 'cell.feed.volumeOhm is 0; expected 1 kΩ to 100 MΩ'],
    ['cell.feed', { kind: 'pickup', bleedOhm: 1e6 }, 'cell.feed.bleedOhm is not a field here; expected only where kind is stage'],
    ['cell.feed', { kind: 'stage', couplingF: 1 }, 'cell.feed.couplingF is 1; expected 1 nF to 1000 μF'],
    ['cell.feed', { kind: 'stage', bleedOhm: 10 }, 'cell.feed.bleedOhm is 10; expected 1 kΩ to 1 GΩ'],
    ['cell.pad', { kind: 'divider', upperOhm: 0 }, 'cell.pad.upperOhm is 0; expected 1 Ω to 100 MΩ'],
    ['cell.pad', { kind: 'divider', lowerOhm: 0 }, 'cell.pad.lowerOhm is 0; expected 1 Ω to 100 MΩ'],
    ['cell.buffer', { kind: 'follower', offsetV: 2 }, 'cell.buffer.offsetV is 2; expected −1 V to 1 V'],
    ['cell.buffer', { kind: 'follower', biasA: 1 }, 'cell.buffer.biasA is 1; expected −1 mA to 1 mA'],
    ['cell.coupling', { kind: 'capacitor', couplingF: 0 }, 'cell.coupling.couplingF is 0; expected 100 pF to 10 mF'],
    ['cell.coupling', { kind: 'capacitor', leakOhm: 1 }, 'cell.coupling.leakOhm is 1; expected 10 kΩ to 100 TΩ'],
    ['cell.smoothing', { kind: 'rc', smoothingOhm: 0 }, 'cell.smoothing.smoothingOhm is 0; expected 1 Ω to 100 MΩ'],
    ['cell.smoothing', { kind: 'rc', smoothingF: 0 }, 'cell.smoothing.smoothingF is 0; expected 1 pF to 1000 μF'],
    ['cell.clamp', { kind: 'diode', reverseA: 0 }, 'cell.clamp.reverseA is 0; expected 1 fA to 10 μA'],
    ['cell.clamp', { kind: 'diode', ideality: 0.9 }, 'cell.clamp.ideality is 0.9; expected 1 to 3'],
    ['cell.clamp', { kind: 'zener' }, 'cell.clamp.kind is "zener"; expected none or diode'],
    ['cell.reference', { supplyV: 9 }, 'cell.reference.kind is missing; expected ground or halfSupply (what the source pin stands on)'],
    ['cell.reference', { kind: 'halfSupply', supplyV: 90 }, 'cell.reference.supplyV is 90; expected −60 V to 60 V'],
    ['cell.reference', { kind: 'halfSupply', upperOhm: 0 }, 'cell.reference.upperOhm is 0; expected 1 Ω to 100 MΩ'],
    ['cell.reference', { kind: 'halfSupply', lowerOhm: 0 }, 'cell.reference.lowerOhm is 0; expected 1 Ω to 100 MΩ'],
    ['cell.reference', { kind: 'halfSupply', decouplingF: 0 }, 'cell.reference.decouplingF is 0; expected 1 nF to 1 F'],
    ['cell.sharedGround', { kind: 'shared', groundOhm: 0 }, 'cell.sharedGround.groundOhm is 0; expected 0.1 mΩ to 100 Ω'],
    ['cell.sharedGround', { kind: 'shared', drawAPerV: 2 }, 'cell.sharedGround.drawAPerV is 2; expected −1 S to 1 S'],
    ['control', { source: 'envelope', linked: 1 }, 'control.linked is 1; expected true or false'],
    ['devices', [{}, { idssA: 0 }], 'devices[1].idssA is 0; expected 1 μA to 1 A'],
  ])('%s as %j leads to the fault that %s', (path, value, sentence) =>
    expect(sentencesOf(checkDesign(edited(defaultDesign(), `variants.0.${path}`, value)))).toEqual([`variants[0].${sentence}`]),
  );

  test.each<[string, unknown, string]>([
    ['title', 'two\nlines', 'title is "two\\nlines"; expected 1 to 80 characters in one line'],
    ['title', 'x'.repeat(81), `title is "${'x'.repeat(24)}…"; expected 1 to 80 characters in one line`],
    ['oversampling', 3, 'oversampling is 3; expected 1, 2, 4, 8 or 16'],
    ['tempC', 151, 'tempC is 151; expected −55 °C to 150 °C'],
    ['noise', { kind: 'pink' }, 'noise.kind is "pink"; expected none or thermal'],
    ['noise', { kind: 'none', seed: 1 }, 'noise.seed is not a field here; expected only where kind is thermal'],
    ['noise', { kind: 'thermal', seed: 0.5 }, 'noise.seed is 0.5; expected a whole number, 0 to 4294967295'],
    ['noise', { kind: 'thermal', seed: -1 }, 'noise.seed is -1; expected a whole number, 0 to 4294967295'],
    ['noise', { kind: 'thermal', seed: 2 ** 32 }, 'noise.seed is 4294967296; expected a whole number, 0 to 4294967295'],
    ['noise', { kind: 'thermal', seed: null }, 'noise.seed is null; expected a whole number, 0 to 4294967295'],
    ['fettle', '1', 'fettle is "1"; expected 1'],
    ['variants', [], 'variants is a list of 0; expected a list of 1 to 4 variants'],
    ['variants', 'A', 'variants is "A"; expected a list of 1 to 4 variants'],
    ['variants.1', defaultVariant('A'), 'variants[1].name is "A"; expected a name that no other variant has'],
    ['a b', 1, '["a b"] is not a field here; expected fettle, title, fullScaleV, tempC, oversampling, noise or variants'],
  ])('in the design, %s as %j is refused: %s', (path, value, sentence) =>
    expect(sentencesOf(checkDesign(edited(defaultDesign(), path, value)))).toEqual([sentence]),
  );

  test('the edge of a ramp may take half a period to the last digit, and a sine and a triangle have none to judge', () => {
    const lfo = { source: 'lfo', rateHz: 4, edgeSec: 0.125 };
    for (const shape of ['square', 'rising', 'falling'])
      expect(sentencesOf(checkDesign(edited(defaultDesign(), 'variants.0.control', { ...lfo, shape })))).toEqual([]);
    for (const shape of ['sine', 'triangle'])
      expect(sentencesOf(checkDesign(edited(defaultDesign(), 'variants.0.control', { ...lfo, shape, edgeSec: 10 })))).toEqual([]);
  });

  test('five variants are one fault, and a fault inside the fifth is another', () => {
    const variants = ['A', 'B', 'C', 'D', 'E'].map((name) => defaultVariant(name));
    expect(sentencesOf(checkDesign(edited({ fettle: 1, variants }, 'variants.4.cell.loadF', -1)))).toEqual([
      'variants is a list of 5; expected a list of 1 to 4 variants',
      'variants[4].cell.loadF is -1; expected 0 F to 1000 μF',
    ]);
  });

  test('a file with many faults names them all, with path, value and expectation apart', () => {
    const result = checkDesign({
      fettle: 1,
      tempC: 'warm',
      variants: [{ name: 7, device: { idssA: -1, law: 1 }, cell: { seriesOhm: null }, control: { source: 'random' } }],
    });
    expect('faults' in result && result.faults.map(({ path, value }) => [path, value])).toEqual([
      ['tempC', 'warm'],
      ['variants[0].name', 7],
      ['variants[0].device.law', 1],
      ['variants[0].device.idssA', -1],
      ['variants[0].cell.seriesOhm', null],
      ['variants[0].control.source', 'random'],
    ]);
  });

  test('zero is legal for resistance of the source, capacitances, and junction and leakage that are not there', () => {
    const junction = { reverseA: 0, leakageS: 0 };
    const device = { junction, gateSourceF: 0, gateDrainF: 0 };
    expect(sentencesOf(checkDesign({ fettle: 1, variants: [{ name: 'A', device, cell: { sourceOhm: 0, loadF: 0 } }] }))).toEqual([]);
  });
});

describe('files that are no design', () => {
  test.each([
    ['', 'Line 1, column 1 is not JSON: the file ends; expected a value'],
    ['{"fettle": 1,\n "variants": [}', 'Line 2, column 15 is not JSON: found "}"; expected a value'],
    ['[]', 'The design is a list of 0; expected an object with fettle, title, fullScaleV, tempC, oversampling, noise and variants'],
    ['null', 'The design is null; expected an object with fettle, title, fullScaleV, tempC, oversampling, noise and variants'],
    ['['.repeat(41), 'Line 1, column 41 is too deep; expected at most 40 levels of lists and objects'],
    [' '.repeat(5_000_001), 'The file is 5.0 million characters long; expected at most 5 million'],
  ])('case %#', (text, sentence) => expect(sentencesOf(readDesign(text))).toEqual([sentence]));

  test('a newer version is refused politely, and nothing else is said of it', () => {
    expect(sentencesOf(readDesign('{"fettle": 2, "cells": []}'))).toEqual([
      'This file is a fettle 2 design; this Fettle reads version 1. A newer Fettle will open it.',
    ]);
  });

  test('a byte order mark is no fault', () => {
    expect(readDesign(`\ufeff${JSON.stringify(least)}`)).toEqual({ design: defaultDesign() });
  });

  test('names that reach for prototypes are refused as fields, and reach nothing', () => {
    const sentences = sentencesOf(
      readDesign('{"fettle": 1, "__proto__": {"title": "x"}, "constructor": {"prototype": {"x": 1}}, "variants": []}'),
    );
    expect(sentences.slice(0, 2).map((sentence) => sentence.split(';')[0])).toEqual([
      '__proto__ is not a field here',
      'constructor is not a field here',
    ]);
    expect(({} as Record<string, unknown>).x).toBeUndefined();
    expect(sentencesOf(checkDesign(Object.create({ fettle: 1, variants: least.variants })))).toHaveLength(2);
  });

  test('a file of 5 MB that is all faults is answered with 200 of them and a word that there are more, in time', () => {
    const names = Array.from({ length: 400_000 }, (_, index) => `"x${index}":1`);
    const started = performance.now();
    const sentences = sentencesOf(readDesign(`{${names.join()}}`));
    expect(sentences).toHaveLength(201);
    expect(sentences[200]).toBe('There are more than 200 faults');
    expect(performance.now() - started).toBeLessThan(10_000);
  });

  test('any JSON value at any place gives a design or sentences, never an exception', () => {
    const paths = [
      'title',
      'tempC',
      'variants',
      'variants.0',
      'variants.0.device',
      'variants.0.devices',
      'variants.0.cell.feedback',
      'variants.0.control',
    ];
    fc.assert(
      fc.property(fc.jsonValue(), fc.constantFrom(...paths), (value, path) => {
        const result = readDesign(JSON.stringify(edited(defaultDesign(), path, value)));
        for (const sentence of sentencesOf(result)) expect(sentence).toMatch(/^\S.* (is|is not a field here|is missing)\b.*; expected ./);
        if ('design' in result) expect(checkDesign(result.design)).toEqual(result);
      }),
      { seed: 8, numRuns: 500 },
    );
  });
});

test('a pair of devices may stand in place of the device, which is then the left one', () => {
  const { device, ...rest } = defaultVariant();
  const pair = [device, { ...device, idssA: 0.004 }];
  const result = checkDesign({ fettle: 1, variants: [{ ...rest, devices: pair }] });
  if ('faults' in result) throw new Error(result.faults.map((fault) => fault.sentence).join('; '));
  expect(result.design.variants[0].device).toEqual(device);
  expect(result.design.variants[0].devices).toEqual(pair);
  const none = checkDesign({ fettle: 1, variants: [rest] });
  expect('faults' in none && none.faults.map((fault) => fault.path)).toEqual(['variants[0].device']);
  const faulty = checkDesign({ fettle: 1, variants: [{ ...rest, devices: [{ ...device, idssA: -1 }, device] }] });
  expect('faults' in faulty && faulty.faults.map((fault) => fault.path)).toEqual(['variants[0].devices[0].idssA']);
});
