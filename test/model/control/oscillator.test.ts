import { expect, test } from 'vitest';
import { compileOscillator, oscillatorValues, runOscillator } from '../../../model/control/oscillator.ts';
import { controlRangeV, restControlV } from '../../../model/control/range.ts';
import type { Control } from '../../../model/design/types.ts';

type Shape = Extract<Control, { source: 'lfo' }>['shape'];

const lfo = (shape: Shape, edgeSec = 0.01): Control => ({
  source: 'lfo',
  shape,
  rateHz: 5,
  fromV: -0.5,
  toV: -2,
  edgeSec,
});

function run(control: Control, rateHz: number, seconds: number): Float64Array {
  const numbers = compileOscillator(control, rateHz);
  const output = new Float64Array(Math.round(rateHz * seconds));
  runOscillator(numbers.shape, oscillatorValues(numbers), new Float64Array(1), output, 0, output.length);
  return output;
}

test('the sine is the definition, to the rounding of ten thousand added steps', () => {
  const output = run(lfo('sine'), 10000, 1);
  output.forEach((v, n) => {
    expect(Math.abs(v - (-1.25 - 0.75 * Math.sin((2 * Math.PI * 5 * n) / 10000)))).toBeLessThan(1e-11);
  });
});

test('each shape starts midway, moves towards toV and stays between its ends', () => {
  for (const shape of ['sine', 'triangle', 'square', 'rising'] as const) {
    const output = run(lfo(shape), 8000, 0.4);
    expect(output[0]).toBe(-1.25);
    expect(output[5]).toBeLessThan(-1.25);
    expect(Math.min(...output)).toBeCloseTo(-2, 3);
    expect(Math.max(...output)).toBeCloseTo(-0.5, 3);
  }
});

test('the square lasts edgeSec from end to end', () => {
  const output = run(lfo('square', 0.02), 100000, 0.2);
  const moving = output.filter((v) => v > -1.9999 && v < -0.5001).length / 100000;
  expect(moving).toBeCloseTo(0.04, 3);
});

test('an edge longer than half a period is refused by name', () => {
  expect(() => compileOscillator(lfo('square', 0.11), 48000)).toThrow(
    'control.edgeSec is 0.11; expected at most half a period, 0.1 s at 5 Hz',
  );
});

test('cutting into blocks of any size changes no bit', () => {
  const numbers = compileOscillator(lfo('triangle'), 8000);
  const whole = new Float64Array(5000);
  runOscillator(numbers.shape, oscillatorValues(numbers), new Float64Array(1), whole, 0, 5000);
  const cut = new Float64Array(5000);
  const values = oscillatorValues(numbers);
  const phase = new Float64Array(1);
  for (let at = 0; at < 5000; at += 7) runOscillator(numbers.shape, values, phase, cut, at, Math.min(5000, at + 7));
  expect(cut).toEqual(whole);
});

test('range and rest of each control', () => {
  expect(controlRangeV(lfo('sine'))).toEqual([-2, -0.5]);
  expect(restControlV(lfo('sine'))).toBe(-1.25);
  expect(controlRangeV({ source: 'fixed', controlV: -1 })).toEqual([-1, -1]);
  expect(controlRangeV({ source: 'external', fullScaleV: 2, offsetV: -1 })).toEqual([-3, 1]);
});

test('a rising ramp returns within edgeSec, and a falling one is its mirror image in time', () => {
  const rising = run(lfo('rising', 0.02), 100000, 0.2);
  const falling = run(lfo('falling', 0.02), 100000, 0.2);
  const returning = rising.filter((v, n) => n > 0 && v > rising[n - 1]).length / 100000;
  expect(returning).toBeCloseTo(0.02, 3);
  for (let n = 1; n < 20000; n++) expect(falling[n]).toBeCloseTo(rising[20000 - n], 9);
});
