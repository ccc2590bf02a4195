/**
 * Kernels of the smooth law by number of trapezoidal and of stiff states: written from source.ts by `npm run kernels`, where the method is
 * explained. Not to be edited.
 *
 * Each advances a cell over the samples `from` to `to`: `c` coefficients, `t` the law's table, `w` noise (or empty), `e` kinks (or empty) and
 * `s` state as in layout.ts, `audio` and `control` in V, `output` in V.
 */
// biome-ignore-all lint: written by a program
// biome-ignore-all format: written by a program
import { evaluate, searched } from './channel.ts';
import type { Conductor, Kernel, LoopedKernel } from './kernel.ts';
import { layoutOf, slotStart } from './layout.ts';
import { addGraded, keepCharges } from './graded.ts';
import { currents, searchPorts, stay } from './ports.ts';
import { expAt } from '../../device/math.ts';

function conduct_smooth(c: Float64Array, t: Float64Array, device: number, aI: number, bI: number, junction: number, s: Float64Array, n: number): void {
  const a = s[n + 36], b = s[n + 37], freeA = s[n + 38];
  const perAs = c[aI], perAd = c[bI], aS = c[junction], aD = c[junction + 1], bS = c[junction + 2], bD = c[junction + 3];
  const off = c[device + 1], reverse = c[device + 3], rateD = c[device + 4], onD = c[device + 13];
  const clampA = c[device + 15], clampRate = c[device + 16], clampOn = c[device + 14], grading = c[device + 18];
  const rateS = clampOn < onD ? clampRate : rateD, onS = clampOn < onD ? clampOn : onD, kneeS = onS + 20 / rateS, kneeD = onD + 20 / rateD;
  const enough = 0.1 * c[device + 17], rounding = 1e-15 * (Math.abs(a) + Math.abs(b));
  const lambda = c[device + 5];
  const scale = c[device + 6];
  const inverseWidth = c[device + 7];
  const slope = c[device + 8];
  const pieces = c[device + 11];
  const lastS = s[n + 44], earlierS = s[n + 46], freeS = a + perAs * freeA;
  const wayS = 2 * lastS - 3 * earlierS + s[n + 48];
  let vs = lastS > onS ? lastS + (wayS * rateS < 0.5 && wayS * rateS > -0.5 ? wayS : 0) : kneeS;
  if (grading != 0 && lastS < onS) vs = lastS + wayS;
  else if (freeS < vs) vs = freeS;
  const lastD = s[n + 45], earlierD = s[n + 47], freeD = b + perAd * freeA;
  const wayD = 2 * lastD - 3 * earlierD + s[n + 49];
  let vd = lastD > onD ? lastD + (wayD * rateD < 0.5 && wayD * rateD > -0.5 ? wayD : 0) : kneeD;
  if (grading != 0 && lastD < onD) vd = lastD + wayD;
  else if (freeD < vd) vd = freeD;
  let junctionS = 0, junctionD = 0, clamped = 0, movedS = 1, movedD = 1;
  for (let step = 0; step < 40; step++) {
    let Fs = 0, fs = 0, Fd = 0, fd = 0;
    if (vs * inverseWidth > -40) {
      const z = (vs * inverseWidth + 40) * 8;
      if (z < pieces) {
        const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
        Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
        fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
      } else { s[n + 9] = vs; evaluate(c, t, device, s, n + 9, n + 9); Fs = s[n + 9]; fs = s[n + 9 + 1]; }
    }
    if (vd * inverseWidth > -40) {
      const z = (vd * inverseWidth + 40) * 8;
      if (z < pieces) {
        const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
        Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
        fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
      } else { s[n + 9] = vd; evaluate(c, t, device, s, n + 9, n + 9); Fd = s[n + 9]; fd = s[n + 9 + 1]; }
    }
    if (lambda != 0) {
      const past = lambda * Math.max(-vd, 0), reversed = lambda * Math.max(-vs, 0), term = Fs;
      fs = fs * (1 + past) + (reversed > 0 ? lambda * Fd : 0);
      fd = fd * (1 + reversed) + (past > 0 ? lambda * term : 0);
      Fs = Fs * (1 + past); Fd = Fd * (1 + reversed);
    }
    if (vs > onD) {
      const x = movedS * rateD;
      if (junctionS > 0 && x < 1e-3 && x > -1e-3) junctionS = junctionS * (1 + x * (1 + x * (0.5 + x * 0.16666666666666666)));
      else { s[n + 39] = (vs + off) * rateD; expAt(s, n + 39); junctionS = reverse * s[n + 39]; }
    } else junctionS = 0;
    if (vd > onD) {
      const x = movedD * rateD;
      if (junctionD > 0 && x < 1e-3 && x > -1e-3) junctionD = junctionD * (1 + x * (1 + x * (0.5 + x * 0.16666666666666666)));
      else { s[n + 39] = (vd + off) * rateD; expAt(s, n + 39); junctionD = reverse * s[n + 39]; }
    } else junctionD = 0;
    if (vs > clampOn) {
      const x = movedS * clampRate;
      if (clamped > 0 && x < 1e-3 && x > -1e-3) clamped = clamped * (1 + x * (1 + x * (0.5 + x * 0.16666666666666666)));
      else { s[n + 39] = (vs + off) * clampRate; expAt(s, n + 39); clamped = clampA * s[n + 39]; }
    } else clamped = 0;
    let S = junctionS + clamped, slopeS = junctionS * rateD + clamped * clampRate, D = junctionD, slopeD = junctionD * rateD;
    if (grading != 0) {
      s[n + 21] = vs; s[n + 29] = vd;
      addGraded(c, device, 20, s, n + 17, n + 13); S += s[n + 13]; slopeS += s[n + 14];
      addGraded(c, device, 21, s, n + 25, n + 15); D += s[n + 15]; slopeD += s[n + 16];
    }
    const channel = Fs - Fd;
    const rs = vs - a - perAs * channel - aS * S - aD * D, rd = vd - b - perAd * channel - bS * S - bD * D;
    const ss = 1 - perAs * fs - aS * slopeS, sd = perAs * fd - aD * slopeD, ds = -perAd * fs - bS * slopeS, dd = 1 + perAd * fd - bD * slopeD;
    const over = 1 / (ss * dd - sd * ds), wholeS = (sd * rd - dd * rs) * over, wholeD = (ds * rs - ss * rd) * over;
    const stepS = wholeS * rateS <= 2 ? wholeS : vs < onS ? Math.min(wholeS, kneeS - vs) : (2 + wholeS * rateS / (1 + 0.1 * wholeS * rateS)) / rateS;
    const stepD = wholeD * rateD <= 2 ? wholeD : vd < onD ? Math.min(wholeD, kneeD - vd) : (2 + wholeD * rateD / (1 + 0.1 * wholeD * rateD)) / rateD;
    vs += stepS; vd += stepD; movedS = stepS; movedD = stepD;
    if (Math.abs(stepS) < enough && Math.abs(stepD) < enough) {
      s[n + 48] = earlierS; s[n + 49] = earlierD; s[n + 46] = lastS; s[n + 47] = lastD;
      s[n + 44] = vs; s[n + 45] = vd; s[n + 5] = vs; s[n + 6] = vd;
      s[n + 2] = channel + fs * stepS - fd * stepD;
      s[n + 3] = S + slopeS * stepS; s[n + 4] = D + slopeD * stepD;
      if (grading != 0) {
        s[n + 21] += s[n + 22] * stepS; s[n + 29] += s[n + 30] * stepD;
        keepCharges(s, n);
      }
      return;
    }
    if (Math.abs(stepS) < rounding && Math.abs(stepD) < rounding) {
      s[n + 5] = vs; s[n + 6] = vd;
      currents(c, t, device, s, n);
      stay(s, n);
      return;
    }
  }
  searchPorts(c, t, device, aI, bI, junction, s, n, a, b);
  stay(s, n);
}

function smooth0__d(c: Float64Array, t: Float64Array, w: Float64Array, e: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0, marking = e.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const b0 = c[4];
  const b1 = c[5];
  const b2 = c[6];
  const b3 = c[7];
  const sign = c[40], off = c[19];
  const on = c[20];
  const lambda = c[23];
  const scale = c[24];
  const inverseWidth = c[25];
  const slope = c[26];
  const enough = c[35];
  const pieces = c[29];
  let I0 = s[2], S0 = s[3], D0 = s[4], E0 = s[7], F0 = s[50], vs = s[5], vd = s[6];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    let a = (a0 * u + a1 * v) + a2;
    let b = (b0 * u + b1 * v) + b2;
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      s[5] = vs; s[6] = vd;
      evaluate(c, t, 18, s, 5, 9); evaluate(c, t, 18, s, 6, 11);
      J = w[i * 4 + 3] * Math.sqrt(0.5 * (s[10] + s[12]));
      a += w[i * 4 + 0] + a3 * J;
      b += w[i * 4 + 1] + b3 * J;
    }
    I = 3 * (I0 - E0) + F0;
    let settled = 0;
    for (let step = 0; step < 40; step++) {
      vs = a + a3 * I; vd = b + b3 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[9] = vs; evaluate(c, t, 18, s, 9, 9); Fs = s[9]; fs = s[9 + 1]; }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[9] = vd; evaluate(c, t, 18, s, 9, 9); Fd = s[9]; fd = s[9 + 1]; }
      }
      let h = Fs - Fd - I, slopes = a3 * fs - b3 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a3 * fs + b3 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b3 * fd + a3 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b3 - a3) * change;
      if (moved < enough && moved > -enough) { settled = 1; break; }
    }
    if (settled == 0) { s[36] = a; s[37] = b; searched(c, t, 18, 3, 7, s, 0); I = s[38]; s[8] += 1; E0 = I; I0 = I; }
    vs = a + a3 * I; vd = b + b3 * I;
    if (vs > on || vd > on) {
      s[36] = a; s[37] = b; s[38] = I;
      conduct_smooth(c, t, 18, 3, 7, 12, s, 0);
      I = s[2]; S = s[3]; D = s[4]; vs = s[5]; vd = s[6];
    }
    I += J;
    output[i] = sign * (vs - vd);
    F0 = E0; E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[2] = I0; s[3] = S0; s[4] = D0; s[7] = E0; s[50] = F0;
  if (to > from) { s[5] = vs; s[6] = vd; }
}

function smooth1__d(c: Float64Array, t: Float64Array, w: Float64Array, e: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0, marking = e.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const a4 = c[4];
  const b0 = c[5];
  const b1 = c[6];
  const b2 = c[7];
  const b3 = c[8];
  const b4 = c[9];
  const n0_0 = c[10];
  const n0_1 = c[11];
  const n0_2 = c[12];
  const n0_3 = c[13];
  const n0_4 = c[14];
  const m0_0 = c[28];
  const m0_1 = c[29];
  const m0_2 = c[30];
  const m0_3 = c[31];
  const sign = c[56], off = c[35];
  const on = c[36];
  const lambda = c[39];
  const scale = c[40];
  const inverseWidth = c[41];
  const slope = c[42];
  const enough = c[51];
  const pieces = c[45];
  let x0 = s[0];
  let u0 = s[1], v0 = s[2];
  let I0 = s[3], S0 = s[4], D0 = s[5], E0 = s[8], F0 = s[51], vs = s[6], vd = s[7];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    let r0 = (m0_0 * x0 + m0_1 * u0) + (m0_2 * v0 + m0_3 * I0);
    if (S0 != 0 || D0 != 0) {
      r0 += c[32] * S0 + c[33] * D0;
    }
    let a = (a0 * r0 + a1 * u) + (a2 * v + a3);
    let b = (b0 * r0 + b1 * u) + (b2 * v + b3);
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      s[6] = vs; s[7] = vd;
      evaluate(c, t, 34, s, 6, 10); evaluate(c, t, 34, s, 7, 12);
      J = w[i * 5 + 4] * Math.sqrt(0.5 * (s[11] + s[13]));
      a += w[i * 5 + 0] + a4 * J;
      b += w[i * 5 + 1] + b4 * J;
    }
    I = 3 * (I0 - E0) + F0;
    let settled = 0;
    for (let step = 0; step < 40; step++) {
      vs = a + a4 * I; vd = b + b4 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[10] = vs; evaluate(c, t, 34, s, 10, 10); Fs = s[10]; fs = s[10 + 1]; }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[10] = vd; evaluate(c, t, 34, s, 10, 10); Fd = s[10]; fd = s[10 + 1]; }
      }
      let h = Fs - Fd - I, slopes = a4 * fs - b4 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a4 * fs + b4 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b4 * fd + a4 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b4 - a4) * change;
      if (moved < enough && moved > -enough) { settled = 1; break; }
    }
    if (settled == 0) { s[37] = a; s[38] = b; searched(c, t, 34, 4, 9, s, 1); I = s[39]; s[9] += 1; E0 = I; I0 = I; }
    vs = a + a4 * I; vd = b + b4 * I;
    if (vs > on || vd > on) {
      s[37] = a; s[38] = b; s[39] = I;
      conduct_smooth(c, t, 34, 4, 9, 20, s, 1);
      I = s[3]; S = s[4]; D = s[5]; vs = s[6]; vd = s[7];
    }
    I += J;
    x0 = (n0_0 * r0 + n0_1 * u) + (n0_2 * v + n0_3) + n0_4 * I;
    if (noisy) {
      x0 += w[i * 5 + 2];
    }
    if (S != 0 || D != 0) {
      x0 += c[24] * S + c[25] * D;
    }
    output[i] = sign * (vs - vd);
    u0 = u; v0 = v;
    F0 = E0; E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = u0; s[2] = v0;
  s[3] = I0; s[4] = S0; s[5] = D0; s[8] = E0; s[51] = F0;
  if (to > from) { s[6] = vs; s[7] = vd; }
}

function smooth2__d(c: Float64Array, t: Float64Array, w: Float64Array, e: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0, marking = e.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const a4 = c[4];
  const a5 = c[5];
  const b0 = c[6];
  const b1 = c[7];
  const b2 = c[8];
  const b3 = c[9];
  const b4 = c[10];
  const b5 = c[11];
  const n0_0 = c[12];
  const n0_1 = c[13];
  const n0_2 = c[14];
  const n0_3 = c[15];
  const n0_4 = c[16];
  const n0_5 = c[17];
  const n1_0 = c[18];
  const n1_1 = c[19];
  const n1_2 = c[20];
  const n1_3 = c[21];
  const n1_4 = c[22];
  const n1_5 = c[23];
  const m0_0 = c[40];
  const m0_1 = c[41];
  const m0_2 = c[42];
  const m0_3 = c[43];
  const m0_4 = c[44];
  const m1_0 = c[45];
  const m1_1 = c[46];
  const m1_2 = c[47];
  const m1_3 = c[48];
  const m1_4 = c[49];
  const sign = c[76], off = c[55];
  const on = c[56];
  const lambda = c[59];
  const scale = c[60];
  const inverseWidth = c[61];
  const slope = c[62];
  const enough = c[71];
  const pieces = c[65];
  let x0 = s[0];
  let x1 = s[1];
  let u0 = s[2], v0 = s[3];
  let I0 = s[4], S0 = s[5], D0 = s[6], E0 = s[9], F0 = s[52], vs = s[7], vd = s[8];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    let r0 = ((m0_0 * x0 + m0_1 * x1) + m0_2 * u0) + (m0_3 * v0 + m0_4 * I0);
    let r1 = ((m1_0 * x0 + m1_1 * x1) + m1_2 * u0) + (m1_3 * v0 + m1_4 * I0);
    if (S0 != 0 || D0 != 0) {
      r0 += c[50] * S0 + c[51] * D0;
      r1 += c[52] * S0 + c[53] * D0;
    }
    let a = ((a0 * r0 + a1 * r1) + a2 * u) + (a3 * v + a4);
    let b = ((b0 * r0 + b1 * r1) + b2 * u) + (b3 * v + b4);
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      s[7] = vs; s[8] = vd;
      evaluate(c, t, 54, s, 7, 11); evaluate(c, t, 54, s, 8, 13);
      J = w[i * 6 + 5] * Math.sqrt(0.5 * (s[12] + s[14]));
      a += w[i * 6 + 0] + a5 * J;
      b += w[i * 6 + 1] + b5 * J;
    }
    I = 3 * (I0 - E0) + F0;
    let settled = 0;
    for (let step = 0; step < 40; step++) {
      vs = a + a5 * I; vd = b + b5 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[11] = vs; evaluate(c, t, 54, s, 11, 11); Fs = s[11]; fs = s[11 + 1]; }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[11] = vd; evaluate(c, t, 54, s, 11, 11); Fd = s[11]; fd = s[11 + 1]; }
      }
      let h = Fs - Fd - I, slopes = a5 * fs - b5 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a5 * fs + b5 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b5 * fd + a5 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b5 - a5) * change;
      if (moved < enough && moved > -enough) { settled = 1; break; }
    }
    if (settled == 0) { s[38] = a; s[39] = b; searched(c, t, 54, 5, 11, s, 2); I = s[40]; s[10] += 1; E0 = I; I0 = I; }
    vs = a + a5 * I; vd = b + b5 * I;
    if (vs > on || vd > on) {
      s[38] = a; s[39] = b; s[40] = I;
      conduct_smooth(c, t, 54, 5, 11, 30, s, 2);
      I = s[4]; S = s[5]; D = s[6]; vs = s[7]; vd = s[8];
    }
    I += J;
    x0 = ((n0_0 * r0 + n0_1 * r1) + n0_2 * u) + (n0_3 * v + n0_4) + n0_5 * I;
    x1 = ((n1_0 * r0 + n1_1 * r1) + n1_2 * u) + (n1_3 * v + n1_4) + n1_5 * I;
    if (noisy) {
      x0 += w[i * 6 + 2];
      x1 += w[i * 6 + 3];
    }
    if (S != 0 || D != 0) {
      x0 += c[34] * S + c[35] * D;
      x1 += c[36] * S + c[37] * D;
    }
    output[i] = sign * (vs - vd);
    u0 = u; v0 = v;
    F0 = E0; E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = x1;
  s[2] = u0; s[3] = v0;
  s[4] = I0; s[5] = S0; s[6] = D0; s[9] = E0; s[52] = F0;
  if (to > from) { s[7] = vs; s[8] = vd; }
}

