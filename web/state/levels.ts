/** What the processor reports, as signals and as the latest window of samples. */
import type { ReadonlySignal } from '@preact/signals';
import { signal } from '@preact/signals';
import type { Report } from '../../worklet/protocol.ts';
import type { LiveLevels } from './bench.ts';

export const MOST_SAMPLES = 32768;
const RECENT_MS = 1500;
/** Reports that the load is averaged over: 4 s. */
const LOAD_REPORTS = 120;
/** Reports that the residual's level is taken over: 1 s. */
const RESIDUAL_REPORTS = 30;

export interface Levels {
  readonly live: ReadonlySignal<LiveLevels | null>;
  /** Takes a report in; its arrays are copied, so they may go back at once. `slots` are the variants' places in it. */
  note(report: Report, underruns: number, slots: readonly number[]): void;
  outputSamples(into: Float32Array): void;
  inputSamples(into: Float32Array): void;
  /** Forgets the samples: silence or another rate lies between. */
  clear(): void;
}

export function createLevels(now: () => number = () => performance.now()): Levels {
  const live = signal<LiveLevels | null>(null);
  const input = createRing();
  const output = createRing();
  let nextFrame = 0;
  let load = 0;
  let loads = 0;
  let squares: { readonly output: number; readonly residual: number }[] = [];
  let recent: { atMs: number; peak: number }[] = [];
  return {
    live,
    note(report, underruns, slots) {
      if (report.frame !== nextFrame) {
        input.clear();
        output.clear();
      }
      nextFrame = report.frame + report.output.length;
      input.write(report.input);
      output.write(report.output);
      const atMs = now();
      loads = Math.min(loads + 1, LOAD_REPORTS);
      load += (report.loadFraction - load) / loads;
      recent = [...recent.filter((each) => atMs - each.atMs < RECENT_MS), { atMs, peak: report.outputPeak }];
      squares = [...squares.slice(1 - RESIDUAL_REPORTS), { output: report.outputSquare, residual: report.residualSquare }];
      live.value = {
        controlV: report.controlV,
        gateSourceV: report.gateSourceV,
        gateLowV: report.gateLowV,
        gateHighV: report.gateHighV,
        feedthroughPeakV: report.feedthroughPeakV,
        inputPeakV: report.inputPeakV,
        drainPeakV: report.drainPeakV,
        outputPeakDbfs: toDb(report.outputPeak),
        outputRmsDbfs: toDb(Math.sqrt(report.outputSquare)),
        recentPeakDbfs: toDb(Math.max(...recent.map((each) => each.peak))),
        heardPeakDbfs: toDb(report.heardPeak),
        heardRmsDbfs: toDb(Math.sqrt(report.heardSquare)),
        variants: slots.map((slot) => ({ peakDbfs: toDb(report.slotPeaks[slot]), faults: report.slotFaults[slot] })),
        loadFraction: load,
        residualDb: levelUnder(squares),
        atCeiling: report.ceilingFrames > 0,
        faults: report.faults,
        underruns,
      };
    },
    outputSamples: output.read,
    inputSamples: input.read,
    clear() {
      input.clear();
      output.clear();
      load = 0;
      loads = 0;
    },
  };
}

/** Of the time in which there was a residual. */
function levelUnder(squares: readonly { readonly output: number; readonly residual: number }[]): number | null {
  const both = squares.filter(({ residual }) => residual > 0);
  const output = both.reduce((sum, each) => sum + each.output, 0);
  const residual = both.reduce((sum, each) => sum + each.residual, 0);
  return output > 0 ? toDb(Math.sqrt(residual / output)) : null;
}

export function toDb(ratio: number): number {
  return 20 * Math.log10(ratio);
}

function createRing() {
  const ring = new Float32Array(MOST_SAMPLES);
  let at = 0;
  return {
    write(samples: Float32Array) {
      const head = samples.subarray(0, ring.length - at);
      ring.set(head, at);
      ring.set(samples.subarray(head.length), 0);
      at = (at + samples.length) % ring.length;
    },
    read(into: Float32Array) {
      if (into.length > ring.length)
        throw new RangeError(`A window of ${into.length} samples was asked for; expected at most ${ring.length}`);
      const from = (at - into.length + ring.length) % ring.length;
      const head = ring.subarray(from, Math.min(ring.length, from + into.length));
      into.set(head, 0);
      into.set(ring.subarray(0, into.length - head.length), head.length);
    },
    clear() {
      ring.fill(0);
    },
  };
}
