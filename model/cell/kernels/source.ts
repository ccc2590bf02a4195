/**
 * The text of the kernels: one function for each number of states, unrolled, its coefficients in local constants. Written at build time, because
 * code made at run time is refused by the page's policy; in TypeScript for the tool and in C for the bench, from the same template.
 *
 * Law      overdrives a, b of the two ends for no channel current are linear in old states, inputs and currents; with the current I they are
 *          a − αI and b + γI, and I = F(a − αI) − F(b + γI). For the square law that is a quadratic in each region, and g(I) falls
 *          monotonically for α, γ ≥ 0, so the region whose root is consistent is the only one
 * Scheme   roots as 2c/(q + √…), free of cancellation; junction currents, when one conducts, by the solver in ports.ts
 */
import * as L from './layout.ts';

export const STATE_COUNTS = [0, 1, 2, 3, 4];

interface Language {
  readonly constant: string;
  readonly variable: string;
  readonly sqrt: string;
  readonly open: (stateCount: number) => string;
}

const typescript: Language = {
  constant: 'const',
  variable: 'let',
  sqrt: 'Math.sqrt',
  open: (n) =>
    `function square${n}(c: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {\n` +
    '  for (let i = from; i < to; i++) {',
};

const c: Language = {
  constant: 'const double',
  variable: 'double',
  sqrt: 'sqrt',
  open: (n) =>
    `void square${n}(const double *restrict c, double *restrict s, const double *restrict audio, const double *restrict control, double *restrict output, int from, int to) {\n` +
    '  for (int i = from; i < to; i++) {',
};

/** The TypeScript module with all kernels. */
export function kernelModule(): string {
  const kernels = STATE_COUNTS.map((n) => kernel(n, typescript)).join('\n\n');
  return `/**
 * Square-law kernels, one for each number of states: written from source.ts by \`npm run kernels\`, where the method is explained. Not to be edited.
 *
 * Each advances a cell over the samples \`from\` to \`to\`: \`c\` coefficients and \`s\` state as in layout.ts, \`audio\` and \`control\` in V, \`output\` in V.
 */
// biome-ignore-all lint: written by a program
// biome-ignore-all format: written by a program
import { conduct } from '../ports.ts';

${kernels}

/** By number of states. */
export const SQUARE_KERNELS = [${STATE_COUNTS.map((n) => `square${n}`).join(', ')}];
`;
}

/** The same kernel in C, for the bench. */
export function kernelInC(stateCount: number): string {
  return kernel(stateCount, c);
}

