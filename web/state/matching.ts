/**
 * Everything that can be heard at the loudness of the source: each is rendered whole in a worker and measured by BS.1770, and gets the gain that
 * is missing. Of a source longer than a minute, its first minute.
 */
import type { ReadonlySignal } from '@preact/signals';
import { computed, signal } from '@preact/signals';
import { matchingGainDb } from '../../model/measure/loudness.ts';
import type { Match, ToCell } from '../../worklet/protocol.ts';
import { PREVIOUS_SLOT, SLOTS } from '../../worklet/protocol.ts';
import type { Clip } from '../audio/clip.ts';
import type { Bench, MatchDb } from './bench.ts';
import type { DocumentState } from './document.ts';
import type { Notes } from './notes.ts';
import type { Before } from './previous.ts';
import { soundingText } from './sounding.ts';
import type { FromLoudness, ToLoudness, WorkerPort } from './workers.ts';

const LONGEST_SEC = 60;
/** Values that are being dragged are not measured before they rest. */
const REST_MS = 250;
/** A gain of more than this would raise what is hardly there, or hide what is far too loud. */
const MOST_DB = 40;
const SOURCE = 'source';
/** Measurements that are kept, so that undo and another variant find theirs. */
const MOST_KNOWN = 100;

export interface Matching extends Pick<Bench, 'matched' | 'setMatched' | 'matchDb'> {
  match(): Match;
  /** Tells the processor the gains where they have changed: slots may stand for other variants than before. */
  update(): void;
  /** The source is another one. */
  noteSource(): void;
}

export interface MatchingNeeds {
  readonly document: Pick<DocumentState, 'design' | 'heardVariant'>;
  readonly previous: ReadonlySignal<Before | null>;
  readonly notes: Notes;
  clip(): Clip | null;
  slots(): readonly number[];
  send(message: ToCell): void;
  openWorker(): WorkerPort<ToLoudness, FromLoudness>;
}

interface Job {
  readonly key: string;
  readonly about: Before | null;
}

export function createMatching({ document, previous, notes, clip, slots, send, openWorker }: MatchingNeeds): Matching {
  const matched = signal(false);
  /** LUFS by what it was measured of: the source, or what decides how a variant sounds. */
  const known = signal<ReadonlyMap<string, number>>(new Map());
  /** The last gain of each variant, in force until the new one is known. */
  let kept: readonly number[] = [];
  let running: { readonly key: string; readonly worker: WorkerPort<ToLoudness, FromLoudness> } | null = null;
  let timer: ReturnType<typeof setTimeout> | undefined;
  let told = '';

  const keyOf = (about: Before) => soundingText(about.design, about.index);
  const gainFor = (about: Before): number | null => {
    const [source, own] = [known.value.get(SOURCE), known.value.get(keyOf(about))];
    return source === undefined || own === undefined ? null : matchingGainDb(source, own);
  };

  const matchDb = computed((): MatchDb => {
    const design = document.design.value;
    return {
      variants: design.variants.map((_, index) => gainFor({ design, index })),
      previous: previous.value === null ? null : gainFor(previous.value),
    };
  });

  const match = (): Match => {
    const gains = Array.from({ length: SLOTS }, () => 1);
    if (!matched.peek()) return { slots: gains, bypass: 1 };
    const { variants, previous: before } = matchDb.peek();
    kept = variants.map((db, index) => within(db) ?? kept[index] ?? 0);
    for (const [index, slot] of slots().entries()) gains[slot] = toRatio(kept[index]);
    gains[PREVIOUS_SLOT] = toRatio(within(before) ?? kept[document.heardVariant.peek()] ?? 0);
    return { slots: gains, bypass: 1 };
  };

  const update = () => {
    const next = match();
    const text = JSON.stringify(next);
    if (text === told) return;
    told = text;
    send({ type: 'match', match: next });
  };

  /** What is not known yet: the source, the heard one, then the rest. */
  const wanted = (): Job[] => {
    const design = document.design.peek();
    const heard = document.heardVariant.peek();
    const order = [heard, ...design.variants.keys()];
    const abouts: Before[] = order.map((index) => ({ design, index }));
    const before = previous.peek();
    if (before !== null) abouts.push(before);
    const jobs = [{ key: SOURCE, about: null }, ...abouts.map((about) => ({ key: keyOf(about), about }))];
    return jobs.filter(({ key }) => !known.peek().has(key));
  };

  const end = () => {
    running?.worker.end();
    running = null;
  };

  const next = () => {
    const source = clip();
    const jobs = matched.peek() && source !== null ? wanted() : [];
    if (running !== null && jobs.some(({ key }) => key === running?.key)) return;
    end();
    if (jobs.length > 0 && source !== null) begin(jobs[0], source);
  };

  const begin = ({ key, about }: Job, { channels, sampleRateHz }: Clip) => {
    const worker = openWorker();
    running = { key, worker };
    const done = (lufs: number) => {
      end();
      const others = [...known.peek()].filter(([each]) => each !== SOURCE).slice(1 - MOST_KNOWN);
      const source = known.peek().get(SOURCE);
      known.value = new Map([...(source === undefined ? [] : [[SOURCE, source] as const]), ...others, [key, lufs]]);
      say(about);
      update();
      next();
    };
    worker.receive(
      (message) => {
        if (message.type === 'loudness') return done(message.lufs);
        notes.fault(`The loudness cannot be measured: ${message.sentence}.`);
        done(Number.NEGATIVE_INFINITY);
      },
      (sentence) => {
        end();
        notes.fault(sentence);
      },
    );
    const longest = Math.round(LONGEST_SEC * sampleRateHz);
    worker.post({ type: 'loudness', about, channels: channels.map((line) => line.slice(0, longest)), sampleRateHz });
  };

  const say = (about: Before | null) => {
    const db = about === null ? null : gainFor(about);
    if (about === null || db === null || within(db) !== null) return;
    const { name } = about.design.variants[about.index];
    const size = `${Math.abs(db).toFixed(0)} LU ${db > 0 ? 'quieter' : 'louder'} than the source`;
    notes.add('note', `Variant ${name} is ${size}; its loudness is matched up to ${MOST_DB} dB only, so it is left as it was.`);
  };

  const later = () => {
    clearTimeout(timer);
    if (matched.peek()) timer = setTimeout(next, REST_MS);
  };
  document.design.subscribe(later);
  previous.subscribe(later);

  return {
    matched,
    matchDb,
    update,
    match() {
      const now = match();
      told = JSON.stringify(now);
      return now;
    },
    setMatched(on) {
      matched.value = on;
      update();
      next();
    },
    noteSource() {
      end();
      kept = [];
      known.value = new Map();
      update();
      later();
    },
  };
}

function within(db: number | null): number | null {
  return db !== null && Math.abs(db) <= MOST_DB ? db : null;
}

function toRatio(db: number): number {
  return 10 ** (db / 20);
}
