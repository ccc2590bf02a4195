/** The wire between the page and its two workers. Each union goes one way; receivers end in `message satisfies never`. */
import type { Moves } from '../../model/design/feedback.ts';
import type { Design } from '../../model/design/types.ts';
import type {
  ControlPicture,
  FeedbackCurve,
  Moment,
  NoisePoint,
  SwingPoint,
  TransferPlane,
  VariantSummary,
  WorstReading,
} from './bench.ts';

/** A worker as the state sees it, so that a test can stand something else in its place. */
export interface WorkerPort<Out, In> {
  post(message: Out, transfer?: Transferable[]): void;
  /** `failed` is told in a sentence when the worker could not be loaded or threw; it may answer no more. */
  receive(handler: (message: In) => void, failed: (sentence: string) => void): void;
  end(): void;
}

export interface ToneQuestion {
  readonly design: Design;
  readonly variantIndex: number;
  readonly toneHz: number;
  readonly toneV: number;
  /** Which resistors make another k. */
  readonly moves: Moves;
}

/** `id` counts up with each question; what is asked for, and its answer, carry the id of the question that they are about. */
export type ToReading =
  /** What everything after it is about. */
  | { readonly type: 'question'; readonly id: number; readonly question: ToneQuestion }
  /** Asks for the reading at a gate voltage; null is the gate with the control at rest. Comes before all other work. */
  | { readonly type: 'moment'; readonly id: number; readonly gateV: number | null }
  /** Asks for the curve against k; replaces one that is being computed. */
  | { readonly type: 'curve'; readonly id: number; readonly gateV: number | null }
  /** Asks for the period, the plane, the worst over the swing, what lies beyond it, then the noise over it, in this order; replaces one that is being computed. */
  | { readonly type: 'swing'; readonly id: number }
  /** Asks for the summary of one variant. */
  | { readonly type: 'variant'; readonly id: number; readonly index: number };

export type FromReading =
  | ({ readonly type: 'reading'; readonly id: number } & Omit<Moment, 'levels'>)
  | { readonly type: 'curve'; readonly id: number; readonly curve: FeedbackCurve | null }
  | { readonly type: 'period'; readonly id: number; readonly period: ControlPicture | { readonly fault: string } }
  | {
      readonly type: 'worst';
      readonly id: number;
      readonly swing: { readonly worst: WorstReading; readonly points: readonly SwingPoint[] } | null;
    }
  | { readonly type: 'beyond'; readonly id: number; readonly points: readonly SwingPoint[] | null }
  | { readonly type: 'plane'; readonly id: number; readonly plane: TransferPlane | null }
  | { readonly type: 'variant'; readonly id: number; readonly index: number; readonly summary: VariantSummary | null }
  | { readonly type: 'noise'; readonly id: number; readonly points: readonly NoisePoint[] | null };

export type ToRender = {
  readonly type: 'render';
  readonly design: Design;
  readonly variantIndex: number;
  readonly channels: readonly Float32Array<ArrayBuffer>[];
  readonly sampleRateHz: number;
};

/** Asks for the loudness of the source, or of what a variant makes of it. */
export type ToLoudness = {
  readonly type: 'loudness';
  readonly about: { readonly design: Design; readonly index: number } | null;
  readonly channels: readonly Float32Array<ArrayBuffer>[];
  readonly sampleRateHz: number;
};

export type FromLoudness =
  /** −Infinity where all is silent. */
  { readonly type: 'loudness'; readonly lufs: number } | { readonly type: 'fault'; readonly sentence: string };

export type FromRender =
  | { readonly type: 'progress'; readonly fraction: number }
  | { readonly type: 'done'; readonly channels: readonly Float32Array<ArrayBuffer>[] }
  | { readonly type: 'fault'; readonly sentence: string };
