/**
 * Brings back what the last visit left, and keeps what this one changes. What cannot be read is said, stays where it is and is offered as a file; the
 * rest goes on without it.
 */
import type { ReadonlySignal } from '@preact/signals';
import type { KeptRecord, Store } from '../store/store.ts';
import type { DocumentState } from './document.ts';
import { fileName } from './fileName.ts';
import { isFields, readDocument } from './keptDocument.ts';
import type { Note } from './bench.ts';
import type { Notes } from './notes.ts';
import { sentenceOf } from './notes.ts';
import type { Settings } from './settings.ts';
import { restoreSettings, settingsRecord } from './settings.ts';
import type { Shelf } from './shelf.ts';

const DOCUMENT = 'document';
const SETTINGS = 'settings';
const ASIDE = 'aside ';
/** A killed tab loses no more than the changes of this time. */
const WRITE_EVERY_MS = 300;

export interface KeepingNeeds {
  readonly store: Store;
  readonly shelf: Shelf;
  readonly document: Pick<DocumentState, 'record' | 'restore'>;
  readonly settings: Settings;
  readonly notes: Notes;
  download(name: string, bytes: Uint8Array<ArrayBuffer>, mediaType: string): void;
  /** This tab is now the one that keeps; `records` are those that were found. */
  hold(records: readonly KeptRecord[]): Promise<void>;
}

export interface Keeping {
  /** Resolves when design and settings of the last visit are in place, or it is known that there are none. */
  readonly restored: Promise<void>;
  /** The browser has removed all that was kept: puts there again what is here. */
  keepAnew(): void;
}

/** Something that was found and could not be used, as it was found. */
interface Aside {
  readonly kind: Note['kind'];
  readonly sentence: string;
  readonly title: string;
  readonly value: unknown;
}

export function createKeeping({ store, shelf, document, settings, notes, download, hold }: KeepingNeeds): Keeping {
  const settingsNow = settingsRecord(settings);
  let asides = 0;

  const setAside = (aside: Aside) => {
    const key = `${ASIDE}${Date.now()} ${asides++}`;
    shelf.put(key, aside);
    offer(key, aside);
  };

  const offer = (key: string, { kind, sentence, title, value }: Aside) => {
    const run = () => {
      download(`${fileName(title)}.json`, new TextEncoder().encode(`${JSON.stringify(value, null, 2)}\n`), 'application/json');
      shelf.remove(key);
    };
    notes.add(kind, sentence, 'It stays until it is saved.', undefined, { words: 'Save it as a file', run });
  };

  const restoreDocument = (record: KeptRecord): Aside | null => {
    if ('fault' in record) {
      notes.fault(`The design of the last visit cannot be read: ${record.fault}. The page opens with an example.`);
      return null;
    }
    const result = readDocument(record.value);
    const refused = 'faults' in result ? result.faults : [document.restore(result.record)].filter((each) => each !== null);
    if ('note' in result && result.note !== null) notes.add('note', result.note);
    if (refused.length === 0) return null;
    const more = refused.length > 1 ? ` (and ${refused.length - 1} more)` : '';
    return {
      kind: 'fault',
      sentence: `The design of the last visit cannot be used: ${refused[0].replace(/\.$/, '')}${more}. The page opens with an example.`,
      title: 'design of the last visit',
      value: record.value,
    };
  };

  const restore = (records: readonly KeptRecord[]): Aside | null => {
    const kept = (key: string) => records.find((record) => record.key === key);
    const [design, rest] = [kept(DOCUMENT), kept(SETTINGS)];
    const aside = design === undefined ? null : restoreDocument(design);
    if (rest === undefined) return aside;
    const refused = 'fault' in rest ? [rest.fault] : restoreSettings(settings, rest.value);
    if (refused.length > 0) notes.add('note', 'Some settings of the last visit could not be taken:', undefined, refused);
    return aside;
  };

  const keepAnew = () => {
    shelf.put(DOCUMENT, document.record.peek());
    shelf.put(SETTINGS, settingsNow.peek());
  };

  /** Another tab kept until now. Its design is not this tab's, and must not be lost to it. */
  const yieldedBy = (records: readonly KeptRecord[]): Aside | null => {
    const record = records.find(({ key }) => key === DOCUMENT);
    if (record === undefined || 'fault' in record) return null;
    const result = readDocument(record.value);
    const known = JSON.stringify(document.record.peek().design);
    if ('record' in result && JSON.stringify(result.record.design) === known) return null;
    const title = 'record' in result ? result.record.design.title : 'design of the other tab';
    const sentence = `The other tab is closed; this one keeps from now on, and the design that the other one ended with, “${title}”, stands aside.`;
    return { kind: 'note', sentence, title, value: 'record' in result ? result.record.design : record.value };
  };

  const begin = async (records: readonly KeptRecord[], aside: Aside | null) => {
    shelf.open();
    for (const record of records) {
      if (record.key.startsWith(ASIDE) && 'value' in record) offer(record.key, asideIn(record.value));
    }
    if (aside !== null) setAside(aside);
    keepAnew();
    writeOnChange(document.record, () => shelf.put(DOCUMENT, document.record.peek()), store);
    writeOnChange(settingsNow, () => shelf.put(SETTINGS, settingsNow.peek()), store);
    await hold(records);
  };

  const open = async () => {
    const holds = await store.holds;
    const records = await store.readRecords();
    const aside = restore(records);
    if (holds) return { keep: () => begin(records, aside) };
    if (aside !== null) setAside(aside);
    notes.add(
      'note',
      'Another tab has Fettle open and keeps design and takes; what you do here lasts until this tab is closed.',
      'When the other one is closed first, this one keeps from then on.',
    );
    const takeOver = async () => {
      await store.held;
      const later = await store.readRecords();
      await begin(later, yieldedBy(later));
    };
    return { keep: takeOver };
  };

  const failed = (error: unknown) =>
    notes.add('note', `This browser keeps nothing here: ${sentenceOf(error)}. Design and takes last until the page is closed.`);

  const opened = open();
  opened.then(({ keep }) => keep()).catch(failed);
  return {
    restored: opened.then(
      () => undefined,
      () => undefined,
    ),
    keepAnew,
  };
}

/** A value that goes on changing is written every so often; the last one when the page goes. */
function writeOnChange(value: ReadonlySignal<unknown>, write: () => void, store: Pick<Store, 'beforeLeaving'>): void {
  let timer: ReturnType<typeof setTimeout> | undefined;
  const writeNow = () => {
    if (timer === undefined) return;
    clearTimeout(timer);
    timer = undefined;
    write();
  };
  let first = true;
  value.subscribe(() => {
    if (!first) timer ??= setTimeout(writeNow, WRITE_EVERY_MS);
    first = false;
  });
  store.beforeLeaving(writeNow);
}

function asideIn(value: unknown): Aside {
  const fields = isFields(value) ? value : {};
  const { kind, sentence, title } = fields;
  return {
    kind: kind === 'note' ? 'note' : 'fault',
    sentence: typeof sentence === 'string' ? sentence : 'Something of an earlier visit stands aside.',
    title: typeof title === 'string' ? title : 'kept',
    value: 'value' in fields ? fields.value : value,
  };
}