function smooth3__d(c: Float64Array, t: Float64Array, w: Float64Array, e: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0, marking = e.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const a4 = c[4];
  const a5 = c[5];
  const a6 = c[6];
  const b0 = c[7];
  const b1 = c[8];
  const b2 = c[9];
  const b3 = c[10];
  const b4 = c[11];
  const b5 = c[12];
  const b6 = c[13];
  const n0_0 = c[14];
  const n0_1 = c[15];
  const n0_2 = c[16];
  const n0_3 = c[17];
  const n0_4 = c[18];
  const n0_5 = c[19];
  const n0_6 = c[20];
  const n1_0 = c[21];
  const n1_1 = c[22];
  const n1_2 = c[23];
  const n1_3 = c[24];
  const n1_4 = c[25];
  const n1_5 = c[26];
  const n1_6 = c[27];
  const n2_0 = c[28];
  const n2_1 = c[29];
  const n2_2 = c[30];
  const n2_3 = c[31];
  const n2_4 = c[32];
  const n2_5 = c[33];
  const n2_6 = c[34];
  const m0_0 = c[54];
  const m0_1 = c[55];
  const m0_2 = c[56];
  const m0_3 = c[57];
  const m0_4 = c[58];
  const m0_5 = c[59];
  const m1_0 = c[60];
  const m1_1 = c[61];
  const m1_2 = c[62];
  const m1_3 = c[63];
  const m1_4 = c[64];
  const m1_5 = c[65];
  const m2_0 = c[66];
  const m2_1 = c[67];
  const m2_2 = c[68];
  const m2_3 = c[69];
  const m2_4 = c[70];
  const m2_5 = c[71];
  const sign = c[100], off = c[79];
  const on = c[80];
  const lambda = c[83];
  const scale = c[84];
  const inverseWidth = c[85];
  const slope = c[86];
  const enough = c[95];
  const pieces = c[89];
  let x0 = s[0];
  let x1 = s[1];
  let x2 = s[2];
  let u0 = s[3], v0 = s[4];
  let I0 = s[5], S0 = s[6], D0 = s[7], E0 = s[10], F0 = s[53], vs = s[8], vd = s[9];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    let r0 = ((m0_0 * x0 + m0_1 * x1) + m0_2 * x2) + ((m0_3 * u0 + m0_4 * v0) + m0_5 * I0);
    let r1 = ((m1_0 * x0 + m1_1 * x1) + m1_2 * x2) + ((m1_3 * u0 + m1_4 * v0) + m1_5 * I0);
    let r2 = ((m2_0 * x0 + m2_1 * x1) + m2_2 * x2) + ((m2_3 * u0 + m2_4 * v0) + m2_5 * I0);
    if (S0 != 0 || D0 != 0) {
      r0 += c[72] * S0 + c[73] * D0;
      r1 += c[74] * S0 + c[75] * D0;
      r2 += c[76] * S0 + c[77] * D0;
    }
    let a = ((a0 * r0 + a1 * r1) + a2 * r2) + ((a3 * u + a4 * v) + a5);
    let b = ((b0 * r0 + b1 * r1) + b2 * r2) + ((b3 * u + b4 * v) + b5);
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      s[8] = vs; s[9] = vd;
      evaluate(c, t, 78, s, 8, 12); evaluate(c, t, 78, s, 9, 14);
      J = w[i * 7 + 6] * Math.sqrt(0.5 * (s[13] + s[15]));
      a += w[i * 7 + 0] + a6 * J;
      b += w[i * 7 + 1] + b6 * J;
    }
    I = 3 * (I0 - E0) + F0;
    let settled = 0;
    for (let step = 0; step < 40; step++) {
      vs = a + a6 * I; vd = b + b6 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[12] = vs; evaluate(c, t, 78, s, 12, 12); Fs = s[12]; fs = s[12 + 1]; }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[12] = vd; evaluate(c, t, 78, s, 12, 12); Fd = s[12]; fd = s[12 + 1]; }
      }
      let h = Fs - Fd - I, slopes = a6 * fs - b6 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a6 * fs + b6 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b6 * fd + a6 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b6 - a6) * change;
      if (moved < enough && moved > -enough) { settled = 1; break; }
    }
    if (settled == 0) { s[39] = a; s[40] = b; searched(c, t, 78, 6, 13, s, 3); I = s[41]; s[11] += 1; E0 = I; I0 = I; }
    vs = a + a6 * I; vd = b + b6 * I;
    if (vs > on || vd > on) {
      s[39] = a; s[40] = b; s[41] = I;
      conduct_smooth(c, t, 78, 6, 13, 42, s, 3);
      I = s[5]; S = s[6]; D = s[7]; vs = s[8]; vd = s[9];
    }
    I += J;
    x0 = ((n0_0 * r0 + n0_1 * r1) + n0_2 * r2) + ((n0_3 * u + n0_4 * v) + n0_5) + n0_6 * I;
    x1 = ((n1_0 * r0 + n1_1 * r1) + n1_2 * r2) + ((n1_3 * u + n1_4 * v) + n1_5) + n1_6 * I;
    x2 = ((n2_0 * r0 + n2_1 * r1) + n2_2 * r2) + ((n2_3 * u + n2_4 * v) + n2_5) + n2_6 * I;
    if (noisy) {
      x0 += w[i * 7 + 2];
      x1 += w[i * 7 + 3];
      x2 += w[i * 7 + 4];
    }
    if (S != 0 || D != 0) {
      x0 += c[46] * S + c[47] * D;
      x1 += c[48] * S + c[49] * D;
      x2 += c[50] * S + c[51] * D;
    }
    output[i] = sign * (vs - vd);
    u0 = u; v0 = v;
    F0 = E0; E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = x1;
  s[2] = x2;
  s[3] = u0; s[4] = v0;
  s[5] = I0; s[6] = S0; s[7] = D0; s[10] = E0; s[53] = F0;
  if (to > from) { s[8] = vs; s[9] = vd; }
}

function smooth4__d(c: Float64Array, t: Float64Array, w: Float64Array, e: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0, marking = e.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const a4 = c[4];
  const a5 = c[5];
  const a6 = c[6];
  const a7 = c[7];
  const b0 = c[8];
  const b1 = c[9];
  const b2 = c[10];
  const b3 = c[11];
  const b4 = c[12];
  const b5 = c[13];
  const b6 = c[14];
  const b7 = c[15];
  const n0_0 = c[16];
  const n0_1 = c[17];
  const n0_2 = c[18];
  const n0_3 = c[19];
  const n0_4 = c[20];
  const n0_5 = c[21];
  const n0_6 = c[22];
  const n0_7 = c[23];
  const n1_0 = c[24];
  const n1_1 = c[25];
  const n1_2 = c[26];
  const n1_3 = c[27];
  const n1_4 = c[28];
  const n1_5 = c[29];
  const n1_6 = c[30];
  const n1_7 = c[31];
  const n2_0 = c[32];
  const n2_1 = c[33];
  const n2_2 = c[34];
  const n2_3 = c[35];
  const n2_4 = c[36];
  const n2_5 = c[37];
  const n2_6 = c[38];
  const n2_7 = c[39];
  const n3_0 = c[40];
  const n3_1 = c[41];
  const n3_2 = c[42];
  const n3_3 = c[43];
  const n3_4 = c[44];
  const n3_5 = c[45];
  const n3_6 = c[46];
  const n3_7 = c[47];
  const m0_0 = c[70];
  const m0_1 = c[71];
  const m0_2 = c[72];
  const m0_3 = c[73];
  const m0_4 = c[74];
  const m0_5 = c[75];
  const m0_6 = c[76];
  const m1_0 = c[77];
  const m1_1 = c[78];
  const m1_2 = c[79];
  const m1_3 = c[80];
  const m1_4 = c[81];
  const m1_5 = c[82];
  const m1_6 = c[83];
  const m2_0 = c[84];
  const m2_1 = c[85];
  const m2_2 = c[86];
  const m2_3 = c[87];
  const m2_4 = c[88];
  const m2_5 = c[89];
  const m2_6 = c[90];
  const m3_0 = c[91];
  const m3_1 = c[92];
  const m3_2 = c[93];
  const m3_3 = c[94];
  const m3_4 = c[95];
  const m3_5 = c[96];
  const m3_6 = c[97];
  const sign = c[128], off = c[107];
  const on = c[108];
  const lambda = c[111];
  const scale = c[112];
  const inverseWidth = c[113];
  const slope = c[114];
  const enough = c[123];
  const pieces = c[117];
  let x0 = s[0];
  let x1 = s[1];
  let x2 = s[2];
  let x3 = s[3];
  let u0 = s[4], v0 = s[5];
  let I0 = s[6], S0 = s[7], D0 = s[8], E0 = s[11], F0 = s[54], vs = s[9], vd = s[10];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    let r0 = ((m0_0 * x0 + m0_1 * x1) + (m0_2 * x2 + m0_3 * x3)) + ((m0_4 * u0 + m0_5 * v0) + m0_6 * I0);
    let r1 = ((m1_0 * x0 + m1_1 * x1) + (m1_2 * x2 + m1_3 * x3)) + ((m1_4 * u0 + m1_5 * v0) + m1_6 * I0);
    let r2 = ((m2_0 * x0 + m2_1 * x1) + (m2_2 * x2 + m2_3 * x3)) + ((m2_4 * u0 + m2_5 * v0) + m2_6 * I0);
    let r3 = ((m3_0 * x0 + m3_1 * x1) + (m3_2 * x2 + m3_3 * x3)) + ((m3_4 * u0 + m3_5 * v0) + m3_6 * I0);
    if (S0 != 0 || D0 != 0) {
      r0 += c[98] * S0 + c[99] * D0;
      r1 += c[100] * S0 + c[101] * D0;
      r2 += c[102] * S0 + c[103] * D0;
      r3 += c[104] * S0 + c[105] * D0;
    }
    let a = ((a0 * r0 + a1 * r1) + (a2 * r2 + a3 * r3)) + ((a4 * u + a5 * v) + a6);
    let b = ((b0 * r0 + b1 * r1) + (b2 * r2 + b3 * r3)) + ((b4 * u + b5 * v) + b6);
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      s[9] = vs; s[10] = vd;
      evaluate(c, t, 106, s, 9, 13); evaluate(c, t, 106, s, 10, 15);
      J = w[i * 8 + 7] * Math.sqrt(0.5 * (s[14] + s[16]));
      a += w[i * 8 + 0] + a7 * J;
      b += w[i * 8 + 1] + b7 * J;
    }
    I = 3 * (I0 - E0) + F0;
    let settled = 0;
    for (let step = 0; step < 40; step++) {
      vs = a + a7 * I; vd = b + b7 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[13] = vs; evaluate(c, t, 106, s, 13, 13); Fs = s[13]; fs = s[13 + 1]; }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[13] = vd; evaluate(c, t, 106, s, 13, 13); Fd = s[13]; fd = s[13 + 1]; }
      }
      let h = Fs - Fd - I, slopes = a7 * fs - b7 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a7 * fs + b7 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b7 * fd + a7 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b7 - a7) * change;
      if (moved < enough && moved > -enough) { settled = 1; break; }
    }
    if (settled == 0) { s[40] = a; s[41] = b; searched(c, t, 106, 7, 15, s, 4); I = s[42]; s[12] += 1; E0 = I; I0 = I; }
    vs = a + a7 * I; vd = b + b7 * I;
    if (vs > on || vd > on) {
      s[40] = a; s[41] = b; s[42] = I;
      conduct_smooth(c, t, 106, 7, 15, 56, s, 4);
      I = s[6]; S = s[7]; D = s[8]; vs = s[9]; vd = s[10];
    }
    I += J;
    x0 = ((n0_0 * r0 + n0_1 * r1) + (n0_2 * r2 + n0_3 * r3)) + ((n0_4 * u + n0_5 * v) + n0_6) + n0_7 * I;
    x1 = ((n1_0 * r0 + n1_1 * r1) + (n1_2 * r2 + n1_3 * r3)) + ((n1_4 * u + n1_5 * v) + n1_6) + n1_7 * I;
    x2 = ((n2_0 * r0 + n2_1 * r1) + (n2_2 * r2 + n2_3 * r3)) + ((n2_4 * u + n2_5 * v) + n2_6) + n2_7 * I;
    x3 = ((n3_0 * r0 + n3_1 * r1) + (n3_2 * r2 + n3_3 * r3)) + ((n3_4 * u + n3_5 * v) + n3_6) + n3_7 * I;
    if (noisy) {
      x0 += w[i * 8 + 2];
      x1 += w[i * 8 + 3];
      x2 += w[i * 8 + 4];
      x3 += w[i * 8 + 5];
    }
    if (S != 0 || D != 0) {
      x0 += c[60] * S + c[61] * D;
      x1 += c[62] * S + c[63] * D;
      x2 += c[64] * S + c[65] * D;
      x3 += c[66] * S + c[67] * D;
    }
    output[i] = sign * (vs - vd);
    u0 = u; v0 = v;
    F0 = E0; E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = x1;
  s[2] = x2;
  s[3] = x3;
  s[4] = u0; s[5] = v0;
  s[6] = I0; s[7] = S0; s[8] = D0; s[11] = E0; s[54] = F0;
  if (to > from) { s[9] = vs; s[10] = vd; }
}

function smooth0_x_d(c: Float64Array, t: Float64Array, w: Float64Array, e: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0, marking = e.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const a4 = c[4];
  const b0 = c[5];
  const b1 = c[6];
  const b2 = c[7];
  const b3 = c[8];
  const b4 = c[9];
  const n0_0 = c[10];
  const n0_1 = c[11];
  const n0_2 = c[12];
  const n0_3 = c[13];
  const n0_4 = c[14];
  const m0_0 = c[28];
  const m0_1 = c[29];
  const m0_2 = c[30];
  const sign = c[56], off = c[35];
  const on = c[36];
  const lambda = c[39];
  const scale = c[40];
  const inverseWidth = c[41];
  const slope = c[42];
  const enough = c[51];
  const pieces = c[45];
  let x0 = s[0];
  let e0 = s[1], f0 = s[2], g0 = s[3];
  let u0 = s[4], v0 = s[5];
  let I0 = s[6], S0 = s[7], D0 = s[8], E0 = s[11], F0 = s[54], vs = s[9], vd = s[10];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    const p0 = 3.5 * x0 - 2.25 * e0 + 0.8333333333333334 * f0 - 0.125 * g0;
    let r0 = (m0_0 * p0 + m0_1 * u0) + m0_2 * v0;
    let a = (a0 * r0 + a1 * u) + (a2 * v + a3);
    let b = (b0 * r0 + b1 * u) + (b2 * v + b3);
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      s[9] = vs; s[10] = vd;
      evaluate(c, t, 34, s, 9, 13); evaluate(c, t, 34, s, 10, 15);
      J = w[i * 5 + 4] * Math.sqrt(0.5 * (s[14] + s[16]));
      a += w[i * 5 + 0] + a4 * J;
      b += w[i * 5 + 1] + b4 * J;
    }
    I = 3 * (I0 - E0) + F0;
    let settled = 0;
    for (let step = 0; step < 40; step++) {
      vs = a + a4 * I; vd = b + b4 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[13] = vs; evaluate(c, t, 34, s, 13, 13); Fs = s[13]; fs = s[13 + 1]; }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[13] = vd; evaluate(c, t, 34, s, 13, 13); Fd = s[13]; fd = s[13 + 1]; }
      }
      let h = Fs - Fd - I, slopes = a4 * fs - b4 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a4 * fs + b4 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b4 * fd + a4 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b4 - a4) * change;
      if (moved < enough && moved > -enough) { settled = 1; break; }
    }
    if (settled == 0) { s[40] = a; s[41] = b; searched(c, t, 34, 4, 9, s, 4); I = s[42]; s[12] += 1; E0 = I; I0 = I; }
    vs = a + a4 * I; vd = b + b4 * I;
    if (vs > on || vd > on) {
      s[40] = a; s[41] = b; s[42] = I;
      conduct_smooth(c, t, 34, 4, 9, 20, s, 4);
      I = s[6]; S = s[7]; D = s[8]; vs = s[9]; vd = s[10];
    }
    I += J;
    g0 = f0; f0 = e0; e0 = x0;
    x0 = (n0_0 * r0 + n0_1 * u) + (n0_2 * v + n0_3) + n0_4 * I;
    if (noisy) {
      x0 += w[i * 5 + 2];
    }
    if (S != 0 || D != 0) {
      x0 += c[24] * S + c[25] * D;
    }
    output[i] = sign * (vs - vd);
    u0 = u; v0 = v;
    F0 = E0; E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = e0; s[2] = f0; s[3] = g0;
  s[4] = u0; s[5] = v0;
  s[6] = I0; s[7] = S0; s[8] = D0; s[11] = E0; s[54] = F0;
  if (to > from) { s[9] = vs; s[10] = vd; }
}

