/** Cell A solved apart from the model: Kirchhoff's law at the drain with the square law of facts.md section 1, no capacitors, by bisected Newton. */
const SERIES_OHM = 10000;
const OFF_V = -1.5;
const BETA = 0.003 / (OFF_V * OFF_V);
const PERIOD = 65536;

/** The drain's voltage for `inputV`, the gate at `gateV` + k times the drain. */
export function drainV(inputV: number, gateV: number, k: number): number {
  let low = Math.min(0, inputV);
  let high = Math.max(0, inputV);
  let v = inputV / 2;
  for (let step = 0; step < 100; step++) {
    const source = Math.max(0, gateV + k * v - OFF_V);
    const drain = Math.max(0, gateV + (k - 1) * v - OFF_V);
    const miss = (v - inputV) / SERIES_OHM + BETA * (source * source - drain * drain);
    if (miss > 0) high = v;
    else low = v;
    const slope = 1 / SERIES_OHM + 2 * BETA * (k * source + (1 - k) * drain);
    const newton = v - miss / slope;
    const next = newton > low && newton < high ? newton : (low + high) / 2;
    if (Math.abs(next - v) < 1e-17) break;
    v = next;
  }
  return v;
}

/** One period of the drain under toneV·cos, from the crest. */
export function drainPeriod(toneV: number, gateV: number, k: number): Float64Array {
  return Float64Array.from({ length: PERIOD }, (_, i) => drainV(toneV * Math.cos((2 * Math.PI * i) / PERIOD), gateV, k));
}
