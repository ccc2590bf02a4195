/**
 * Quantities as people write them, and as the sheet prints them.
 *
 * Read     a number with an SI prefix and a unit, each of which may be left out (10 kΩ, 1.2 M, −50 mV, 4.7e5), or the letter code in
 *          which the prefix or R stands for the decimal point (6k8, 4R7, 2u2, R47). M is mega and m is milli; K is k for resistances only.
 * Error    the nearest double to the decimal that was written: 100n is 1e-7 and not 100 × 1e-9
 * Source   letter code: IEC 60062, from memory; V, A and Hz written the same way (3V3, 4k2): common practice, no source
 */

/** The units of the design; '' is a plain number. */
export type Unit = 'Ω' | 'F' | 'V' | 'A' | 'Hz' | 's' | 'S' | 'H' | 'V/s' | '1/V' | '°C' | 'dB' | '';

/** What was typed is not a quantity. `fault` says so in one sentence, `advice` how to write it. */
export class QuantityError extends RangeError {
  readonly fault: string;
  readonly advice: string;
  constructor(fault: string, advice: string) {
    super(`${fault} ${advice}`);
    this.name = 'QuantityError';
    this.fault = fault;
    this.advice = advice;
  }
}

export interface PrintStyle {
  /** A plus before positive values, where the sign tells which way to turn. */
  readonly signed?: boolean;
  /** Drops zeros at the end of a fraction: 10 kΩ for 10.0 kΩ. */
  readonly trimmed?: boolean;
}

interface UnitRule {
  /** With its article, as in «“1M2k” is not a resistance.» */
  readonly noun: string;
  readonly examples: string;
  readonly printed: string;
  readonly spellings: readonly string[];
  /** Prefix letters that may be read; '' for units that take none. */
  readonly prefixes: string;
  /** The unit's own letter where it may stand for the decimal point. */
  readonly pointLetter: string;
  /** Exponents of the smallest and largest prefix that are printed. */
  readonly printsFrom: number;
  readonly printsTo: number;
  /** Printed with `digits − 2` decimals, whatever the size: a scale with an arbitrary zero. */
  readonly fixedPoint?: boolean;
}

const PREFIX_LETTERS = 'fpnumkMGT';
const PLAIN = { spellings: [] as string[], prefixes: '', pointLetter: '', printsFrom: 0, printsTo: 0 };

const RULES: Readonly<Record<Unit, UnitRule>> = {
  Ω: {
    noun: 'a resistance',
    examples: '1M2, 1.2 M or 1200 k',
    printed: 'Ω',
    spellings: ['Ω', 'R', 'ohm', 'Ohm', 'ohms'],
    prefixes: `${PREFIX_LETTERS}K`,
    pointLetter: 'R',
    printsFrom: -3,
    printsTo: 12,
  },
  F: rule('a capacitance', '100n, 0.1 u or 100 nF', 'F', -12, -6),
  V: rule('a voltage', '-1.2, 1V2 or 50 mV', 'V', -15, 3),
  A: rule('a current', '3m, 3.0 mA or 0.003', 'A', -15, 0),
  Hz: { ...rule('a frequency', '4.2, 4.2 Hz or 1k5', 'Hz', 0, 9), spellings: ['Hz', 'hz'], pointLetter: '' },
  s: { ...rule('a time', '10m, 10 ms or 0.01', 's', -9, 0), spellings: ['s', 'sec'], pointLetter: '' },
  S: rule('a conductance', '1p, 1 pS or 1e-12', 'S', -15, 0),
  H: rule('an inductance', '4, 4H5 or 100 mH', 'H', -6, 0),
  'V/s': { ...rule('a slew rate', '13M, 0.5e6 or 500k', 'V/s', 0, 9), spellings: ['V/s'], pointLetter: '' },
  '1/V': { ...rule('a value per volt', '0.02, 20m or 0.02 /V', '/V', 0, 0), spellings: ['/V', '1/V'], pointLetter: '' },
  '°C': { ...PLAIN, noun: 'a temperature', examples: '25, 25 °C or -40', printed: '°C', spellings: ['°C', 'C', '℃'], fixedPoint: true },
  dB: { ...PLAIN, noun: 'a level in decibels', examples: '-6, 18 dB or +0.5', printed: 'dB', spellings: ['dB', 'db'], fixedPoint: true },
  '': { ...PLAIN, noun: 'a number', examples: '0.476, 2 or 1e-3', printed: '' },
};

function rule(noun: string, examples: string, letter: string, printsFrom: number, printsTo: number): UnitRule {
  return { noun, examples, printed: letter, spellings: [letter], prefixes: PREFIX_LETTERS, pointLetter: letter, printsFrom, printsTo };
}

const EXPONENTS: Readonly<Record<string, number>> = { f: -15, p: -12, n: -9, u: -6, m: -3, k: 3, K: 3, M: 6, G: 9, T: 12 };
const PRINTED_PREFIXES: Readonly<Record<number, string>> = {
  [-15]: 'f',
  [-12]: 'p',
  [-9]: 'n',
  [-6]: 'μ',
  [-3]: 'm',
  0: '',
  3: 'k',
  6: 'M',
  9: 'G',
  12: 'T',
};
const LONGEST_TEXT = 64;
const THIN_SPACE = '\u2009';
const MINUS = '\u2212';

/**
 * The value in SI units of what was typed.
 *
 * @throws QuantityError (a RangeError) whose message is the sentence to show
 */
