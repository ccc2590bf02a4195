/**
 * A kernel written by hand for one cell: the shunt with a blocking capacitor, square law, no λ, no clamp, constant capacitances. It knows which of
 * the coefficients are zero and calls nothing general; the bench holds the kernels for any circuit against it.
 */
import * as L from '../../model/cell/kernels/layout.ts';
import { expAt } from '../../model/device/math.ts';

const N = 3;
const ROW = L.rowLayout(N);
const PAST = L.memoryLayout(N);
const ALL = L.coefficientLayout(N);
const SLOTS = L.slotStart(1, 2);

export function shuntByHand(
  c: Float64Array,
  s: Float64Array,
  audio: Float64Array,
  control: Float64Array,
  output: Float64Array,
  to: number,
): void {
  const [a0, a1, a2, au, av, ak, aI] = c.subarray(0, ROW.width);
  const [b0, b1, b2, bu, bv, bk, bI] = c.subarray(ROW.width, 2 * ROW.width);
  const [n0, n1, n2, nu, nv, nk, nI] = c.subarray(2 * ROW.width, 3 * ROW.width);
  const [m00, m01, m02] = c.subarray(ALL.memory, ALL.memory + N);
  const [, m11, m12] = c.subarray(ALL.memory + PAST.width, ALL.memory + PAST.width + N);
  const [, m21, m22] = c.subarray(ALL.memory + 2 * PAST.width, ALL.memory + 2 * PAST.width + N);
  const on = c[ALL.device + L.ON_V];
  const off = c[ALL.device + L.GATE_OFF_V];
  const scale = c[ALL.device + L.SCALE];
  const fall = c[ALL.device + L.FALL];
  const rise = c[ALL.device + L.RISE];
  const [nS, nD] = [c[ALL.junction + 2 * L.JUNCTION_WIDTH], c[ALL.junction + 2 * L.JUNCTION_WIDTH + 1]];
  let [x0, x1, x2, e1, e2, f1, f2, g1, g2] = s;
  let vs = s[SLOTS + L.OVERDRIVE_S];
  let vd = s[SLOTS + L.OVERDRIVE_D];
  for (let i = 0; i < to; i++) {
    const u = audio[i];
    const v = control[i];
    const p1 = 3.5 * x1 - 2.25 * e1 + (5 / 6) * f1 - 0.125 * g1;
    const p2 = 3.5 * x2 - 2.25 * e2 + (5 / 6) * f2 - 0.125 * g2;
    const r0 = m00 * x0 + m01 * x1 + m02 * x2;
    const r1 = m11 * p1 + m12 * p2;
    const r2 = m21 * p1 + m22 * p2;
    const a = a0 * r0 + a1 * r1 + (a2 * r2 + (au * u + (av * v + ak)));
    const b = b0 * r0 + b1 * r1 + (b2 * r2 + (bu * u + (bv * v + bk)));
    let I = 0;
    let S = 0;
    let D = 0;
    if (a > 0 || b > 0) {
      const p = fall * a + rise * b;
      const g = fall * b + rise * a;
      I = (2 * scale * (a - b) * (a + b)) / (1 + p + Math.sqrt(1 + 2 * p + g * g));
      if (!(a + aI * I >= 0 && b + bI * I >= 0)) {
        if (a > b) I = (2 * scale * a * a) / (1 + fall * a + Math.sqrt(1 + 2 * fall * a));
        else I = (-2 * scale * b * b) / (1 + rise * b + Math.sqrt(1 + 2 * rise * b));
      }
    }
    const freeS = a + aI * I;
    const freeD = b + bI * I;
    if (freeS > on || freeD > on) {
      conductByHand(c, s, a, b, freeS, freeD);
      I = s[SLOTS + L.CHANNEL_A];
      S = s[SLOTS + L.JUNCTION_S];
      D = s[SLOTS + L.JUNCTION_D];
      vs = s[SLOTS + L.OVERDRIVE_S];
      vd = s[SLOTS + L.OVERDRIVE_D];
    } else {
      vs = freeS;
      vd = freeD;
    }
    s[SLOTS + L.OVERDRIVE_S] = vs;
    s[SLOTS + L.OVERDRIVE_D] = vd;
    g1 = f1;
    f1 = e1;
    e1 = x1;
    g2 = f2;
    f2 = e2;
    e2 = x2;
    x0 = n0 * r0 + n1 * r1 + (n2 * r2 + (nu * u + (nv * v + nk))) + nI * I + (nS * S + nD * D);
    x1 = vs - vd;
    x2 = vs + off;
    output[i] = x1;
  }
  s.set([x0, x1, x2, e1, e2, f1, f2, g1, g2]);
}

