/**
 * The text of the kernels: one function for each law and shape (how many trapezoidal and stiff states), unrolled, its coefficients in local constants. Written at build time,
 * because code made at run time is refused by the page's policy; in TypeScript for the tool and in C for the bench, from the same template.
 *
 * Law      each row remembers one sum of the past; overdrives a, b of the two ends for no channel current are linear in these, the inputs and
 *          the constants; with the current I they are
 *          a − αI and b + γI, and I = F(a − αI) − F(b + γI), which has one solution as its two sides move apart monotonically for α, γ ≥ 0.
 *          Beyond the knee F of the driving end is multiplied by 1 + λ·(the overdrive by which the other end is past VGS(off))
 * Scheme   square law: a quadratic in each region, roots as 2c/(q + √…), free of cancellation; the root that is consistent is the only one.
 *          Where γ < 0 bends the curve back (more than the drain's voltage fed back), the search of channel.ts.
 *          Other laws, and λ: Newton from the current extrapolated along a straight line; where that does not settle, bisection.
 *          Junction currents, when one conducts, by the solver in ports.ts. Noise, where there is a row of it for each sample, adds to the rows;
 *          the channel's own is white with the conductance of the sample before (4kT/r: van der Ziel, Proc. IRE 50 (1962) 1808)
 *          Where an end passes VGS(off) the output's curvature jumps: such kinks are marked for chain/kinks.ts to soften
 * Error    Newton stops at a step under `ENOUGH_V` in the overdrives; what is left is about its square over twice the overdrive
 */
import type { Law } from '../../design/types.ts';
import * as L from './layout.ts';

/**
 * What a kernel is written out for: the number of trapezoidal states; for each stiff state what it is the voltage of: `g` gate to source, `m` gate to
 * drain, which follow from the overdrives, or `x` anything else, which takes a row of its own; and for the output `d` drain to source or `x`.
 */
export interface Shape {
  readonly trapezoidal: number;
  readonly stiff: string;
  readonly output: 'd' | 'x';
}

/** `x` serves for every letter, and looped.ts for every other shape. */
export const SHAPES: readonly Shape[] = [
  ...written([0, 1, 2, 3, 4], '', 'd'),
  ...written([0, 1], 'x', 'd'),
  ...written([0, 1, 2], 'xg', 'd'),
  ...written([0, 1], 'gm', 'd'),
  ...written([0, 1, 2, 3], '', 'x'),
  ...written([0, 1, 2, 3], 'xx', 'x'),
  ...written([1, 2], 'xxx', 'x'),
];

function written(counts: readonly number[], stiff: string, output: 'd' | 'x'): Shape[] {
  return counts.map((trapezoidal) => ({ trapezoidal, stiff, output }));
}

/** By which a kernel is found. */
export function shapeKey({ trapezoidal, stiff, output }: Shape): string {
  return `${trapezoidal} ${stiff} ${output}`;
}

const NEWTON_STEPS = 40;

interface Language {
  /** The head of the solver for a conducting gate. */
  readonly conduct: (name: string) => string;
  readonly absolute: string;
  readonly least: string;
  readonly most: string;
  readonly constant: string;
  readonly variable: string;
  readonly sqrt: string;
  readonly open: (name: string) => string;
}

const typescript: Language = {
  conduct: (name) =>
    `function ${name}(c: Float64Array, t: Float64Array, device: number, aI: number, bI: number, junction: number, s: Float64Array, n: number): void {`,
  absolute: 'Math.abs',
  least: 'Math.min',
  most: 'Math.max',
  constant: 'const',
  variable: 'let',
  sqrt: 'Math.sqrt',
  open: (name) =>
    `function ${name}(c: Float64Array, t: Float64Array, w: Float64Array, e: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {\n` +
    '  const noisy = w.length > 0, marking = e.length > 0;\n  for (let i = from; i < to; i++) {',
};

const c: Language = {
  conduct: (name) => `static void ${name}(const double *c, const double *t, int device, int aI, int bI, int junction, double *s, int n) {`,
  absolute: 'fabs',
  least: 'fmin',
  most: 'fmax',
  constant: 'const double',
  variable: 'double',
  sqrt: 'sqrt',
  open: (name) =>
    `void ${name}(const double *restrict c, const double *restrict t, const double *restrict w, double *restrict e, double *restrict s, const double *restrict audio, const double *restrict control, double *restrict output, int from, int to) {\n` +
    '  const int noisy = w != 0, marking = e != 0;\n  for (int i = from; i < to; i++) {',
};