function kernel(n: number, language: Language): string {
  const row = L.rowLayout(n);
  const all = L.coefficientLayout(n);
  const states = Array.from({ length: n }, (_, i) => i);
  const { constant, variable, sqrt } = language;
  const load: string[] = [];
  const rowName = (r: number) => (r === 0 ? 'a' : r === 1 ? 'b' : r === all.outputRow ? 'y' : `n${r - 2}_`);
  for (let r = 0; r < all.rows; r++) {
    for (let k = 0; k < row.width; k++) {
      const unused = r === all.outputRow && n > 0 && k >= row.oldU && k <= row.oldI;
      if (!unused) load.push(`${constant} ${rowName(r)}${k} = c[${r * row.width + k}];`);
    }
  }
  const device = (index: number) => `c[${all.device + index}]`;
  const weight = (r: number, k: number) => `c[${all.junction + r * L.JUNCTION_WIDTH + k}]`;
  const slot = (index: number) => `s[${n + index}]`;
  const linear = (r: number, x: string, isNew: boolean) => {
    const p = rowName(r);
    const terms = states.map((i) => `${p}${i} * ${x}${i}`);
    terms.push(`${p}${row.newU} * u`, `${p}${row.newU + 1} * v`);
    if (n > 0 && !isNew) terms.push(`${p}${row.oldU} * u0`, `${p}${row.oldU + 1} * v0`, `${p}${row.oldI} * I0`);
    terms.push(`${p}${row.constant}`);
    return terms.join(' + ');
  };
  const lines: string[] = [];
  lines.push(...load.map((line) => `  ${line}`));
  lines.push(
    `  ${constant} beta = ${device(L.BETA)}, bent = ${device(L.BENT)}, fall = ${device(L.FALL)}, rise = ${device(L.RISE)}, on = ${device(L.ON_V)};`,
    ...states.map((i) => `  ${variable} x${i} = s[${i}];`),
  );
  if (n > 0) lines.push(`  ${variable} u0 = ${slot(L.OLD_AUDIO)}, v0 = ${slot(L.OLD_CONTROL)};`);
  lines.push(`  ${variable} I0 = ${slot(L.CHANNEL_A)}, S0 = ${slot(L.JUNCTION_S)}, D0 = ${slot(L.JUNCTION_D)}, vs = 0, vd = 0;`);
  const [head, loop] = language.open(n).split('\n');
  lines.unshift(head);
  lines.push(loop);
  const body: string[] = [
    `${constant} u = audio[i], v = control[i];`,
    `${variable} a = ${linear(0, 'x', false)};`,
    `${variable} b = ${linear(1, 'x', false)};`,
  ];
  if (n > 0) {
    body.push(
      'if (S0 != 0 || D0 != 0) {',
      `  a += ${weight(0, L.OLD_S)} * S0 + ${weight(0, L.OLD_D)} * D0;`,
      `  b += ${weight(1, L.OLD_S)} * S0 + ${weight(1, L.OLD_D)} * D0;`,
      '}',
    );
  }
  body.push(
    `${variable} I = 0, S = 0, D = 0;`,
    'if (a > 0 || b > 0) {',
    `  ${constant} q = 1 + fall * a + rise * b;`,
    `  ${constant} w = beta * (a - b) * (a + b);`,
    `  I = 2 * w / (q + ${sqrt}(q * q - 4 * bent * w));`,
    `  if (!(a + a${row.newI} * I >= 0 && b + b${row.newI} * I >= 0)) {`,
    '    if (a > b) {',
    `      I = 2 * beta * a * a / (1 + fall * a + ${sqrt}(1 + 2 * fall * a));`,
    '    } else {',
    `      I = -2 * beta * b * b / (1 + rise * b + ${sqrt}(1 + 2 * rise * b));`,
    '    }',
    '  }',
    '}',
    `vs = a + a${row.newI} * I;`,
    `vd = b + b${row.newI} * I;`,
    'if (vs > on || vd > on) {',
    `  conduct(c, ${all.device}, ${row.newI}, ${row.width + row.newI}, ${all.junction}, s, ${n}, a, b, I);`,
    `  I = ${slot(L.CHANNEL_A)}; S = ${slot(L.JUNCTION_S)}; D = ${slot(L.JUNCTION_D)}; vs = ${slot(L.OVERDRIVE_S)}; vd = ${slot(L.OVERDRIVE_D)};`,
    '}',
  );
  states.forEach((i) => {
    body.push(`${variable} z${i} = ${linear(2 + i, 'x', false)} + ${rowName(2 + i)}${row.newI} * I;`);
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
  body.push(`${variable} y = 0;`);
  body.push('if (S != 0 || D != 0) {');
  states.forEach((i) => {
    body.push(`  x${i} += ${weight(2 + i, L.NEW_S)} * S + ${weight(2 + i, L.NEW_D)} * D;`);
  });
  body.push(`  y = ${weight(all.outputRow, L.NEW_S)} * S + ${weight(all.outputRow, L.NEW_D)} * D;`, '}');
  body.push(`output[i] = y + ${linear(all.outputRow, 'x', true)} + y${row.newI} * I;`);
  if (n > 0) body.push('u0 = u; v0 = v;');
  body.push('I0 = I; S0 = S; D0 = D;');
  lines.push(...body.map((line) => `    ${line}`), '  }');
  lines.push(...states.map((i) => `  s[${i}] = x${i};`));
  if (n > 0) lines.push(`  ${slot(L.OLD_AUDIO)} = u0; ${slot(L.OLD_CONTROL)} = v0;`);
  lines.push(
    `  ${slot(L.CHANNEL_A)} = I0; ${slot(L.JUNCTION_S)} = S0; ${slot(L.JUNCTION_D)} = D0;`,
    `  if (to > from) { ${slot(L.OVERDRIVE_S)} = vs; ${slot(L.OVERDRIVE_D)} = vd; }`,
    '}',
  );
  return lines.join('\n');
}