function conductByHand(c: Float64Array, s: Float64Array, a: number, b: number, freeS: number, freeD: number): void {
  const rate = c[ALL.device + L.INVERSE_NVT];
  const off = c[ALL.device + L.GATE_OFF_V];
  const reverseA = c[ALL.device + L.REVERSE_A];
  const on = c[ALL.device + L.ON_V];
  const scale = c[ALL.device + L.SCALE];
  const aI = c[ROW.current];
  const bI = c[ROW.width + ROW.current];
  const aS = c[ALL.junction];
  const aD = c[ALL.junction + 1];
  const bS = c[ALL.junction + 2];
  const bD = c[ALL.junction + 3];
  const knee = on + 20 / rate;
  const enough = 0.1 * c[ALL.device + L.ENOUGH_V] + 1e-15 * (Math.abs(a) + Math.abs(b));
  let vs = Math.min(freeS, s[SLOTS + L.OVERDRIVE_S] > on ? s[SLOTS + L.OVERDRIVE_S] : knee);
  let vd = Math.min(freeD, s[SLOTS + L.OVERDRIVE_D] > on ? s[SLOTS + L.OVERDRIVE_D] : knee);
  for (let step = 0; step < 40; step++) {
    const ps = Math.max(vs, 0);
    const pd = Math.max(vd, 0);
    s[SLOTS + L.PORT_S] = (vs + off) * rate;
    s[SLOTS + L.PORT_D] = (vd + off) * rate;
    if (vs > on) expAt(s, SLOTS + L.PORT_S);
    if (vd > on) expAt(s, SLOTS + L.PORT_D);
    const S = vs > on ? reverseA * s[SLOTS + L.PORT_S] : 0;
    const D = vd > on ? reverseA * s[SLOTS + L.PORT_D] : 0;
    const channel = scale * (ps - pd) * (ps + pd);
    const rs = vs - a - aI * channel - aS * S - aD * D;
    const rd = vd - b - bI * channel - bS * S - bD * D;
    const ss = 1 - 2 * scale * ps * aI - aS * S * rate;
    const sd = 2 * scale * pd * aI - aD * D * rate;
    const ds = -2 * scale * ps * bI - bS * S * rate;
    const dd = 1 + 2 * scale * pd * bI - bD * D * rate;
    const determinant = ss * dd - sd * ds;
    const stepS = (sd * rd - dd * rs) / determinant;
    const stepD = (ds * rs - ss * rd) / determinant;
    vs += stepS * rate > 2 ? (2 + (stepS * rate) / (1 + 0.1 * stepS * rate)) / rate : stepS;
    vd += stepD * rate > 2 ? (2 + (stepD * rate) / (1 + 0.1 * stepD * rate)) / rate : stepD;
    if (Math.abs(stepS) < enough && Math.abs(stepD) < enough) {
      s[SLOTS + L.CHANNEL_A] = channel + 2 * scale * (ps * stepS - pd * stepD);
      s[SLOTS + L.JUNCTION_S] = S * (1 + rate * stepS);
      s[SLOTS + L.JUNCTION_D] = D * (1 + rate * stepD);
      s[SLOTS + L.OVERDRIVE_S] = vs;
      s[SLOTS + L.OVERDRIVE_D] = vd;
      return;
    }
  }
  throw new Error("the benchmark's signal must not need the search");
}