/** The TypeScript module with all kernels of one law. */
export function kernelModule(law: Law): string {
  const kernels = SHAPES.map((shape) => kernel(law, shape, typescript)).join('\n\n');
  const helpers = law === 'square' ? 'bent, evaluate, searched' : 'evaluate, searched';
  return `/**
 * Kernels of the ${law} law by number of trapezoidal and of stiff states: written from source.ts by \`npm run kernels\`, where the method is
 * explained. Not to be edited.
 *
 * Each advances a cell over the samples \`from\` to \`to\`: \`c\` coefficients, \`t\` the law's table, \`w\` noise (or empty), \`e\` kinks (or empty) and
 * \`s\` state as in layout.ts, \`audio\` and \`control\` in V, \`output\` in V.
 */
// biome-ignore-all lint: written by a program
// biome-ignore-all format: written by a program
import { ${helpers} } from './channel.ts';
import type { Conductor, Kernel, LoopedKernel } from './kernel.ts';
import { layoutOf, slotStart } from './layout.ts';
import { addGraded, keepCharges } from './graded.ts';
${law === 'smooth' ? '' : "import { markKink } from './kinks.ts';\n"}import { currents, searchPorts } from './ports.ts';
import { expAt } from '../../device/math.ts';

${conductor(law, typescript)}

${kernels}

${loopedKernel(law)}

export const ${law.toUpperCase()}_CONDUCTOR: Conductor = ${conductorName(law)};

/** For shapes that are not written out. */
export const ${law.toUpperCase()}_LOOPED: LoopedKernel = ${loopedName(law)};

/** By the key of a shape. */
export const ${law.toUpperCase()}_KERNELS: Readonly<Record<string, Kernel>> = {
${SHAPES.map((shape) => `  '${shapeKey(shape)}': ${kernelName(law, shape)},`).join('\n')}
};
`;
}

export function kernelName(law: Law, { trapezoidal, stiff, output }: Shape): string {
  return `${law}${trapezoidal}_${stiff}_${output}`;
}

/** The same kernel in C, for the bench, with its solver for a conducting gate. */
export function kernelInC(law: Law, shape: Shape): { conductor: string; kernel: string } {
  return { conductor: conductor(law, c), kernel: kernel(law, shape, c) };
}

function loopedName(law: Law): string {
  return `looped_${law}`;
}

function conductorName(law: Law): string {
  return `conduct_${law}`;
}

