/** `fettle render` */
import { LARGEST_SAMPLE } from '../chain/chain.ts';
import { renderClip } from '../chain/render.ts';
import { RESIDUAL_PARTS, type ResidualPart } from '../chain/residual.ts';
import { type Dither, readWav, type WavClip, type WavFormat, writeWav } from '../chain/wav.ts';
import type { Variant } from '../design/types.ts';
import { designText } from '../design/text.ts';
import { either, shown } from '../design/wording.ts';
import { CommandFault, judged } from './fault.ts';
import { outputPath, readBytes, writeWhole } from './files.ts';
import type { Command, Line, Option } from './line.ts';
import { createProgress } from './progress.ts';
import { openSubject, SET, SET_NOTES, VARIANT } from './subject.ts';

const FORMATS: readonly WavFormat[] = ['pcm16', 'pcm24', 'pcm32', 'float32'];
const DITHERS: readonly Dither[] = ['none', 'triangular'];
const FORMAT: Option = { name: 'format', value: 'FORMAT', about: `samples of OUT: ${either(FORMATS)}; those of IN when left out` };

const DITHER: Option = { name: 'dither', value: 'DITHER', about: `of PCM samples: ${either(DITHERS)}; none when left out` };

const CONTROL: Option = {
  name: 'control',
  value: 'CONTROL.wav',
  about: 'recorded control, for a variant whose control.source is external',
};

const RESIDUAL: Option = {
  name: 'residual',
  value: 'PART',
  about: `what the cell adds, in place of its output: ${either(RESIDUAL_PARTS)}`,
};

export const render: Command = {
  name: 'render',
  files: ['DESIGN', 'IN.wav', 'OUT.wav'],
  about: 'Puts a sound through one variant of a design.',
  options: [VARIANT, SET, FORMAT, DITHER, CONTROL, RESIDUAL],
  notes: `IN is a WAV file of PCM with 16, 24 or 32 bits or of 32-bit float, mono or stereo. OUT has its sample rate, channels and number of
frames, and no delay. Its samples are of IN's kind unless --format says otherwise; PCM is rounded to the nearest step, by --dither triangular
with noise of that density, two steps wide and the same at every run, before. Samples beyond full scale are cut to it, counted and reported
on stderr. The design is inside OUT, which can stand for DESIGN. OUT appears only when it is whole; IN is never touched.
CONTROL has IN's sample rate and at least its frames; its first channel moves the gate: control.offsetV + control.fullScaleV × sample.
--residual distortion is the cell less its copy without audio and its linear twin; feedthrough is that copy; noise is there though the
design has it switched off. All are at the level that they have in OUT.

${SET_NOTES}`,
  run: runRender,
};

async function runRender(line: Line): Promise<void> {
  const [designPath, inPath, outPath] = line.words;
  const asked = askedFormat(line);
  const residual = askedPart(line);
  const dither = askedDither(line);
  const { design, variantIndex } = openSubject(designPath, line);
  const clip = openClip(inPath);
  const format = asked ?? formatOf(clip);
  if (dither !== 'none' && format === 'float32')
    throw new CommandFault(`--dither is ${dither}, but OUT is float32, which is not rounded; expected a --format of PCM`);
  const controlPath = controlPathOf(line, design.variants[variantIndex]);
  const recorded = controlPath === undefined ? undefined : openControl(controlPath, clip, inPath);
  const target = outputPath(outPath, [inPath, designPath, ...(controlPath === undefined ? [] : [controlPath])]);
  const progress = createProgress();
  const about = `${inPath} cannot be rendered with variant ${design.variants[variantIndex].name}: `;
  const rendered = judged(about, () =>
    renderClip(design, variantIndex, clip.channels, clip.sampleRateHz, { onProgress: progress.show, recorded, residual }),
  );
  progress.clear();
  const { bytes, cut } = writeWav(rendered, clip.sampleRateHz, format, { dither, design: designText(design, variantIndex) });
  await writeWhole(target, bytes);
  if (cut > 0) process.stderr.write(`${outPath}: ${cutSentence(cut, rendered.length * rendered[0].length)}\n`);
}

/** An external control needs its recording, and no other may have one: each would be another circuit. */
function controlPathOf({ values }: Line, { name, control }: Variant): string | undefined {
  const [path] = values.get(CONTROL.name) ?? [];
  if (control.source === 'external' && path === undefined) {
    throw new CommandFault(`control.source of variant ${name} is external; expected --control CONTROL.wav with its recording`);
  }
  if (control.source !== 'external' && path !== undefined) {
    throw new CommandFault(`--control is given, but control.source of variant ${name} is ${control.source}; expected external`);
  }
  return path;
}

function openControl(path: string, clip: WavClip, inPath: string): Float32Array {
  const { channels, sampleRateHz } = openClip(path);
  const [frames, expected] = [channels[0].length, clip.channels[0].length];
  if (sampleRateHz !== clip.sampleRateHz) {
    throw new CommandFault(`${path} has a sample rate of ${sampleRateHz} Hz; expected that of ${inPath}, ${clip.sampleRateHz} Hz`);
  }
  if (frames < expected) throw new CommandFault(`${path} has ${frames} frames; expected at least the ${expected} of ${inPath}`);
  return channels[0];
}

function cutSentence(cut: number, count: number): string {
  const [samples, were] = cut === 1 ? ['1 sample', 'was'] : [`${cut} samples`, 'were'];
  return `${samples} of ${count} lay beyond full scale and ${were} cut to it; a lower output.gainDb or --format float32 keeps them`;
}

function askedFormat({ values }: Line): WavFormat | undefined {
  const [text] = values.get(FORMAT.name) ?? [];
  const format = FORMATS.find((name) => name === text);
  if (text !== undefined && !format) throw new CommandFault(`--format is ${shown(text)}; expected ${either(FORMATS)}`);
  return format;
}

function askedPart({ values }: Line): ResidualPart | undefined {
  const [text] = values.get(RESIDUAL.name) ?? [];
  const part = RESIDUAL_PARTS.find((name) => name === text);
  if (text !== undefined && !part) throw new CommandFault(`--residual is ${shown(text)}; expected ${either(RESIDUAL_PARTS)}`);
  return part;
}

function askedDither({ values }: Line): Dither {
  const [text] = values.get(DITHER.name) ?? ['none'];
  const dither = DITHERS.find((name) => name === text);
  if (!dither) throw new CommandFault(`--dither is ${shown(text)}; expected ${either(DITHERS)}`);
  return dither;
}

function formatOf({ float, bits }: WavClip): WavFormat {
  return float ? 'float32' : `pcm${bits}`;
}

/** Refuses a file with samples that are no sound, which the chain would take as silence. */
function openClip(path: string): WavClip {
  const bytes = readBytes(path);
  const clip = judged(`${path}: `, () => readWav(bytes));
  for (const samples of clip.channels) {
    const frame = samples.findIndex((sample) => !(Math.abs(sample) <= LARGEST_SAMPLE));
    if (frame >= 0) {
      const expected = `at most ${LARGEST_SAMPLE} times full scale`;
      throw new CommandFault(`${path}: frame ${frame + 1} holds a sample of ${samples[frame]}; expected ${expected}`);
    }
  }
  return clip;
}
