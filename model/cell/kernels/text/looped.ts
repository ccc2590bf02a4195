import type { Law } from '../../../design/types.ts';
import * as L from '../layout.ts';
import { conductorName } from './conductor.ts';
import { typescript } from './language.ts';
import { channelNoise, deviceConstants, guessText, newtonSolution, squareSolution } from './law.ts';

export function loopedName(law: Law): string {
  return `looped_${law}`;
}

/**
 * The kernel of any number of states, in loops over the same coefficients: for circuits of a shape that is not written out. A function that makes it,
 * with the scratch memory that it needs.
 */
export function loopedKernel(law: Law): string {
  const { constant, variable } = typescript;
  const device = (index: number) => `c[device + ${index}]`;
  const slot = (index: number) => `s[slots + ${index}]`;
  const places = 'device, aI, bI';
  const bends = law !== 'smooth';
  const guess = guessText(law, slot);
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
    `  ${variable} I0 = ${slot(L.CHANNEL_A)}, S0 = ${slot(L.JUNCTION_S)}, D0 = ${slot(L.JUNCTION_D)}${guess.open}, vs = ${slot(L.OVERDRIVE_S)}, vd = ${slot(L.OVERDRIVE_D)};`,
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
      ...channelNoise(law, 'w[noise + rows]', 'device', slot, typescript),
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
      `${guess.keep}I0 = I; S0 = S; D0 = D;`,
    ].map((line) => `    ${line}`),
    '  }',
    `  ${slot(L.OLD_AUDIO)} = u0; ${slot(L.OLD_CONTROL)} = v0;`,
    `  ${slot(L.CHANNEL_A)} = I0; ${slot(L.JUNCTION_S)} = S0; ${slot(L.JUNCTION_D)} = D0;${guess.close}`,
    `  if (to > from) { ${slot(L.OVERDRIVE_S)} = vs; ${slot(L.OVERDRIVE_D)} = vd; }`,
    '  };',
    '}',
  ].join('\n');
}
