/**
 * The text of the kernels: one function for each law and number of states, unrolled, its coefficients in local constants. Written at build time,
 * because code made at run time is refused by the page's policy; in TypeScript for the tool and in C for the bench, from the same template.
 *
 * Law      overdrives a, b of the two ends for no channel current are linear in old states, inputs and currents; with the current I they are
 *          a − αI and b + γI, and I = F(a − αI) − F(b + γI), which has one solution as its two sides move apart monotonically for α, γ ≥ 0.
 *          Beyond the knee F of the driving end is multiplied by 1 + λ·(the overdrive by which the other end is past VGS(off))
 * Scheme   square law: a quadratic in each region, roots as 2c/(q + √…), free of cancellation; the root that is consistent is the only one.
 *          Other laws, and λ: Newton from the current extrapolated along a straight line; where that does not settle, bisection.
 *          Junction currents, when one conducts, by the solver in ports.ts. Noise, where there is a row of it for each sample, adds to the rows;
 *          the channel's own is white with the conductance of the sample before (4kT/r: van der Ziel, Proc. IRE 50 (1962) 1808)
 * Error    Newton stops at a step under 1e-8 V in the overdrives; what is left is its square over the tail's width, under 1e-14 V
 */
import type { Law } from '../../design/types.ts';
import * as L from './layout.ts';

/** Kernels are written out for these numbers of states. */
export const STATE_COUNTS = [0, 1, 2, 3, 4, 5, 6, 7, 8];
const NEWTON_STEPS = 12;

interface Language {
  readonly constant: string;
  readonly variable: string;
  readonly sqrt: string;
  readonly open: (name: string) => string;
}

const typescript: Language = {
  constant: 'const',
  variable: 'let',
  sqrt: 'Math.sqrt',
  open: (name) =>
    `function ${name}(c: Float64Array, t: Float64Array, w: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {\n` +
    '  const noisy = w.length > 0;\n  for (let i = from; i < to; i++) {',
};

const c: Language = {
  constant: 'const double',
  variable: 'double',
  sqrt: 'sqrt',
  open: (name) =>
    `void ${name}(const double *restrict c, const double *restrict t, const double *restrict w, double *restrict s, const double *restrict audio, const double *restrict control, double *restrict output, int from, int to) {\n` +
    '  const int noisy = w != 0;\n  for (int i = from; i < to; i++) {',
};

/** The TypeScript module with all kernels of one law. */
export function kernelModule(law: Law): string {
  const kernels = STATE_COUNTS.map((n) => kernel(law, n, typescript)).join('\n\n');
  const helpers = law === 'square' ? 'bent, slopeAt' : law === 'gradual' ? 'searched, slopeAt' : 'searched, slopeAt, termAt';
  return `/**
 * Kernels of the ${law} law, one for each number of states: written from source.ts by \`npm run kernels\`, where the method is explained. Not to be edited.
 *
 * Each advances a cell over the samples \`from\` to \`to\`: \`c\` coefficients, \`t\` the law's table, \`w\` noise (or empty) and \`s\` state as in layout.ts, \`audio\` and
 * \`control\` in V, \`output\` in V.
 */
// biome-ignore-all lint: written by a program
// biome-ignore-all format: written by a program
import { ${helpers} } from './channel.ts';
import { conduct } from './ports.ts';

${kernels}

/** By number of states. */
export const ${law.toUpperCase()}_KERNELS = [${STATE_COUNTS.map((n) => `${law}${n}`).join(', ')}];
`;
}

/** The same kernel in C, for the bench. */
export function kernelInC(law: Law, stateCount: number): string {
  return kernel(law, stateCount, c);
}

