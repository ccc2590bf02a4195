/** A decaying sine as a point that turns and shrinks: one mode of a tine, a head or a cymbal. */
export interface Mode {
  re: number;
  im: number;
  turnRe: number;
  turnIm: number;
}

/** A mode at rest; decaySec is the time for its size to fall to 1/e. */
export function createMode(hz: number, decaySec: number, rateHz: number): Mode {
  const mode = { re: 0, im: 0, turnRe: Math.cos((2 * Math.PI * hz) / rateHz), turnIm: Math.sin((2 * Math.PI * hz) / rateHz) };
  setDecay(mode, decaySec, rateHz);
  return mode;
}

/** Changes how fast the mode dies, not where it is. */
export function setDecay(mode: Mode, decaySec: number, rateHz: number): void {
  const factor = Math.exp(-1 / (decaySec * rateHz)) / Math.sqrt(mode.turnRe * mode.turnRe + mode.turnIm * mode.turnIm);
  mode.turnRe *= factor;
  mode.turnIm *= factor;
}

/** One sample on, with a push added; returns the sine. */
export function turn(mode: Mode, push = 0): number {
  const re = mode.re * mode.turnRe - mode.im * mode.turnIm + push;
  mode.im = mode.re * mode.turnIm + mode.im * mode.turnRe;
  mode.re = re;
  return mode.im;
}
