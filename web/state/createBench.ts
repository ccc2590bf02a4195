/** The real bench: document, sound, readings and takes put together. */
import { computed, signal } from '@preact/signals';
import firstDesign from '../../assets/designs/harbour-tremolo.json?raw';
import { compileChain } from '../../model/chain/compile.ts';
import { readWav } from '../../model/chain/wav.ts';
import { readDesign } from '../../model/design/read.ts';
import { designText } from '../../model/design/text.ts';
import { MOVES, type Moves } from '../../model/design/feedback.ts';
import type { Design } from '../../model/design/types.ts';
import type { Bench, Keep } from './bench.ts';
import { createDocument } from './document.ts';
import { fileName } from './fileName.ts';
import { createKeeping } from './keeping.ts';
import { createLevels } from './levels.ts';
import { createLibrary } from './library.ts';
import { createLimits, limitSettings } from './limits.ts';
import type { Listening } from './listening.ts';
import { createListening } from './listening.ts';
import { createNotes, sentenceOf } from './notes.ts';
import type { Parts } from './parts.ts';
import { browserParts } from './parts.ts';
import { createReadings } from './readings.ts';
import { choiceSetting, numberSetting, textSetting } from './settings.ts';
import { createShelf } from './shelf.ts';
import type { Sources } from './sources.ts';
import { createSources } from './sources.ts';
import type { Takes } from './takes.ts';
import { createTakes } from './takes.ts';
import { createTimeline } from './timeline.ts';

/** Before any sound is open, a design is tried out at the lowest usual rate. */
const TRY_OUT_HZ = 44100;

export function createBench(): Bench {
  return assembleBench(browserParts());
}