function smooth1_x_d(c: Float64Array, t: Float64Array, w: Float64Array, e: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0, marking = e.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const a4 = c[4];
  const a5 = c[5];
  const b0 = c[6];
  const b1 = c[7];
  const b2 = c[8];
  const b3 = c[9];
  const b4 = c[10];
  const b5 = c[11];
  const n0_0 = c[12];
  const n0_1 = c[13];
  const n0_2 = c[14];
  const n0_3 = c[15];
  const n0_4 = c[16];
  const n0_5 = c[17];
  const n1_0 = c[18];
  const n1_1 = c[19];
  const n1_2 = c[20];
  const n1_3 = c[21];
  const n1_4 = c[22];
  const n1_5 = c[23];
  const m0_0 = c[40];
  const m0_1 = c[41];
  const m0_2 = c[42];
  const m0_3 = c[43];
  const m0_4 = c[44];
  const m1_0 = c[45];
  const m1_1 = c[46];
  const m1_2 = c[47];
  const m1_3 = c[48];
  const sign = c[76], off = c[55];
  const on = c[56];
  const lambda = c[59];
  const scale = c[60];
  const inverseWidth = c[61];
  const slope = c[62];
  const enough = c[71];
  const pieces = c[65];
  let x0 = s[0];
  let x1 = s[1];
  let e1 = s[2], f1 = s[3], g1 = s[4];
  let u0 = s[5], v0 = s[6];
  let I0 = s[7], S0 = s[8], D0 = s[9], E0 = s[12], F0 = s[55], vs = s[10], vd = s[11];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    const p1 = 3.5 * x1 - 2.25 * e1 + 0.8333333333333334 * f1 - 0.125 * g1;
    let r0 = ((m0_0 * x0 + m0_1 * x1) + m0_2 * u0) + (m0_3 * v0 + m0_4 * I0);
    let r1 = (m1_0 * x0 + m1_1 * p1) + (m1_2 * u0 + m1_3 * v0);
    if (S0 != 0 || D0 != 0) {
      r0 += c[50] * S0 + c[51] * D0;
    }
    let a = ((a0 * r0 + a1 * r1) + a2 * u) + (a3 * v + a4);
    let b = ((b0 * r0 + b1 * r1) + b2 * u) + (b3 * v + b4);
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      s[10] = vs; s[11] = vd;
      evaluate(c, t, 54, s, 10, 14); evaluate(c, t, 54, s, 11, 16);
      J = w[i * 6 + 5] * Math.sqrt(0.5 * (s[15] + s[17]));
      a += w[i * 6 + 0] + a5 * J;
      b += w[i * 6 + 1] + b5 * J;
    }
    I = 3 * (I0 - E0) + F0;
    let settled = 0;
    for (let step = 0; step < 40; step++) {
      vs = a + a5 * I; vd = b + b5 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[14] = vs; evaluate(c, t, 54, s, 14, 14); Fs = s[14]; fs = s[14 + 1]; }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[14] = vd; evaluate(c, t, 54, s, 14, 14); Fd = s[14]; fd = s[14 + 1]; }
      }
      let h = Fs - Fd - I, slopes = a5 * fs - b5 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a5 * fs + b5 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b5 * fd + a5 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b5 - a5) * change;
      if (moved < enough && moved > -enough) { settled = 1; break; }
    }
    if (settled == 0) { s[41] = a; s[42] = b; searched(c, t, 54, 5, 11, s, 5); I = s[43]; s[13] += 1; E0 = I; I0 = I; }
    vs = a + a5 * I; vd = b + b5 * I;
    if (vs > on || vd > on) {
      s[41] = a; s[42] = b; s[43] = I;
      conduct_smooth(c, t, 54, 5, 11, 30, s, 5);
      I = s[7]; S = s[8]; D = s[9]; vs = s[10]; vd = s[11];
    }
    I += J;
    g1 = f1; f1 = e1; e1 = x1;
    x0 = ((n0_0 * r0 + n0_1 * r1) + n0_2 * u) + (n0_3 * v + n0_4) + n0_5 * I;
    x1 = ((n1_0 * r0 + n1_1 * r1) + n1_2 * u) + (n1_3 * v + n1_4) + n1_5 * I;
    if (noisy) {
      x0 += w[i * 6 + 2];
      x1 += w[i * 6 + 3];
    }
    if (S != 0 || D != 0) {
      x0 += c[34] * S + c[35] * D;
      x1 += c[36] * S + c[37] * D;
    }
    output[i] = sign * (vs - vd);
    u0 = u; v0 = v;
    F0 = E0; E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = x1;
  s[2] = e1; s[3] = f1; s[4] = g1;
  s[5] = u0; s[6] = v0;
  s[7] = I0; s[8] = S0; s[9] = D0; s[12] = E0; s[55] = F0;
  if (to > from) { s[10] = vs; s[11] = vd; }
}

function smooth0_xg_d(c: Float64Array, t: Float64Array, w: Float64Array, e: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0, marking = e.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const a4 = c[4];
  const a5 = c[5];
  const b0 = c[6];
  const b1 = c[7];
  const b2 = c[8];
  const b3 = c[9];
  const b4 = c[10];
  const b5 = c[11];
  const n0_0 = c[12];
  const n0_1 = c[13];
  const n0_2 = c[14];
  const n0_3 = c[15];
  const n0_4 = c[16];
  const n0_5 = c[17];
  const m0_0 = c[40];
  const m0_1 = c[41];
  const m0_2 = c[42];
  const m0_3 = c[43];
  const m1_0 = c[45];
  const m1_1 = c[46];
  const m1_2 = c[47];
  const m1_3 = c[48];
  const sign = c[76], off = c[55];
  const on = c[56];
  const lambda = c[59];
  const scale = c[60];
  const inverseWidth = c[61];
  const slope = c[62];
  const enough = c[71];
  const pieces = c[65];
  let x0 = s[0];
  let x1 = s[1];
  let e0 = s[2], f0 = s[4], g0 = s[6];
  let e1 = s[3], f1 = s[5], g1 = s[7];
  let u0 = s[8], v0 = s[9];
  let I0 = s[10], S0 = s[11], D0 = s[12], E0 = s[15], F0 = s[58], vs = s[13], vd = s[14];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    const p0 = 3.5 * x0 - 2.25 * e0 + 0.8333333333333334 * f0 - 0.125 * g0;
    const p1 = 3.5 * x1 - 2.25 * e1 + 0.8333333333333334 * f1 - 0.125 * g1;
    let r0 = (m0_0 * p0 + m0_1 * p1) + (m0_2 * u0 + m0_3 * v0);
    let r1 = (m1_0 * p0 + m1_1 * p1) + (m1_2 * u0 + m1_3 * v0);
    let a = ((a0 * r0 + a1 * r1) + a2 * u) + (a3 * v + a4);
    let b = ((b0 * r0 + b1 * r1) + b2 * u) + (b3 * v + b4);
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      s[13] = vs; s[14] = vd;
      evaluate(c, t, 54, s, 13, 17); evaluate(c, t, 54, s, 14, 19);
      J = w[i * 6 + 5] * Math.sqrt(0.5 * (s[18] + s[20]));
      a += w[i * 6 + 0] + a5 * J;
      b += w[i * 6 + 1] + b5 * J;
    }
    I = 3 * (I0 - E0) + F0;
    let settled = 0;
    for (let step = 0; step < 40; step++) {
      vs = a + a5 * I; vd = b + b5 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[17] = vs; evaluate(c, t, 54, s, 17, 17); Fs = s[17]; fs = s[17 + 1]; }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[17] = vd; evaluate(c, t, 54, s, 17, 17); Fd = s[17]; fd = s[17 + 1]; }
      }
      let h = Fs - Fd - I, slopes = a5 * fs - b5 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a5 * fs + b5 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b5 * fd + a5 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b5 - a5) * change;
      if (moved < enough && moved > -enough) { settled = 1; break; }
    }
    if (settled == 0) { s[44] = a; s[45] = b; searched(c, t, 54, 5, 11, s, 8); I = s[46]; s[16] += 1; E0 = I; I0 = I; }
    vs = a + a5 * I; vd = b + b5 * I;
    if (vs > on || vd > on) {
      s[44] = a; s[45] = b; s[46] = I;
      conduct_smooth(c, t, 54, 5, 11, 30, s, 8);
      I = s[10]; S = s[11]; D = s[12]; vs = s[13]; vd = s[14];
    }
    I += J;
    g0 = f0; f0 = e0; e0 = x0;
    g1 = f1; f1 = e1; e1 = x1;
    x0 = ((n0_0 * r0 + n0_1 * r1) + n0_2 * u) + (n0_3 * v + n0_4) + n0_5 * I;
    x1 = sign * (vs + off);
    if (noisy) {
      x0 += w[i * 6 + 2];
    }
    if (S != 0 || D != 0) {
      x0 += c[34] * S + c[35] * D;
    }
    output[i] = sign * (vs - vd);
    u0 = u; v0 = v;
    F0 = E0; E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = x1;
  s[2] = e0; s[4] = f0; s[6] = g0;
  s[3] = e1; s[5] = f1; s[7] = g1;
  s[8] = u0; s[9] = v0;
  s[10] = I0; s[11] = S0; s[12] = D0; s[15] = E0; s[58] = F0;
  if (to > from) { s[13] = vs; s[14] = vd; }
}

function smooth1_xg_d(c: Float64Array, t: Float64Array, w: Float64Array, e: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0, marking = e.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const a4 = c[4];
  const a5 = c[5];
  const a6 = c[6];
  const b0 = c[7];
  const b1 = c[8];
  const b2 = c[9];
  const b3 = c[10];
  const b4 = c[11];
  const b5 = c[12];
  const b6 = c[13];
  const n0_0 = c[14];
  const n0_1 = c[15];
  const n0_2 = c[16];
  const n0_3 = c[17];
  const n0_4 = c[18];
  const n0_5 = c[19];
  const n0_6 = c[20];
  const n1_0 = c[21];
  const n1_1 = c[22];
  const n1_2 = c[23];
  const n1_3 = c[24];
  const n1_4 = c[25];
  const n1_5 = c[26];
  const n1_6 = c[27];
  const m0_0 = c[54];
  const m0_1 = c[55];
  const m0_2 = c[56];
  const m0_3 = c[57];
  const m0_4 = c[58];
  const m0_5 = c[59];
  const m1_0 = c[60];
  const m1_1 = c[61];
  const m1_2 = c[62];
  const m1_3 = c[63];
  const m1_4 = c[64];
  const m2_0 = c[66];
  const m2_1 = c[67];
  const m2_2 = c[68];
  const m2_3 = c[69];
  const m2_4 = c[70];
  const sign = c[100], off = c[79];
  const on = c[80];
  const lambda = c[83];
  const scale = c[84];
  const inverseWidth = c[85];
  const slope = c[86];
  const enough = c[95];
  const pieces = c[89];
  let x0 = s[0];
  let x1 = s[1];
  let x2 = s[2];
  let e1 = s[3], f1 = s[5], g1 = s[7];
  let e2 = s[4], f2 = s[6], g2 = s[8];
  let u0 = s[9], v0 = s[10];
  let I0 = s[11], S0 = s[12], D0 = s[13], E0 = s[16], F0 = s[59], vs = s[14], vd = s[15];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    const p1 = 3.5 * x1 - 2.25 * e1 + 0.8333333333333334 * f1 - 0.125 * g1;
    const p2 = 3.5 * x2 - 2.25 * e2 + 0.8333333333333334 * f2 - 0.125 * g2;
    let r0 = ((m0_0 * x0 + m0_1 * x1) + m0_2 * x2) + ((m0_3 * u0 + m0_4 * v0) + m0_5 * I0);
    let r1 = ((m1_0 * x0 + m1_1 * p1) + m1_2 * p2) + (m1_3 * u0 + m1_4 * v0);
    let r2 = ((m2_0 * x0 + m2_1 * p1) + m2_2 * p2) + (m2_3 * u0 + m2_4 * v0);
    if (S0 != 0 || D0 != 0) {
      r0 += c[72] * S0 + c[73] * D0;
    }
    let a = ((a0 * r0 + a1 * r1) + a2 * r2) + ((a3 * u + a4 * v) + a5);
    let b = ((b0 * r0 + b1 * r1) + b2 * r2) + ((b3 * u + b4 * v) + b5);
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      s[14] = vs; s[15] = vd;
      evaluate(c, t, 78, s, 14, 18); evaluate(c, t, 78, s, 15, 20);
      J = w[i * 7 + 6] * Math.sqrt(0.5 * (s[19] + s[21]));
      a += w[i * 7 + 0] + a6 * J;
      b += w[i * 7 + 1] + b6 * J;
    }
    I = 3 * (I0 - E0) + F0;
    let settled = 0;
    for (let step = 0; step < 40; step++) {
      vs = a + a6 * I; vd = b + b6 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[18] = vs; evaluate(c, t, 78, s, 18, 18); Fs = s[18]; fs = s[18 + 1]; }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[18] = vd; evaluate(c, t, 78, s, 18, 18); Fd = s[18]; fd = s[18 + 1]; }
      }
      let h = Fs - Fd - I, slopes = a6 * fs - b6 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a6 * fs + b6 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b6 * fd + a6 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b6 - a6) * change;
      if (moved < enough && moved > -enough) { settled = 1; break; }
    }
    if (settled == 0) { s[45] = a; s[46] = b; searched(c, t, 78, 6, 13, s, 9); I = s[47]; s[17] += 1; E0 = I; I0 = I; }
    vs = a + a6 * I; vd = b + b6 * I;
    if (vs > on || vd > on) {
      s[45] = a; s[46] = b; s[47] = I;
      conduct_smooth(c, t, 78, 6, 13, 42, s, 9);
      I = s[11]; S = s[12]; D = s[13]; vs = s[14]; vd = s[15];
    }
    I += J;
    g1 = f1; f1 = e1; e1 = x1;
    g2 = f2; f2 = e2; e2 = x2;
    x0 = ((n0_0 * r0 + n0_1 * r1) + n0_2 * r2) + ((n0_3 * u + n0_4 * v) + n0_5) + n0_6 * I;
    x1 = ((n1_0 * r0 + n1_1 * r1) + n1_2 * r2) + ((n1_3 * u + n1_4 * v) + n1_5) + n1_6 * I;
    x2 = sign * (vs + off);
    if (noisy) {
      x0 += w[i * 7 + 2];
      x1 += w[i * 7 + 3];
    }
    if (S != 0 || D != 0) {
      x0 += c[46] * S + c[47] * D;
      x1 += c[48] * S + c[49] * D;
    }
    output[i] = sign * (vs - vd);
    u0 = u; v0 = v;
    F0 = E0; E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = x1;
  s[2] = x2;
  s[3] = e1; s[5] = f1; s[7] = g1;
  s[4] = e2; s[6] = f2; s[8] = g2;
  s[9] = u0; s[10] = v0;
  s[11] = I0; s[12] = S0; s[13] = D0; s[16] = E0; s[59] = F0;
  if (to > from) { s[14] = vs; s[15] = vd; }
}

