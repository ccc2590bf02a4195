/** Numbers as the sheet prints them: real minus, signs where they tell which way to turn, as many digits as mean something. */

import { formatQuantity } from '../../model/design/values.ts';

const MINUS = '−';
const THIN = '\u2009';

export function decimals(value: number, digits: number): string {
  const text = value.toFixed(digits);
  const zero = Number(text) === 0;
  return zero ? (0).toFixed(digits) : text.replace('-', MINUS);
}

export function signedDecimals(value: number, digits: number): string {
  const text = decimals(value, digits);
  return value > 0 && Number(text) !== 0 ? `+${text}` : text;
}

/** Decimals that show a percentage to two digits or more, down to a thousandth of a per cent. */
function percentDigits(percent: number): number {
  const size = Math.abs(percent);
  if (size >= 0.995) return 1;
  return size >= 0.0995 ? 2 : 3;
}

/** A fraction in per cent, without the sign %: 0.0047 gives «0.47». */
export function percentText(fraction: number): string {
  const percent = 100 * fraction;
  return decimals(percent, percentDigits(percent));
}

export function signedPercentText(fraction: number): string {
  const percent = 100 * fraction;
  return signedDecimals(percent, percentDigits(percent));
}

/** Seconds as minutes and seconds: 16 gives «0:16». */
export function clockText(seconds: number, tenths = false): string {
  const whole = Math.floor(seconds / 60);
  const rest = seconds - 60 * whole;
  const text = tenths ? (Math.floor(rest * 10) / 10).toFixed(1) : String(Math.floor(rest));
  return `${whole}:${text.padStart(tenths ? 4 : 2, '0')}`;
}

/** A voltage on the scale that reads best: 0.0592 V gives «59 mV». Three digits from 100 mV, two below. */
export function voltsText(volts: number): string {
  const size = Math.abs(volts);
  if (size >= 0.9995) return `${decimals(volts, 2)}${THIN}V`;
  if (size >= 0.00995) return `${decimals(volts * 1000, 0)}${THIN}mV`;
  if (size >= 0.0000995) return `${decimals(volts * 1000, 1)}${THIN}mV`;
  return size >= 0.995e-6 || size === 0 ? `${decimals(volts * 1e6, 0)}${THIN}μV` : formatQuantity(volts, 'V');
}

/** Level of a sine of this peak voltage, dB re 0.7746 V rms. */
export function dbuFromPeak(peakV: number): number {
  return 20 * Math.log10(peakV / Math.SQRT2 / DBU_V);
}

export function peakFromDbu(dbu: number): number {
  return DBU_V * Math.SQRT2 * 10 ** (dbu / 20);
}

/** 0 dBu: the voltage that puts 1 mW into 600 Ω, V rms. */
const DBU_V = Math.sqrt(0.6);

/** A gate or control voltage that is measured: always two decimals, so that it keeps its width. */
export function gateVolts(volts: number): string {
  return `${decimals(volts, 2)}${THIN}V`;
}

/** A voltage that is set: in volts from 0.1 V up, as many decimals as it has, two at least and three at most; millivolts below. */
export function valueVolts(volts: number): string {
  const size = Math.abs(volts);
  if (size > 0 && size < 0.0995) return `${decimals(volts * 1000, size < 0.00995 ? 2 : 1)}${THIN}mV`;
  const digits = Math.abs(volts - Number(volts.toFixed(2))) < 1e-6 ? 2 : 3;
  return `${decimals(volts, digits)}${THIN}V`;
}
