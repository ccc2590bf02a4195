/** What sound needs of the browser: a sentence for the first thing that is missing, or null. */
export function missingFeature(scope: typeof globalThis = globalThis): string | null {
  if (scope.isSecureContext === false) {
    return 'Sound needs a page served over https or from this machine; this address is neither.';
  }
  if (typeof scope.AudioContext !== 'function') return 'This browser has no Web Audio, so Fettle cannot play here.';
  if (typeof scope.AudioWorkletNode !== 'function') return 'This browser has no audio worklet, so Fettle cannot play here.';
  if (typeof scope.Worker !== 'function') return 'This browser has no workers, so Fettle cannot measure here.';
  return null;
}