export function assembleBench(parts: Parts): Bench {
  const notes = createNotes();
  const levels = createLevels();
  const library = createLibrary(parts);
  const document = createDocument(openingDesign(), (design, variantIndex) => {
    compileChain(design, variantIndex, listening.rateHz.peek() ?? TRY_OUT_HZ, 1, 'lowLatency');
  });
  const sources: Sources = createSources({
    ...{ parts, library, document, notes, listening: () => listening },
    restored: () => keeping.restored,
  });
  const listening: Listening = createListening({ parts, document, levels, notes, takes: () => takes, loadFirstSource: sources.loadFirst });
  const store = parts.openStore(() => keepAnew());
  const shelf = createShelf(store, notes);
  const takes: Takes = createTakes({ parts, document, source: listening.forTakes, notes, shelf, store });
  const readings = createReadings(parts.openReadingWorker(), {
    design: document.design,
    heardVariant: document.heardVariant,
    moves: document.moves,
    live: levels.live,
    playing: computed(() => listening.sound.value === 'playing'),
  });

  const limits = createLimits();
  const hintsAway = signal(false);
  const putAway = (away: boolean) => {
    hintsAway.value = away;
  };
  /** Hints wait until it is known whether an earlier visit has put them away. */
  const visitKnown = signal(false);

  const keeping = createKeeping({
    ...{ store, shelf, document, notes, download: parts.download },
    settings: {
      listenDb: numberSetting('The listening level', listening.listenDb, listening.setListenDb),
      ceilingDbfs: numberSetting('The ceiling', listening.ceilingDbfs, listening.setCeilingDbfs),
      matched: choiceSetting('Matching of loudness', [true, false], listening.matched, listening.setMatched),
      toneV: numberSetting('The shadow tone’s level', readings.toneV, readings.setToneV),
      toneHz: numberSetting('The shadow tone’s frequency', readings.toneHz, readings.setToneHz),
      testToneV: numberSetting('The test tone’s level', sources.testToneV, sources.setTestToneV),
      testToneHz: numberSetting('The test tone’s frequency', sources.testToneHz, sources.setTestToneHz),
      keep: choiceSetting<Keep>('What setting k leaves alone', ['gate', 'control'], document.keep, document.setKeep),
      moves: choiceSetting<Moves>('What setting k moves', MOVES, document.moves, document.setMoves),
      phrase: textSetting('The phrase', sources.phrase),
      file: textSetting('The file', sources.file),
      hintsAway: choiceSetting('Whether the hints are away', [true, false], hintsAway, putAway),
      ...limitSettings(limits),
    },
    hold: takes.hold,
  });
  const keepAnew = () => {
    notes.add('note', 'The browser has closed or removed what Fettle kept here.', 'What this page holds is being written anew.');
    keeping.keepAnew();
    takes.keepAnew();
  };

  /** Runs what may fail; its sentence goes to the notes. */
  const noting = async (work: () => Promise<unknown>) => {
    try {
      await work();
    } catch (error) {
      notes.fault(error);
    }
  };

  const openText = (text: string, from: string) => {
    const result = readDesign(text);
    const refused = 'faults' in result ? result.faults.map((fault) => fault.sentence) : [document.replace(result.design)];
    const sentences = refused.filter((sentence) => sentence !== null);
    if (sentences.length === 1) notes.fault(`“${from}”: ${sentences[0].replace(/\.$/, '')}.`);
    if (sentences.length > 1) notes.add('fault', `“${from}” was not opened; its faults:`, undefined, sentences);
  };

  const missing = parts.missingFeature();
  if (missing !== null) notes.fault(missing, 'Everything else works; values can be read and designs saved.');
  noting(async () => {
    await sources.loadFirst();
    await parts.prepareSound();
    parts.keepOffline({
      newer: () =>
        notes.add('note', 'A newer Fettle has been fetched; it opens when this page is reloaded.', 'Close its other tabs first.'),
      failed: (reason) => notes.add('note', `This page will not open without a network: ${reason}.`, 'The next visit tries again.'),
    });
  });

  void keeping.restored.then(() => {
    visitKnown.value = true;
  });

  const openDesign = (file: File) => noting(async () => openText(await designIn(file), file.name));
  return {
    restored: keeping.restored,
    ...document,
    ...listening,
    ...levels,
    ...readings,
    ...takes,
    ...createTimeline(document, takes),
    ...sources,
    examples: library.examples,
    notes: notes.notes,
    dismiss: notes.dismiss,
    limits,
    hints: computed(() => visitKnown.value && !hintsAway.value),
    putHintsAway: () => putAway(true),
    savePlot(name, kind, text) {
      const mediaType = kind === 'csv' ? 'text/csv' : 'image/svg+xml';
      parts.download(`${fileName(document.design.peek().title)}-${name}.${kind}`, new TextEncoder().encode(text), mediaType);
    },
    openDesign,
    async openDropped(files) {
      const [file] = files;
      if (file === undefined) return;
      if (files.length > 1) notes.add('note', `${files.length} files were dropped; “${file.name}” is opened, the others are not.`);
      await (/\.json$/i.test(file.name) ? openDesign(file) : sources.openAudio(file));
    },
    openExample: (name) => noting(async () => openText(await library.loadExample(name), name)),
    saveDesign() {
      const design = document.design.peek();
      parts.download(`${fileName(design.title)}.json`, new TextEncoder().encode(designText(design)), 'application/json');
    },
  };
}

/** What the page opens with: an example, so that there is something to hear at the first Start. */
function openingDesign(): Design {
  const result = readDesign(firstDesign);
  if ('faults' in result) throw new Error(`The design that the page opens with is faulty: ${result.faults[0].sentence}`);
  return result.design;
}

/** The text of a design's file, or of the design inside a WAV file. Throws with a sentence where a WAV file holds none. */
async function designIn(file: File): Promise<string> {
  if (!/\.wav$/i.test(file.name)) return file.text();
  try {
    const { design } = readWav(new Uint8Array(await file.arrayBuffer()));
    if (design !== undefined) return design;
  } catch (error) {
    throw new Error(`“${file.name}” cannot be read: ${sentenceOf(error)}.`);
  }
  throw new Error(`“${file.name}” holds sound and no design. Expected a design, or a saved take with one inside.`);
}
