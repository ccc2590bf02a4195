/** `fettle measure` */
import { controlRangeV, restControlV } from '../control/range.ts';
import { fieldAt } from '../design/path.ts';
import type { Control } from '../design/types.ts';
import { formatQuantity, parseQuantity, type Unit } from '../design/values.ts';
import { requireRange } from '../study/require.ts';
import { measureTone, TONE_HZ_RANGE, TONE_V_RANGE, type ToneReading } from '../study/tone.ts';
import { judged } from './fault.ts';
import type { Command, Line, Option } from './line.ts';
import { type Asked, printReading } from './reading.ts';
import { openSubject, SET, SET_NOTES, VARIANT } from './subject.ts';

const TONE_HZ: Option = { name: 'toneHz', value: 'HZ', about: 'frequency of the tone; 1000 when left out' };
const TONE_V: Option = { name: 'toneV', value: 'V', about: "size of the tone at the cell's input, V peak; 0.5 when left out" };
const CONTROL_V: Option = { name: 'controlV', value: 'V', about: "voltage of the control's driver; where the control rests when left out" };
const AT_OUTPUT: Option = { name: 'atOutput', about: "reads the amplifier's output in place of the drain" };
const JSON_OUT: Option = { name: 'json', about: 'prints one JSON object' };

type Range = readonly [least: number, most: number];

export const measure: Command = {
  name: 'measure',
  files: ['DESIGN'],
  about: 'Reads what one variant does to a tone in the steady state, at a fixed control voltage.',
  options: [VARIANT, TONE_HZ, TONE_V, CONTROL_V, SET, AT_OUTPUT, JSON_OUT],
  notes: `A control that moves is held still: an LFO midway between its ends, a follower without signal, an external control at its offset.
Where left and right have devices of their own, the left one is read. All voltages are peak.

--json prints gainDb, fundamentalV, dcV, restDcV, thdFundamental, thdTotal, harmonics, rdsOhm, vgsV, regions,
gridPoints, converged, fundamentalError, harmonicsError, settledByTime. THD and regions are ratios: thdFundamental divides by the
fundamental, thdTotal by the total (IEC 60268-3), both over harmonics 2 to 9. harmonics is a list of { n, amplitudeV, db, phaseRad }:
db re the fundamental, null where the harmonic is zero; the phase re the input's cosine.
rdsOhm is the slope resistance at rest, null where the channel is cut off. regions is the share of the period in each:
ohmic, saturated and cutoff add up to one, gateOn may overlap them. The errors are what the last doubling of the grid changed, over the
fundamental and over the harmonic above -160 dB that changed most; converged says that these are under 1e-7 and 1e-4 dB.
settledByTime is true where the steady state was not found directly but run until it repeated.

${SET_NOTES}`,
  run: runMeasure,
};

function runMeasure(line: Line): void {
  const toneHz = quantityOf(line, TONE_HZ, 'Hz', TONE_HZ_RANGE) ?? 1000;
  const toneV = quantityOf(line, TONE_V, 'V', TONE_V_RANGE, ' peak') ?? 0.5;
  const givenV = quantityOf(line, CONTROL_V, 'V', controlRange());
  const { design, variantIndex } = openSubject(line.words[0], line);
  const variant = design.variants[variantIndex];
  const controlV = givenV ?? restControlV(variant.control);
  const options: Asked = {
    toneHz,
    toneV,
    controlV,
    at: line.values.has(AT_OUTPUT.name) ? 'output' : 'drain',
  };
  const reading = judged(`Variant ${variant.name} cannot be measured: `, () => measureTone(design, variantIndex, options));
  const held = givenV === undefined ? heldBy(variant.control) : 'from --controlV';
  process.stdout.write(line.values.has(JSON_OUT.name) ? `${json(reading)}\n` : printReading(design, variant, reading, options, held));
  if (!reading.converged) process.stderr.write('The reading had not stopped changing on the finest grid: its last digits are uncertain\n');
}

/** `note` stands after the limits in the sentence. */
function quantityOf({ values }: Line, option: Option, unit: Unit, [least, most]: Range, note = ''): number | undefined {
  const [text] = values.get(option.name) ?? [];
  if (text === undefined) return undefined;
  const value = judged(`--${option.name}: `, () => parseQuantity(text, unit));
  judged('', () => requireRange(`--${option.name}`, value, least, most, unit, note));
  return value;
}

/** What the document allows a control to be. */
function controlRange(): Range {
  const { min, max } = fieldAt('control.controlV');
  return [min, max];
}

function heldBy(control: Control): string {
  const [lower, upper] = controlRangeV(control).map((volts) => formatQuantity(volts, 'V'));
  switch (control.source) {
    case 'fixed':
      return 'fixed, as in the design';
    case 'lfo':
      return `the LFO midway between ${lower} and ${upper}`;
    case 'envelope':
      return 'the follower without signal';
    case 'external':
      return 'the external control at its offset';
  }
}

/** What is not finite has no place in JSON and becomes null. */
function json(reading: ToneReading): string {
  return JSON.stringify(reading);
}
