/**
 * The document, described once: checking, defaults, editing and JSON Schema all follow from this table.
 * Limits are those of parts that exist or of what the model can solve, whichever is narrower.
 */
import { cell } from './cellSchema.ts';
import { control } from './controlSchema.ts';
import { device } from './deviceSchema.ts';
import { toJsonSchema } from './json-schema.ts';
import { absentOr, choice, count, type Group, group, type Member, quantity, type Rule, text, union } from './kinds.ts';
import type { Design, Noise, Output, Variant } from './types.ts';

export const VERSION = 1;

const namesDiffer: Rule = {
  fault({ variants }) {
    if (!Array.isArray(variants)) return null;
    const names = variants.map((variant: Partial<Variant> | undefined) => variant?.name);
    const second = names.findIndex((name, index) => name !== undefined && names.indexOf(name) < index);
    return second < 0 ? null : { path: `variants[${second}].name`, value: names[second], expected: 'a name that no other variant has' };
  },
};

const output = group<Output>('Output', 'The make-up amplifier after the cell.', {
  gainDb: quantity('dB', -60, 60, 0, 'Gain; 0 dB is transparent.'),
  gainBandwidthHz: absentOr('Hz', 1e3, 1e10, 'Gain-bandwidth product; null is ideal.'),
  slewVPerSec: absentOr('V/s', 100, 1e10, 'Slew rate, 1e6 for 1 V/μs; null is ideal.'),
  swingV: absentOr('V', 0.1, 1000, 'Largest output either side of 0 V; null has no limit.'),
});

const noise = union('Noise', 'Thermal noise of the parts, computed sample by sample.', {
  none: group<Member<Noise, 'kind', 'none'>>('NoNoise', 'The parts are silent.', {}),
  thermal: group<Member<Noise, 'kind', 'thermal'>>('ThermalNoise', 'Noise of every resistor and of the channel.', {
    seed: count(0, 4294967295, 1, 'Number from which the noise is computed: the same one gives the same noise.'),
  }),
});

export const variantSchema: Group = group<Variant>(
  'Variant',
  'One complete set of circuit values, heard and measured beside the others.',
  {
    name: text(24, 'A', 'Name of the variant, different from the others: A to D by custom.'),
    device,
    devices: {
      kind: 'list',
      noun: 'devices',
      description: 'Left and right, in place of device, where the two channels have different parts.',
      item: device,
      min: 2,
      max: 2,
    },
    cell,
    control,
    output,
  },
  { presence: { name: 'required', device: 'first of devices', devices: 'optional', cell: 'required' } },
);

export const designSchema: Group = group<Design>(
  'Design',
  'A gain cell with a junction FET as voltage-controlled resistor, in up to four variants. All values in SI units.',
  {
    fettle: choice([VERSION], VERSION, "Version of the document's layout."),
    title: text(80, 'Untitled design', 'Title of the design.'),
    fullScaleV: quantity('V', 1e-4, 100, 0.2, "Voltage at the cell's input for a digital sample of 1.0, peak."),
    tempC: quantity('°C', -55, 150, 25, 'Temperature at which the cell works.'),
    oversampling: choice([1, 2, 4, 8, 16], 8, 'Steps that the circuit is solved in for each sample of the sound.'),
    noise,
    variants: { kind: 'list', noun: 'variants', description: 'Up to four sets of circuit values.', item: variantSchema, min: 1, max: 4 },
  },
  { presence: { fettle: 'required', variants: 'required' }, rules: [namesDiffer] },
);

/** The schema of a design file, JSON Schema draft 2020-12. Agreements between fields that it cannot state stand in the descriptions. */
export function jsonSchema(): object {
  return { $schema: 'https://json-schema.org/draft/2020-12/schema', ...toJsonSchema(designSchema) };
}