export function parseQuantity(text: string, unit: Unit): number {
  const { noun, examples } = RULES[unit];
  const advice = `Write ${examples}.`;
  const written = text
    .trim()
    .replace(/\u2212/g, '-')
    .replace(/[\u00b5\u03bc]/g, 'u')
    .replace(/\u2126/g, 'Ω');
  if (written === '') throw new QuantityError(`${noun[0].toUpperCase()}${noun.slice(1)} is missing.`, advice);
  const shown = `“${shorten(text.trim())}”`;
  if (written.includes(','))
    throw new QuantityError(`${shown} has a comma.`, `Use a point for decimals, and nothing for thousands. ${advice}`);
  const decimal = written.length > LONGEST_TEXT ? null : (readDecimal(written, unit) ?? readLetterCode(written, unit));
  if (decimal === null) throw new QuantityError(`${shown} is not ${noun}.`, advice);
  const value = Number(decimal);
  const lost = !Number.isFinite(value) || (value === 0 && /[1-9]/.test(decimal.split('e')[0]));
  if (lost) throw new QuantityError(`${shown} is beyond what can be computed.`, advice);
  return value;
}

/** `1.2 MΩ`, `4.7e5`, `−50 mV` as a decimal with an exponent; null when the text has another form. */
function readDecimal(text: string, unit: Unit): string | null {
  const match = /^([+-]?)\s*(\d+\.?\d*|\.\d+)(?:[eE]([+-]?\d+))?\s*(.*)$/.exec(text);
  if (!match) return null;
  const [, sign, mantissa, exponent = '0', suffix] = match;
  const { prefixes, spellings } = RULES[unit];
  const isUnit = (rest: string) => rest === '' || spellings.includes(rest);
  if (isUnit(suffix)) return `${sign}${mantissa}e${exponent}`;
  if (!prefixes.includes(suffix[0]) || !isUnit(suffix.slice(1).trimStart())) return null;
  return `${sign}${mantissa}e${Number(exponent) + EXPONENTS[suffix[0]]}`;
}

/** `6k8`, `4R7`, `R47`, `2u2 F` as a decimal with an exponent; null when the text has another form. */
function readLetterCode(text: string, unit: Unit): string | null {
  const match = /^([+-]?)(\d*)([A-Za-z])(\d+)\s*(\D*)$/.exec(text);
  if (!match) return null;
  const [, sign, whole, letter, part, suffix] = match;
  const { prefixes, pointLetter, spellings } = RULES[unit];
  if (letter !== pointLetter && !prefixes.includes(letter)) return null;
  if (suffix !== '' && !spellings.includes(suffix)) return null;
  return `${sign}${whole}.${part}e${letter === pointLetter ? 0 : EXPONENTS[letter]}`;
}

/**
 * The number as printed and its unit with prefix, apart: `['6.80', 'kΩ']`, for tables with a column of units.
 * A value that is not finite prints as `no reading`.
 *
 * @param digits significant digits, 2 to 15; decibels and degrees have `digits − 2` decimals instead, so that a scale keeps its width
 */
export function splitQuantity(value: number, unit: Unit, digits = 3, style: PrintStyle = {}): { number: string; unit: string } {
  if (!(Number.isInteger(digits) && digits >= 2 && digits <= 15)) throw new RangeError(`digits is ${digits}; expected 2 to 15`);
  if (!Number.isFinite(value)) return { number: 'no reading', unit: '' };
  const { printed, fixedPoint } = RULES[unit];
  const size = Math.abs(value);
  const print = fixedPoint ? { figures: size.toFixed(digits - 2), prefix: '' } : printSignificant(size, unit, digits);
  const figures = style.trimmed ? print.figures.replace(/\.(\d*[1-9])?0+(?=e|$)/, (_, kept) => (kept ? `.${kept}` : '')) : print.figures;
  const isZero = !/[1-9]/.test(figures.split('e')[0]);
  const sign = isZero ? '' : value < 0 ? MINUS : style.signed ? '+' : '';
  return { number: `${sign}${figures}`, unit: `${print.prefix}${printed}` };
}

function printSignificant(size: number, unit: Unit, digits: number): { figures: string; prefix: string } {
  if (size === 0) return { figures: '0', prefix: '' };
  const [mantissa, exponentText] = size.toExponential(digits - 1).split('e');
  const exponent = Number(exponentText);
  const group = prefixExponent(exponent, RULES[unit]);
  if (group === null) return { figures: `${mantissa}e${exponentText.replace('-', MINUS).replace('+', '')}`, prefix: '' };
  const shifted = Number(`${mantissa}e${exponent - group}`);
  return { figures: shifted.toFixed(Math.max(0, digits - 1 - (exponent - group))), prefix: PRINTED_PREFIXES[group] };
}

/**
 * The prefix to print with. The trade's own (no mF, no mHz, no ks) reach two decades below and four above, 0.01 Hz and 1000 μF;
 * past them any SI prefix serves. Null where there is none and an exponent has to be printed.
 */
function prefixExponent(exponent: number, { printsFrom, printsTo }: UnitRule): number | null {
  const natural = Math.floor(exponent / 3) * 3;
  if (printsFrom === printsTo) return exponent >= -4 && exponent < 6 ? printsFrom : null;
  if (exponent >= printsFrom - 2 && exponent < printsTo + 4) return Math.min(Math.max(natural, printsFrom), printsTo);
  return natural in PRINTED_PREFIXES ? natural : null;
}

/** The value as the sheet prints it, three significant digits unless said: `6.80 kΩ`, `−1.20 V`, `+18.0 dB`, with a thin space and a real minus. */
export function formatQuantity(value: number, unit: Unit, digits = 3, style: PrintStyle = {}): string {
  const { number, unit: printed } = splitQuantity(value, unit, digits, style);
  return printed === '' ? number : `${number}${THIN_SPACE}${printed}`;
}

/** The first 24 characters, to quote in a sentence. */
export function shorten(text: string): string {
  return text.length > 24 ? `${text.slice(0, 24)}…` : text;
}
