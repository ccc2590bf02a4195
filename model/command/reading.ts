/** A reading set for people: rows of a name, a value in a column, and a remark. */
import type { Design, Variant } from '../design/types.ts';
import { formatQuantity, type PrintStyle, type Unit } from '../design/values.ts';
import { dbFromRatio } from '../device/math.ts';
import type { Harmonic, ToneOptions, ToneReading } from '../study/tone.ts';

const NAME_WIDTH = 14;
const VALUE_WIDTH = 11;
const DEGREES_PER_RAD = 180 / Math.PI;

/** What was asked for, complete. */
export type Asked = Required<Pick<ToneOptions, 'toneHz' | 'toneV' | 'controlV' | 'at'>>;

/** `held` says why the control stands where it does. */
export function printReading(design: Design, variant: Variant, reading: ToneReading, options: Asked, held: string): string {
  const { regions } = reading;
  const rows = [
    `${design.title}, variant ${variant.name}${variant.devices ? ', left device' : ''}`,
    '',
    row('Tone', print(options.toneV, 'V'), `peak, ${print(options.toneHz, 'Hz')}, at the cell's input`),
    row('Control', print(options.controlV, 'V'), held),
    row(
      'Read at',
      options.at === 'drain' ? 'drain' : 'output',
      options.at === 'drain' ? '' : `with ${print(variant.output.gainDb, 'dB', SIGNED)} of make-up`,
    ),
    '',
    row('Gain', print(reading.gainDb, 'dB', SIGNED)),
    row('Fundamental', print(reading.fundamentalV, 'V'), 'peak'),
    row('THD', percent(reading.thdFundamental), `of the fundamental${inDb(reading.thdFundamental)}`),
    row('', percent(reading.thdTotal), `of the total, as IEC 60268-3 divides${inDb(reading.thdTotal)}`),
    ...reading.harmonics.slice(1).map(harmonicRow),
    row('DC', print(reading.dcV, 'V'), `with the tone; ${print(reading.restDcV, 'V')} at rest`),
    '',
    row('Channel', resistance(reading.rdsOhm), 'at rest'),
    row('VGS', print(reading.vgsV, 'V'), 'at rest'),
    row('Ohmic', percent(regions.ohmic), 'of the period'),
    row('Saturated', percent(regions.saturated)),
    row('Cut off', percent(regions.cutoff)),
    row('Gate conducts', percent(regions.gateOn)),
    '',
    row('Error', reading.fundamentalError.toExponential(1), 'of the fundamental, by what the last doubling of the grid changed'),
    row('', reading.harmonicsError.toExponential(1), 'of the harmonic that changed most'),
    row('Grid', `${reading.gridPoints}`, `points; steady state ${reading.settledByTime ? 'run until it repeated' : 'found directly'}`),
  ];
  return `${rows.join('\n')}\n`;
}

const SIGNED: PrintStyle = { signed: true };

function row(name: string, value: string, remark = ''): string {
  return `${name.padEnd(NAME_WIDTH)}${value.padStart(VALUE_WIDTH)}  ${remark}`.trimEnd();
}

function print(value: number, unit: Unit, style: PrintStyle = {}): string {
  return formatQuantity(value, unit, 3, style);
}

function percent(ratio: number): string {
  return `${formatQuantity(ratio * 100, '', 3)}\u2009%`;
}

function inDb(ratio: number): string {
  return ratio > 0 ? `, ${print(dbFromRatio(ratio), 'dB')}` : '';
}

function resistance(ohm: number): string {
  return Number.isFinite(ohm) ? print(ohm, 'Ω') : 'cut off';
}

function harmonicRow({ n, amplitudeV, db, phaseRad }: Harmonic): string {
  if (db === null) return row(`  H${n}`, 'none');
  const degrees = print(phaseRad * DEGREES_PER_RAD, '', SIGNED);
  return row(`  H${n}`, print(db, 'dB'), `re the fundamental; ${print(amplitudeV, 'V')} peak at ${degrees}°`);
}
