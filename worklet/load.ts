/**
 * How much of its time the processor needs. A worklet's only clock counts whole milliseconds; a block that takes a part of one crosses a tick that
 * often, so the mean is right where single readings are not. One block in 13 is timed: reading the clock makes an object.
 *
 * Error    over T s of a load of p about √(p·13/(375·T)) at 48 kHz: 4 % of the time after 10 s at a half
 */
const EVERY = 13;

export interface Load {
  blocks: number;
  startMs: number;
  busyMs: number;
  timedSec: number;
  /** What it last was, given again while no block has been timed since. */
  last: number;
}

export function createLoad(): Load {
  return { blocks: 0, startMs: 0, busyMs: 0, timedSec: 0, last: 0 };
}

export function beginBlock(load: Load): void {
  if (load.blocks % EVERY === 0) load.startMs = Date.now();
}

export function endBlock(load: Load, blockSec: number): void {
  if (load.blocks % EVERY === 0) {
    load.busyMs += Date.now() - load.startMs;
    load.timedSec += blockSec;
  }
  load.blocks = (load.blocks + 1) % EVERY;
}

/** Fraction of the time since the last call, and forgets it. */
export function takeLoad(load: Load): number {
  if (load.timedSec > 0) load.last = load.busyMs / (1000 * load.timedSec);
  load.busyMs = 0;
  load.timedSec = 0;
  return load.last;
}