function kernel(law: Law, n: number, language: Language): string {
  const row = L.rowLayout(n);
  const all = L.coefficientLayout(n);
  const states = Array.from({ length: n }, (_, i) => i);
  const { constant, variable } = language;
  const rowName = (r: number) => (r === 0 ? 'a' : r === 1 ? 'b' : r === all.outputRow ? 'y' : `n${r - 2}_`);
  const device = (index: number) => `c[${all.device + index}]`;
  const weight = (r: number, k: number) => `c[${all.junction + r * L.JUNCTION_WIDTH + k}]`;
  const slot = (index: number) => `s[${n + index}]`;
  const linear = (r: number, isNew: boolean) => {
    const p = rowName(r);
    const terms = states.map((i) => `${p}${i} * x${i}`);
    terms.push(`${p}${row.newU} * u`, `${p}${row.newU + 1} * v`);
    if (n > 0 && !isNew) terms.push(`${p}${row.oldU} * u0`, `${p}${row.oldU + 1} * v0`, `${p}${row.oldI} * I0`);
    terms.push(`${p}${row.constant}`);
    return terms.join(' + ');
  };

  const [head, noisy, loop] = language.open(`${law}${n}`).split('\n');
  const lines: string[] = [head, noisy];
  for (let r = 0; r < all.rows; r++) {
    for (let k = 0; k < row.width; k++) {
      const unused = r === all.outputRow && n > 0 && k >= row.oldU && k <= row.oldI;
      if (!unused) lines.push(`  ${constant} ${rowName(r)}${k} = c[${r * row.width + k}];`);
    }
  }
  lines.push(...deviceConstants(law, device).map(([name, value]) => `  ${constant} ${name} = ${value};`));
  lines.push(...states.map((i) => `  ${variable} x${i} = s[${i}];`));
  if (n > 0) lines.push(`  ${variable} u0 = ${slot(L.OLD_AUDIO)}, v0 = ${slot(L.OLD_CONTROL)};`);
  lines.push(
    `  ${variable} I0 = ${slot(L.CHANNEL_A)}, S0 = ${slot(L.JUNCTION_S)}, D0 = ${slot(L.JUNCTION_D)}, E0 = ${slot(L.EARLIER_A)}, vs = ${slot(L.OVERDRIVE_S)}, vd = ${slot(L.OVERDRIVE_D)};`,
    loop,
  );

  const body: string[] = [
    `${constant} u = audio[i], v = control[i];`,
    `${variable} a = ${linear(0, false)};`,
    `${variable} b = ${linear(1, false)};`,
  ];
  if (n > 0) {
    body.push(
      'if (S0 != 0 || D0 != 0) {',
      `  a += ${weight(0, L.OLD_S)} * S0 + ${weight(0, L.OLD_D)} * D0;`,
      `  b += ${weight(1, L.OLD_S)} * S0 + ${weight(1, L.OLD_D)} * D0;`,
      '}',
    );
  }
  const aI = `a${row.newI}`;
  const bI = `b${row.newI}`;
  const places = `${all.device}, ${row.newI}, ${row.width + row.newI}`;
  const noise = (k: number) => `w[i * ${all.rows + 1} + ${k}]`;
  body.push(
    `${variable} I = 0, S = 0, D = 0, J = 0;`,
    'if (noisy) {',
    `  J = ${noise(all.rows)} * ${language.sqrt}(0.5 * (slopeAt(c, t, ${all.device}, vs) + slopeAt(c, t, ${all.device}, vd)));`,
    `  a += ${noise(0)} + ${aI} * J;`,
    `  b += ${noise(1)} + ${bI} * J;`,
    '}',
  );
  body.push(...(law === 'square' ? squareSolution(aI, bI, places, language) : newtonSolution(law, aI, bI, places, slot, language)));
  body.push(
    'if (vs > on || vd > on) {',
    `  conduct(c, t, ${places}, ${all.junction}, s, ${n}, a, b, I);`,
    `  I = ${slot(L.CHANNEL_A)}; S = ${slot(L.JUNCTION_S)}; D = ${slot(L.JUNCTION_D)}; vs = ${slot(L.OVERDRIVE_S)}; vd = ${slot(L.OVERDRIVE_D)};`,
    '}',
  );
  body.push('I += J;');
  states.forEach((i) => {
    body.push(`${variable} z${i} = ${linear(2 + i, false)} + ${rowName(2 + i)}${row.newI} * I;`);
  });
  if (n > 0) {
    body.push('if (S0 != 0 || D0 != 0) {');
    states.forEach((i) => {
      body.push(`  z${i} += ${weight(2 + i, L.OLD_S)} * S0 + ${weight(2 + i, L.OLD_D)} * D0;`);
    });
    body.push('}');
  }
  states.forEach((i) => {
    body.push(`x${i} = z${i};`);
  });
  body.push(`${variable} y = 0;`, 'if (noisy) {');
  states.forEach((i) => {
    body.push(`  x${i} += ${noise(2 + i)};`);
  });
  body.push(`  y = ${noise(all.outputRow)};`, '}');
  body.push('if (S != 0 || D != 0) {');
  states.forEach((i) => {
    body.push(`  x${i} += ${weight(2 + i, L.NEW_S)} * S + ${weight(2 + i, L.NEW_D)} * D;`);
  });
  body.push(`  y += ${weight(all.outputRow, L.NEW_S)} * S + ${weight(all.outputRow, L.NEW_D)} * D;`, '}');
  body.push(`output[i] = y + ${linear(all.outputRow, true)} + y${row.newI} * I;`);
  if (n > 0) body.push('u0 = u; v0 = v;');
  body.push('E0 = I0; I0 = I; S0 = S; D0 = D;');
  lines.push(...body.map((line) => `    ${line}`), '  }');

  lines.push(...states.map((i) => `  s[${i}] = x${i};`));
  if (n > 0) lines.push(`  ${slot(L.OLD_AUDIO)} = u0; ${slot(L.OLD_CONTROL)} = v0;`);
  lines.push(
    `  ${slot(L.CHANNEL_A)} = I0; ${slot(L.JUNCTION_S)} = S0; ${slot(L.JUNCTION_D)} = D0; ${slot(L.EARLIER_A)} = E0;`,
    `  if (to > from) { ${slot(L.OVERDRIVE_S)} = vs; ${slot(L.OVERDRIVE_D)} = vd; }`,
    '}',
  );
  return lines.join('\n');
}

