/** The rows of Table 1 as words, grouped by meaning: the signal, the channel, the control. Only rows with a real number in them. */
import type { Control, Variant } from '../../model/design/types.ts';
import { splitQuantity } from '../../model/design/values.ts';
import type { ToneReading } from '../../model/study/tone.ts';
import { gatePeriod } from '../draw/gatePlot.ts';
import { decimals, signedDecimals } from '../draw/words.ts';

export interface Row {
  readonly what: string;
  /** For a narrow sheet. */
  readonly short: string;
  readonly symbol: readonly [of: string, sub?: string] | null;
  readonly min: string;
  readonly now: string | null;
  readonly max: string;
  readonly unit: string;
}

/** `controlV` is the control of this moment, null while sound is stopped: then it is shown at rest. */
export function characteristicRows(variant: Variant, reading: ToneReading | null, controlV: number | null): Row[][] {
  const groups = [reading ? signalRows(reading) : [], reading ? [channelRow(reading)] : [], controlRows(variant, reading, controlV)];
  return groups.filter((rows) => rows.length > 0);
}

function row(
  what: string,
  short: string,
  symbol: Row['symbol'],
  now: string | null,
  unit: string,
  ends: { min: string; max: string } = { min: '', max: '' },
): Row {
  return { what, short, symbol, now, unit, ...ends };
}

function signalRows(reading: ToneReading): Row[] {
  const dc = smallVolts(reading.dcV - reading.restDcV);
  const rest = smallVolts(reading.restDcV);
  return [
    row('Gain of the cell, input to drain', 'Gain', ['G'], signedDecimals(reading.gainDb, 1), 'dB'),
    row('DC at the drain, at rest', 'DC at rest', null, rest.number, rest.unit),
    row('DC that the tone adds', 'DC added', null, dc.number, dc.unit),
  ];
}

/** Under a tenth of a microvolt nobody asks. */
function smallVolts(volts: number): { number: string; unit: string } {
  return Math.abs(volts) < 1e-7 ? { number: '0.0', unit: 'μV' } : splitQuantity(volts, 'V', 2, { signed: true });
}

function channelRow(reading: ToneReading): Row {
  if (!Number.isFinite(reading.rdsOhm) || reading.rdsOhm > 1e9)
    return row('Drain to source, at rest', 'Drain-source', ['r', 'DS'], 'off', '');
  const ohm = splitQuantity(reading.rdsOhm, 'Ω');
  return row('Drain to source, at rest', 'Drain-source', ['r', 'DS'], ohm.number, ohm.unit);
}

function controlRows(variant: Variant, reading: ToneReading | null, controlV: number | null): Row[] {
  const { control, cell, device } = variant;
  const volts = (v: number) => decimals(v, 2);
  const swing = controlEnds(control);
  const period = gatePeriod(control, cell);
  const rows: Row[] = [];
  const now = controlV ?? (control.source === 'fixed' ? control.controlV : null);
  if (now !== null || swing)
    rows.push(row('Control to be delivered', 'Control', ['V', 'C'], now === null ? null : volts(now), 'V', endsOf(swing, volts)));
  const gateEnds = period && !period.steady ? { min: Math.min(...period.gate), max: Math.max(...period.gate) } : null;
  if (reading) rows.push(row('Gate to source, at rest', 'Gate-source', ['V', 'GS'], volts(reading.vgsV), 'V', endsOf(gateEnds, volts)));
  if (period) {
    const off = device.gateOffV < 0 ? device.gateOffV - Math.min(...period.gate) : Math.max(...period.gate) - device.gateOffV;
    rows.push(row('Past off, at the gate’s far end', 'Past off', null, signedDecimals(off, 2), 'V'));
  }
  return rows;
}

function controlEnds(control: Control): { min: number; max: number } | null {
  return control.source === 'lfo' ? { min: Math.min(control.fromV, control.toV), max: Math.max(control.fromV, control.toV) } : null;
}

function endsOf(ends: { min: number; max: number } | null, print: (v: number) => string): { min: string; max: string } {
  return ends ? { min: print(ends.min), max: print(ends.max) } : { min: '', max: '' };
}
