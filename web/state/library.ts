/** What comes with the page: demo phrases and example designs, by their manifests. */
import type { ReadonlySignal } from '@preact/signals';
import { signal } from '@preact/signals';
import type { Clip } from '../audio/clip.ts';
import type { ExampleEntry } from './bench.ts';
import type { Parts } from './parts.ts';

export interface Library {
  readonly phrases: ReadonlySignal<readonly PhraseEntry[]>;
  readonly examples: ReadonlySignal<readonly ExampleEntry[]>;
  /** Reads both manifests; rejects with a sentence. Reading them again asks nothing. */
  load(): Promise<void>;
  /** A phrase as sound; once loaded it stays. */
  loadPhrase(name: string): Promise<Clip>;
  /** An example design as the text of its file. */
  loadExample(name: string): Promise<string>;
}

interface PhraseEntry {
  readonly name: string;
  readonly title: string;
  readonly file: string;
  readonly listenFor?: string;
}

export function createLibrary(parts: Pick<Parts, 'fetchBytes' | 'decodeAudio'>): Library {
  const phrases = signal<readonly PhraseEntry[]>([]);
  const examples = signal<readonly ExampleEntry[]>([]);
  const clips = new Map<string, Promise<Clip>>();
  let loading: Promise<void> | null = null;

  const readText = async (path: string) => new TextDecoder().decode(await parts.fetchBytes(path));

  const load = async () => {
    const [phraseText, designText] = await Promise.all([readText('phrases/manifest.json'), readText('designs/manifest.json')]);
    phrases.value = JSON.parse(phraseText).phrases;
    examples.value = JSON.parse(designText);
  };

  const fetchPhrase = async (name: string) => {
    const { file, title } = find(phrases.peek(), name, 'phrase');
    return parts.decodeAudio(await parts.fetchBytes(`phrases/${file}`), title);
  };

  return {
    phrases,
    examples,
    load() {
      loading ??= load().catch((error) => {
        loading = null;
        throw error;
      });
      return loading;
    },
    loadPhrase(name) {
      const known = clips.get(name);
      if (known !== undefined) return known;
      const clip = fetchPhrase(name).catch((error) => {
        clips.delete(name);
        throw error;
      });
      clips.set(name, clip);
      return clip;
    },
    loadExample: (name) => readText(`designs/${find(examples.peek(), name, 'example').name}.json`),
  };
}

function find<Entry extends { readonly name: string }>(entries: readonly Entry[], name: string, what: string): Entry {
  const found = entries.find((entry) => entry.name === name);
  if (found === undefined)
    throw new RangeError(`There is no ${what} “${name}”; expected one of ${entries.map((entry) => entry.name).join(', ')}.`);
  return found;
}
