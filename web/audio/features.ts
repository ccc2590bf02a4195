/** What Fettle needs of the browser, found out by looking for it. */

type Scope = typeof globalThis;

/** In words; without one of them the page cannot be shown. */
const FOR_THE_PAGE: readonly (readonly [words: string, there: (scope: Scope) => boolean])[] = [
  ['workers, in which the circuit is computed', ({ Worker }) => typeof Worker === 'function'],
  ['the dialog element', ({ HTMLDialogElement }) => typeof HTMLDialogElement === 'function'],
  ['a watch on the size of elements (ResizeObserver)', ({ ResizeObserver }) => typeof ResizeObserver === 'function'],
  ['pointer events', ({ PointerEvent }) => typeof PointerEvent === 'function'],
];

export function missingForPage(scope: Scope = globalThis): string[] {
  return FOR_THE_PAGE.filter(([, there]) => !there(scope)).map(([words]) => words);
}

/** What sound needs beside that: a sentence for the first thing that is missing, or null. */
export function missingFeature(scope: Scope = globalThis): string | null {
  if (scope.isSecureContext === false) {
    return 'Sound needs a page served over https or from this machine; this address is neither.';
  }
  if (typeof scope.AudioContext !== 'function') return 'This browser has no Web Audio, so Fettle cannot play here.';
  if (typeof scope.AudioWorkletNode !== 'function') return 'This browser has no audio worklet, so Fettle cannot play here.';
  return null;
}
