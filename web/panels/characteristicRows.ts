/** The rows of Table 1 as words, grouped by meaning: the signal, the channel, the control. Only rows with a real number in them. */
import type { Control, Variant } from '../../model/design/types.ts';
import { formatQuantity, splitQuantity } from '../../model/design/values.ts';
import type { ToneReading } from '../../model/study/tone.ts';
import { decimals, signedDecimals } from '../draw/words.ts';
import type { ControlPicture, LiveLevels, NoisePoint, SwingPoint } from '../state/bench.ts';

export interface Row {
  readonly what: string;
  /** For a narrow sheet. */
  readonly short: string;
  readonly symbol: readonly [of: string, sub?: string] | null;
  readonly min: string;
  readonly now: string | null;
  readonly max: string;
  readonly unit: string;
  /** Which of the designer's limits it has, and which of its numbers are past it. */
  readonly limit?: keyof RowLimits;
  readonly over?: readonly ('min' | 'now' | 'max')[];
  /** False for what follows from the circuit alone: it is never coloured. */
  readonly measured: boolean;
}

/** What was measured, each null where it could not be. */
export interface Measured {
  readonly reading: ToneReading | null;
  /** Of the reading's moment; null while sound is stopped: the control is then shown at rest. */
  readonly levels: LiveLevels | null;
  readonly picture: ControlPicture | null;
  readonly swing: readonly SwingPoint[] | null;
  readonly noise: readonly NoisePoint[] | null;
  readonly limits: RowLimits;
}

/** V, as in `SheetLimits`. */
export interface RowLimits {
  readonly feedthroughV: number | null;
  readonly controlV: number | null;
  readonly pastOffV: number | null;
}

export function characteristicRows(variant: Variant, measured: Measured): Row[][] {
  const { reading } = measured;
  const groups = [
    reading ? signalRows(reading, measured) : [],
    reading ? [channelRow(reading, measured.swing)] : [],
    controlRows(variant, measured),
  ];
  return groups.filter((rows) => rows.length > 0);
}

interface Ends {
  readonly min: string;
  readonly max: string;
}

const NO_ENDS: Ends = { min: '', max: '' };

function row(what: string, short: string, symbol: Row['symbol'], now: string | null, unit: string, ends: Ends = NO_ENDS): Row {
  return { what, short, symbol, now, unit, ...ends, measured: true };
}

/** The least and the highest of a swing, printed; nothing where nothing swings. */
function endsOf(values: readonly number[] | Float64Array | null, print: (value: number) => string): Ends {
  if (values === null || values.length < 2) return NO_ENDS;
  return { min: print(Math.min(...values)), max: print(Math.max(...values)) };
}

type Numbers = { readonly [which in 'min' | 'now' | 'max']?: number | null };

/** Which numbers of a row are past its limit. */
function limited(
  limit: keyof RowLimits,
  size: number | null,
  numbers: Numbers,
  past: (value: number, limit: number) => boolean,
): Pick<Row, 'limit' | 'over'> {
  const over = (['min', 'now', 'max'] as const).filter((which) => {
    const value = numbers[which];
    return size !== null && value !== null && value !== undefined && past(value, size);
  });
  return { limit, over };
}

function spanOf(values: readonly number[] | Float64Array | null): Numbers {
  return values === null || values.length < 2 ? {} : { min: Math.min(...values), max: Math.max(...values) };
}

function signalRows(reading: ToneReading, { levels, picture, swing, noise, limits }: Measured): Row[] {
  const gain = (db: number) => signedDecimals(db, 1);
  const through = levels?.feedthroughPeakV ?? Math.abs(reading.restDcV);
  const overPeriod = picture && 'drain' in picture && !picture.steady ? picture.drain.map(Math.abs) : null;
  const drain = unsignedVolts(overPeriod ? [through, ...overPeriod] : [through]);
  const added = reading.dcV - reading.restDcV;
  const tone = smallVolts([added]);
  const hiss = noise === null ? null : noiseAt(noise, reading.vgsV);
  const hissVolts = noise?.map(({ drainV }) => drainV) ?? null;
  const hissUnit = unsignedVolts(hissVolts ?? []);
  const range = swing?.map(({ gainDb }) => gainDb) ?? null;
  return [
    row('Gain of the cell, input to drain', 'Gain', ['G'], gain(reading.gainDb), 'dB', endsOf(range, gain)),
    {
      ...row(
        'Control feedthrough at the drain, peak',
        'Feedthrough',
        ['V', 'FT'],
        drain.print(through),
        drain.unit,
        endsOf(overPeriod, drain.print),
      ),
      ...limited('feedthroughV', limits.feedthroughV, { now: through, ...spanOf(overPeriod) }, (v, most) => Math.abs(v) > most),
    },
    row(
      'Noise at the drain, 20\u2009Hz to 20\u2009kHz',
      'Noise',
      ['V', 'N'],
      hiss === null ? null : hissUnit.print(hiss),
      hissUnit.unit,
      endsOf(hissVolts, hissUnit.print),
    ),
    row('DC that the tone adds at the drain', 'DC added', null, tone.print(added), tone.unit),
  ];
}

