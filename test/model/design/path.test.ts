import { describe, expect, test } from 'vitest';
import { defaultDesign, defaultVariant } from '../../../model/design/defaults.ts';
import { fieldAt, getAt, rangeFault, setAt, setFromText } from '../../../model/design/path.ts';
import type { Variant } from '../../../model/design/types.ts';

const variant = defaultVariant();
const pair: Variant = { ...variant, devices: [variant.device, { ...variant.device, idssA: 2e-3 }] };

describe('reading and replacing', () => {
  test('a value is found by dots or brackets, in a variant and in a design', () => {
    expect(getAt(variant, 'cell.seriesOhm')).toBe(10e3);
    expect(getAt(pair, 'devices.1.idssA')).toBe(2e-3);
    expect(getAt(pair, 'devices[1].idssA')).toBe(2e-3);
    expect(getAt(defaultDesign(), 'variants[0].control.controlV')).toBe(-1.2);
    expect(getAt(variant, 'cell.feedback')).toEqual({ kind: 'none' });
  });

  test('replacing makes a new object and leaves the old one and all that is not on the way', () => {
    const before = structuredClone(pair);
    const after = setAt(pair, 'devices[1].idssA', 5e-3);
    expect(after.devices?.[1].idssA).toBe(5e-3);
    expect(pair).toEqual(before);
    expect(after.cell).toBe(pair.cell);
    expect(after.devices?.[0]).toBe(pair.devices?.[0]);
  });

  test('another kind brings its own defaults, the same kind keeps its values', () => {
    const withPair = setAt(variant, 'cell.feedback.kind', 'resistor');
    expect(withPair.cell.feedback).toEqual({ kind: 'resistor', drainOhm: 1e6, blockingF: null });
    const moved = setAt(withPair, 'cell.feedback.drainOhm', 470e3);
    expect(setAt(moved, 'cell.feedback.kind', 'resistor')).toEqual(moved);
    expect(setAt(moved, 'cell.feedback.kind', 'none').cell.feedback).toEqual({ kind: 'none' });
    expect(setAt(variant, 'cell.feed.kind', 'stage').cell.feed).toEqual({ kind: 'stage', couplingF: 1e-6, bleedOhm: 1e6 });
    expect(setAt(variant, 'cell.reference.kind', 'halfSupply').cell.reference).toMatchObject({ kind: 'halfSupply', supplyV: 9 });
    expect(setAt(defaultDesign(), 'noise.kind', 'thermal').noise).toEqual({ kind: 'thermal', seed: 1 });
    expect(setAt(variant, 'control.source', 'lfo').control).toMatchObject({ source: 'lfo', shape: 'sine', rateHz: 4 });
  });

  test('undefined takes the pair of devices away', () => {
    expect(setAt(pair, 'devices', undefined)).toEqual(variant);
  });

  test.each([
    [
      'cell.seriesOhms',
      'cell.seriesOhms does not exist; cell has circuit, feed, sourceOhm, pad, buffer, coupling, seriesOhm, drainReturnOhm, outputCouplingF, loadOhm, loadF, driverOhm, smoothing, controlOhm, feedback, clamp, reference, sharedGround, strayF (seriesOhm, perhaps)',
    ],
    ['sell', 'sell does not exist; the top level has name, device, devices, cell, control, output (cell, perhaps)'],
    ['cell.seriesOhm.x', 'cell.seriesOhm.x does not exist: cell.seriesOhm is one value'],
    ['cell.feedback.drainOhm', 'cell.feedback.drainOhm does not exist while cell.feedback.kind is "none"; set that to resistor first'],
    ['control.rateHz', 'control.rateHz does not exist while control.source is "fixed"; set that to lfo first'],
    ['devices[0].idssA', 'devices[0].idssA does not exist: this variant has no devices'],
    ['cell.__proto__', 'cell.__proto__ does not exist; cell has circuit'],
    ['constructor', 'constructor does not exist; the top level has'],
    ['', '“” is not a path'],
    ['cell..seriesOhm', '“cell..seriesOhm” is not a path'],
  ])('the path %j is refused with what there is instead', (path, sentence) => {
    expect(() => getAt(variant, path)).toThrow(sentence);
    expect(() => setAt(variant, path, 1)).toThrow(RangeError);
  });

  test('an index past the list and a kind that is none are refused', () => {
    expect(() => getAt(pair, 'devices[2].idssA')).toThrow('devices[2].idssA does not exist; devices has 0, 1');
    expect(() => setAt(variant, 'cell.feedback.kind', 'magnet')).toThrow(
      'cell.feedback.kind is "magnet"; expected none, resistor or buffered',
    );
  });
});

