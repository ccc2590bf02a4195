/** The wire between the page and its two workers. Each union goes one way; receivers end in `message satisfies never`. */
import type { Design } from '../../model/design/types.ts';
import type { ToneReading } from '../../model/study/tone.ts';
import type { FeedbackPoint, GatePeriod, WorstReading } from './bench.ts';

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
}

/** `id` counts up with each question; an answer carries the id of the question that it belongs to. */
export type ToReading =
  /** Asks for the control's period, the worst over the swing and the curve against k; drops what was being computed. */
  | { readonly type: 'question'; readonly id: number; readonly question: ToneQuestion }
  /** Asks for the reading at a gate voltage; null is the gate with the control at rest. */
  | { readonly type: 'moment'; readonly id: number; readonly gateV: number | null };

export type FromReading =
  | { readonly type: 'reading'; readonly id: number; readonly reading: ToneReading | { readonly fault: string } }
  | { readonly type: 'period'; readonly id: number; readonly period: GatePeriod | { readonly fault: string } }
  | { readonly type: 'worst'; readonly id: number; readonly worst: WorstReading | null }
  | { readonly type: 'curve'; readonly id: number; readonly points: readonly FeedbackPoint[] | null };

export type ToRender = {
  readonly type: 'render';
  readonly design: Design;
  readonly variantIndex: number;
  readonly channels: readonly Float32Array<ArrayBuffer>[];
  readonly sampleRateHz: number;
};

export type FromRender =
  | { readonly type: 'progress'; readonly fraction: number }
  | { readonly type: 'done'; readonly channels: readonly Float32Array<ArrayBuffer>[] }
  | { readonly type: 'fault'; readonly sentence: string };