/** Between the two nearest of the swing; null beyond its ends. */
export function noiseAt(points: readonly NoisePoint[], gateV: number): number | null {
  const apart = (point: NoisePoint) => point.gateV - gateV;
  const near = points.find((point) => Math.abs(apart(point)) < 1e-6);
  if (near) return near.drainV;
  const n = points.findIndex((point) => apart(point) > 0);
  if (n <= 0) return null;
  const [a, b] = [points[n - 1], points[n]];
  return a.drainV + ((gateV - a.gateV) / (b.gateV - a.gateV)) * (b.drainV - a.drainV);
}

/** One unit for the voltages of a row, by the largest of them: from a tenth of a microvolt, under which nobody asks. */
function smallVolts(volts: readonly number[]): { unit: string; print: (volts: number) => string } {
  const largest = volts.reduce((most, v) => Math.max(most, Math.abs(v)), 0);
  const [scale, unit] = largest >= 0.9995 ? [1, 'V'] : largest >= 0.9995e-3 ? [1e3, 'mV'] : [1e6, 'μV'];
  return { unit, print: (v) => signedDecimals(v * scale, largest * scale >= 99.5 ? 0 : 1) };
}

function unsignedVolts(volts: readonly number[]): { unit: string; print: (volts: number) => string } {
  const { unit, print } = smallVolts(volts);
  const most = volts.reduce((highest, v) => Math.max(highest, v), 0);
  const digits = unit === 'μV' && most < 9.95e-6 ? 2 : 1;
  return unit === 'μV' && digits === 2 ? { unit, print: (v) => decimals(v * 1e6, 2) } : { unit, print: (v) => print(v).replace('+', '') };
}

/** Every number of the row in the unit of its least, so that they can be compared. */
function channelRow(reading: ToneReading, swing: readonly SwingPoint[] | null): Row {
  const cutOff = (ohm: number) => !Number.isFinite(ohm) || ohm > 1e9;
  const ohms = [reading.rdsOhm, ...(swing?.map(({ rdsOhm }) => rdsOhm) ?? [])];
  const least = Math.min(...ohms);
  if (cutOff(least)) return row('Drain to source, at rest', 'Drain-source', ['r', 'DS'], 'off', '');
  const { unit } = splitQuantity(least, 'Ω');
  const scale = unit === 'kΩ' ? 1e-3 : unit === 'MΩ' ? 1e-6 : 1;
  const print = (ohm: number) => {
    if (cutOff(ohm)) return 'off';
    const scaled = ohm * scale;
    return scaled < 1e4 ? decimals(scaled, scaled < 9.995 ? 2 : scaled < 99.95 ? 1 : 0) : formatQuantity(ohm, 'Ω').replace('\u2009', '');
  };
  return row('Drain to source, at rest', 'Drain-source', ['r', 'DS'], print(reading.rdsOhm), unit, endsOf(swing && ohms.slice(1), print));
}

function controlRows({ control }: Variant, { reading, levels, picture, limits }: Measured): Row[] {
  const volts = (v: number) => decimals(v, 2);
  const now = levels?.controlV ?? (control.source === 'fixed' ? control.controlV : null);
  const swing = controlEnds(control);
  const rows: Row[] = [];
  if (now !== null || swing)
    rows.push({
      ...row('Control to be delivered', 'Control', ['V', 'C'], now === null ? null : volts(now), 'V', endsOf(swing, volts)),
      ...limited('controlV', limits.controlV, { now, ...spanOf(swing) }, (v, most) => Math.abs(v) > most),
    });
  const still = picture === null || ('steady' in picture && picture.steady);
  const gate = still ? null : picture.gate;
  if (reading) rows.push(row('Gate to source, at rest', 'Gate-source', ['V', 'GS'], volts(reading.vgsV), 'V', endsOf(gate, volts)));
  if (picture) {
    const { gateOffV } = picture;
    const off = gateOffV < 0 ? gateOffV - Math.min(...picture.gate) : Math.max(...picture.gate) - gateOffV;
    rows.push({
      ...row('Past off, at the gate’s far end', 'Past off', null, signedDecimals(off, 2), 'V'),
      ...limited('pastOffV', limits.pastOffV, { now: off }, (v, least) => v < least),
      measured: false,
    });
  }
  return rows;
}

function controlEnds(control: Control): readonly number[] | null {
  if (control.source === 'lfo') return [control.fromV, control.toV];
  return control.source === 'envelope' ? [control.restV, control.limitV] : null;
}