describe('fields', () => {
  test('a path tells unit, limits, default, choices and description', () => {
    expect(fieldAt('cell.seriesOhm')).toMatchObject({ kind: 'number', unit: 'Ω', min: 1, max: 100e6, default: 10e3, nullable: false });
    expect(fieldAt('variants[3].cell.seriesOhm')).toBe(fieldAt('cell.seriesOhm'));
    expect(fieldAt('control.shape')).toMatchObject({
      kind: 'choice',
      choices: ['sine', 'triangle', 'square', 'rising', 'falling'],
      default: 'sine',
    });
    expect(fieldAt('cell.feed.inductanceH')).toMatchObject({ unit: 'H', default: 4 });
    expect(fieldAt('output.slewVPerSec')).toMatchObject({ unit: 'V/s', default: null, nullable: true });
    expect(fieldAt('cell.sharedGround.drawAPerV').unit).toBe('S');
    expect(fieldAt('noise.seed')).toMatchObject({ unit: '', min: 0, max: 2 ** 32 - 1, whole: true, default: 1 });
    expect(fieldAt('cell.seriesOhm')).not.toHaveProperty('whole');
    expect(fieldAt('cell.feedback.kind').choices).toEqual(['none', 'resistor', 'buffered']);
    expect(fieldAt('cell.feedback.blockingF')).toMatchObject({ unit: 'F', default: null, nullable: true });
    expect(fieldAt('control.linked')).toMatchObject({ kind: 'flag', default: true });
    expect(fieldAt('tempC').unit).toBe('°C');
    expect(fieldAt('control.fullScaleV').default).toBe(0.6);
    expect(fieldAt('fullScaleV').default).toBe(0.2);
  });

  test('a group and a path to nowhere are refused', () => {
    expect(() => fieldAt('cell.feedback')).toThrow('cell.feedback is not one value; it has kind, drainOhm, blockingF or fraction');
    expect(() => fieldAt('cell.x')).toThrow('cell.x does not exist');
    expect(() => fieldAt('variants[4].name')).toThrow('variants[4].name does not exist');
  });

  test('a value past its limits is named with them', () => {
    const printed = (sentence: string | null) => sentence?.replaceAll('\u2009', ' ');
    expect(printed(rangeFault(fieldAt('cell.seriesOhm'), 0.5, 'R1'))).toBe('R1 is 500 mΩ; it can be 1 Ω to 100 MΩ.');
    expect(printed(rangeFault(fieldAt('output.gainDb'), 61))).toBe('This is 61 dB; it can be −60 dB to 60 dB.');
    expect(printed(rangeFault(fieldAt('noise.seed'), 1.5, 'The seed'))).toBe('The seed is 1.5; it can be a whole number, 0 to 4294967295.');
    expect(rangeFault(fieldAt('cell.seriesOhm'), 100e6)).toBeNull();
    expect(rangeFault(fieldAt('noise.seed'), 2 ** 32 - 1)).toBeNull();
  });
});

describe('setting from text', () => {
  test.each<[string, string, unknown]>([
    ['cell.seriesOhm', '6k8', 6800],
    ['cell.seriesOhm', ' 6800 ', 6800],
    ['cell.loadF', '100n', 1e-7],
    ['device.law', 'gradual', 'gradual'],
    ['device.law', '"gradual"', 'gradual'],
    ['name', 'B', 'B'],
    ['control.controlV', '-1.2', -1.2],
    ['cell.feedback', '{"kind": "resistor", "drainOhm": 470e3}', { kind: 'resistor', drainOhm: 470e3, blockingF: null }],
  ])('%s = %s', (path, text, value) => expect(getAt(setFromText(variant, path, text), path)).toEqual(value));

  test('null and none take a part away, flags are words, a design takes its own values', () => {
    const withCapacitor = setFromText(setFromText(variant, 'cell.feedback.kind', 'resistor'), 'cell.feedback.blockingF', '100n');
    expect(getAt(withCapacitor, 'cell.feedback.blockingF')).toBe(1e-7);
    for (const text of ['null', 'none'])
      expect(getAt(setFromText(withCapacitor, 'cell.feedback.blockingF', text), 'cell.feedback.blockingF')).toBeNull();
    const envelope = setFromText(variant, 'control.source', 'envelope');
    expect(getAt(setFromText(envelope, 'control.linked', 'false'), 'control.linked')).toBe(false);
    expect(setFromText(defaultDesign(), 'oversampling', '16').oversampling).toBe(16);
    expect(setFromText(pair, 'devices', 'null')).toEqual(variant);
    expect(setFromText(variant, 'output.slewVPerSec', '13M').output.slewVPerSec).toBe(13e6);
    expect(setFromText(setFromText(defaultDesign(), 'noise.kind', 'thermal'), 'noise.seed', '7').noise).toEqual({
      kind: 'thermal',
      seed: 7,
    });
  });

  test.each([
    ['cell.seriesOhm', '1M2k', 'cell.seriesOhm: “1M2k” is not a resistance. Write 1M2, 1.2 M or 1200 k.'],
    ['cell.seriesOhm', 'null', 'cell.seriesOhm: “null” is not a resistance.'],
    ['cell.seriesOhm', '0.1', 'cell.seriesOhm is 0.1; expected 1 Ω to 100 MΩ'],
    ['device.law', 'cubic', 'device.law is "cubic"; expected square, gradual or smooth'],
    ['device.gateOffV', '1.5', 'device.gateOffV is 1.5; expected −20 V to −0.1 V for an n-channel part'],
    ['device', '{"idssA": }', 'device: Line 1, column 11 is not JSON: found "}"; expected a value'],
    ['cell.seriesOhms', '1', 'cell.seriesOhms does not exist'],
    ['cell.feed.inductanceH', '4', 'cell.feed.inductanceH does not exist while cell.feed.kind is "direct"; set that to pickup first'],
    ['cell.drainReturnOhm', '0', 'cell.drainReturnOhm is 0; expected 1 Ω to 1 GΩ, or null where there is none'],
  ])('%s = %s is refused with a sentence', (path, text, sentence) => {
    expect(() => setFromText(variant, path, text)).toThrow(sentence);
    expect(() => setFromText(variant, path, text)).toThrow(RangeError);
  });
});
