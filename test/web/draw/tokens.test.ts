import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';

const css = readFileSync(new URL('../../../web/style/tokens.css', import.meta.url), 'utf8');
const [light, dark] = [css.split('@media')[0], css.split('@media')[1]];

/** Least contrast that each use needs. Source: WCAG 2.2, success criteria 1.4.3 (text, large text) and 1.4.11 (graphics). */
const NEEDS = [
  ['ink', 'paper', 4.5],
  ['ink', 'tint', 4.5],
  ['ink2', 'paper', 4.5],
  ['ink2', 'tint', 4.5],
  ['ink3', 'paper', 3],
  ['edge', 'paper', 3],
  ['live', 'paper', 4.5],
  ['live', 'tint', 4.5],
  ['limit', 'paper', 4.5],
  ['limit', 'tint', 4.5],
  ['paper', 'limit', 4.5],
] as const;

describe.each([
  ['light', light],
  ['dark', dark],
])('in the %s scheme', (_, scheme) => {
  test.each(NEEDS)('%s on %s has the contrast %f that its use needs, in figures too', (front, back, least) => {
    expect(contrast(colour(scheme, front), colour(scheme, back))).toBeGreaterThanOrEqual(least);
  });
});

test('the formula gives 21 for black on white and 1 for a colour on itself', () => {
  expect(contrast('#000000', '#ffffff')).toBeCloseTo(21, 9);
  expect(contrast('#00718a', '#00718a')).toBe(1);
});

function colour(scheme: string, token: string): string {
  const found = new RegExp(`--${token}: (#[0-9a-f]{6});`).exec(scheme);
  if (found === null) throw new Error(`no token ${token}`);
  return found[1];
}

/** Source: WCAG 2.2, definitions of relative luminance and contrast ratio. */
function contrast(a: string, b: string): number {
  const [high, low] = [luminance(a), luminance(b)].sort((x, y) => y - x);
  return (high + 0.05) / (low + 0.05);
}

function luminance(hex: string): number {
  const [r, g, b] = [1, 3, 5].map((at) => {
    const value = Number.parseInt(hex.slice(at, at + 2), 16) / 255;
    return value <= 0.04045 ? value / 12.92 : ((value + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * r + 0.7152 * g + 0.0722 * b;
}
