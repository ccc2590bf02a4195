/** From the document to a cell: which device a channel has, and the numbers of its circuit at the design's temperature. */
import { atTemperature } from '../device/temperature.ts';
import type { Design, Device, Variant } from '../design/types.ts';
import { type CellNumbers, compileCell } from './cell.ts';
import type { Circuit } from './circuit.ts';
import { shuntCircuit } from './shunt.ts';

/** The device of audio channel `channel` (0 left, 1 right). */
export function deviceOf(variant: Variant, channel: number): Device {
  return variant.devices ? variant.devices[channel === 0 ? 0 : 1] : variant.device;
}

/** Numbers of the cell of one variant and channel, with `noise` ready for sampled thermal noise. Throws a RangeError that names what cannot be computed. */
export function cellNumbers(design: Design, variantIndex: number, channel: number, noise = false): CellNumbers {
  const device = deviceOf(variantAt(design, variantIndex), channel);
  return compileCell(circuitOf(design, variantIndex, channel), device, design.tempC, noise);
}

/** The circuit of the cell of one variant and channel, its device at the design's temperature. */
export function circuitOf(design: Design, variantIndex: number, channel: number): Circuit {
  const variant = variantAt(design, variantIndex);
  return shuntCircuit(variant.cell, atTemperature(deviceOf(variant, channel), design.tempC).device);
}

/** The variant at an index. Throws a RangeError when there is none. */
export function variantAt(design: Design, index: number): Variant {
  const variant = design.variants[index];
  if (!variant) throw new RangeError(`variant ${index} is not in the design; expected 0 to ${design.variants.length - 1}`);
  return variant;
}
