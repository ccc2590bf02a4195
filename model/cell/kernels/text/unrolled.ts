/** The text of a kernel that is written out for a shape, its coefficients in local constants. */
import type { Law } from '../../../design/types.ts';
import * as L from '../layout.ts';
import { conductorName } from './conductor.ts';
import type { Language } from './language.ts';
import { channelNoise, deviceConstants, guessText, newtonSolution, squareSolution } from './law.ts';

/**
 * What a kernel is written out for: the number of trapezoidal states; for each stiff state what it is the voltage of: `g` gate to source, `m` gate to
 * drain, which follow from the overdrives, or `x` anything else, which takes a row of its own; and for the output `d` drain to source or `x`.
 */
export interface Shape {
  readonly trapezoidal: number;
  readonly stiff: string;
  readonly output: 'd' | 'x';
}

export function kernelName(law: Law, { trapezoidal, stiff, output }: Shape): string {
  return `${law}${trapezoidal}_${stiff}_${output}`;
}

export function kernel(law: Law, shape: Shape, language: Language): string {
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
  const guess = guessText(law, (index) => `s[${slots + index}]`);
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
    `  ${variable} I0 = ${slot(L.CHANNEL_A)}, S0 = ${slot(L.JUNCTION_S)}, D0 = ${slot(L.JUNCTION_D)}${guess.open}, vs = ${slot(L.OVERDRIVE_S)}, vd = ${slot(L.OVERDRIVE_D)};`,
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
    ...channelNoise(law, noise(all.rows), `${all.device}`, slot, language),
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
  body.push(`${guess.keep}I0 = I; S0 = S; D0 = D;`);
  lines.push(...body.map((line) => `    ${line}`), '  }');

  lines.push(...states.map((i) => `  s[${i}] = x${i};`));
  stiffStates.forEach((i, k) => {
    lines.push(`  s[${n + k}] = e${i}; s[${n + stiff + k}] = f${i}; s[${n + 2 * stiff + k}] = g${i};`);
  });
  if (n > 0) lines.push(`  ${slot(L.OLD_AUDIO)} = u0; ${slot(L.OLD_CONTROL)} = v0;`);
  lines.push(
    `  ${slot(L.CHANNEL_A)} = I0; ${slot(L.JUNCTION_S)} = S0; ${slot(L.JUNCTION_D)} = D0;${guess.close}`,
    `  if (to > from) { ${slot(L.OVERDRIVE_S)} = vs; ${slot(L.OVERDRIVE_D)} = vd; }`,
    '}',
  );
  return lines.join('\n');
}

/** Added in pairs, so that no addition waits for a long row of others. */
function sum(terms: readonly string[]): string {
  if (terms.length <= 2) return terms.join(' + ');
  const half = Math.ceil(terms.length / 2);
  const part = (some: readonly string[]) => (some.length > 1 ? `(${sum(some)})` : sum(some));
  return `${part(terms.slice(0, half))} + ${part(terms.slice(half))}`;
}
