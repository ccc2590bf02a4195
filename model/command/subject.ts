/** The design and variant that a command is about, with the values that `--set` changes. */
import { readWav } from '../chain/wav.ts';
import { setAllFromText } from '../design/path.ts';
import { readDesign } from '../design/read.ts';
import type { Design } from '../design/types.ts';
import { shown } from '../design/wording.ts';
import { CommandFault, judged } from './fault.ts';
import { readBytes, readText } from './files.ts';
import type { Line, Option } from './line.ts';

export const VARIANT: Option = { name: 'variant', value: 'NAME', about: 'which variant, by its name; the first when left out' };
export const SET: Option = {
  name: 'set',
  value: 'PATH=VALUE',
  about: 'a value in place of the one in the design, which stays as it is; may be repeated',
  repeats: true,
};

export const SET_NOTES = `Paths of --set start at the variant: cell.seriesOhm=6k8, device.gateOffV=-1.8, cell.feedback.kind=resistor,
control.controlV=-1.2, output.gainDb=6. Those of the design itself start with design: design.fullScaleV=500m. Values are quantities
(6k8, 100n, -1.2), choices, true, false, null for an absent part, or JSON. All are set in the order given, then judged together.`;

const OF_DESIGN = 'design.';

export interface Subject {
  readonly design: Design;
  readonly variantIndex: number;
}

export function openSubject(path: string, { values }: Line): Subject {
  const read = readDesign(textAt(path));
  if ('faults' in read) throw new CommandFault(read.faults.map((fault) => `${path}: ${fault.sentence}`).join('\n'));
  const { design } = read;
  const names = design.variants.map(({ name }) => name);
  const [wanted] = values.get(VARIANT.name) ?? [names[0]];
  const variantIndex = names.indexOf(wanted);
  if (variantIndex < 0) throw new CommandFault(`--variant is ${shown(wanted)}; ${path} has ${names.map(shown).join(', ')}`);
  return { design: withSettings(design, variantIndex, (values.get(SET.name) ?? []).map(splitSetting)), variantIndex };
}

/** The text of a design's file, or of the design inside a WAV file. */
function textAt(path: string): string {
  if (!/\.wav$/i.test(path)) return readText(path);
  const { design } = judged(`${path}: `, () => readWav(readBytes(path)));
  if (design === undefined) throw new CommandFault(`${path} holds sound and no design; expected a design, or a WAV file with one inside`);
  return design;
}

type Setting = readonly [path: string, text: string];

function splitSetting(written: string): Setting {
  const at = written.indexOf('=');
  if (at < 1) throw new CommandFault(`--set is ${shown(written)}; expected PATH=VALUE such as cell.seriesOhm=6k8`);
  return [written.slice(0, at).trim(), written.slice(at + 1)];
}

function withSettings(design: Design, variantIndex: number, settings: readonly Setting[]): Design {
  const ofDesign = settings.filter(([path]) => path.startsWith(OF_DESIGN));
  const ofVariant = settings.filter((setting) => !ofDesign.includes(setting));
  try {
    const variant = setAllFromText(design.variants[variantIndex], ofVariant);
    const variants = design.variants.map((each, index) => (index === variantIndex ? variant : each));
    return setAllFromText(
      { ...design, variants },
      ofDesign.map(([path, text]) => [path.slice(OF_DESIGN.length), text]),
    );
  } catch (error) {
    throw error instanceof RangeError ? new CommandFault(`--set: ${error.message}${whereFrom(error.message)}`) : error;
  }
}

/** A path that leads nowhere is most often one of the design's own. */
function whereFrom(sentence: string): string {
  return sentence.includes('the top level') ? `. Paths start at the variant; those of the design itself with ${OF_DESIGN}` : '';
}
