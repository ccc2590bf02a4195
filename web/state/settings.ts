/** Settings that are kept between visits: each a signal and the call that sets it, so that a kept value passes the same checks as a typed one. */
import type { ReadonlySignal, Signal } from '@preact/signals';
import { computed } from '@preact/signals';
import { isFields, shown } from './keptDocument.ts';

export interface Setting {
  readonly value: ReadonlySignal<unknown>;
  /** Returns the sentence that refuses it, or null. */
  set(value: unknown): string | null;
}

export type Settings = Readonly<Record<string, Setting>>;

export function numberSetting(name: string, value: ReadonlySignal<number>, set: (value: number) => string | null): Setting {
  return { value, set: (next) => (typeof next === 'number' ? set(next) : `${name} is ${shown(next)}; expected a number.`) };
}

export function choiceSetting<T>(name: string, choices: readonly T[], value: ReadonlySignal<T>, set: (value: T) => void): Setting {
  return {
    value,
    set(next) {
      const chosen = choices.find((each) => each === next);
      if (chosen === undefined) return `${name} is ${shown(next)}; expected ${choices.map(shown).join(' or ')}.`;
      set(chosen);
      return null;
    },
  };
}

/** A text that may be missing; null where nothing was chosen. */
export function textSetting(name: string, value: Signal<string | null>): Setting {
  return {
    value,
    set(next) {
      if (next !== null && typeof next !== 'string') return `${name} is ${shown(next)}; expected a name.`;
      value.value = next;
      return null;
    },
  };
}

export function settingsRecord(settings: Settings): ReadonlySignal<Readonly<Record<string, unknown>>> {
  return computed(() => Object.fromEntries(Object.entries(settings).map(([name, { value }]) => [name, value.value])));
}

/** Sets what is kept; what is missing stays as it is. Returns the sentences of what was refused. */
export function restoreSettings(settings: Settings, record: unknown): string[] {
  if (!isFields(record)) return [`They are ${shown(record)}; expected names with values.`];
  const refused = Object.entries(settings).map(([name, { set }]) => (Object.hasOwn(record, name) ? set(record[name]) : null));
  return refused.filter((sentence) => sentence !== null);
}