function smooth2_xg_d(c: Float64Array, t: Float64Array, w: Float64Array, e: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0, marking = e.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const a4 = c[4];
  const a5 = c[5];
  const a6 = c[6];
  const a7 = c[7];
  const b0 = c[8];
  const b1 = c[9];
  const b2 = c[10];
  const b3 = c[11];
  const b4 = c[12];
  const b5 = c[13];
  const b6 = c[14];
  const b7 = c[15];
  const n0_0 = c[16];
  const n0_1 = c[17];
  const n0_2 = c[18];
  const n0_3 = c[19];
  const n0_4 = c[20];
  const n0_5 = c[21];
  const n0_6 = c[22];
  const n0_7 = c[23];
  const n1_0 = c[24];
  const n1_1 = c[25];
  const n1_2 = c[26];
  const n1_3 = c[27];
  const n1_4 = c[28];
  const n1_5 = c[29];
  const n1_6 = c[30];
  const n1_7 = c[31];
  const n2_0 = c[32];
  const n2_1 = c[33];
  const n2_2 = c[34];
  const n2_3 = c[35];
  const n2_4 = c[36];
  const n2_5 = c[37];
  const n2_6 = c[38];
  const n2_7 = c[39];
  const m0_0 = c[70];
  const m0_1 = c[71];
  const m0_2 = c[72];
  const m0_3 = c[73];
  const m0_4 = c[74];
  const m0_5 = c[75];
  const m0_6 = c[76];
  const m1_0 = c[77];
  const m1_1 = c[78];
  const m1_2 = c[79];
  const m1_3 = c[80];
  const m1_4 = c[81];
  const m1_5 = c[82];
  const m1_6 = c[83];
  const m2_0 = c[84];
  const m2_1 = c[85];
  const m2_2 = c[86];
  const m2_3 = c[87];
  const m2_4 = c[88];
  const m2_5 = c[89];
  const m3_0 = c[91];
  const m3_1 = c[92];
  const m3_2 = c[93];
  const m3_3 = c[94];
  const m3_4 = c[95];
  const m3_5 = c[96];
  const sign = c[128], off = c[107];
  const on = c[108];
  const lambda = c[111];
  const scale = c[112];
  const inverseWidth = c[113];
  const slope = c[114];
  const enough = c[123];
  const pieces = c[117];
  let x0 = s[0];
  let x1 = s[1];
  let x2 = s[2];
  let x3 = s[3];
  let e2 = s[4], f2 = s[6], g2 = s[8];
  let e3 = s[5], f3 = s[7], g3 = s[9];
  let u0 = s[10], v0 = s[11];
  let I0 = s[12], S0 = s[13], D0 = s[14], E0 = s[17], F0 = s[60], vs = s[15], vd = s[16];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    const p2 = 3.5 * x2 - 2.25 * e2 + 0.8333333333333334 * f2 - 0.125 * g2;
    const p3 = 3.5 * x3 - 2.25 * e3 + 0.8333333333333334 * f3 - 0.125 * g3;
    let r0 = ((m0_0 * x0 + m0_1 * x1) + (m0_2 * x2 + m0_3 * x3)) + ((m0_4 * u0 + m0_5 * v0) + m0_6 * I0);
    let r1 = ((m1_0 * x0 + m1_1 * x1) + (m1_2 * x2 + m1_3 * x3)) + ((m1_4 * u0 + m1_5 * v0) + m1_6 * I0);
    let r2 = ((m2_0 * x0 + m2_1 * x1) + m2_2 * p2) + ((m2_3 * p3 + m2_4 * u0) + m2_5 * v0);
    let r3 = ((m3_0 * x0 + m3_1 * x1) + m3_2 * p2) + ((m3_3 * p3 + m3_4 * u0) + m3_5 * v0);
    if (S0 != 0 || D0 != 0) {
      r0 += c[98] * S0 + c[99] * D0;
      r1 += c[100] * S0 + c[101] * D0;
    }
    let a = ((a0 * r0 + a1 * r1) + (a2 * r2 + a3 * r3)) + ((a4 * u + a5 * v) + a6);
    let b = ((b0 * r0 + b1 * r1) + (b2 * r2 + b3 * r3)) + ((b4 * u + b5 * v) + b6);
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      s[15] = vs; s[16] = vd;
      evaluate(c, t, 106, s, 15, 19); evaluate(c, t, 106, s, 16, 21);
      J = w[i * 8 + 7] * Math.sqrt(0.5 * (s[20] + s[22]));
      a += w[i * 8 + 0] + a7 * J;
      b += w[i * 8 + 1] + b7 * J;
    }
    I = 3 * (I0 - E0) + F0;
    let settled = 0;
    for (let step = 0; step < 40; step++) {
      vs = a + a7 * I; vd = b + b7 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[19] = vs; evaluate(c, t, 106, s, 19, 19); Fs = s[19]; fs = s[19 + 1]; }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[19] = vd; evaluate(c, t, 106, s, 19, 19); Fd = s[19]; fd = s[19 + 1]; }
      }
      let h = Fs - Fd - I, slopes = a7 * fs - b7 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a7 * fs + b7 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b7 * fd + a7 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b7 - a7) * change;
      if (moved < enough && moved > -enough) { settled = 1; break; }
    }
    if (settled == 0) { s[46] = a; s[47] = b; searched(c, t, 106, 7, 15, s, 10); I = s[48]; s[18] += 1; E0 = I; I0 = I; }
    vs = a + a7 * I; vd = b + b7 * I;
    if (vs > on || vd > on) {
      s[46] = a; s[47] = b; s[48] = I;
      conduct_smooth(c, t, 106, 7, 15, 56, s, 10);
      I = s[12]; S = s[13]; D = s[14]; vs = s[15]; vd = s[16];
    }
    I += J;
    g2 = f2; f2 = e2; e2 = x2;
    g3 = f3; f3 = e3; e3 = x3;
    x0 = ((n0_0 * r0 + n0_1 * r1) + (n0_2 * r2 + n0_3 * r3)) + ((n0_4 * u + n0_5 * v) + n0_6) + n0_7 * I;
    x1 = ((n1_0 * r0 + n1_1 * r1) + (n1_2 * r2 + n1_3 * r3)) + ((n1_4 * u + n1_5 * v) + n1_6) + n1_7 * I;
    x2 = ((n2_0 * r0 + n2_1 * r1) + (n2_2 * r2 + n2_3 * r3)) + ((n2_4 * u + n2_5 * v) + n2_6) + n2_7 * I;
    x3 = sign * (vs + off);
    if (noisy) {
      x0 += w[i * 8 + 2];
      x1 += w[i * 8 + 3];
      x2 += w[i * 8 + 4];
    }
    if (S != 0 || D != 0) {
      x0 += c[60] * S + c[61] * D;
      x1 += c[62] * S + c[63] * D;
      x2 += c[64] * S + c[65] * D;
    }
    output[i] = sign * (vs - vd);
    u0 = u; v0 = v;
    F0 = E0; E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = x1;
  s[2] = x2;
  s[3] = x3;
  s[4] = e2; s[6] = f2; s[8] = g2;
  s[5] = e3; s[7] = f3; s[9] = g3;
  s[10] = u0; s[11] = v0;
  s[12] = I0; s[13] = S0; s[14] = D0; s[17] = E0; s[60] = F0;
  if (to > from) { s[15] = vs; s[16] = vd; }
}

function smooth0_gm_d(c: Float64Array, t: Float64Array, w: Float64Array, e: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0, marking = e.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const a4 = c[4];
  const a5 = c[5];
  const b0 = c[6];
  const b1 = c[7];
  const b2 = c[8];
  const b3 = c[9];
  const b4 = c[10];
  const b5 = c[11];
  const m0_0 = c[40];
  const m0_1 = c[41];
  const m0_2 = c[42];
  const m0_3 = c[43];
  const m1_0 = c[45];
  const m1_1 = c[46];
  const m1_2 = c[47];
  const m1_3 = c[48];
  const sign = c[76], off = c[55];
  const on = c[56];
  const lambda = c[59];
  const scale = c[60];
  const inverseWidth = c[61];
  const slope = c[62];
  const enough = c[71];
  const pieces = c[65];
  let x0 = s[0];
  let x1 = s[1];
  let e0 = s[2], f0 = s[4], g0 = s[6];
  let e1 = s[3], f1 = s[5], g1 = s[7];
  let u0 = s[8], v0 = s[9];
  let I0 = s[10], S0 = s[11], D0 = s[12], E0 = s[15], F0 = s[58], vs = s[13], vd = s[14];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    const p0 = 3.5 * x0 - 2.25 * e0 + 0.8333333333333334 * f0 - 0.125 * g0;
    const p1 = 3.5 * x1 - 2.25 * e1 + 0.8333333333333334 * f1 - 0.125 * g1;
    let r0 = (m0_0 * p0 + m0_1 * p1) + (m0_2 * u0 + m0_3 * v0);
    let r1 = (m1_0 * p0 + m1_1 * p1) + (m1_2 * u0 + m1_3 * v0);
    let a = ((a0 * r0 + a1 * r1) + a2 * u) + (a3 * v + a4);
    let b = ((b0 * r0 + b1 * r1) + b2 * u) + (b3 * v + b4);
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      s[13] = vs; s[14] = vd;
      evaluate(c, t, 54, s, 13, 17); evaluate(c, t, 54, s, 14, 19);
      J = w[i * 6 + 5] * Math.sqrt(0.5 * (s[18] + s[20]));
      a += w[i * 6 + 0] + a5 * J;
      b += w[i * 6 + 1] + b5 * J;
    }
    I = 3 * (I0 - E0) + F0;
    let settled = 0;
    for (let step = 0; step < 40; step++) {
      vs = a + a5 * I; vd = b + b5 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[17] = vs; evaluate(c, t, 54, s, 17, 17); Fs = s[17]; fs = s[17 + 1]; }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[17] = vd; evaluate(c, t, 54, s, 17, 17); Fd = s[17]; fd = s[17 + 1]; }
      }
      let h = Fs - Fd - I, slopes = a5 * fs - b5 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a5 * fs + b5 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b5 * fd + a5 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b5 - a5) * change;
      if (moved < enough && moved > -enough) { settled = 1; break; }
    }
    if (settled == 0) { s[44] = a; s[45] = b; searched(c, t, 54, 5, 11, s, 8); I = s[46]; s[16] += 1; E0 = I; I0 = I; }
    vs = a + a5 * I; vd = b + b5 * I;
    if (vs > on || vd > on) {
      s[44] = a; s[45] = b; s[46] = I;
      conduct_smooth(c, t, 54, 5, 11, 30, s, 8);
      I = s[10]; S = s[11]; D = s[12]; vs = s[13]; vd = s[14];
    }
    I += J;
    g0 = f0; f0 = e0; e0 = x0;
    g1 = f1; f1 = e1; e1 = x1;
    x0 = sign * (vs + off);
    x1 = sign * (vd + off);
    output[i] = sign * (vs - vd);
    u0 = u; v0 = v;
    F0 = E0; E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = x1;
  s[2] = e0; s[4] = f0; s[6] = g0;
  s[3] = e1; s[5] = f1; s[7] = g1;
  s[8] = u0; s[9] = v0;
  s[10] = I0; s[11] = S0; s[12] = D0; s[15] = E0; s[58] = F0;
  if (to > from) { s[13] = vs; s[14] = vd; }
}

function smooth1_gm_d(c: Float64Array, t: Float64Array, w: Float64Array, e: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0, marking = e.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const a4 = c[4];
  const a5 = c[5];
  const a6 = c[6];
  const b0 = c[7];
  const b1 = c[8];
  const b2 = c[9];
  const b3 = c[10];
  const b4 = c[11];
  const b5 = c[12];
  const b6 = c[13];
  const n0_0 = c[14];
  const n0_1 = c[15];
  const n0_2 = c[16];
  const n0_3 = c[17];
  const n0_4 = c[18];
  const n0_5 = c[19];
  const n0_6 = c[20];
  const m0_0 = c[54];
  const m0_1 = c[55];
  const m0_2 = c[56];
  const m0_3 = c[57];
  const m0_4 = c[58];
  const m0_5 = c[59];
  const m1_0 = c[60];
  const m1_1 = c[61];
  const m1_2 = c[62];
  const m1_3 = c[63];
  const m1_4 = c[64];
  const m2_0 = c[66];
  const m2_1 = c[67];
  const m2_2 = c[68];
  const m2_3 = c[69];
  const m2_4 = c[70];
  const sign = c[100], off = c[79];
  const on = c[80];
  const lambda = c[83];
  const scale = c[84];
  const inverseWidth = c[85];
  const slope = c[86];
  const enough = c[95];
  const pieces = c[89];
  let x0 = s[0];
  let x1 = s[1];
  let x2 = s[2];
  let e1 = s[3], f1 = s[5], g1 = s[7];
  let e2 = s[4], f2 = s[6], g2 = s[8];
  let u0 = s[9], v0 = s[10];
  let I0 = s[11], S0 = s[12], D0 = s[13], E0 = s[16], F0 = s[59], vs = s[14], vd = s[15];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    const p1 = 3.5 * x1 - 2.25 * e1 + 0.8333333333333334 * f1 - 0.125 * g1;
    const p2 = 3.5 * x2 - 2.25 * e2 + 0.8333333333333334 * f2 - 0.125 * g2;
    let r0 = ((m0_0 * x0 + m0_1 * x1) + m0_2 * x2) + ((m0_3 * u0 + m0_4 * v0) + m0_5 * I0);
    let r1 = ((m1_0 * x0 + m1_1 * p1) + m1_2 * p2) + (m1_3 * u0 + m1_4 * v0);
    let r2 = ((m2_0 * x0 + m2_1 * p1) + m2_2 * p2) + (m2_3 * u0 + m2_4 * v0);
    if (S0 != 0 || D0 != 0) {
      r0 += c[72] * S0 + c[73] * D0;
    }
    let a = ((a0 * r0 + a1 * r1) + a2 * r2) + ((a3 * u + a4 * v) + a5);
    let b = ((b0 * r0 + b1 * r1) + b2 * r2) + ((b3 * u + b4 * v) + b5);
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      s[14] = vs; s[15] = vd;
      evaluate(c, t, 78, s, 14, 18); evaluate(c, t, 78, s, 15, 20);
      J = w[i * 7 + 6] * Math.sqrt(0.5 * (s[19] + s[21]));
      a += w[i * 7 + 0] + a6 * J;
      b += w[i * 7 + 1] + b6 * J;
    }
    I = 3 * (I0 - E0) + F0;
    let settled = 0;
    for (let step = 0; step < 40; step++) {
      vs = a + a6 * I; vd = b + b6 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[18] = vs; evaluate(c, t, 78, s, 18, 18); Fs = s[18]; fs = s[18 + 1]; }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[18] = vd; evaluate(c, t, 78, s, 18, 18); Fd = s[18]; fd = s[18 + 1]; }
      }
      let h = Fs - Fd - I, slopes = a6 * fs - b6 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a6 * fs + b6 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b6 * fd + a6 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b6 - a6) * change;
      if (moved < enough && moved > -enough) { settled = 1; break; }
    }
    if (settled == 0) { s[45] = a; s[46] = b; searched(c, t, 78, 6, 13, s, 9); I = s[47]; s[17] += 1; E0 = I; I0 = I; }
    vs = a + a6 * I; vd = b + b6 * I;
    if (vs > on || vd > on) {
      s[45] = a; s[46] = b; s[47] = I;
      conduct_smooth(c, t, 78, 6, 13, 42, s, 9);
      I = s[11]; S = s[12]; D = s[13]; vs = s[14]; vd = s[15];
    }
    I += J;
    g1 = f1; f1 = e1; e1 = x1;
    g2 = f2; f2 = e2; e2 = x2;
    x0 = ((n0_0 * r0 + n0_1 * r1) + n0_2 * r2) + ((n0_3 * u + n0_4 * v) + n0_5) + n0_6 * I;
    x1 = sign * (vs + off);
    x2 = sign * (vd + off);
    if (noisy) {
      x0 += w[i * 7 + 2];
    }
    if (S != 0 || D != 0) {
      x0 += c[46] * S + c[47] * D;
    }
    output[i] = sign * (vs - vd);
    u0 = u; v0 = v;
    F0 = E0; E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = x1;
  s[2] = x2;
  s[3] = e1; s[5] = f1; s[7] = g1;
  s[4] = e2; s[6] = f2; s[8] = g2;
  s[9] = u0; s[10] = v0;
  s[11] = I0; s[12] = S0; s[13] = D0; s[16] = E0; s[59] = F0;
  if (to > from) { s[14] = vs; s[15] = vd; }
}

function smooth0__x(c: Float64Array, t: Float64Array, w: Float64Array, e: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0, marking = e.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const b0 = c[4];
  const b1 = c[5];
  const b2 = c[6];
  const b3 = c[7];
  const y0 = c[8];
  const y1 = c[9];
  const y2 = c[10];
  const y3 = c[11];
  const sign = c[40], off = c[19];
  const on = c[20];
  const lambda = c[23];
  const scale = c[24];
  const inverseWidth = c[25];
  const slope = c[26];
  const enough = c[35];
  const pieces = c[29];
  let I0 = s[2], S0 = s[3], D0 = s[4], E0 = s[7], F0 = s[50], vs = s[5], vd = s[6];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    let a = (a0 * u + a1 * v) + a2;
    let b = (b0 * u + b1 * v) + b2;
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      s[5] = vs; s[6] = vd;
      evaluate(c, t, 18, s, 5, 9); evaluate(c, t, 18, s, 6, 11);
      J = w[i * 4 + 3] * Math.sqrt(0.5 * (s[10] + s[12]));
      a += w[i * 4 + 0] + a3 * J;
      b += w[i * 4 + 1] + b3 * J;
    }
    I = 3 * (I0 - E0) + F0;
    let settled = 0;
    for (let step = 0; step < 40; step++) {
      vs = a + a3 * I; vd = b + b3 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[9] = vs; evaluate(c, t, 18, s, 9, 9); Fs = s[9]; fs = s[9 + 1]; }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[9] = vd; evaluate(c, t, 18, s, 9, 9); Fd = s[9]; fd = s[9 + 1]; }
      }
      let h = Fs - Fd - I, slopes = a3 * fs - b3 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a3 * fs + b3 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b3 * fd + a3 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b3 - a3) * change;
      if (moved < enough && moved > -enough) { settled = 1; break; }
    }
    if (settled == 0) { s[36] = a; s[37] = b; searched(c, t, 18, 3, 7, s, 0); I = s[38]; s[8] += 1; E0 = I; I0 = I; }
    vs = a + a3 * I; vd = b + b3 * I;
    if (vs > on || vd > on) {
      s[36] = a; s[37] = b; s[38] = I;
      conduct_smooth(c, t, 18, 3, 7, 12, s, 0);
      I = s[2]; S = s[3]; D = s[4]; vs = s[5]; vd = s[6];
    }
    I += J;
    let y = 0;
    if (noisy) {
      y = w[i * 4 + 2];
    }
    if (S != 0 || D != 0) {
      y += c[16] * S + c[17] * D;
    }
    output[i] = y + (y0 * u + y1 * v) + y2 + y3 * I;
    F0 = E0; E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[2] = I0; s[3] = S0; s[4] = D0; s[7] = E0; s[50] = F0;
  if (to > from) { s[5] = vs; s[6] = vd; }
}