/** Newton on both overdrives while a junction, the clamp or a graded capacitance carries current: ports.ts explains. */
function conductor(law: Law, language: Language): string {
  const { constant, variable, absolute, least, most } = language;
  const device = (index: number) => `c[device + ${index}]`;
  const slot = (index: number) => `s[n + ${index}]`;
  const counter = variable === 'let' ? 'let' : 'int';
  const text = (v: string, F: string, f: string) =>
    (law === 'square' ? [`if (${v} > 0) { ${F} = scale * ${v} * ${v}; ${f} = 2 * scale * ${v}; }`] : lawText(law, v, F, f, language)).map(
      (line) => `    ${line.replaceAll('DEVICE', 'device').replaceAll('TERM', `n + ${L.TERM_S}`)}`,
    );
  /** Where an end last conducted, a step further along its line unless that is half of nVT; or just into conduction. */
  const start = (end: 'S' | 'D', free: string, over: number, earlier: number) => [
    `  ${constant} last${end} = ${slot(over)}, line${end} = last${end} - ${slot(earlier)};`,
    `  ${variable} v${end === 'S' ? 's' : 'd'} = ${least}(${free}, last${end} > on${end} ? last${end} + (line${end} * rate${end} < 0.5 && line${end} * rate${end} > -0.5 ? line${end} : 0) : knee${end});`,
  ];
  const cut = (end: 'S' | 'D', v: string) =>
    `    ${constant} step${end} = whole${end} * rate${end} <= 2 ? whole${end} : ${v} < on${end} ? ${least}(whole${end}, knee${end} - ${v}) : (2 + whole${end} * rate${end} / (1 + 0.1 * whole${end} * rate${end})) / rate${end};`;
  return [
    language.conduct(conductorName(law)),
    `  ${constant} a = ${slot(L.GIVEN_A)}, b = ${slot(L.GIVEN_B)}, freeA = ${slot(L.GIVEN_FREE)};`,
    `  ${constant} perAs = c[aI], perAd = c[bI], aS = c[junction], aD = c[junction + 1], bS = c[junction + 2], bD = c[junction + 3];`,
    `  ${constant} off = ${device(L.GATE_OFF_V)}, reverse = ${device(L.REVERSE_A)}, rateD = ${device(L.INVERSE_NVT)}, onD = ${device(L.JUNCTION_ON_V)};`,
    `  ${constant} clampA = ${device(L.CLAMP_A)}, clampRate = ${device(L.CLAMP_INVERSE_NVT)}, clampOn = ${device(L.CLAMP_ON_V)}, grading = ${device(L.GRADING)};`,
    `  ${constant} rateS = clampOn < onD ? clampRate : rateD, onS = clampOn < onD ? clampOn : onD, kneeS = onS + 20 / rateS, kneeD = onD + 20 / rateD;`,
    `  ${constant} enough = 0.1 * ${device(L.ENOUGH_V)}, rounding = 1e-15 * (${absolute}(a) + ${absolute}(b));`,
    ...deviceConstants(law, device)
      .filter(([name]) => !['on', 'bent_', 'fall', 'rise', 'enough'].includes(name))
      .map(([name, value]) => `  ${constant} ${name} = ${value};`),
    ...start('S', 'a + perAs * freeA', L.OVERDRIVE_S, L.EARLIER_S),
    ...start('D', 'b + perAd * freeA', L.OVERDRIVE_D, L.EARLIER_D),
    `  ${variable} junctionS = 0, junctionD = 0, clamped = 0, movedS = 1, movedD = 1;`,
    `  for (${counter} step = 0; step < ${NEWTON_STEPS}; step++) {`,
    `    ${variable} Fs = 0, fs = 0, Fd = 0, fd = 0;`,
    ...text('vs', 'Fs', 'fs'),
    ...text('vd', 'Fd', 'fd'),
    '    if (lambda != 0) {',
    `      ${constant} past = lambda * ${most}(-vd, 0), reversed = lambda * ${most}(-vs, 0), term = Fs;`,
    '      fs = fs * (1 + past) + (reversed > 0 ? lambda * Fd : 0);',
    '      fd = fd * (1 + reversed) + (past > 0 ? lambda * term : 0);',
    '      Fs = Fs * (1 + past); Fd = Fd * (1 + reversed);',
    '    }',
    ...exponential('vs', 'onD', 'movedS * rateD', 'junctionS', 'reverse', 'rateD', language),
    ...exponential('vd', 'onD', 'movedD * rateD', 'junctionD', 'reverse', 'rateD', language),
    ...exponential('vs', 'clampOn', 'movedS * clampRate', 'clamped', 'clampA', 'clampRate', language),
    `    ${variable} S = junctionS + clamped, slopeS = junctionS * rateD + clamped * clampRate, D = junctionD, slopeD = junctionD * rateD;`,
    '    if (grading != 0) {',
    `      ${slot(L.CHARGES_S + 4)} = vs; ${slot(L.CHARGES_D + 4)} = vd;`,
    `      addGraded(c, device, ${L.STEP_S}, s, n + ${L.CHARGES_S}, n + ${L.PORT_S}); S += ${slot(L.PORT_S)}; slopeS += ${slot(L.PORT_S + 1)};`,
    `      addGraded(c, device, ${L.STEP_D}, s, n + ${L.CHARGES_D}, n + ${L.PORT_D}); D += ${slot(L.PORT_D)}; slopeD += ${slot(L.PORT_D + 1)};`,
    '    }',
    `    ${constant} channel = Fs - Fd;`,
    `    ${constant} rs = vs - a - perAs * channel - aS * S - aD * D, rd = vd - b - perAd * channel - bS * S - bD * D;`,
    `    ${constant} ss = 1 - perAs * fs - aS * slopeS, sd = perAs * fd - aD * slopeD, ds = -perAd * fs - bS * slopeS, dd = 1 + perAd * fd - bD * slopeD;`,
    `    ${constant} over = 1 / (ss * dd - sd * ds), wholeS = (sd * rd - dd * rs) * over, wholeD = (ds * rs - ss * rd) * over;`,
    cut('S', 'vs'),
    cut('D', 'vd'),
    '    vs += stepS; vd += stepD; movedS = stepS; movedD = stepD;',
    `    if (${absolute}(stepS) < enough && ${absolute}(stepD) < enough) {`,
    `      ${slot(L.EARLIER_S)} = lastS; ${slot(L.EARLIER_D)} = lastD; ${slot(L.OVERDRIVE_S)} = vs; ${slot(L.OVERDRIVE_D)} = vd;`,
    `      ${slot(L.CHANNEL_A)} = channel + fs * stepS - fd * stepD;`,
    `      ${slot(L.JUNCTION_S)} = S + slopeS * stepS; ${slot(L.JUNCTION_D)} = D + slopeD * stepD;`,
    '      if (grading != 0) {',
    `        ${slot(L.CHARGES_S + 4)} += ${slot(L.CHARGES_S + 5)} * stepS; ${slot(L.CHARGES_D + 4)} += ${slot(L.CHARGES_D + 5)} * stepD;`,
    '        keepCharges(s, n);',
    '      }',
    '      return;',
    '    }',
    `    if (${absolute}(stepS) < rounding && ${absolute}(stepD) < rounding) {`,
    `      ${slot(L.OVERDRIVE_S)} = vs; ${slot(L.OVERDRIVE_D)} = vd;`,
    '      currents(c, t, device, s, n);',
    '      return;',
    '    }',
    '  }',
    '  searchPorts(c, t, device, aI, bI, junction, s, n, a, b);',
    '}',
  ].join('\n');
}

