/** The laws of the channel as text: their constants, F and F′ at an overdrive, and the channel current of a sample from the overdrives for none. */
import type { Law } from '../../../design/types.ts';
import * as L from '../layout.ts';
import type { Language } from './language.ts';

export const NEWTON_STEPS = 40;

export function deviceConstants(law: Law, device: (index: number) => string): [string, string][] {
  const common: [string, string][] = [
    ['on', device(L.ON_V)],
    ['lambda', device(L.LAMBDA)],
    ['scale', device(L.SCALE)],
  ];
  if (law === 'square') return [...common, ['fall', device(L.FALL)], ['rise', device(L.RISE)]];
  const shaped: [string, string][] = [
    ...common,
    ['inverseWidth', device(L.INVERSE_WIDTH)],
    ['slope', device(L.SLOPE)],
    ['enough', device(L.ENOUGH_V)],
  ];
  return law === 'gradual' ? shaped : [...shaped, ['pieces', device(L.PIECES)]];
}

function givenText(slot: (index: number) => string): string {
  return `${slot(L.GIVEN_A)} = a; ${slot(L.GIVEN_B)} = b;`;
}

function searchText(places: string, slot: (index: number) => string): string {
  return `${givenText(slot)} searched(c, t, ${places}, s, ${slotsOf(slot)}); I = ${slot(L.GIVEN_FREE)}; ${slot(L.FALLBACKS)} += 1;`;
}

/** Where the slots begin. */
function slotsOf(slot: (index: number) => string): string {
  return slot(0).slice(2, -1);
}

export function squareSolution(
  aI: string,
  bI: string,
  places: string,
  slot: (index: number) => string,
  { constant, sqrt }: Language,
): string[] {
  const given = givenText(slot);
  const searches = searchText(places, slot);
  return [
    `if ((b > 0 && rise * b < -0.25) || (a > 0 && fall * a < -0.25)) { ${searches} }`,
    'else if (a > 0 || b > 0) {',
    // The discriminant of I = scale·(vs² − vd²), written so that nothing cancels where the two roots meet.
    `  ${constant} p = fall * a + rise * b, g = fall * b + rise * a;`,
    `  I = 2 * scale * (a - b) * (a + b) / (1 + p + ${sqrt}(1 + 2 * p + g * g));`,
    `  if (!(a + ${aI} * I >= 0 && b + ${bI} * I >= 0)) {`,
    '    if (a > b) {',
    `      I = 2 * scale * a * a / (1 + fall * a + ${sqrt}(1 + 2 * fall * a));`,
    '    } else {',
    `      I = -2 * scale * b * b / (1 + rise * b + ${sqrt}(1 + 2 * rise * b));`,
    '    }',
    `    if (lambda != 0) { ${given} ${slot(L.GIVEN_FREE)} = I; bent(c, t, ${places}, s, ${slotsOf(slot)}); I = ${slot(L.GIVEN_FREE)}; }`,
    '  } else if (p < 0) {',
    // Here what stands there without currents is beyond cut-off, and the sums above cancel: one step of Newton's method makes that good.
    `    ${constant} over = a + ${aI} * I, under = b + ${bI} * I;`,
    '    I -= (I - scale * (over - under) * (over + under)) / (1 + fall * over + rise * under);',
    '  }',
    '}',
    `vs = a + ${aI} * I;`,
    `vd = b + ${bI} * I;`,
  ];
}

/** J, the channel's noise current, from the unit noise and the overdrives of the sample before, with 4kT·g at the mean of the slopes. */
export function channelNoise(law: Law, unit: string, device: string, slot: (index: number) => string, { most, sqrt }: Language): string[] {
  if (law === 'square') return [`  J = ${unit} * ${sqrt}(scale * (${most}(vs, 0) + ${most}(vd, 0)));`];
  const at = (index: number) => slot(index).slice(2, -1);
  return [
    `  ${slot(L.OVERDRIVE_S)} = vs; ${slot(L.OVERDRIVE_D)} = vd;`,
    `  evaluate(c, t, ${device}, s, ${at(L.OVERDRIVE_S)}, ${at(L.TERM_S)}); evaluate(c, t, ${device}, s, ${at(L.OVERDRIVE_D)}, ${at(L.TERM_D)});`,
    `  J = ${unit} * ${sqrt}(0.5 * (${slot(L.TERM_S + 1)} + ${slot(L.TERM_D + 1)}));`,
  ];
}

