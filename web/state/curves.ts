/** Curves against k that have been measured at gate voltages as they are printed, so that a gate that comes by again finds its own at once. */
import type { FeedbackCurve } from './bench.ts';

/** Gate voltages are printed to this, V. */
const STEP_V = 0.01;
/** Twice the swing of 10 V; more is not kept. */
const MOST = 2000;

export function createCurves() {
  const kept = new Map<number, FeedbackCurve>();
  const keyOf = (gateV: number) => Math.round(gateV / STEP_V);
  return {
    /** The gate voltage to measure at for one near it. */
    nearV: (gateV: number) => Number((keyOf(gateV) * STEP_V).toFixed(2)),
    at: (gateV: number): FeedbackCurve | null => kept.get(keyOf(gateV)) ?? null,
    keep(curve: FeedbackCurve) {
      if (kept.size >= MOST) kept.clear();
      kept.set(keyOf(curve.gateV), curve);
    },
    /** Another design, or another tone. */
    clear: () => kept.clear(),
  };
}