function kernel(law: Law, shape: Shape, language: Language): string {
  const { trapezoidal } = shape;
  const stiff = shape.stiff.length;
  const n = trapezoidal + stiff;
  const row = L.rowLayout(n);
  const past = L.memoryLayout(n);
  const all = L.coefficientLayout(n);
  const slots = L.slotStart(trapezoidal, stiff);
  const states = Array.from({ length: n }, (_, i) => i);
  const stiffStates = states.slice(trapezoidal);
  /** What a state or the output follows from, or null where it has a row. */
  const shortcut = (letter: string): string | null =>
    letter === 'g' ? 'sign * (vs + off)' : letter === 'm' ? 'sign * (vd + off)' : letter === 'd' ? 'sign * (vs - vd)' : null;
  const stateShortcut = (i: number) => (i < trapezoidal ? null : shortcut(shape.stiff[i - trapezoidal]));
  const hasRow = (r: number) => (r === all.outputRow ? shape.output === 'x' : r < 2 || stateShortcut(r - 2) === null);
  const { constant, variable } = language;
  const rowName = (r: number) => (r === 0 ? 'a' : r === 1 ? 'b' : r === all.outputRow ? 'y' : `n${r - 2}_`);
  const device = (index: number) => `c[${all.device + index}]`;
  const weight = (r: number, k: number) => `c[${all.junction + r * L.JUNCTION_WIDTH + k}]`;
  const oldWeight = (i: number, k: number) => `c[${all.memoryJunction + i * L.JUNCTION_WIDTH + k}]`;
  const slot = (index: number) => `s[${slots + index}]`;
  const linear = (r: number, from: string) => {
    const p = rowName(r);
    return sum([...states.map((i) => `${p}${i} * ${from}${i}`), `${p}${row.u} * u`, `${p}${row.u + 1} * v`, `${p}${row.constant}`]);
  };
  /** What a row remembers: a stiff row the past of the stiff states, a trapezoidal one their last value and the old current too. */
  const memory = (i: number) => {
    const isStiff = i >= trapezoidal;
    const terms = states.map((k) => `m${i}_${k} * ${isStiff && k >= trapezoidal ? 'p' : 'x'}${k}`);
    terms.push(`m${i}_${past.oldU} * u0`, `m${i}_${past.oldU + 1} * v0`);
    if (!isStiff) terms.push(`m${i}_${past.oldI} * I0`);
    return sum(terms);
  };

  const [head, noisy, loop] = language.open(kernelName(law, shape)).split('\n');
  const lines: string[] = [head, noisy];
  for (let r = 0; r < all.rows; r++) {
    if (!hasRow(r)) continue;
    for (let k = 0; k < row.width; k++) lines.push(`  ${constant} ${rowName(r)}${k} = c[${r * row.width + k}];`);
  }
  for (const i of states) {
    for (let k = 0; k < past.width - (i >= trapezoidal ? 1 : 0); k++) {
      lines.push(`  ${constant} m${i}_${k} = c[${all.memory + i * past.width + k}];`);
    }
  }
  lines.push(`  ${constant} sign = ${device(L.POLARITY)}, off = ${device(L.GATE_OFF_V)};`);
  lines.push(...deviceConstants(law, device).map(([name, value]) => `  ${constant} ${name} = ${value};`));
  lines.push(...states.map((i) => `  ${variable} x${i} = s[${i}];`));
  stiffStates.forEach((i, k) => {
    lines.push(`  ${variable} e${i} = s[${n + k}], f${i} = s[${n + stiff + k}], g${i} = s[${n + 2 * stiff + k}];`);
  });
  if (n > 0) lines.push(`  ${variable} u0 = ${slot(L.OLD_AUDIO)}, v0 = ${slot(L.OLD_CONTROL)};`);
  lines.push(
    `  ${variable} I0 = ${slot(L.CHANNEL_A)}, S0 = ${slot(L.JUNCTION_S)}, D0 = ${slot(L.JUNCTION_D)}, E0 = ${slot(L.EARLIER_A)}, vs = ${slot(L.OVERDRIVE_S)}, vd = ${slot(L.OVERDRIVE_D)};`,
    loop,
  );

  const bends = law !== 'smooth';
  const body: string[] = [`${constant} u = audio[i], v = control[i];`];
  if (bends) body.push(`${constant} qs = vs, qd = vd;`);
  for (const i of stiffStates) body.push(`${constant} p${i} = 3.5 * x${i} - 2.25 * e${i} + ${5 / 6} * f${i} - 0.125 * g${i};`);
  for (const i of states) body.push(`${variable} r${i} = ${memory(i)};`);
  if (trapezoidal > 0) {
    body.push('if (S0 != 0 || D0 != 0) {');
    for (const i of states.slice(0, trapezoidal)) body.push(`  r${i} += ${oldWeight(i, L.BY_S)} * S0 + ${oldWeight(i, L.BY_D)} * D0;`);
    body.push('}');
  }
  const aI = `a${row.current}`;
  const bI = `b${row.current}`;
  const places = `${all.device}, ${row.current}, ${row.width + row.current}`;
  const noise = (k: number) => `w[i * ${all.rows + 1} + ${k}]`;
  body.push(
    `${variable} a = ${linear(0, 'r')};`,
    `${variable} b = ${linear(1, 'r')};`,
    `${variable} I = 0, S = 0, D = 0, J = 0;`,
    'if (noisy) {',
    `  ${slot(L.OVERDRIVE_S)} = vs; ${slot(L.OVERDRIVE_D)} = vd;`,
    `  evaluate(c, t, ${all.device}, s, ${slots + L.OVERDRIVE_S}, ${slots + L.TERM_S}); evaluate(c, t, ${all.device}, s, ${slots + L.OVERDRIVE_D}, ${slots + L.TERM_D});`,
    `  J = ${noise(all.rows)} * ${language.sqrt}(0.5 * (${slot(L.TERM_S + 1)} + ${slot(L.TERM_D + 1)}));`,
    `  a += ${noise(0)} + ${aI} * J;`,
    `  b += ${noise(1)} + ${bI} * J;`,
    '}',
  );
  body.push(...(law === 'square' ? squareSolution(aI, bI, places, slot, language) : newtonSolution(law, aI, bI, places, slot, language)));
  body.push(
    'if (vs > on || vd > on) {',
    `  ${slot(L.GIVEN_A)} = a; ${slot(L.GIVEN_B)} = b; ${slot(L.GIVEN_FREE)} = I;`,
    `  ${conductorName(law)}(c, t, ${places}, ${all.junction}, s, ${slots});`,
    `  I = ${slot(L.CHANNEL_A)}; S = ${slot(L.JUNCTION_S)}; D = ${slot(L.JUNCTION_D)}; vs = ${slot(L.OVERDRIVE_S)}; vd = ${slot(L.OVERDRIVE_D)};`,
    '}',
    'I += J;',
  );
  for (const i of stiffStates) body.push(`g${i} = f${i}; f${i} = e${i}; e${i} = x${i};`);
  for (const i of states) body.push(`x${i} = ${stateShortcut(i) ?? `${linear(2 + i, 'r')} + ${rowName(2 + i)}${row.current} * I`};`);
  const rows = states.filter((i) => hasRow(2 + i));
  const hasOutput = hasRow(all.outputRow);
  if (hasOutput) body.push(`${variable} y = 0;`);
  if (rows.length > 0 || hasOutput) {
    body.push('if (noisy) {', ...rows.map((i) => `  x${i} += ${noise(2 + i)};`));
    if (hasOutput) body.push(`  y = ${noise(all.outputRow)};`);
    body.push('}', 'if (S != 0 || D != 0) {');
    for (const i of rows) body.push(`  x${i} += ${weight(2 + i, L.BY_S)} * S + ${weight(2 + i, L.BY_D)} * D;`);
    if (hasOutput) body.push(`  y += ${weight(all.outputRow, L.BY_S)} * S + ${weight(all.outputRow, L.BY_D)} * D;`);
    body.push('}');
  }
  body.push(`output[i] = ${hasOutput ? `y + ${linear(all.outputRow, 'x')} + y${row.current} * I` : shortcut(shape.output)};`);
  if (bends) {
    const perA = hasOutput ? `y${row.current}` : `sign * (${aI} - ${bI})`;
    body.push(
      'if (marking && ((vs > 0) != (qs > 0) || (vd > 0) != (qd > 0))) {',
      `  ${slot(L.BEFORE_S)} = qs; ${slot(L.BEFORE_D)} = qd; ${slot(L.OVERDRIVE_S)} = vs; ${slot(L.OVERDRIVE_D)} = vd; ${slot(L.PER_A)} = ${perA};`,
      `  markKink(c, t, ${places}, e, i, s, ${slots});`,
      '}',
    );
  }
  if (n > 0) body.push('u0 = u; v0 = v;');
  body.push('E0 = I0; I0 = I; S0 = S; D0 = D;');
  lines.push(...body.map((line) => `    ${line}`), '  }');

  lines.push(...states.map((i) => `  s[${i}] = x${i};`));
  stiffStates.forEach((i, k) => {
    lines.push(`  s[${n + k}] = e${i}; s[${n + stiff + k}] = f${i}; s[${n + 2 * stiff + k}] = g${i};`);
  });
  if (n > 0) lines.push(`  ${slot(L.OLD_AUDIO)} = u0; ${slot(L.OLD_CONTROL)} = v0;`);
  lines.push(
    `  ${slot(L.CHANNEL_A)} = I0; ${slot(L.JUNCTION_S)} = S0; ${slot(L.JUNCTION_D)} = D0; ${slot(L.EARLIER_A)} = E0;`,
    `  if (to > from) { ${slot(L.OVERDRIVE_S)} = vs; ${slot(L.OVERDRIVE_D)} = vd; }`,
    '}',
  );
  return lines.join('\n');
}

