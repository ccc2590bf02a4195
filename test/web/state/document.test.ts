import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest';
import { defaultDesign } from '../../../model/design/defaults.ts';
import { feedbackFraction } from '../../../model/design/feedback.ts';
import { createDocument } from '../../../web/state/document.ts';

beforeEach(() => {
  vi.useFakeTimers({ toFake: ['Date'] });
});
afterEach(() => {
  vi.useRealTimers();
});

const later = () => vi.setSystemTime(Date.now() + 5000);
const open = (tryOut = () => {}) => createDocument(defaultDesign(), tryOut);

describe('the document', () => {
  test('takes a value, and gives the one before back', () => {
    const document = open();
    expect(document.setValue('cell.seriesOhm', 6800)).toBeNull();
    later();
    expect(document.setDesignValue('title', 'Pad')).toBeNull();
    expect(document.variant.value.cell.seriesOhm).toBe(6800);
    document.undo();
    document.undo();
    expect(document.design.value).toEqual(defaultDesign());
    expect(document.canUndo.value).toBe(false);
    document.redo();
    document.redo();
    expect(document.design.value.title).toBe('Pad');
    expect(document.canRedo.value).toBe(false);
  });

  test('changes nothing when a value is refused, and says why with field, value and what was expected', () => {
    const document = open();
    const before = document.design.value;
    expect(document.setValue('cell.seriesOhm', -5)).toMatch(/seriesOhm is -5; expected .+ to .+/);
    expect(document.setValue('cell.nonsense', 1)).toContain('cell.nonsense');
    expect(document.setDesignValue('oversampling', 3)).toContain('oversampling is 3');
    expect(document.design.value).toBe(before);
    expect(document.canUndo.value).toBe(false);
  });

  test('a design that cannot sound is refused with the sentence it was refused with', () => {
    const document = open(() => {
      throw new RangeError('the network is singular');
    });
    expect(document.setValue('cell.seriesOhm', 6800)).toBe('the network is singular');
    expect(document.design.value).toEqual(defaultDesign());
  });

  test('a drag undoes as one change, two drags as two, and so do two values', () => {
    const document = open();
    for (const ohm of [5000, 6000, 7000]) document.setValue('cell.seriesOhm', ohm);
    document.setValue('cell.loadOhm', 2e6);
    document.setValue('cell.seriesOhm', 8000);
    later();
    document.setValue('cell.seriesOhm', 9000);
    const seen = [];
    while (document.canUndo.value) {
      document.undo();
      seen.push(document.variant.value.cell.seriesOhm);
    }
    expect(seen).toEqual([8000, 7000, 7000, 10000]);
  });

  test('keeps the last 200 changes', () => {
    const document = open();
    for (let i = 0; i < 250; i++) {
      later();
      document.setValue('cell.seriesOhm', 1000 + i);
    }
    let steps = 0;
    for (; document.canUndo.value; steps++) document.undo();
    expect(steps).toBe(200);
    expect(document.variant.value.cell.seriesOhm).toBe(1049);
  });

  test('another kind of feedback or control comes with its defaults', () => {
    const document = open();
    expect(document.setValue('cell.feedback.kind', 'resistor')).toBeNull();
    expect(document.variant.value.cell.feedback).toMatchObject({ kind: 'resistor' });
    expect(document.setValue('control.source', 'lfo')).toBeNull();
    expect(document.variant.value.control).toMatchObject({ source: 'lfo', shape: 'sine' });
  });

  test('k is set in the heard variant alone, keeping what was asked to be kept', () => {
    const document = open();
    document.setValue('cell.feedback.kind', 'resistor');
    document.setValue('control', { source: 'fixed', controlV: -1.2 });
    document.addVariant();
    expect(document.heardVariant.value).toBe(1);
    const gate = (k: number, controlV: number) => controlV * (1 - k);
    const before = document.variant.value;
    if (before.control.source !== 'fixed') throw new Error('the control was to be fixed');
    expect(document.setFeedbackFraction(0.3)).toBeNull();
    const { cell, control } = document.variant.value;
    expect(feedbackFraction(cell)).toBeCloseTo(0.3, 12);
    if (control.source !== 'fixed') throw new Error('the control was to be fixed');
    expect(gate(0.3, control.controlV)).toBeCloseTo(gate(feedbackFraction(before.cell), before.control.controlV), 12);
    document.setKeep('control');
    document.setFeedbackFraction(0.4);
    expect(document.variant.value.control).toEqual(control);
    expect(document.design.value.variants[0].cell).toEqual(before.cell);
    expect(document.setFeedbackFraction(1.5)).toContain('1.5');
  });

  test('k moves the resistors that were asked to be moved', () => {
    const document = open();
    document.setValue('cell.feedback', { kind: 'resistor', drainOhm: 1e6, blockingF: null });
    document.setValue('cell.controlOhm', 1e6);
    document.setMoves('bothKeepSum');
    document.setFeedbackFraction(0.4);
    expect(document.variant.value.cell).toMatchObject({ controlOhm: 0.8e6, feedback: { drainOhm: 1.2e6 } });
    document.setMoves('controlOhm');
    document.setFeedbackFraction(0.5);
    expect(document.variant.value.cell).toMatchObject({ controlOhm: 1.2e6, feedback: { drainOhm: 1.2e6 } });
  });

  test('the right channel gets a part of its own, keeps its values while the left one’s change, and gives it back', () => {
    const document = open();
    const { device } = document.variant.value;
    expect(document.setValues([['devices', [device, device]]])).toBeNull();
    later();
    expect(document.setValue('devices.1.idssA', 0.004)).toBeNull();
    later();
    expect(document.setValue('devices.0.idssA', 0.002)).toBeNull();
    expect(document.variant.value.devices?.map(({ idssA }) => idssA)).toEqual([0.002, 0.004]);
    later();
    const [left] = document.variant.value.devices ?? [];
    const same = [
      ['device', left],
      ['devices', undefined],
    ] as const;
    expect(document.setValues(same)).toBeNull();
    expect(document.variant.value.devices).toBeUndefined();
    expect(document.variant.value.device.idssA).toBe(0.002);
  });

  test('several values are one change, and a refused one among them leaves all as they were', () => {
    const document = open();
    const before = document.design.value;
    expect(
      document.setValues([
        ['cell.pad.kind', 'divider'],
        ['cell.pad.upperOhm', -1],
      ]),
    ).toContain('upperOhm');
    expect(document.design.value).toBe(before);
    expect(
      document.setValues([
        ['cell.pad.kind', 'divider'],
        ['cell.pad.upperOhm', 47e3],
      ]),
    ).toBeNull();
    expect(document.variant.value.cell.pad).toMatchObject({ kind: 'divider', upperOhm: 47e3 });
    document.undo();
    expect(document.design.value).toEqual(before);
  });

  test('a variant is copied under the next letter, up to four; undo never leaves one heard that is gone', () => {
    const document = open();
    for (let i = 0; i < 3; i++) expect(document.addVariant()).toBeNull();
    expect(document.design.value.variants.map(({ name }) => name)).toEqual(['A', 'B', 'C', 'D']);
    expect(document.addVariant()).toContain('at most four');
    document.hearVariant(3);
    while (document.canUndo.value) document.undo();
    expect(document.heardVariant.value).toBe(0);
    expect(() => document.hearVariant(2)).toThrow('There is no variant 2');
  });
});