function smooth1__x(c: Float64Array, t: Float64Array, w: Float64Array, e: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0, marking = e.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const a4 = c[4];
  const b0 = c[5];
  const b1 = c[6];
  const b2 = c[7];
  const b3 = c[8];
  const b4 = c[9];
  const n0_0 = c[10];
  const n0_1 = c[11];
  const n0_2 = c[12];
  const n0_3 = c[13];
  const n0_4 = c[14];
  const y0 = c[15];
  const y1 = c[16];
  const y2 = c[17];
  const y3 = c[18];
  const y4 = c[19];
  const m0_0 = c[28];
  const m0_1 = c[29];
  const m0_2 = c[30];
  const m0_3 = c[31];
  const sign = c[56], off = c[35];
  const on = c[36];
  const lambda = c[39];
  const scale = c[40];
  const inverseWidth = c[41];
  const slope = c[42];
  const enough = c[51];
  const pieces = c[45];
  let x0 = s[0];
  let u0 = s[1], v0 = s[2];
  let I0 = s[3], S0 = s[4], D0 = s[5], E0 = s[8], F0 = s[51], vs = s[6], vd = s[7];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    let r0 = (m0_0 * x0 + m0_1 * u0) + (m0_2 * v0 + m0_3 * I0);
    if (S0 != 0 || D0 != 0) {
      r0 += c[32] * S0 + c[33] * D0;
    }
    let a = (a0 * r0 + a1 * u) + (a2 * v + a3);
    let b = (b0 * r0 + b1 * u) + (b2 * v + b3);
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      s[6] = vs; s[7] = vd;
      evaluate(c, t, 34, s, 6, 10); evaluate(c, t, 34, s, 7, 12);
      J = w[i * 5 + 4] * Math.sqrt(0.5 * (s[11] + s[13]));
      a += w[i * 5 + 0] + a4 * J;
      b += w[i * 5 + 1] + b4 * J;
    }
    I = 3 * (I0 - E0) + F0;
    let settled = 0;
    for (let step = 0; step < 40; step++) {
      vs = a + a4 * I; vd = b + b4 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[10] = vs; evaluate(c, t, 34, s, 10, 10); Fs = s[10]; fs = s[10 + 1]; }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[10] = vd; evaluate(c, t, 34, s, 10, 10); Fd = s[10]; fd = s[10 + 1]; }
      }
      let h = Fs - Fd - I, slopes = a4 * fs - b4 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a4 * fs + b4 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b4 * fd + a4 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b4 - a4) * change;
      if (moved < enough && moved > -enough) { settled = 1; break; }
    }
    if (settled == 0) { s[37] = a; s[38] = b; searched(c, t, 34, 4, 9, s, 1); I = s[39]; s[9] += 1; E0 = I; I0 = I; }
    vs = a + a4 * I; vd = b + b4 * I;
    if (vs > on || vd > on) {
      s[37] = a; s[38] = b; s[39] = I;
      conduct_smooth(c, t, 34, 4, 9, 20, s, 1);
      I = s[3]; S = s[4]; D = s[5]; vs = s[6]; vd = s[7];
    }
    I += J;
    x0 = (n0_0 * r0 + n0_1 * u) + (n0_2 * v + n0_3) + n0_4 * I;
    let y = 0;
    if (noisy) {
      x0 += w[i * 5 + 2];
      y = w[i * 5 + 3];
    }
    if (S != 0 || D != 0) {
      x0 += c[24] * S + c[25] * D;
      y += c[26] * S + c[27] * D;
    }
    output[i] = y + (y0 * x0 + y1 * u) + (y2 * v + y3) + y4 * I;
    u0 = u; v0 = v;
    F0 = E0; E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = u0; s[2] = v0;
  s[3] = I0; s[4] = S0; s[5] = D0; s[8] = E0; s[51] = F0;
  if (to > from) { s[6] = vs; s[7] = vd; }
}

function smooth2__x(c: Float64Array, t: Float64Array, w: Float64Array, e: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0, marking = e.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const a4 = c[4];
  const a5 = c[5];
  const b0 = c[6];
  const b1 = c[7];
  const b2 = c[8];
  const b3 = c[9];
  const b4 = c[10];
  const b5 = c[11];
  const n0_0 = c[12];
  const n0_1 = c[13];
  const n0_2 = c[14];
  const n0_3 = c[15];
  const n0_4 = c[16];
  const n0_5 = c[17];
  const n1_0 = c[18];
  const n1_1 = c[19];
  const n1_2 = c[20];
  const n1_3 = c[21];
  const n1_4 = c[22];
  const n1_5 = c[23];
  const y0 = c[24];
  const y1 = c[25];
  const y2 = c[26];
  const y3 = c[27];
  const y4 = c[28];
  const y5 = c[29];
  const m0_0 = c[40];
  const m0_1 = c[41];
  const m0_2 = c[42];
  const m0_3 = c[43];
  const m0_4 = c[44];
  const m1_0 = c[45];
  const m1_1 = c[46];
  const m1_2 = c[47];
  const m1_3 = c[48];
  const m1_4 = c[49];
  const sign = c[76], off = c[55];
  const on = c[56];
  const lambda = c[59];
  const scale = c[60];
  const inverseWidth = c[61];
  const slope = c[62];
  const enough = c[71];
  const pieces = c[65];
  let x0 = s[0];
  let x1 = s[1];
  let u0 = s[2], v0 = s[3];
  let I0 = s[4], S0 = s[5], D0 = s[6], E0 = s[9], F0 = s[52], vs = s[7], vd = s[8];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    let r0 = ((m0_0 * x0 + m0_1 * x1) + m0_2 * u0) + (m0_3 * v0 + m0_4 * I0);
    let r1 = ((m1_0 * x0 + m1_1 * x1) + m1_2 * u0) + (m1_3 * v0 + m1_4 * I0);
    if (S0 != 0 || D0 != 0) {
      r0 += c[50] * S0 + c[51] * D0;
      r1 += c[52] * S0 + c[53] * D0;
    }
    let a = ((a0 * r0 + a1 * r1) + a2 * u) + (a3 * v + a4);
    let b = ((b0 * r0 + b1 * r1) + b2 * u) + (b3 * v + b4);
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      s[7] = vs; s[8] = vd;
      evaluate(c, t, 54, s, 7, 11); evaluate(c, t, 54, s, 8, 13);
      J = w[i * 6 + 5] * Math.sqrt(0.5 * (s[12] + s[14]));
      a += w[i * 6 + 0] + a5 * J;
      b += w[i * 6 + 1] + b5 * J;
    }
    I = 3 * (I0 - E0) + F0;
    let settled = 0;
    for (let step = 0; step < 40; step++) {
      vs = a + a5 * I; vd = b + b5 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[11] = vs; evaluate(c, t, 54, s, 11, 11); Fs = s[11]; fs = s[11 + 1]; }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[11] = vd; evaluate(c, t, 54, s, 11, 11); Fd = s[11]; fd = s[11 + 1]; }
      }
      let h = Fs - Fd - I, slopes = a5 * fs - b5 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a5 * fs + b5 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b5 * fd + a5 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b5 - a5) * change;
      if (moved < enough && moved > -enough) { settled = 1; break; }
    }
    if (settled == 0) { s[38] = a; s[39] = b; searched(c, t, 54, 5, 11, s, 2); I = s[40]; s[10] += 1; E0 = I; I0 = I; }
    vs = a + a5 * I; vd = b + b5 * I;
    if (vs > on || vd > on) {
      s[38] = a; s[39] = b; s[40] = I;
      conduct_smooth(c, t, 54, 5, 11, 30, s, 2);
      I = s[4]; S = s[5]; D = s[6]; vs = s[7]; vd = s[8];
    }
    I += J;
    x0 = ((n0_0 * r0 + n0_1 * r1) + n0_2 * u) + (n0_3 * v + n0_4) + n0_5 * I;
    x1 = ((n1_0 * r0 + n1_1 * r1) + n1_2 * u) + (n1_3 * v + n1_4) + n1_5 * I;
    let y = 0;
    if (noisy) {
      x0 += w[i * 6 + 2];
      x1 += w[i * 6 + 3];
      y = w[i * 6 + 4];
    }
    if (S != 0 || D != 0) {
      x0 += c[34] * S + c[35] * D;
      x1 += c[36] * S + c[37] * D;
      y += c[38] * S + c[39] * D;
    }
    output[i] = y + ((y0 * x0 + y1 * x1) + y2 * u) + (y3 * v + y4) + y5 * I;
    u0 = u; v0 = v;
    F0 = E0; E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = x1;
  s[2] = u0; s[3] = v0;
  s[4] = I0; s[5] = S0; s[6] = D0; s[9] = E0; s[52] = F0;
  if (to > from) { s[7] = vs; s[8] = vd; }
}

function smooth3__x(c: Float64Array, t: Float64Array, w: Float64Array, e: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0, marking = e.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const a4 = c[4];
  const a5 = c[5];
  const a6 = c[6];
  const b0 = c[7];
  const b1 = c[8];
  const b2 = c[9];
  const b3 = c[10];
  const b4 = c[11];
  const b5 = c[12];
  const b6 = c[13];
  const n0_0 = c[14];
  const n0_1 = c[15];
  const n0_2 = c[16];
  const n0_3 = c[17];
  const n0_4 = c[18];
  const n0_5 = c[19];
  const n0_6 = c[20];
  const n1_0 = c[21];
  const n1_1 = c[22];
  const n1_2 = c[23];
  const n1_3 = c[24];
  const n1_4 = c[25];
  const n1_5 = c[26];
  const n1_6 = c[27];
  const n2_0 = c[28];
  const n2_1 = c[29];
  const n2_2 = c[30];
  const n2_3 = c[31];
  const n2_4 = c[32];
  const n2_5 = c[33];
  const n2_6 = c[34];
  const y0 = c[35];
  const y1 = c[36];
  const y2 = c[37];
  const y3 = c[38];
  const y4 = c[39];
  const y5 = c[40];
  const y6 = c[41];
  const m0_0 = c[54];
  const m0_1 = c[55];
  const m0_2 = c[56];
  const m0_3 = c[57];
  const m0_4 = c[58];
  const m0_5 = c[59];
  const m1_0 = c[60];
  const m1_1 = c[61];
  const m1_2 = c[62];
  const m1_3 = c[63];
  const m1_4 = c[64];
  const m1_5 = c[65];
  const m2_0 = c[66];
  const m2_1 = c[67];
  const m2_2 = c[68];
  const m2_3 = c[69];
  const m2_4 = c[70];
  const m2_5 = c[71];
  const sign = c[100], off = c[79];
  const on = c[80];
  const lambda = c[83];
  const scale = c[84];
  const inverseWidth = c[85];
  const slope = c[86];
  const enough = c[95];
  const pieces = c[89];
  let x0 = s[0];
  let x1 = s[1];
  let x2 = s[2];
  let u0 = s[3], v0 = s[4];
  let I0 = s[5], S0 = s[6], D0 = s[7], E0 = s[10], F0 = s[53], vs = s[8], vd = s[9];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    let r0 = ((m0_0 * x0 + m0_1 * x1) + m0_2 * x2) + ((m0_3 * u0 + m0_4 * v0) + m0_5 * I0);
    let r1 = ((m1_0 * x0 + m1_1 * x1) + m1_2 * x2) + ((m1_3 * u0 + m1_4 * v0) + m1_5 * I0);
    let r2 = ((m2_0 * x0 + m2_1 * x1) + m2_2 * x2) + ((m2_3 * u0 + m2_4 * v0) + m2_5 * I0);
    if (S0 != 0 || D0 != 0) {
      r0 += c[72] * S0 + c[73] * D0;
      r1 += c[74] * S0 + c[75] * D0;
      r2 += c[76] * S0 + c[77] * D0;
    }
    let a = ((a0 * r0 + a1 * r1) + a2 * r2) + ((a3 * u + a4 * v) + a5);
    let b = ((b0 * r0 + b1 * r1) + b2 * r2) + ((b3 * u + b4 * v) + b5);
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      s[8] = vs; s[9] = vd;
      evaluate(c, t, 78, s, 8, 12); evaluate(c, t, 78, s, 9, 14);
      J = w[i * 7 + 6] * Math.sqrt(0.5 * (s[13] + s[15]));
      a += w[i * 7 + 0] + a6 * J;
      b += w[i * 7 + 1] + b6 * J;
    }
    I = 3 * (I0 - E0) + F0;
    let settled = 0;
    for (let step = 0; step < 40; step++) {
      vs = a + a6 * I; vd = b + b6 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[12] = vs; evaluate(c, t, 78, s, 12, 12); Fs = s[12]; fs = s[12 + 1]; }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[12] = vd; evaluate(c, t, 78, s, 12, 12); Fd = s[12]; fd = s[12 + 1]; }
      }
      let h = Fs - Fd - I, slopes = a6 * fs - b6 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a6 * fs + b6 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b6 * fd + a6 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b6 - a6) * change;
      if (moved < enough && moved > -enough) { settled = 1; break; }
    }
    if (settled == 0) { s[39] = a; s[40] = b; searched(c, t, 78, 6, 13, s, 3); I = s[41]; s[11] += 1; E0 = I; I0 = I; }
    vs = a + a6 * I; vd = b + b6 * I;
    if (vs > on || vd > on) {
      s[39] = a; s[40] = b; s[41] = I;
      conduct_smooth(c, t, 78, 6, 13, 42, s, 3);
      I = s[5]; S = s[6]; D = s[7]; vs = s[8]; vd = s[9];
    }
    I += J;
    x0 = ((n0_0 * r0 + n0_1 * r1) + n0_2 * r2) + ((n0_3 * u + n0_4 * v) + n0_5) + n0_6 * I;
    x1 = ((n1_0 * r0 + n1_1 * r1) + n1_2 * r2) + ((n1_3 * u + n1_4 * v) + n1_5) + n1_6 * I;
    x2 = ((n2_0 * r0 + n2_1 * r1) + n2_2 * r2) + ((n2_3 * u + n2_4 * v) + n2_5) + n2_6 * I;
    let y = 0;
    if (noisy) {
      x0 += w[i * 7 + 2];
      x1 += w[i * 7 + 3];
      x2 += w[i * 7 + 4];
      y = w[i * 7 + 5];
    }
    if (S != 0 || D != 0) {
      x0 += c[46] * S + c[47] * D;
      x1 += c[48] * S + c[49] * D;
      x2 += c[50] * S + c[51] * D;
      y += c[52] * S + c[53] * D;
    }
    output[i] = y + ((y0 * x0 + y1 * x1) + y2 * x2) + ((y3 * u + y4 * v) + y5) + y6 * I;
    u0 = u; v0 = v;
    F0 = E0; E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = x1;
  s[2] = x2;
  s[3] = u0; s[4] = v0;
  s[5] = I0; s[6] = S0; s[7] = D0; s[10] = E0; s[53] = F0;
  if (to > from) { s[8] = vs; s[9] = vd; }
}

function smooth0_xx_x(c: Float64Array, t: Float64Array, w: Float64Array, e: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0, marking = e.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const a4 = c[4];
  const a5 = c[5];
  const b0 = c[6];
  const b1 = c[7];
  const b2 = c[8];
  const b3 = c[9];
  const b4 = c[10];
  const b5 = c[11];
  const n0_0 = c[12];
  const n0_1 = c[13];
  const n0_2 = c[14];
  const n0_3 = c[15];
  const n0_4 = c[16];
  const n0_5 = c[17];
  const n1_0 = c[18];
  const n1_1 = c[19];
  const n1_2 = c[20];
  const n1_3 = c[21];
  const n1_4 = c[22];
  const n1_5 = c[23];
  const y0 = c[24];
  const y1 = c[25];
  const y2 = c[26];
  const y3 = c[27];
  const y4 = c[28];
  const y5 = c[29];
  const m0_0 = c[40];
  const m0_1 = c[41];
  const m0_2 = c[42];
  const m0_3 = c[43];
  const m1_0 = c[45];
  const m1_1 = c[46];
  const m1_2 = c[47];
  const m1_3 = c[48];
  const sign = c[76], off = c[55];
  const on = c[56];
  const lambda = c[59];
  const scale = c[60];
  const inverseWidth = c[61];
  const slope = c[62];
  const enough = c[71];
  const pieces = c[65];
  let x0 = s[0];
  let x1 = s[1];
  let e0 = s[2], f0 = s[4], g0 = s[6];
  let e1 = s[3], f1 = s[5], g1 = s[7];
  let u0 = s[8], v0 = s[9];
  let I0 = s[10], S0 = s[11], D0 = s[12], E0 = s[15], F0 = s[58], vs = s[13], vd = s[14];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    const p0 = 3.5 * x0 - 2.25 * e0 + 0.8333333333333334 * f0 - 0.125 * g0;
    const p1 = 3.5 * x1 - 2.25 * e1 + 0.8333333333333334 * f1 - 0.125 * g1;
    let r0 = (m0_0 * p0 + m0_1 * p1) + (m0_2 * u0 + m0_3 * v0);
    let r1 = (m1_0 * p0 + m1_1 * p1) + (m1_2 * u0 + m1_3 * v0);
    let a = ((a0 * r0 + a1 * r1) + a2 * u) + (a3 * v + a4);
    let b = ((b0 * r0 + b1 * r1) + b2 * u) + (b3 * v + b4);
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      s[13] = vs; s[14] = vd;
      evaluate(c, t, 54, s, 13, 17); evaluate(c, t, 54, s, 14, 19);
      J = w[i * 6 + 5] * Math.sqrt(0.5 * (s[18] + s[20]));
      a += w[i * 6 + 0] + a5 * J;
      b += w[i * 6 + 1] + b5 * J;
    }
    I = 3 * (I0 - E0) + F0;
    let settled = 0;
    for (let step = 0; step < 40; step++) {
      vs = a + a5 * I; vd = b + b5 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[17] = vs; evaluate(c, t, 54, s, 17, 17); Fs = s[17]; fs = s[17 + 1]; }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[17] = vd; evaluate(c, t, 54, s, 17, 17); Fd = s[17]; fd = s[17 + 1]; }
      }
      let h = Fs - Fd - I, slopes = a5 * fs - b5 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a5 * fs + b5 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b5 * fd + a5 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b5 - a5) * change;
      if (moved < enough && moved > -enough) { settled = 1; break; }
    }
    if (settled == 0) { s[44] = a; s[45] = b; searched(c, t, 54, 5, 11, s, 8); I = s[46]; s[16] += 1; E0 = I; I0 = I; }
    vs = a + a5 * I; vd = b + b5 * I;
    if (vs > on || vd > on) {
      s[44] = a; s[45] = b; s[46] = I;
      conduct_smooth(c, t, 54, 5, 11, 30, s, 8);
      I = s[10]; S = s[11]; D = s[12]; vs = s[13]; vd = s[14];
    }
    I += J;
    g0 = f0; f0 = e0; e0 = x0;
    g1 = f1; f1 = e1; e1 = x1;
    x0 = ((n0_0 * r0 + n0_1 * r1) + n0_2 * u) + (n0_3 * v + n0_4) + n0_5 * I;
    x1 = ((n1_0 * r0 + n1_1 * r1) + n1_2 * u) + (n1_3 * v + n1_4) + n1_5 * I;
    let y = 0;
    if (noisy) {
      x0 += w[i * 6 + 2];
      x1 += w[i * 6 + 3];
      y = w[i * 6 + 4];
    }
    if (S != 0 || D != 0) {
      x0 += c[34] * S + c[35] * D;
      x1 += c[36] * S + c[37] * D;
      y += c[38] * S + c[39] * D;
    }
    output[i] = y + ((y0 * x0 + y1 * x1) + y2 * u) + (y3 * v + y4) + y5 * I;
    u0 = u; v0 = v;
    F0 = E0; E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = x1;
  s[2] = e0; s[4] = f0; s[6] = g0;
  s[3] = e1; s[5] = f1; s[7] = g1;
  s[8] = u0; s[9] = v0;
  s[10] = I0; s[11] = S0; s[12] = D0; s[15] = E0; s[58] = F0;
  if (to > from) { s[13] = vs; s[14] = vd; }
}