/**
 * The kernel of any number of states, in loops over the same coefficients: for circuits of a shape that is not written out. A function that makes it,
 * with the scratch memory that it needs.
 */
function loopedKernel(law: Law): string {
  const { constant, variable, sqrt } = typescript;
  const device = (index: number) => `c[device + ${index}]`;
  const slot = (index: number) => `s[slots + ${index}]`;
  const places = 'device, aI, bI';
  const bends = law !== 'smooth';
  const solution =
    law === 'square'
      ? squareSolution('perAs', 'perAd', places, slot, typescript)
      : newtonSolution(law, 'perAs', 'perAd', places, slot, typescript);
  return [
    `function ${loopedName(law)}(trapezoidal: number, stiff: number): Kernel {`,
    '  const n = trapezoidal + stiff, { row, past, all } = layoutOf(n), { device, junction, rows, outputRow } = all;',
    '  const slots = slotStart(trapezoidal, stiff), width = row.width, aI = row.current, bI = width + row.current;',
    "  /** What each row remembers, then the audio, the control and 1; the stiff states' past, weighted; the sums of the rows. */",
    '  const drives = new Float64Array(n + 3), weighed = new Float64Array(n), sums = new Float64Array(n + 3);',
    '  drives[n + 2] = 1;',
    '  return (c, t, w, e, s, audio, control, output, from, to) => {',
    '  const noisy = w.length > 0, marking = e.length > 0;',
    '  const perAs = c[aI], perAd = c[bI];',
    ...deviceConstants(law, device).map(([name, value]) => `  ${constant} ${name} = ${value};`),
    `  ${variable} u0 = ${slot(L.OLD_AUDIO)}, v0 = ${slot(L.OLD_CONTROL)};`,
    `  ${variable} I0 = ${slot(L.CHANNEL_A)}, S0 = ${slot(L.JUNCTION_S)}, D0 = ${slot(L.JUNCTION_D)}, E0 = ${slot(L.EARLIER_A)}, vs = ${slot(L.OVERDRIVE_S)}, vd = ${slot(L.OVERDRIVE_D)};`,
    '  for (let i = from; i < to; i++) {',
    ...[
      `${constant} u = audio[i], v = control[i], noise = i * (rows + 1);`,
      ...(bends ? [`${constant} qs = vs, qd = vd;`] : []),
      'for (let k = 0; k < trapezoidal; k++) weighed[k] = s[k];',
      'for (let k = 0; k < stiff; k++) {',
      '  const x = s[trapezoidal + k], e1 = s[n + k], e2 = s[n + stiff + k];',
      `  weighed[trapezoidal + k] = 3.5 * x - 2.25 * e1 + ${5 / 6} * e2 - 0.125 * s[n + 2 * stiff + k];`,
      '  s[n + 2 * stiff + k] = e2; s[n + stiff + k] = e1; s[n + k] = x;',
      '}',
      'for (let r = 0; r < n; r++) {',
      '  const at = all.memory + r * past.width, x = r < trapezoidal ? s : weighed;',
      '  let even = c[at + n] * u0, odd = c[at + n + 1] * v0;',
      '  for (let k = 0; k + 1 < n; k += 2) { even += c[at + k] * x[k]; odd += c[at + k + 1] * x[k + 1]; }',
      '  if (n % 2 === 1) even += c[at + n - 1] * x[n - 1];',
      '  if (r < trapezoidal) {',
      '    const old = all.memoryJunction + 2 * r;',
      '    even += c[at + n + 2] * I0; odd += c[old] * S0 + c[old + 1] * D0;',
      '  }',
      '  drives[r] = even + odd;',
      '}',
      'drives[n] = u; drives[n + 1] = v;',
      'for (let r = 0; r < n + 2; r++) {',
      '  const at = r * width;',
      '  let even = c[at + n], odd = c[at + n + 1] * v;',
      '  even = even * u + c[at + n + 2];',
      '  for (let k = 0; k + 1 < n; k += 2) { even += c[at + k] * drives[k]; odd += c[at + k + 1] * drives[k + 1]; }',
      '  if (n % 2 === 1) odd += c[at + n - 1] * drives[n - 1];',
      '  sums[r] = even + odd;',
      '}',
      `${variable} a = sums[0], b = sums[1], I = 0, S = 0, D = 0, J = 0;`,
      'if (noisy) {',
      `  ${slot(L.OVERDRIVE_S)} = vs; ${slot(L.OVERDRIVE_D)} = vd;`,
      `  evaluate(c, t, device, s, slots + ${L.OVERDRIVE_S}, slots + ${L.TERM_S}); evaluate(c, t, device, s, slots + ${L.OVERDRIVE_D}, slots + ${L.TERM_D});`,
      `  J = w[noise + rows] * ${sqrt}(0.5 * (${slot(L.TERM_S + 1)} + ${slot(L.TERM_D + 1)}));`,
      '  a += w[noise] + perAs * J; b += w[noise + 1] + perAd * J;',
      '  for (let r = 2; r < n + 2; r++) sums[r] += w[noise + r];',
      '}',
      ...solution,
      'if (vs > on || vd > on) {',
      `  ${slot(L.GIVEN_A)} = a; ${slot(L.GIVEN_B)} = b; ${slot(L.GIVEN_FREE)} = I;`,
      `  ${conductorName(law)}(c, t, device, aI, bI, junction, s, slots);`,
      `  I = ${slot(L.CHANNEL_A)}; S = ${slot(L.JUNCTION_S)}; D = ${slot(L.JUNCTION_D)}; vs = ${slot(L.OVERDRIVE_S)}; vd = ${slot(L.OVERDRIVE_D)};`,
      '}',
      'I += J;',
      `${constant} last = outputRow * width;`,
      `${variable} y = c[last + n] * u + c[last + n + 1] * v + c[last + n + 2] + c[last + n + 3] * I + c[junction + 2 * outputRow] * S + c[junction + 2 * outputRow + 1] * D;`,
      'if (noisy) y += w[noise + outputRow];',
      'for (let k = 0; k < n; k++) {',
      '  const at = junction + 4 + 2 * k, x = sums[2 + k] + c[(2 + k) * width + n + 3] * I + (c[at] * S + c[at + 1] * D);',
      '  s[k] = x; y += c[last + k] * x;',
      '}',
      'output[i] = y;',
      ...(bends
        ? [
            'if (marking && ((vs > 0) != (qs > 0) || (vd > 0) != (qd > 0))) {',
            `  ${slot(L.BEFORE_S)} = qs; ${slot(L.BEFORE_D)} = qd; ${slot(L.OVERDRIVE_S)} = vs; ${slot(L.OVERDRIVE_D)} = vd; ${slot(L.PER_A)} = c[last + n + 3];`,
            '  markKink(c, t, device, aI, bI, e, i, s, slots);',
            '}',
          ]
        : []),
      'u0 = u; v0 = v;',
      'E0 = I0; I0 = I; S0 = S; D0 = D;',
    ].map((line) => `    ${line}`),
    '  }',
    `  ${slot(L.OLD_AUDIO)} = u0; ${slot(L.OLD_CONTROL)} = v0;`,
    `  ${slot(L.CHANNEL_A)} = I0; ${slot(L.JUNCTION_S)} = S0; ${slot(L.JUNCTION_D)} = D0; ${slot(L.EARLIER_A)} = E0;`,
    `  if (to > from) { ${slot(L.OVERDRIVE_S)} = vs; ${slot(L.OVERDRIVE_D)} = vd; }`,
    '  };',
    '}',
  ].join('\n');
}

