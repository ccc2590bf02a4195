/** The text of the solver of both ports while a gate junction conducts: ports.ts explains it. */
import type { Law } from '../../../design/types.ts';
import * as L from '../layout.ts';
import type { Language } from './language.ts';
import { deviceConstants, lawText, NEWTON_STEPS } from './law.ts';

export function conductorName(law: Law): string {
  return `conduct_${law}`;
}

/** Newton on both overdrives while a junction, the clamp or a graded capacitance carries current: ports.ts explains. */
export function conductor(law: Law, language: Language): string {
  const { constant, variable, absolute, least, most } = language;
  const device = (index: number) => `c[device + ${index}]`;
  const slot = (index: number) => `s[n + ${index}]`;
  const counter = variable === 'let' ? 'let' : 'int';
  const text = (v: string, F: string, f: string) =>
    (law === 'square' ? [`if (${v} > 0) { ${F} = scale * ${v} * ${v}; ${f} = 2 * scale * ${v}; }`] : lawText(law, v, F, f, language)).map(
      (line) => `    ${line.replaceAll('DEVICE', 'device').replaceAll('TERM', `n + ${L.TERM_S}`)}`,
    );
  /**
   * Where an end last conducted, a step further along its parabola unless that is half of nVT; or just into conduction; with graded capacitances always
   * along its parabola.
   */
  const start = (end: 'S' | 'D', free: string, latest: number, earlier: number, earliest: number) => {
    const v = `v${end.toLowerCase()}`;
    const way = `way${end}`;
    return [
      `  ${constant} last${end} = ${slot(latest)}, earlier${end} = ${slot(earlier)}, free${end} = ${free};`,
      `  ${constant} ${way} = 2 * last${end} - 3 * earlier${end} + ${slot(earliest)};`,
      `  ${variable} ${v} = last${end} > on${end} ? last${end} + (${way} * rate${end} < 0.5 && ${way} * rate${end} > -0.5 ? ${way} : 0) : knee${end};`,
      `  if (grading != 0 && last${end} < on${end}) ${v} = last${end} + ${way};`,
      // By a branch, which the processor foresees: the smaller of two would wait for the current that flows without junctions.
      `  else if (free${end} < ${v}) ${v} = free${end};`,
    ];
  };
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
      .filter(([name]) => !['on', 'fall', 'rise', 'enough'].includes(name))
      .map(([name, value]) => `  ${constant} ${name} = ${value};`),
    ...start('S', 'a + perAs * freeA', L.LATEST_S, L.EARLIER_S, L.EARLIEST_S),
    ...start('D', 'b + perAd * freeA', L.LATEST_D, L.EARLIER_D, L.EARLIEST_D),
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
    `      ${slot(L.EARLIEST_S)} = earlierS; ${slot(L.EARLIEST_D)} = earlierD; ${slot(L.EARLIER_S)} = lastS; ${slot(L.EARLIER_D)} = lastD;`,
    `      ${slot(L.LATEST_S)} = vs; ${slot(L.LATEST_D)} = vd; ${slot(L.OVERDRIVE_S)} = vs; ${slot(L.OVERDRIVE_D)} = vd;`,
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
    '      stay(s, n);',
    '      return;',
    '    }',
    '  }',
    '  searchPorts(c, t, device, aI, bI, junction, s, n, a, b);',
    '  stay(s, n);',
    '}',
  ].join('\n');
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
