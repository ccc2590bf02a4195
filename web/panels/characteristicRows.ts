/** The rows of Table 1 as words, grouped by meaning: the signal, the channel, the control. Only rows with a real number in them. */
import type { Control, Variant } from '../../model/design/types.ts';
import { splitQuantity } from '../../model/design/values.ts';
import type { ToneReading } from '../../model/study/tone.ts';
import type { GatePeriod } from '../state/bench.ts';
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
  /** False for what follows from the circuit alone: it is never coloured. */
  readonly measured: boolean;
}

/** `controlV` is the control of this moment, null while sound is stopped: then it is shown at rest. */
export function characteristicRows(
  variant: Variant,
  reading: ToneReading | null,
  controlV: number | null,
  period: GatePeriod | null,
): Row[][] {
  const groups = [
    reading ? signalRows(reading, period) : [],
    reading ? [channelRow(reading)] : [],
    controlRows(variant, reading, controlV, period),
  ];
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
  return { what, short, symbol, now, unit, ...ends, measured: true };
}

function signalRows(reading: ToneReading, period: GatePeriod | null): Row[] {
  const drain = period && !period.steady ? [Math.min(...period.drain), Math.max(...period.drain)] : [];
  const { unit, print } = smallVolts([reading.restDcV, ...drain]);
  const added = reading.dcV - reading.restDcV;
  const tone = smallVolts([added]);
  return [
    row('Gain of the cell, input to drain', 'Gain', ['G'], signedDecimals(reading.gainDb, 1), 'dB'),
    row(
      'DC at the drain, from the control',
      'DC at drain',
      ['V', 'DS'],
      print(reading.restDcV),
      unit,
      drain.length > 0 ? { min: print(drain[0]), max: print(drain[1]) } : undefined,
    ),
    row('DC that the tone adds', 'DC added', null, tone.print(added), tone.unit),
  ];
}

/** One unit for voltages of a row, by the largest of them: from a tenth of a microvolt, under which nobody asks. */
function smallVolts(volts: readonly number[]): { unit: string; print: (volts: number) => string } {
  const largest = Math.max(...volts.map(Math.abs));
  const [scale, unit] = largest >= 0.9995 ? [1, 'V'] : largest >= 0.9995e-3 ? [1e3, 'mV'] : [1e6, 'μV'];
  return { unit, print: (v) => signedDecimals(v * scale, largest * scale >= 99.5 ? 0 : 1) };
}

function channelRow(reading: ToneReading): Row {
  if (!Number.isFinite(reading.rdsOhm) || reading.rdsOhm > 1e9)
    return row('Drain to source, at rest', 'Drain-source', ['r', 'DS'], 'off', '');
  const ohm = splitQuantity(reading.rdsOhm, 'Ω');
  return row('Drain to source, at rest', 'Drain-source', ['r', 'DS'], ohm.number, ohm.unit);
}

function controlRows({ control }: Variant, reading: ToneReading | null, controlV: number | null, period: GatePeriod | null): Row[] {
  const volts = (v: number) => decimals(v, 2);
  const swing = controlEnds(control);
  const rows: Row[] = [];
  const now = controlV ?? (control.source === 'fixed' ? control.controlV : null);
  if (now !== null || swing)
    rows.push(row('Control to be delivered', 'Control', ['V', 'C'], now === null ? null : volts(now), 'V', endsOf(swing, volts)));
  const gateEnds = period && !period.steady ? { min: Math.min(...period.gate), max: Math.max(...period.gate) } : null;
  if (reading) rows.push(row('Gate to source, at rest', 'Gate-source', ['V', 'GS'], volts(reading.vgsV), 'V', endsOf(gateEnds, volts)));
  if (period) {
    const off = period.gateOffV < 0 ? period.gateOffV - Math.min(...period.gate) : Math.max(...period.gate) - period.gateOffV;
    rows.push({ ...row('Past off, at the gate’s far end', 'Past off', null, signedDecimals(off, 2), 'V'), measured: false });
  }
  return rows;
}

function controlEnds(control: Control): { min: number; max: number } | null {
  return control.source === 'lfo' ? { min: Math.min(control.fromV, control.toV), max: Math.max(control.fromV, control.toV) } : null;
}

function endsOf(ends: { min: number; max: number } | null, print: (v: number) => string): { min: string; max: string } {
  return ends ? { min: print(ends.min), max: print(ends.max) } : { min: '', max: '' };
}