/** Added in pairs, so that no addition waits for a long row of others. */
function sum(terms: readonly string[]): string {
  if (terms.length <= 2) return terms.join(' + ');
  const half = Math.ceil(terms.length / 2);
  const part = (some: readonly string[]) => (some.length > 1 ? `(${sum(some)})` : sum(some));
  return `${part(terms.slice(0, half))} + ${part(terms.slice(half))}`;
}

/** A junction's current; after a step of under a thousandth of nVT its series to the third power, which leaves 4e-14 of it, in place of the exponential. */
function exponential(v: string, on: string, x: string, name: string, reverse: string, rate: string, { constant }: Language): string[] {
  return [
    `    if (${v} > ${on}) {`,
    `      ${constant} x = ${x};`,
    `      if (${name} > 0 && x < 1e-3 && x > -1e-3) ${name} = ${name} * (1 + x * (1 + x * (0.5 + x * ${1 / 6})));`,
    `      else { s[n + ${L.POWER}] = (${v} + off) * ${rate}; expAt(s, n + ${L.POWER}); ${name} = ${reverse} * s[n + ${L.POWER}]; }`,
    `    } else ${name} = 0;`,
  ];
}

function deviceConstants(law: Law, device: (index: number) => string): [string, string][] {
  const common: [string, string][] = [
    ['on', device(L.ON_V)],
    ['lambda', device(L.LAMBDA)],
    ['scale', device(L.SCALE)],
  ];
  if (law === 'square') return [...common, ['bent_', device(L.BENT)], ['fall', device(L.FALL)], ['rise', device(L.RISE)]];
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

function squareSolution(aI: string, bI: string, places: string, slot: (index: number) => string, { constant, sqrt }: Language): string[] {
  const given = givenText(slot);
  const searches = searchText(places, slot);
  return [
    `if ((b > 0 && rise * b < -0.25) || (a > 0 && fall * a < -0.25)) { ${searches} }`,
    'else if (a > 0 || b > 0) {',
    `  ${constant} q = 1 + fall * a + rise * b;`,
    `  ${constant} w = scale * (a - b) * (a + b);`,
    `  I = 2 * w / (q + ${sqrt}(q * q - 4 * bent_ * w));`,
    `  if (!(a + ${aI} * I >= 0 && b + ${bI} * I >= 0)) {`,
    '    if (a > b) {',
    `      I = 2 * scale * a * a / (1 + fall * a + ${sqrt}(1 + 2 * fall * a));`,
    '    } else {',
    `      I = -2 * scale * b * b / (1 + rise * b + ${sqrt}(1 + 2 * rise * b));`,
    '    }',
    `    if (lambda != 0) { ${given} ${slot(L.GIVEN_FREE)} = I; bent(c, t, ${places}, s, ${slotsOf(slot)}); I = ${slot(L.GIVEN_FREE)}; }`,
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
    `  } else { s[TERM] = ${v}; evaluate(c, t, DEVICE, s, TERM, TERM); ${F} = s[TERM]; ${f} = s[TERM + 1]; }`,
    '}',
  ];
}

function newtonSolution(law: Law, aI: string, bI: string, places: string, slot: (index: number) => string, language: Language): string[] {
  const { variable } = language;
  const device = places.split(',')[0];
  const text = (v: string, F: string, f: string) =>
    lawText(law, v, F, f, language).map((line) => `  ${line.replaceAll('DEVICE', device).replaceAll('TERM', slot(L.TERM_S).slice(2, -1))}`);
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
    '  if (moved < enough && moved > -enough) { settled = 1; break; }',
    '}',
    `if (settled == 0) { ${searchText(places, slot)} }`,
    `vs = a + ${aI} * I; vd = b + ${bI} * I;`,
  ];
}