function smooth1_xx_x(c: Float64Array, t: Float64Array, w: Float64Array, e: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0, marking = e.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const a4 = c[4];
  const a5 = c[5];
  const a6 = c[6];
  const b0 = c[7];
  const b1 = c[8];
  const b2 = c[9];
  const b3 = c[10];
  const b4 = c[11];
  const b5 = c[12];
  const b6 = c[13];
  const n0_0 = c[14];
  const n0_1 = c[15];
  const n0_2 = c[16];
  const n0_3 = c[17];
  const n0_4 = c[18];
  const n0_5 = c[19];
  const n0_6 = c[20];
  const n1_0 = c[21];
  const n1_1 = c[22];
  const n1_2 = c[23];
  const n1_3 = c[24];
  const n1_4 = c[25];
  const n1_5 = c[26];
  const n1_6 = c[27];
  const n2_0 = c[28];
  const n2_1 = c[29];
  const n2_2 = c[30];
  const n2_3 = c[31];
  const n2_4 = c[32];
  const n2_5 = c[33];
  const n2_6 = c[34];
  const y0 = c[35];
  const y1 = c[36];
  const y2 = c[37];
  const y3 = c[38];
  const y4 = c[39];
  const y5 = c[40];
  const y6 = c[41];
  const m0_0 = c[54];
  const m0_1 = c[55];
  const m0_2 = c[56];
  const m0_3 = c[57];
  const m0_4 = c[58];
  const m0_5 = c[59];
  const m1_0 = c[60];
  const m1_1 = c[61];
  const m1_2 = c[62];
  const m1_3 = c[63];
  const m1_4 = c[64];
  const m2_0 = c[66];
  const m2_1 = c[67];
  const m2_2 = c[68];
  const m2_3 = c[69];
  const m2_4 = c[70];
  const sign = c[100], off = c[79];
  const on = c[80];
  const lambda = c[83];
  const scale = c[84];
  const inverseWidth = c[85];
  const slope = c[86];
  const enough = c[95];
  const pieces = c[89];
  let x0 = s[0];
  let x1 = s[1];
  let x2 = s[2];
  let e1 = s[3], f1 = s[5], g1 = s[7];
  let e2 = s[4], f2 = s[6], g2 = s[8];
  let u0 = s[9], v0 = s[10];
  let I0 = s[11], S0 = s[12], D0 = s[13], E0 = s[16], F0 = s[59], vs = s[14], vd = s[15];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    const p1 = 3.5 * x1 - 2.25 * e1 + 0.8333333333333334 * f1 - 0.125 * g1;
    const p2 = 3.5 * x2 - 2.25 * e2 + 0.8333333333333334 * f2 - 0.125 * g2;
    let r0 = ((m0_0 * x0 + m0_1 * x1) + m0_2 * x2) + ((m0_3 * u0 + m0_4 * v0) + m0_5 * I0);
    let r1 = ((m1_0 * x0 + m1_1 * p1) + m1_2 * p2) + (m1_3 * u0 + m1_4 * v0);
    let r2 = ((m2_0 * x0 + m2_1 * p1) + m2_2 * p2) + (m2_3 * u0 + m2_4 * v0);
    if (S0 != 0 || D0 != 0) {
      r0 += c[72] * S0 + c[73] * D0;
    }
    let a = ((a0 * r0 + a1 * r1) + a2 * r2) + ((a3 * u + a4 * v) + a5);
    let b = ((b0 * r0 + b1 * r1) + b2 * r2) + ((b3 * u + b4 * v) + b5);
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      s[14] = vs; s[15] = vd;
      evaluate(c, t, 78, s, 14, 18); evaluate(c, t, 78, s, 15, 20);
      J = w[i * 7 + 6] * Math.sqrt(0.5 * (s[19] + s[21]));
      a += w[i * 7 + 0] + a6 * J;
      b += w[i * 7 + 1] + b6 * J;
    }
    I = 3 * (I0 - E0) + F0;
    let settled = 0;
    for (let step = 0; step < 40; step++) {
      vs = a + a6 * I; vd = b + b6 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[18] = vs; evaluate(c, t, 78, s, 18, 18); Fs = s[18]; fs = s[18 + 1]; }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[18] = vd; evaluate(c, t, 78, s, 18, 18); Fd = s[18]; fd = s[18 + 1]; }
      }
      let h = Fs - Fd - I, slopes = a6 * fs - b6 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a6 * fs + b6 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b6 * fd + a6 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b6 - a6) * change;
      if (moved < enough && moved > -enough) { settled = 1; break; }
    }
    if (settled == 0) { s[45] = a; s[46] = b; searched(c, t, 78, 6, 13, s, 9); I = s[47]; s[17] += 1; E0 = I; I0 = I; }
    vs = a + a6 * I; vd = b + b6 * I;
    if (vs > on || vd > on) {
      s[45] = a; s[46] = b; s[47] = I;
      conduct_smooth(c, t, 78, 6, 13, 42, s, 9);
      I = s[11]; S = s[12]; D = s[13]; vs = s[14]; vd = s[15];
    }
    I += J;
    g1 = f1; f1 = e1; e1 = x1;
    g2 = f2; f2 = e2; e2 = x2;
    x0 = ((n0_0 * r0 + n0_1 * r1) + n0_2 * r2) + ((n0_3 * u + n0_4 * v) + n0_5) + n0_6 * I;
    x1 = ((n1_0 * r0 + n1_1 * r1) + n1_2 * r2) + ((n1_3 * u + n1_4 * v) + n1_5) + n1_6 * I;
    x2 = ((n2_0 * r0 + n2_1 * r1) + n2_2 * r2) + ((n2_3 * u + n2_4 * v) + n2_5) + n2_6 * I;
    let y = 0;
    if (noisy) {
      x0 += w[i * 7 + 2];
      x1 += w[i * 7 + 3];
      x2 += w[i * 7 + 4];
      y = w[i * 7 + 5];
    }
    if (S != 0 || D != 0) {
      x0 += c[46] * S + c[47] * D;
      x1 += c[48] * S + c[49] * D;
      x2 += c[50] * S + c[51] * D;
      y += c[52] * S + c[53] * D;
    }
    output[i] = y + ((y0 * x0 + y1 * x1) + y2 * x2) + ((y3 * u + y4 * v) + y5) + y6 * I;
    u0 = u; v0 = v;
    F0 = E0; E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = x1;
  s[2] = x2;
  s[3] = e1; s[5] = f1; s[7] = g1;
  s[4] = e2; s[6] = f2; s[8] = g2;
  s[9] = u0; s[10] = v0;
  s[11] = I0; s[12] = S0; s[13] = D0; s[16] = E0; s[59] = F0;
  if (to > from) { s[14] = vs; s[15] = vd; }
}

function smooth2_xx_x(c: Float64Array, t: Float64Array, w: Float64Array, e: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0, marking = e.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const a4 = c[4];
  const a5 = c[5];
  const a6 = c[6];
  const a7 = c[7];
  const b0 = c[8];
  const b1 = c[9];
  const b2 = c[10];
  const b3 = c[11];
  const b4 = c[12];
  const b5 = c[13];
  const b6 = c[14];
  const b7 = c[15];
  const n0_0 = c[16];
  const n0_1 = c[17];
  const n0_2 = c[18];
  const n0_3 = c[19];
  const n0_4 = c[20];
  const n0_5 = c[21];
  const n0_6 = c[22];
  const n0_7 = c[23];
  const n1_0 = c[24];
  const n1_1 = c[25];
  const n1_2 = c[26];
  const n1_3 = c[27];
  const n1_4 = c[28];
  const n1_5 = c[29];
  const n1_6 = c[30];
  const n1_7 = c[31];
  const n2_0 = c[32];
  const n2_1 = c[33];
  const n2_2 = c[34];
  const n2_3 = c[35];
  const n2_4 = c[36];
  const n2_5 = c[37];
  const n2_6 = c[38];
  const n2_7 = c[39];
  const n3_0 = c[40];
  const n3_1 = c[41];
  const n3_2 = c[42];
  const n3_3 = c[43];
  const n3_4 = c[44];
  const n3_5 = c[45];
  const n3_6 = c[46];
  const n3_7 = c[47];
  const y0 = c[48];
  const y1 = c[49];
  const y2 = c[50];
  const y3 = c[51];
  const y4 = c[52];
  const y5 = c[53];
  const y6 = c[54];
  const y7 = c[55];
  const m0_0 = c[70];
  const m0_1 = c[71];
  const m0_2 = c[72];
  const m0_3 = c[73];
  const m0_4 = c[74];
  const m0_5 = c[75];
  const m0_6 = c[76];
  const m1_0 = c[77];
  const m1_1 = c[78];
  const m1_2 = c[79];
  const m1_3 = c[80];
  const m1_4 = c[81];
  const m1_5 = c[82];
  const m1_6 = c[83];
  const m2_0 = c[84];
  const m2_1 = c[85];
  const m2_2 = c[86];
  const m2_3 = c[87];
  const m2_4 = c[88];
  const m2_5 = c[89];
  const m3_0 = c[91];
  const m3_1 = c[92];
  const m3_2 = c[93];
  const m3_3 = c[94];
  const m3_4 = c[95];
  const m3_5 = c[96];
  const sign = c[128], off = c[107];
  const on = c[108];
  const lambda = c[111];
  const scale = c[112];
  const inverseWidth = c[113];
  const slope = c[114];
  const enough = c[123];
  const pieces = c[117];
  let x0 = s[0];
  let x1 = s[1];
  let x2 = s[2];
  let x3 = s[3];
  let e2 = s[4], f2 = s[6], g2 = s[8];
  let e3 = s[5], f3 = s[7], g3 = s[9];
  let u0 = s[10], v0 = s[11];
  let I0 = s[12], S0 = s[13], D0 = s[14], E0 = s[17], F0 = s[60], vs = s[15], vd = s[16];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    const p2 = 3.5 * x2 - 2.25 * e2 + 0.8333333333333334 * f2 - 0.125 * g2;
    const p3 = 3.5 * x3 - 2.25 * e3 + 0.8333333333333334 * f3 - 0.125 * g3;
    let r0 = ((m0_0 * x0 + m0_1 * x1) + (m0_2 * x2 + m0_3 * x3)) + ((m0_4 * u0 + m0_5 * v0) + m0_6 * I0);
    let r1 = ((m1_0 * x0 + m1_1 * x1) + (m1_2 * x2 + m1_3 * x3)) + ((m1_4 * u0 + m1_5 * v0) + m1_6 * I0);
    let r2 = ((m2_0 * x0 + m2_1 * x1) + m2_2 * p2) + ((m2_3 * p3 + m2_4 * u0) + m2_5 * v0);
    let r3 = ((m3_0 * x0 + m3_1 * x1) + m3_2 * p2) + ((m3_3 * p3 + m3_4 * u0) + m3_5 * v0);
    if (S0 != 0 || D0 != 0) {
      r0 += c[98] * S0 + c[99] * D0;
      r1 += c[100] * S0 + c[101] * D0;
    }
    let a = ((a0 * r0 + a1 * r1) + (a2 * r2 + a3 * r3)) + ((a4 * u + a5 * v) + a6);
    let b = ((b0 * r0 + b1 * r1) + (b2 * r2 + b3 * r3)) + ((b4 * u + b5 * v) + b6);
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      s[15] = vs; s[16] = vd;
      evaluate(c, t, 106, s, 15, 19); evaluate(c, t, 106, s, 16, 21);
      J = w[i * 8 + 7] * Math.sqrt(0.5 * (s[20] + s[22]));
      a += w[i * 8 + 0] + a7 * J;
      b += w[i * 8 + 1] + b7 * J;
    }
    I = 3 * (I0 - E0) + F0;
    let settled = 0;
    for (let step = 0; step < 40; step++) {
      vs = a + a7 * I; vd = b + b7 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[19] = vs; evaluate(c, t, 106, s, 19, 19); Fs = s[19]; fs = s[19 + 1]; }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[19] = vd; evaluate(c, t, 106, s, 19, 19); Fd = s[19]; fd = s[19 + 1]; }
      }
      let h = Fs - Fd - I, slopes = a7 * fs - b7 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a7 * fs + b7 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b7 * fd + a7 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b7 - a7) * change;
      if (moved < enough && moved > -enough) { settled = 1; break; }
    }
    if (settled == 0) { s[46] = a; s[47] = b; searched(c, t, 106, 7, 15, s, 10); I = s[48]; s[18] += 1; E0 = I; I0 = I; }
    vs = a + a7 * I; vd = b + b7 * I;
    if (vs > on || vd > on) {
      s[46] = a; s[47] = b; s[48] = I;
      conduct_smooth(c, t, 106, 7, 15, 56, s, 10);
      I = s[12]; S = s[13]; D = s[14]; vs = s[15]; vd = s[16];
    }
    I += J;
    g2 = f2; f2 = e2; e2 = x2;
    g3 = f3; f3 = e3; e3 = x3;
    x0 = ((n0_0 * r0 + n0_1 * r1) + (n0_2 * r2 + n0_3 * r3)) + ((n0_4 * u + n0_5 * v) + n0_6) + n0_7 * I;
    x1 = ((n1_0 * r0 + n1_1 * r1) + (n1_2 * r2 + n1_3 * r3)) + ((n1_4 * u + n1_5 * v) + n1_6) + n1_7 * I;
    x2 = ((n2_0 * r0 + n2_1 * r1) + (n2_2 * r2 + n2_3 * r3)) + ((n2_4 * u + n2_5 * v) + n2_6) + n2_7 * I;
    x3 = ((n3_0 * r0 + n3_1 * r1) + (n3_2 * r2 + n3_3 * r3)) + ((n3_4 * u + n3_5 * v) + n3_6) + n3_7 * I;
    let y = 0;
    if (noisy) {
      x0 += w[i * 8 + 2];
      x1 += w[i * 8 + 3];
      x2 += w[i * 8 + 4];
      x3 += w[i * 8 + 5];
      y = w[i * 8 + 6];
    }
    if (S != 0 || D != 0) {
      x0 += c[60] * S + c[61] * D;
      x1 += c[62] * S + c[63] * D;
      x2 += c[64] * S + c[65] * D;
      x3 += c[66] * S + c[67] * D;
      y += c[68] * S + c[69] * D;
    }
    output[i] = y + ((y0 * x0 + y1 * x1) + (y2 * x2 + y3 * x3)) + ((y4 * u + y5 * v) + y6) + y7 * I;
    u0 = u; v0 = v;
    F0 = E0; E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = x1;
  s[2] = x2;
  s[3] = x3;
  s[4] = e2; s[6] = f2; s[8] = g2;
  s[5] = e3; s[7] = f3; s[9] = g3;
  s[10] = u0; s[11] = v0;
  s[12] = I0; s[13] = S0; s[14] = D0; s[17] = E0; s[60] = F0;
  if (to > from) { s[15] = vs; s[16] = vd; }
}