function deviceConstants(law: Law, device: (index: number) => string): [string, string][] {
  const common: [string, string][] = [
    ['on', device(L.ON_V)],
    ['lambda', device(L.LAMBDA)],
    ['scale', device(L.SCALE)],
  ];
  if (law === 'square') return [...common, ['bent_', device(L.BENT)], ['fall', device(L.FALL)], ['rise', device(L.RISE)]];
  const shaped: [string, string][] = [...common, ['inverseWidth', device(L.INVERSE_WIDTH)], ['slope', device(L.SLOPE)]];
  return law === 'gradual' ? shaped : [...shaped, ['pieces', device(L.PIECES)]];
}

function squareSolution(aI: string, bI: string, places: string, { constant, sqrt }: Language): string[] {
  return [
    'if (a > 0 || b > 0) {',
    `  ${constant} q = 1 + fall * a + rise * b;`,
    `  ${constant} w = scale * (a - b) * (a + b);`,
    `  I = 2 * w / (q + ${sqrt}(q * q - 4 * bent_ * w));`,
    `  if (!(a + ${aI} * I >= 0 && b + ${bI} * I >= 0)) {`,
    '    if (a > b) {',
    `      I = 2 * scale * a * a / (1 + fall * a + ${sqrt}(1 + 2 * fall * a));`,
    '    } else {',
    `      I = -2 * scale * b * b / (1 + rise * b + ${sqrt}(1 + 2 * rise * b));`,
    '    }',
    `    if (lambda != 0) I = bent(c, t, ${places}, a, b, I);`,
    '  }',
    '}',
    `vs = a + ${aI} * I;`,
    `vd = b + ${bI} * I;`,
  ];
}

/** F and F′ at an overdrive, into variables that exist. */
function lawText(law: Law, v: string, F: string, f: string, { constant, sqrt }: Language): string[] {
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
    `  } else { ${F} = termAt(c, t, DEVICE, ${v}); ${f} = slopeAt(c, t, DEVICE, ${v}); }`,
    '}',
  ];
}

function newtonSolution(law: Law, aI: string, bI: string, places: string, slot: (index: number) => string, language: Language): string[] {
  const { variable } = language;
  const device = places.split(',')[0];
  const text = (v: string, F: string, f: string) => lawText(law, v, F, f, language).map((line) => `  ${line.replaceAll('DEVICE', device)}`);
  return [
    'I = 2 * I0 - E0;',
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
    '  if (moved < 1e-8 && moved > -1e-8) { settled = 1; break; }',
    '}',
    `if (settled == 0) { I = searched(c, t, ${places}, a, b); ${slot(L.FALLBACKS)} += 1; }`,
    `vs = a + ${aI} * I; vd = b + ${bI} * I;`,
  ];
}
