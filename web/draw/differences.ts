/** In what one variant differs from another, in the words of the sheet. */
import type { Control, Feedback, Variant } from '../../model/design/types.ts';
import { fieldAt, getAt } from '../../model/design/path.ts';
import { formatQuantity } from '../../model/design/values.ts';
import { valueVolts } from './words.ts';

/** Values with a name of their own on the sheet, in the order in which they are told. */
const NAMED: readonly (readonly [path: string, name: string])[] = [
  ['device.law', 'law'],
  ['device.channel', 'channel'],
  ['device.idssA', 'IDSS'],
  ['device.gateOffV', 'VGS(off)'],
  ['cell.seriesOhm', 'R1'],
  ['cell.feedback.drainOhm', 'R2'],
  ['cell.controlOhm', 'R3'],
  ['cell.feedback.blockingF', 'C1'],
  ['cell.feedback.fraction', 'share'],
  ['cell.loadOhm', 'R4'],
  ['cell.loadF', 'C2'],
  ['control.controlV', 'VC'],
  ['control.rateHz', 'rate'],
  ['control.fromV', 'from'],
  ['control.toV', 'to'],
  ['control.restV', 'rest'],
  ['control.limitV', 'limit'],
  ['control.thresholdV', 'threshold'],
  ['output.gainDb', 'make-up'],
];

const FEEDBACK: Readonly<Record<Feedback['kind'], string>> = {
  none: 'no feedback',
  resistor: 'feedback by resistors',
  buffered: 'feedback by a buffer',
};

/** Groups whose values are told of by one word. */
const REST: readonly (readonly [paths: readonly string[], words: string])[] = [
  [['cell.feed', 'cell.sourceOhm', 'cell.pad', 'cell.buffer', 'cell.coupling'], 'the input of the board'],
  [['cell.drainReturnOhm', 'cell.outputCouplingF'], 'the output of the board'],
  [['cell.driverOhm', 'cell.smoothing'], 'the path of the control'],
  [['cell.reference', 'cell.sharedGround', 'cell.clamp', 'cell.strayF'], 'the source pin or the gate'],
  [['devices.1'], 'the right channel’s J1'],
];

/** Each difference in a few words, in the order of the circuit; empty for two of the same. */
export function differences(base: Variant, other: Variant): string[] {
  const kinds = base.cell.feedback.kind !== other.cell.feedback.kind ? [FEEDBACK[other.cell.feedback.kind]] : [];
  const control = controlWords(other.control);
  const controls = controlWords(base.control) === control ? [] : [control];
  const named = NAMED.flatMap(([path, name]) => {
    const [before, after] = [valueAt(base, path), valueAt(other, path)];
    const toldOf = before === undefined || after === undefined || before === after;
    return toldOf ? [] : [`${name} ${printed(path, after)}`];
  });
  const groups = REST.filter(([paths]) => paths.some((path) => different(valueAt(base, path), valueAt(other, path)))).map(
    ([, words]) => words,
  );
  const told = [...kinds, ...controls, ...named, ...groups];
  const more =
    told.length === 0 && different(withoutName(base), withoutName(other)) ? ['smaller values of J1, its control or the amplifier'] : [];
  return [...told, ...more];
}

function controlWords(control: Control): string {
  return control.source === 'lfo' ? control.shape : control.source;
}

/** Undefined where this variant has no such value. Where the channels' parts differ `device` is the left one's. */
function valueAt(variant: Variant, path: string): unknown {
  try {
    return getAt(variant, variant.devices ? path.replace(/^device\./, 'devices.0.') : path);
  } catch (error) {
    if (error instanceof RangeError) return undefined;
    throw error;
  }
}

function printed(path: string, value: unknown): string {
  const { unit } = fieldAt(path);
  if (value === null) return 'none';
  if (typeof value !== 'number') return String(value);
  return unit === 'V' ? valueVolts(value) : formatQuantity(value, unit);
}

function withoutName({ name: _, ...rest }: Variant): unknown {
  return rest;
}

function different(a: unknown, b: unknown): boolean {
  return JSON.stringify(a) !== JSON.stringify(b);
}