/** F and F′ at an overdrive, into variables that exist. */
export function lawText(law: Law, v: string, F: string, f: string, { constant, sqrt }: Language): string[] {
  if (law === 'gradual') {
    return [
      `if (${v} > 0) {`,
      `  ${constant} q = ${v} * inverseWidth;`,
      '  if (q < 1) {',
      `    ${constant} r = ${sqrt}(1 - q), p = q / (1 + r);`,
      `    ${F} = scale * p * p * (1 + 2 * r); ${f} = slope * p;`,
      `  } else { ${F} = scale + slope * (${v} - 1 / inverseWidth); ${f} = slope; }`,
      '}',
    ];
  }
  return [
    `if (${v} * inverseWidth > -40) {`,
    `  ${constant} z = (${v} * inverseWidth + 40) * 8;`,
    '  if (z < pieces) {',
    `    ${constant} piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;`,
    `    ${F} = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));`,
    `    ${f} = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));`,
    `  } else { s[TERM] = ${v}; evaluate(c, t, DEVICE, s, TERM, TERM); ${F} = s[TERM]; ${f} = s[TERM + 1]; }`,
    '}',
  ];
}

/** Past currents that Newton's first guess runs through, from sample to sample; the square law is solved without a guess. */
export function guessText(law: Law, slot: (index: number) => string): { open: string; keep: string; close: string } {
  if (law === 'square') return { open: '', keep: '', close: '' };
  return {
    open: `, E0 = ${slot(L.EARLIER_A)}, F0 = ${slot(L.EARLIEST_A)}`,
    keep: 'F0 = E0; E0 = I0; ',
    close: ` ${slot(L.EARLIER_A)} = E0; ${slot(L.EARLIEST_A)} = F0;`,
  };
}

/** Newton's method from the parabola through the last three currents. A search may end far from these: the next guess then is what it found. */
export function newtonSolution(
  law: Law,
  aI: string,
  bI: string,
  places: string,
  slot: (index: number) => string,
  language: Language,
): string[] {
  const { variable } = language;
  const device = places.split(',')[0];
  const text = (v: string, F: string, f: string) =>
    lawText(law, v, F, f, language).map((line) => `  ${line.replaceAll('DEVICE', device).replaceAll('TERM', slot(L.TERM_S).slice(2, -1))}`);
  return [
    'I = 3 * (I0 - E0) + F0;',
    `${variable} settled = 0;`,
    `for (${language.variable === 'let' ? 'let' : 'int'} step = 0; step < ${NEWTON_STEPS}; step++) {`,
    `  vs = a + ${aI} * I; vd = b + ${bI} * I;`,
    `  ${variable} Fs = 0, fs = 0, Fd = 0, fd = 0;`,
    ...text('vs', 'Fs', 'fs'),
    ...text('vd', 'Fd', 'fd'),
    `  ${variable} h = Fs - Fd - I, slopes = ${aI} * fs - ${bI} * fd - 1;`,
    '  if (lambda != 0) {',
    `    if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * ${aI} * fs + ${bI} * Fs); }`,
    `    if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * ${bI} * fd + ${aI} * Fd); }`,
    '  }',
    `  ${language.constant} change = h / slopes;`,
    '  I -= change;',
    `  ${language.constant} moved = (${bI} - ${aI}) * change;`,
    '  if (moved < enough && moved > -enough) { settled = 1; break; }',
    '}',
    `if (settled == 0) { ${searchText(places, slot)} E0 = I; I0 = I; }`,
    `vs = a + ${aI} * I; vd = b + ${bI} * I;`,
  ];
}
