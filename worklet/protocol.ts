/**
 * The whole wire between the page and the processors. Every receiver switches on `type` and ends in `message satisfies never`.
 * Arrays in `report` and `chunk` are transferred to the page and must come back by `return report` and `return chunk`.
 */
import type { ChainNumbers } from '../model/chain/compile.ts';
import type { ResidualPart } from '../model/chain/residual.ts';

export const CELL_PROCESSOR = 'fettle-cell';
export const PASS_PROCESSOR = 'fettle-pass';

/** Length of the ramp that mutes. */
export const MUTE_SEC = 0.03;

/** Places for chains in the processor: four for variants, the last for the setting before the last change. */
export const SLOTS = 5;
export const PREVIOUS_SLOT = 4;

/**
 * What the listener hears: the chain in focus, the setting before the last change, the input as late as the chains, what the cells of the chain in
 * focus add, or the processor's second input (a take being played).
 */
export type Heard = 'cell' | 'previous' | 'bypass' | 'residual' | 'aside';

/** The part of what the cells of the chain in focus add that is computed, null for none, and the gain it is heard with: linear, 0 to 10 000. */
export interface ResidualChoice {
  readonly part: ResidualPart | null;
  readonly gain: number;
}

/** Gains that bring what can be heard to one loudness: one for each slot, and the bypass's. Linear, 0 to 100. */
export interface Match {
  readonly slots: readonly number[];
  readonly bypass: number;
}

/** `processorOptions` of the cell's processor. `gain` and `ceilingPeak` are linear, 0 to 1. */
export interface CellOptions {
  /** By slot; null or absent for an empty one. */
  readonly chains: readonly (ChainNumbers | null)[];
  readonly focus: number;
  readonly channels: number;
  readonly heard: Heard;
  readonly match: Match;
  readonly residual: ResidualChoice;
  readonly gain: number;
  readonly ceilingPeak: number;
  readonly muted: boolean;
}

export type ToCell =
  /** Moves the chain of a slot, or puts one there; the others go on as they are. */
  | { readonly type: 'move'; readonly slot: number; readonly numbers: ChainNumbers }
  /** Empties a slot once it is no longer heard; one that is chosen to be heard is refused. */
  | { readonly type: 'drop'; readonly slot: number }
  /** The slot whose chain «cell» is, and whose readings the reports hold. */
  | { readonly type: 'focus'; readonly slot: number }
  | { readonly type: 'hear'; readonly heard: Heard }
  | { readonly type: 'match'; readonly match: Match }
  | { readonly type: 'residual'; readonly residual: ResidualChoice }
  | { readonly type: 'gain'; readonly gain: number }
  | { readonly type: 'ceiling'; readonly peak: number }
  | { readonly type: 'mute'; readonly on: boolean }
  /** Chunks go to the page, or through `to` straight to whoever keeps them, and come back the same way. */
  | { readonly type: 'record'; readonly on: boolean; readonly to?: MessagePort }
  | {
      readonly type: 'return report';
      readonly slot: number;
      readonly input: Float32Array<ArrayBuffer>;
      readonly output: Float32Array<ArrayBuffer>;
    }
  | { readonly type: 'return chunk'; readonly slot: number; readonly channels: Float32Array<ArrayBuffer>[] }
  | { readonly type: 'dispose' };

export type FromCell =
  | { readonly type: 'ready'; readonly latencySamples: number }
  | Report
  | Chunk
  /** The page did not return chunks in time: so many frames of the take are missing. */
  | { readonly type: 'lost'; readonly frames: number }
  /** A message was refused; the last good values go on sounding. */
  | { readonly type: 'fault'; readonly sentence: string };

export type ToPass = { readonly type: 'dispose' };

/** Levels over the frames since the last report, every sample counted, and those frames themselves (first channel). Output is that of the chain in focus. */
export interface Report {
  readonly type: 'report';
  readonly slot: number;
  /** Context frame of the first sample of `input` and `output`. */
  frame: number;
  input: Float32Array<ArrayBuffer>;
  output: Float32Array<ArrayBuffer>;
  /** Peaks of samples, 1.0 being full scale, over all channels. */
  inputPeak: number;
  outputPeak: number;
  heardPeak: number;
  /** Mean squares of the output and of what left for the loudspeakers, all channels. */
  outputSquare: number;
  heardSquare: number;
  /** Mean square of the residual before its gain, all channels; 0 while there is none. */
  residualSquare: number;
  /** The readings of the chain in focus: the voltages of the last block, the peaks of all. */
  controlV: number;
  gateSourceV: number;
  inputPeakV: number;
  drainPeakV: number;
  feedthroughPeakV: number;
  /** The least and the highest gate-source voltage of the blocks since the last report, V. */
  gateLowV: number;
  gateHighV: number;
  /** Times, since the node was made, that the chain in focus fell back or a sample that is no number was replaced by silence. */
  faults: number;
  /** By slot, 0 where it is empty: output peak since the last report; times that the chain fell back since it was made. */
  readonly slotPeaks: Float64Array;
  readonly slotFaults: Float64Array;
  /** Delay of everything that is heard. */
  latencySamples: number;
  /** Part of the time a block lasts that it took to compute, by a clock of whole milliseconds: only the mean of hundreds of reports is a measurement. */
  loadFraction: number;
  /** Frames that the ceiling turned down. */
  ceilingFrames: number;
  /** How far the audio clock is behind the wall clock, ms, up to a constant: where its least value steps up, there was a gap in the sound. */
  lagMs: number;
}

/** A chunk's arrays on their way back. */
export interface ReturnedChunk {
  readonly type: 'return chunk';
  readonly slot: number;
  readonly channels: Float32Array<ArrayBuffer>[];
}

/** Part of a take: `frames` samples of each channel from context frame `frame` on, without a gap from the chunk before. */
export interface Chunk {
  readonly type: 'chunk';
  readonly slot: number;
  frame: number;
  frames: number;
  channels: Float32Array<ArrayBuffer>[];
  last: boolean;
}