function smooth3_xx_x(c: Float64Array, t: Float64Array, w: Float64Array, e: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0, marking = e.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const a4 = c[4];
  const a5 = c[5];
  const a6 = c[6];
  const a7 = c[7];
  const a8 = c[8];
  const b0 = c[9];
  const b1 = c[10];
  const b2 = c[11];
  const b3 = c[12];
  const b4 = c[13];
  const b5 = c[14];
  const b6 = c[15];
  const b7 = c[16];
  const b8 = c[17];
  const n0_0 = c[18];
  const n0_1 = c[19];
  const n0_2 = c[20];
  const n0_3 = c[21];
  const n0_4 = c[22];
  const n0_5 = c[23];
  const n0_6 = c[24];
  const n0_7 = c[25];
  const n0_8 = c[26];
  const n1_0 = c[27];
  const n1_1 = c[28];
  const n1_2 = c[29];
  const n1_3 = c[30];
  const n1_4 = c[31];
  const n1_5 = c[32];
  const n1_6 = c[33];
  const n1_7 = c[34];
  const n1_8 = c[35];
  const n2_0 = c[36];
  const n2_1 = c[37];
  const n2_2 = c[38];
  const n2_3 = c[39];
  const n2_4 = c[40];
  const n2_5 = c[41];
  const n2_6 = c[42];
  const n2_7 = c[43];
  const n2_8 = c[44];
  const n3_0 = c[45];
  const n3_1 = c[46];
  const n3_2 = c[47];
  const n3_3 = c[48];
  const n3_4 = c[49];
  const n3_5 = c[50];
  const n3_6 = c[51];
  const n3_7 = c[52];
  const n3_8 = c[53];
  const n4_0 = c[54];
  const n4_1 = c[55];
  const n4_2 = c[56];
  const n4_3 = c[57];
  const n4_4 = c[58];
  const n4_5 = c[59];
  const n4_6 = c[60];
  const n4_7 = c[61];
  const n4_8 = c[62];
  const y0 = c[63];
  const y1 = c[64];
  const y2 = c[65];
  const y3 = c[66];
  const y4 = c[67];
  const y5 = c[68];
  const y6 = c[69];
  const y7 = c[70];
  const y8 = c[71];
  const m0_0 = c[88];
  const m0_1 = c[89];
  const m0_2 = c[90];
  const m0_3 = c[91];
  const m0_4 = c[92];
  const m0_5 = c[93];
  const m0_6 = c[94];
  const m0_7 = c[95];
  const m1_0 = c[96];
  const m1_1 = c[97];
  const m1_2 = c[98];
  const m1_3 = c[99];
  const m1_4 = c[100];
  const m1_5 = c[101];
  const m1_6 = c[102];
  const m1_7 = c[103];
  const m2_0 = c[104];
  const m2_1 = c[105];
  const m2_2 = c[106];
  const m2_3 = c[107];
  const m2_4 = c[108];
  const m2_5 = c[109];
  const m2_6 = c[110];
  const m2_7 = c[111];
  const m3_0 = c[112];
  const m3_1 = c[113];
  const m3_2 = c[114];
  const m3_3 = c[115];
  const m3_4 = c[116];
  const m3_5 = c[117];
  const m3_6 = c[118];
  const m4_0 = c[120];
  const m4_1 = c[121];
  const m4_2 = c[122];
  const m4_3 = c[123];
  const m4_4 = c[124];
  const m4_5 = c[125];
  const m4_6 = c[126];
  const sign = c[160], off = c[139];
  const on = c[140];
  const lambda = c[143];
  const scale = c[144];
  const inverseWidth = c[145];
  const slope = c[146];
  const enough = c[155];
  const pieces = c[149];
  let x0 = s[0];
  let x1 = s[1];
  let x2 = s[2];
  let x3 = s[3];
  let x4 = s[4];
  let e3 = s[5], f3 = s[7], g3 = s[9];
  let e4 = s[6], f4 = s[8], g4 = s[10];
  let u0 = s[11], v0 = s[12];
  let I0 = s[13], S0 = s[14], D0 = s[15], E0 = s[18], F0 = s[61], vs = s[16], vd = s[17];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    const p3 = 3.5 * x3 - 2.25 * e3 + 0.8333333333333334 * f3 - 0.125 * g3;
    const p4 = 3.5 * x4 - 2.25 * e4 + 0.8333333333333334 * f4 - 0.125 * g4;
    let r0 = ((m0_0 * x0 + m0_1 * x1) + (m0_2 * x2 + m0_3 * x3)) + ((m0_4 * x4 + m0_5 * u0) + (m0_6 * v0 + m0_7 * I0));
    let r1 = ((m1_0 * x0 + m1_1 * x1) + (m1_2 * x2 + m1_3 * x3)) + ((m1_4 * x4 + m1_5 * u0) + (m1_6 * v0 + m1_7 * I0));
    let r2 = ((m2_0 * x0 + m2_1 * x1) + (m2_2 * x2 + m2_3 * x3)) + ((m2_4 * x4 + m2_5 * u0) + (m2_6 * v0 + m2_7 * I0));
    let r3 = ((m3_0 * x0 + m3_1 * x1) + (m3_2 * x2 + m3_3 * p3)) + ((m3_4 * p4 + m3_5 * u0) + m3_6 * v0);
    let r4 = ((m4_0 * x0 + m4_1 * x1) + (m4_2 * x2 + m4_3 * p3)) + ((m4_4 * p4 + m4_5 * u0) + m4_6 * v0);
    if (S0 != 0 || D0 != 0) {
      r0 += c[128] * S0 + c[129] * D0;
      r1 += c[130] * S0 + c[131] * D0;
      r2 += c[132] * S0 + c[133] * D0;
    }
    let a = ((a0 * r0 + a1 * r1) + (a2 * r2 + a3 * r3)) + ((a4 * r4 + a5 * u) + (a6 * v + a7));
    let b = ((b0 * r0 + b1 * r1) + (b2 * r2 + b3 * r3)) + ((b4 * r4 + b5 * u) + (b6 * v + b7));
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      s[16] = vs; s[17] = vd;
      evaluate(c, t, 138, s, 16, 20); evaluate(c, t, 138, s, 17, 22);
      J = w[i * 9 + 8] * Math.sqrt(0.5 * (s[21] + s[23]));
      a += w[i * 9 + 0] + a8 * J;
      b += w[i * 9 + 1] + b8 * J;
    }
    I = 3 * (I0 - E0) + F0;
    let settled = 0;
    for (let step = 0; step < 40; step++) {
      vs = a + a8 * I; vd = b + b8 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[20] = vs; evaluate(c, t, 138, s, 20, 20); Fs = s[20]; fs = s[20 + 1]; }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[20] = vd; evaluate(c, t, 138, s, 20, 20); Fd = s[20]; fd = s[20 + 1]; }
      }
      let h = Fs - Fd - I, slopes = a8 * fs - b8 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a8 * fs + b8 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b8 * fd + a8 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b8 - a8) * change;
      if (moved < enough && moved > -enough) { settled = 1; break; }
    }
    if (settled == 0) { s[47] = a; s[48] = b; searched(c, t, 138, 8, 17, s, 11); I = s[49]; s[19] += 1; E0 = I; I0 = I; }
    vs = a + a8 * I; vd = b + b8 * I;
    if (vs > on || vd > on) {
      s[47] = a; s[48] = b; s[49] = I;
      conduct_smooth(c, t, 138, 8, 17, 72, s, 11);
      I = s[13]; S = s[14]; D = s[15]; vs = s[16]; vd = s[17];
    }
    I += J;
    g3 = f3; f3 = e3; e3 = x3;
    g4 = f4; f4 = e4; e4 = x4;
    x0 = ((n0_0 * r0 + n0_1 * r1) + (n0_2 * r2 + n0_3 * r3)) + ((n0_4 * r4 + n0_5 * u) + (n0_6 * v + n0_7)) + n0_8 * I;
    x1 = ((n1_0 * r0 + n1_1 * r1) + (n1_2 * r2 + n1_3 * r3)) + ((n1_4 * r4 + n1_5 * u) + (n1_6 * v + n1_7)) + n1_8 * I;
    x2 = ((n2_0 * r0 + n2_1 * r1) + (n2_2 * r2 + n2_3 * r3)) + ((n2_4 * r4 + n2_5 * u) + (n2_6 * v + n2_7)) + n2_8 * I;
    x3 = ((n3_0 * r0 + n3_1 * r1) + (n3_2 * r2 + n3_3 * r3)) + ((n3_4 * r4 + n3_5 * u) + (n3_6 * v + n3_7)) + n3_8 * I;
    x4 = ((n4_0 * r0 + n4_1 * r1) + (n4_2 * r2 + n4_3 * r3)) + ((n4_4 * r4 + n4_5 * u) + (n4_6 * v + n4_7)) + n4_8 * I;
    let y = 0;
    if (noisy) {
      x0 += w[i * 9 + 2];
      x1 += w[i * 9 + 3];
      x2 += w[i * 9 + 4];
      x3 += w[i * 9 + 5];
      x4 += w[i * 9 + 6];
      y = w[i * 9 + 7];
    }
    if (S != 0 || D != 0) {
      x0 += c[76] * S + c[77] * D;
      x1 += c[78] * S + c[79] * D;
      x2 += c[80] * S + c[81] * D;
      x3 += c[82] * S + c[83] * D;
      x4 += c[84] * S + c[85] * D;
      y += c[86] * S + c[87] * D;
    }
    output[i] = y + ((y0 * x0 + y1 * x1) + (y2 * x2 + y3 * x3)) + ((y4 * x4 + y5 * u) + (y6 * v + y7)) + y8 * I;
    u0 = u; v0 = v;
    F0 = E0; E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = x1;
  s[2] = x2;
  s[3] = x3;
  s[4] = x4;
  s[5] = e3; s[7] = f3; s[9] = g3;
  s[6] = e4; s[8] = f4; s[10] = g4;
  s[11] = u0; s[12] = v0;
  s[13] = I0; s[14] = S0; s[15] = D0; s[18] = E0; s[61] = F0;
  if (to > from) { s[16] = vs; s[17] = vd; }
}

function smooth1_xxx_x(c: Float64Array, t: Float64Array, w: Float64Array, e: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0, marking = e.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const a4 = c[4];
  const a5 = c[5];
  const a6 = c[6];
  const a7 = c[7];
  const b0 = c[8];
  const b1 = c[9];
  const b2 = c[10];
  const b3 = c[11];
  const b4 = c[12];
  const b5 = c[13];
  const b6 = c[14];
  const b7 = c[15];
  const n0_0 = c[16];
  const n0_1 = c[17];
  const n0_2 = c[18];
  const n0_3 = c[19];
  const n0_4 = c[20];
  const n0_5 = c[21];
  const n0_6 = c[22];
  const n0_7 = c[23];
  const n1_0 = c[24];
  const n1_1 = c[25];
  const n1_2 = c[26];
  const n1_3 = c[27];
  const n1_4 = c[28];
  const n1_5 = c[29];
  const n1_6 = c[30];
  const n1_7 = c[31];
  const n2_0 = c[32];
  const n2_1 = c[33];
  const n2_2 = c[34];
  const n2_3 = c[35];
  const n2_4 = c[36];
  const n2_5 = c[37];
  const n2_6 = c[38];
  const n2_7 = c[39];
  const n3_0 = c[40];
  const n3_1 = c[41];
  const n3_2 = c[42];
  const n3_3 = c[43];
  const n3_4 = c[44];
  const n3_5 = c[45];
  const n3_6 = c[46];
  const n3_7 = c[47];
  const y0 = c[48];
  const y1 = c[49];
  const y2 = c[50];
  const y3 = c[51];
  const y4 = c[52];
  const y5 = c[53];
  const y6 = c[54];
  const y7 = c[55];
  const m0_0 = c[70];
  const m0_1 = c[71];
  const m0_2 = c[72];
  const m0_3 = c[73];
  const m0_4 = c[74];
  const m0_5 = c[75];
  const m0_6 = c[76];
  const m1_0 = c[77];
  const m1_1 = c[78];
  const m1_2 = c[79];
  const m1_3 = c[80];
  const m1_4 = c[81];
  const m1_5 = c[82];
  const m2_0 = c[84];
  const m2_1 = c[85];
  const m2_2 = c[86];
  const m2_3 = c[87];
  const m2_4 = c[88];
  const m2_5 = c[89];
  const m3_0 = c[91];
  const m3_1 = c[92];
  const m3_2 = c[93];
  const m3_3 = c[94];
  const m3_4 = c[95];
  const m3_5 = c[96];
  const sign = c[128], off = c[107];
  const on = c[108];
  const lambda = c[111];
  const scale = c[112];
  const inverseWidth = c[113];
  const slope = c[114];
  const enough = c[123];
  const pieces = c[117];
  let x0 = s[0];
  let x1 = s[1];
  let x2 = s[2];
  let x3 = s[3];
  let e1 = s[4], f1 = s[7], g1 = s[10];
  let e2 = s[5], f2 = s[8], g2 = s[11];
  let e3 = s[6], f3 = s[9], g3 = s[12];
  let u0 = s[13], v0 = s[14];
  let I0 = s[15], S0 = s[16], D0 = s[17], E0 = s[20], F0 = s[63], vs = s[18], vd = s[19];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    const p1 = 3.5 * x1 - 2.25 * e1 + 0.8333333333333334 * f1 - 0.125 * g1;
    const p2 = 3.5 * x2 - 2.25 * e2 + 0.8333333333333334 * f2 - 0.125 * g2;
    const p3 = 3.5 * x3 - 2.25 * e3 + 0.8333333333333334 * f3 - 0.125 * g3;
    let r0 = ((m0_0 * x0 + m0_1 * x1) + (m0_2 * x2 + m0_3 * x3)) + ((m0_4 * u0 + m0_5 * v0) + m0_6 * I0);
    let r1 = ((m1_0 * x0 + m1_1 * p1) + m1_2 * p2) + ((m1_3 * p3 + m1_4 * u0) + m1_5 * v0);
    let r2 = ((m2_0 * x0 + m2_1 * p1) + m2_2 * p2) + ((m2_3 * p3 + m2_4 * u0) + m2_5 * v0);
    let r3 = ((m3_0 * x0 + m3_1 * p1) + m3_2 * p2) + ((m3_3 * p3 + m3_4 * u0) + m3_5 * v0);
    if (S0 != 0 || D0 != 0) {
      r0 += c[98] * S0 + c[99] * D0;
    }
    let a = ((a0 * r0 + a1 * r1) + (a2 * r2 + a3 * r3)) + ((a4 * u + a5 * v) + a6);
    let b = ((b0 * r0 + b1 * r1) + (b2 * r2 + b3 * r3)) + ((b4 * u + b5 * v) + b6);
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      s[18] = vs; s[19] = vd;
      evaluate(c, t, 106, s, 18, 22); evaluate(c, t, 106, s, 19, 24);
      J = w[i * 8 + 7] * Math.sqrt(0.5 * (s[23] + s[25]));
      a += w[i * 8 + 0] + a7 * J;
      b += w[i * 8 + 1] + b7 * J;
    }
    I = 3 * (I0 - E0) + F0;
    let settled = 0;
    for (let step = 0; step < 40; step++) {
      vs = a + a7 * I; vd = b + b7 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[22] = vs; evaluate(c, t, 106, s, 22, 22); Fs = s[22]; fs = s[22 + 1]; }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[22] = vd; evaluate(c, t, 106, s, 22, 22); Fd = s[22]; fd = s[22 + 1]; }
      }
      let h = Fs - Fd - I, slopes = a7 * fs - b7 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a7 * fs + b7 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b7 * fd + a7 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b7 - a7) * change;
      if (moved < enough && moved > -enough) { settled = 1; break; }
    }
    if (settled == 0) { s[49] = a; s[50] = b; searched(c, t, 106, 7, 15, s, 13); I = s[51]; s[21] += 1; E0 = I; I0 = I; }
    vs = a + a7 * I; vd = b + b7 * I;
    if (vs > on || vd > on) {
      s[49] = a; s[50] = b; s[51] = I;
      conduct_smooth(c, t, 106, 7, 15, 56, s, 13);
      I = s[15]; S = s[16]; D = s[17]; vs = s[18]; vd = s[19];
    }
    I += J;
    g1 = f1; f1 = e1; e1 = x1;
    g2 = f2; f2 = e2; e2 = x2;
    g3 = f3; f3 = e3; e3 = x3;
    x0 = ((n0_0 * r0 + n0_1 * r1) + (n0_2 * r2 + n0_3 * r3)) + ((n0_4 * u + n0_5 * v) + n0_6) + n0_7 * I;
    x1 = ((n1_0 * r0 + n1_1 * r1) + (n1_2 * r2 + n1_3 * r3)) + ((n1_4 * u + n1_5 * v) + n1_6) + n1_7 * I;
    x2 = ((n2_0 * r0 + n2_1 * r1) + (n2_2 * r2 + n2_3 * r3)) + ((n2_4 * u + n2_5 * v) + n2_6) + n2_7 * I;
    x3 = ((n3_0 * r0 + n3_1 * r1) + (n3_2 * r2 + n3_3 * r3)) + ((n3_4 * u + n3_5 * v) + n3_6) + n3_7 * I;
    let y = 0;
    if (noisy) {
      x0 += w[i * 8 + 2];
      x1 += w[i * 8 + 3];
      x2 += w[i * 8 + 4];
      x3 += w[i * 8 + 5];
      y = w[i * 8 + 6];
    }
    if (S != 0 || D != 0) {
      x0 += c[60] * S + c[61] * D;
      x1 += c[62] * S + c[63] * D;
      x2 += c[64] * S + c[65] * D;
      x3 += c[66] * S + c[67] * D;
      y += c[68] * S + c[69] * D;
    }
    output[i] = y + ((y0 * x0 + y1 * x1) + (y2 * x2 + y3 * x3)) + ((y4 * u + y5 * v) + y6) + y7 * I;
    u0 = u; v0 = v;
    F0 = E0; E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = x1;
  s[2] = x2;
  s[3] = x3;
  s[4] = e1; s[7] = f1; s[10] = g1;
  s[5] = e2; s[8] = f2; s[11] = g2;
  s[6] = e3; s[9] = f3; s[12] = g3;
  s[13] = u0; s[14] = v0;
  s[15] = I0; s[16] = S0; s[17] = D0; s[20] = E0; s[63] = F0;
  if (to > from) { s[18] = vs; s[19] = vd; }
}

