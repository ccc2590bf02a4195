import { writeWav } from '../../../model/chain/wav.ts';
import type { Bench } from '../../../web/state/bench.ts';
import { createBench } from '../../../web/state/createBench.ts';
import { malformedFile } from '../../support/malformed.ts';

export interface Fed {
  readonly refused: number;
  readonly taken: number;
  /** What was neither refused by a sentence nor taken, and why. */
  readonly faults: readonly string[];
  /** A sentence of each kind, so that a person can read them. */
  readonly sentences: readonly string[];
}

let bench: Bench | null = null;

/** How often a good file is opened in between. */
const EVERY = 50;

/** Opens the malformed files of `seeds` on the page's one bench; `design` is the text of a good one. */
export async function feedMalformed(seeds: readonly number[], design: string): Promise<Fed> {
  bench ??= createBench();
  const faults: string[] = [];
  const sentences = new Map<string, string>();
  let taken = 0;
  for (const seed of seeds) {
    const { name, kind, bytes } = malformedFile(seed, design);
    const file = new File([bytes], name);
    const before = bench.design.peek();
    await (kind === 'design' ? bench.openDesign(file) : bench.openAudio(file));
    const opened = kind === 'design' ? bench.design.peek() !== before : bench.source.peek().title === name;
    const notes = bench.notes.peek();
    const wrong = opened ? '' : refusalFault(name, notes);
    if (wrong !== '') faults.push(`${name}: ${wrong}`);
    if (opened) taken++;
    else sentences.set(`${kind} ${name.replace(/^\d+ |\.\w+$/g, '')}`, notes[0]?.sentence ?? '');
    for (const { id } of notes) bench.dismiss(id);
    if (seed % EVERY === 0) faults.push(...(await opensGood(bench, design)).map((fault) => `after ${name}: ${fault}`));
  }
  if ('polluted' in {}) faults.push('Object.prototype was written to');
  const refused = seeds.length - taken;
  return { refused, taken, faults, sentences: [...sentences].map(([how, sentence]) => `${how}: ${sentence}`) };
}

/** One sentence that names the file, ends, and speaks of no program's insides. */
function refusalFault(name: string, notes: Bench['notes']['value']): string {
  const [note] = notes;
  if (notes.length !== 1) return `${notes.length} notes: ${notes.map(({ sentence }) => sentence).join(' | ')}`;
  const said = [note.sentence, ...(note.list ?? [])];
  if (!note.sentence.includes(`“${name}”`)) return `does not name the file: ${note.sentence}`;
  const bad = said.find((sentence) => /undefined|\[object|Exception|Failed to|Uncaught|TypeError|DOMException/.test(sentence));
  if (bad !== undefined) return `speaks of the program: ${bad}`;
  return /[.:]$/.test(note.sentence) ? '' : `does not end: ${note.sentence.slice(-200)}`;
}

/** That the page goes on: a good recording and a good design open, with nothing to be said. */
async function opensGood(bench: Bench, design: string): Promise<string[]> {
  const { bytes } = writeWav([Float32Array.of(0, 0.5, 0)], 48000, 'pcm24');
  await bench.openAudio(new File([bytes], 'good.wav'));
  await bench.openDesign(new File([design], 'good.json'));
  const faults = bench.notes.peek().map(({ sentence }) => sentence);
  return bench.source.peek().title === 'good.wav' ? faults : [...faults, 'good.wav was not opened'];
}
