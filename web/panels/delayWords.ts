/** How late live input is heard: each part in ms, as far as it is known; each null where the browser does not state it. */
export function delayWords(inputSec: number | null, chainSec: number | null, outputSec: number | null): string {
  if (chainSec === null) return 'its delay known once it plays';
  const parts = [
    ['input', inputSec],
    ['cell', chainSec],
    ['output', outputSec],
  ] as const;
  const known = parts.reduce((sum, [, sec]) => sum + (sec ?? 0), 0);
  const whole = parts.every(([, sec]) => sec !== null);
  const list = parts.map(([name, sec]) => (sec === null ? `${name} not stated` : `${name} ${milliseconds(sec)}`));
  return `late by ${whole ? '' : 'at least '}${milliseconds(known)}\u2009ms (${list.join(', ')})`;
}

function milliseconds(sec: number): string {
  return (1000 * sec).toFixed(sec < 0.00995 ? 1 : 0);
}