function smooth2_xxx_x(c: Float64Array, t: Float64Array, w: Float64Array, e: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0, marking = e.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const a4 = c[4];
  const a5 = c[5];
  const a6 = c[6];
  const a7 = c[7];
  const a8 = c[8];
  const b0 = c[9];
  const b1 = c[10];
  const b2 = c[11];
  const b3 = c[12];
  const b4 = c[13];
  const b5 = c[14];
  const b6 = c[15];
  const b7 = c[16];
  const b8 = c[17];
  const n0_0 = c[18];
  const n0_1 = c[19];
  const n0_2 = c[20];
  const n0_3 = c[21];
  const n0_4 = c[22];
  const n0_5 = c[23];
  const n0_6 = c[24];
  const n0_7 = c[25];
  const n0_8 = c[26];
  const n1_0 = c[27];
  const n1_1 = c[28];
  const n1_2 = c[29];
  const n1_3 = c[30];
  const n1_4 = c[31];
  const n1_5 = c[32];
  const n1_6 = c[33];
  const n1_7 = c[34];
  const n1_8 = c[35];
  const n2_0 = c[36];
  const n2_1 = c[37];
  const n2_2 = c[38];
  const n2_3 = c[39];
  const n2_4 = c[40];
  const n2_5 = c[41];
  const n2_6 = c[42];
  const n2_7 = c[43];
  const n2_8 = c[44];
  const n3_0 = c[45];
  const n3_1 = c[46];
  const n3_2 = c[47];
  const n3_3 = c[48];
  const n3_4 = c[49];
  const n3_5 = c[50];
  const n3_6 = c[51];
  const n3_7 = c[52];
  const n3_8 = c[53];
  const n4_0 = c[54];
  const n4_1 = c[55];
  const n4_2 = c[56];
  const n4_3 = c[57];
  const n4_4 = c[58];
  const n4_5 = c[59];
  const n4_6 = c[60];
  const n4_7 = c[61];
  const n4_8 = c[62];
  const y0 = c[63];
  const y1 = c[64];
  const y2 = c[65];
  const y3 = c[66];
  const y4 = c[67];
  const y5 = c[68];
  const y6 = c[69];
  const y7 = c[70];
  const y8 = c[71];
  const m0_0 = c[88];
  const m0_1 = c[89];
  const m0_2 = c[90];
  const m0_3 = c[91];
  const m0_4 = c[92];
  const m0_5 = c[93];
  const m0_6 = c[94];
  const m0_7 = c[95];
  const m1_0 = c[96];
  const m1_1 = c[97];
  const m1_2 = c[98];
  const m1_3 = c[99];
  const m1_4 = c[100];
  const m1_5 = c[101];
  const m1_6 = c[102];
  const m1_7 = c[103];
  const m2_0 = c[104];
  const m2_1 = c[105];
  const m2_2 = c[106];
  const m2_3 = c[107];
  const m2_4 = c[108];
  const m2_5 = c[109];
  const m2_6 = c[110];
  const m3_0 = c[112];
  const m3_1 = c[113];
  const m3_2 = c[114];
  const m3_3 = c[115];
  const m3_4 = c[116];
  const m3_5 = c[117];
  const m3_6 = c[118];
  const m4_0 = c[120];
  const m4_1 = c[121];
  const m4_2 = c[122];
  const m4_3 = c[123];
  const m4_4 = c[124];
  const m4_5 = c[125];
  const m4_6 = c[126];
  const sign = c[160], off = c[139];
  const on = c[140];
  const lambda = c[143];
  const scale = c[144];
  const inverseWidth = c[145];
  const slope = c[146];
  const enough = c[155];
  const pieces = c[149];
  let x0 = s[0];
  let x1 = s[1];
  let x2 = s[2];
  let x3 = s[3];
  let x4 = s[4];
  let e2 = s[5], f2 = s[8], g2 = s[11];
  let e3 = s[6], f3 = s[9], g3 = s[12];
  let e4 = s[7], f4 = s[10], g4 = s[13];
  let u0 = s[14], v0 = s[15];
  let I0 = s[16], S0 = s[17], D0 = s[18], E0 = s[21], F0 = s[64], vs = s[19], vd = s[20];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    const p2 = 3.5 * x2 - 2.25 * e2 + 0.8333333333333334 * f2 - 0.125 * g2;
    const p3 = 3.5 * x3 - 2.25 * e3 + 0.8333333333333334 * f3 - 0.125 * g3;
    const p4 = 3.5 * x4 - 2.25 * e4 + 0.8333333333333334 * f4 - 0.125 * g4;
    let r0 = ((m0_0 * x0 + m0_1 * x1) + (m0_2 * x2 + m0_3 * x3)) + ((m0_4 * x4 + m0_5 * u0) + (m0_6 * v0 + m0_7 * I0));
    let r1 = ((m1_0 * x0 + m1_1 * x1) + (m1_2 * x2 + m1_3 * x3)) + ((m1_4 * x4 + m1_5 * u0) + (m1_6 * v0 + m1_7 * I0));
    let r2 = ((m2_0 * x0 + m2_1 * x1) + (m2_2 * p2 + m2_3 * p3)) + ((m2_4 * p4 + m2_5 * u0) + m2_6 * v0);
    let r3 = ((m3_0 * x0 + m3_1 * x1) + (m3_2 * p2 + m3_3 * p3)) + ((m3_4 * p4 + m3_5 * u0) + m3_6 * v0);
    let r4 = ((m4_0 * x0 + m4_1 * x1) + (m4_2 * p2 + m4_3 * p3)) + ((m4_4 * p4 + m4_5 * u0) + m4_6 * v0);
    if (S0 != 0 || D0 != 0) {
      r0 += c[128] * S0 + c[129] * D0;
      r1 += c[130] * S0 + c[131] * D0;
    }
    let a = ((a0 * r0 + a1 * r1) + (a2 * r2 + a3 * r3)) + ((a4 * r4 + a5 * u) + (a6 * v + a7));
    let b = ((b0 * r0 + b1 * r1) + (b2 * r2 + b3 * r3)) + ((b4 * r4 + b5 * u) + (b6 * v + b7));
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      s[19] = vs; s[20] = vd;
      evaluate(c, t, 138, s, 19, 23); evaluate(c, t, 138, s, 20, 25);
      J = w[i * 9 + 8] * Math.sqrt(0.5 * (s[24] + s[26]));
      a += w[i * 9 + 0] + a8 * J;
      b += w[i * 9 + 1] + b8 * J;
    }
    I = 3 * (I0 - E0) + F0;
    let settled = 0;
    for (let step = 0; step < 40; step++) {
      vs = a + a8 * I; vd = b + b8 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[23] = vs; evaluate(c, t, 138, s, 23, 23); Fs = s[23]; fs = s[23 + 1]; }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[23] = vd; evaluate(c, t, 138, s, 23, 23); Fd = s[23]; fd = s[23 + 1]; }
      }
      let h = Fs - Fd - I, slopes = a8 * fs - b8 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a8 * fs + b8 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b8 * fd + a8 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b8 - a8) * change;
      if (moved < enough && moved > -enough) { settled = 1; break; }
    }
    if (settled == 0) { s[50] = a; s[51] = b; searched(c, t, 138, 8, 17, s, 14); I = s[52]; s[22] += 1; E0 = I; I0 = I; }
    vs = a + a8 * I; vd = b + b8 * I;
    if (vs > on || vd > on) {
      s[50] = a; s[51] = b; s[52] = I;
      conduct_smooth(c, t, 138, 8, 17, 72, s, 14);
      I = s[16]; S = s[17]; D = s[18]; vs = s[19]; vd = s[20];
    }
    I += J;
    g2 = f2; f2 = e2; e2 = x2;
    g3 = f3; f3 = e3; e3 = x3;
    g4 = f4; f4 = e4; e4 = x4;
    x0 = ((n0_0 * r0 + n0_1 * r1) + (n0_2 * r2 + n0_3 * r3)) + ((n0_4 * r4 + n0_5 * u) + (n0_6 * v + n0_7)) + n0_8 * I;
    x1 = ((n1_0 * r0 + n1_1 * r1) + (n1_2 * r2 + n1_3 * r3)) + ((n1_4 * r4 + n1_5 * u) + (n1_6 * v + n1_7)) + n1_8 * I;
    x2 = ((n2_0 * r0 + n2_1 * r1) + (n2_2 * r2 + n2_3 * r3)) + ((n2_4 * r4 + n2_5 * u) + (n2_6 * v + n2_7)) + n2_8 * I;
    x3 = ((n3_0 * r0 + n3_1 * r1) + (n3_2 * r2 + n3_3 * r3)) + ((n3_4 * r4 + n3_5 * u) + (n3_6 * v + n3_7)) + n3_8 * I;
    x4 = ((n4_0 * r0 + n4_1 * r1) + (n4_2 * r2 + n4_3 * r3)) + ((n4_4 * r4 + n4_5 * u) + (n4_6 * v + n4_7)) + n4_8 * I;
    let y = 0;
    if (noisy) {
      x0 += w[i * 9 + 2];
      x1 += w[i * 9 + 3];
      x2 += w[i * 9 + 4];
      x3 += w[i * 9 + 5];
      x4 += w[i * 9 + 6];
      y = w[i * 9 + 7];
    }
    if (S != 0 || D != 0) {
      x0 += c[76] * S + c[77] * D;
      x1 += c[78] * S + c[79] * D;
      x2 += c[80] * S + c[81] * D;
      x3 += c[82] * S + c[83] * D;
      x4 += c[84] * S + c[85] * D;
      y += c[86] * S + c[87] * D;
    }
    output[i] = y + ((y0 * x0 + y1 * x1) + (y2 * x2 + y3 * x3)) + ((y4 * x4 + y5 * u) + (y6 * v + y7)) + y8 * I;
    u0 = u; v0 = v;
    F0 = E0; E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = x1;
  s[2] = x2;
  s[3] = x3;
  s[4] = x4;
  s[5] = e2; s[8] = f2; s[11] = g2;
  s[6] = e3; s[9] = f3; s[12] = g3;
  s[7] = e4; s[10] = f4; s[13] = g4;
  s[14] = u0; s[15] = v0;
  s[16] = I0; s[17] = S0; s[18] = D0; s[21] = E0; s[64] = F0;
  if (to > from) { s[19] = vs; s[20] = vd; }
}

function looped_smooth(trapezoidal: number, stiff: number): Kernel {
  const n = trapezoidal + stiff, { row, past, all } = layoutOf(n), { device, junction, rows, outputRow } = all;
  const slots = slotStart(trapezoidal, stiff), width = row.width, aI = row.current, bI = width + row.current;
  /** What each row remembers, then the audio, the control and 1; the stiff states' past, weighted; the sums of the rows. */
  const drives = new Float64Array(n + 3), weighed = new Float64Array(n), sums = new Float64Array(n + 3);
  drives[n + 2] = 1;
  return (c, t, w, e, s, audio, control, output, from, to) => {
  const noisy = w.length > 0, marking = e.length > 0;
  const perAs = c[aI], perAd = c[bI];
  const on = c[device + 2];
  const lambda = c[device + 5];
  const scale = c[device + 6];
  const inverseWidth = c[device + 7];
  const slope = c[device + 8];
  const enough = c[device + 17];
  const pieces = c[device + 11];
  let u0 = s[slots + 0], v0 = s[slots + 1];
  let I0 = s[slots + 2], S0 = s[slots + 3], D0 = s[slots + 4], E0 = s[slots + 7], F0 = s[slots + 50], vs = s[slots + 5], vd = s[slots + 6];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i], noise = i * (rows + 1);
    for (let k = 0; k < trapezoidal; k++) weighed[k] = s[k];
    for (let k = 0; k < stiff; k++) {
      const x = s[trapezoidal + k], e1 = s[n + k], e2 = s[n + stiff + k];
      weighed[trapezoidal + k] = 3.5 * x - 2.25 * e1 + 0.8333333333333334 * e2 - 0.125 * s[n + 2 * stiff + k];
      s[n + 2 * stiff + k] = e2; s[n + stiff + k] = e1; s[n + k] = x;
    }
    for (let r = 0; r < n; r++) {
      const at = all.memory + r * past.width, x = r < trapezoidal ? s : weighed;
      let even = c[at + n] * u0, odd = c[at + n + 1] * v0;
      for (let k = 0; k + 1 < n; k += 2) { even += c[at + k] * x[k]; odd += c[at + k + 1] * x[k + 1]; }
      if (n % 2 === 1) even += c[at + n - 1] * x[n - 1];
      if (r < trapezoidal) {
        const old = all.memoryJunction + 2 * r;
        even += c[at + n + 2] * I0; odd += c[old] * S0 + c[old + 1] * D0;
      }
      drives[r] = even + odd;
    }
    drives[n] = u; drives[n + 1] = v;
    for (let r = 0; r < n + 2; r++) {
      const at = r * width;
      let even = c[at + n], odd = c[at + n + 1] * v;
      even = even * u + c[at + n + 2];
      for (let k = 0; k + 1 < n; k += 2) { even += c[at + k] * drives[k]; odd += c[at + k + 1] * drives[k + 1]; }
      if (n % 2 === 1) odd += c[at + n - 1] * drives[n - 1];
      sums[r] = even + odd;
    }
    let a = sums[0], b = sums[1], I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      s[slots + 5] = vs; s[slots + 6] = vd;
      evaluate(c, t, device, s, slots + 5, slots + 9); evaluate(c, t, device, s, slots + 6, slots + 11);
      J = w[noise + rows] * Math.sqrt(0.5 * (s[slots + 10] + s[slots + 12]));
      a += w[noise] + perAs * J; b += w[noise + 1] + perAd * J;
      for (let r = 2; r < n + 2; r++) sums[r] += w[noise + r];
    }
    I = 3 * (I0 - E0) + F0;
    let settled = 0;
    for (let step = 0; step < 40; step++) {
      vs = a + perAs * I; vd = b + perAd * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[slots + 9] = vs; evaluate(c, t, device, s, slots + 9, slots + 9); Fs = s[slots + 9]; fs = s[slots + 9 + 1]; }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { s[slots + 9] = vd; evaluate(c, t, device, s, slots + 9, slots + 9); Fd = s[slots + 9]; fd = s[slots + 9 + 1]; }
      }
      let h = Fs - Fd - I, slopes = perAs * fs - perAd * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * perAs * fs + perAd * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * perAd * fd + perAs * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (perAd - perAs) * change;
      if (moved < enough && moved > -enough) { settled = 1; break; }
    }
    if (settled == 0) { s[slots + 36] = a; s[slots + 37] = b; searched(c, t, device, aI, bI, s, slots + 0); I = s[slots + 38]; s[slots + 8] += 1; E0 = I; I0 = I; }
    vs = a + perAs * I; vd = b + perAd * I;
    if (vs > on || vd > on) {
      s[slots + 36] = a; s[slots + 37] = b; s[slots + 38] = I;
      conduct_smooth(c, t, device, aI, bI, junction, s, slots);
      I = s[slots + 2]; S = s[slots + 3]; D = s[slots + 4]; vs = s[slots + 5]; vd = s[slots + 6];
    }
    I += J;
    const last = outputRow * width;
    let y = c[last + n] * u + c[last + n + 1] * v + c[last + n + 2] + c[last + n + 3] * I + c[junction + 2 * outputRow] * S + c[junction + 2 * outputRow + 1] * D;
    if (noisy) y += w[noise + outputRow];
    for (let k = 0; k < n; k++) {
      const at = junction + 4 + 2 * k, x = sums[2 + k] + c[(2 + k) * width + n + 3] * I + (c[at] * S + c[at + 1] * D);
      s[k] = x; y += c[last + k] * x;
    }
    output[i] = y;
    u0 = u; v0 = v;
    F0 = E0; E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[slots + 0] = u0; s[slots + 1] = v0;
  s[slots + 2] = I0; s[slots + 3] = S0; s[slots + 4] = D0; s[slots + 7] = E0; s[slots + 50] = F0;
  if (to > from) { s[slots + 5] = vs; s[slots + 6] = vd; }
  };
}

export const SMOOTH_CONDUCTOR: Conductor = conduct_smooth;

/** For shapes that are not written out. */
export const SMOOTH_LOOPED: LoopedKernel = looped_smooth;

/** By the key of a shape. */
export const SMOOTH_KERNELS: Readonly<Record<string, Kernel>> = {
  '0  d': smooth0__d,
  '1  d': smooth1__d,
  '2  d': smooth2__d,
  '3  d': smooth3__d,
  '4  d': smooth4__d,
  '0 x d': smooth0_x_d,
  '1 x d': smooth1_x_d,
  '0 xg d': smooth0_xg_d,
  '1 xg d': smooth1_xg_d,
  '2 xg d': smooth2_xg_d,
  '0 gm d': smooth0_gm_d,
  '1 gm d': smooth1_gm_d,
  '0  x': smooth0__x,
  '1  x': smooth1__x,
  '2  x': smooth2__x,
  '3  x': smooth3__x,
  '0 xx x': smooth0_xx_x,
  '1 xx x': smooth1_xx_x,
  '2 xx x': smooth2_xx_x,
  '3 xx x': smooth3_xx_x,
  '1 xxx x': smooth1_xxx_x,
  '2 xxx x': smooth2_xxx_x,
};
