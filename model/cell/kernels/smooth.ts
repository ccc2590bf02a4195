/**
 * Kernels of the smooth law, one for each number of states: written from source.ts by `npm run kernels`, where the method is explained. Not to be edited.
 *
 * Each advances a cell over the samples `from` to `to`: `c` coefficients, `t` the law's table, `w` noise (or empty) and `s` state as in layout.ts, `audio` and
 * `control` in V, `output` in V.
 */
// biome-ignore-all lint: written by a program
// biome-ignore-all format: written by a program
import { searched, slopeAt, termAt } from './channel.ts';
import { conduct } from './ports.ts';

function smooth0(c: Float64Array, t: Float64Array, w: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0;
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
  const on = c[26];
  const lambda = c[29];
  const scale = c[30];
  const inverseWidth = c[31];
  const slope = c[32];
  const pieces = c[36];
  let I0 = s[2], S0 = s[3], D0 = s[4], E0 = s[7], vs = s[5], vd = s[6];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    let a = a0 * u + a1 * v + a2;
    let b = b0 * u + b1 * v + b2;
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      J = w[i * 4 + 3] * Math.sqrt(0.5 * (slopeAt(c, t, 24, vs) + slopeAt(c, t, 24, vd)));
      a += w[i * 4 + 0] + a3 * J;
      b += w[i * 4 + 1] + b3 * J;
    }
    I = 2 * I0 - E0;
    let settled = 0;
    for (let step = 0; step < 12; step++) {
      vs = a + a3 * I; vd = b + b3 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { Fs = termAt(c, t, 24, vs); fs = slopeAt(c, t, 24, vs); }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { Fd = termAt(c, t, 24, vd); fd = slopeAt(c, t, 24, vd); }
      }
      let h = Fs - Fd - I, slopes = a3 * fs - b3 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a3 * fs + b3 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b3 * fd + a3 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b3 - a3) * change;
      if (moved < 1e-8 && moved > -1e-8) { settled = 1; break; }
    }
    if (settled == 0) { I = searched(c, t, 24, 3, 7, a, b); s[8] += 1; }
    vs = a + a3 * I; vd = b + b3 * I;
    if (vs > on || vd > on) {
      conduct(c, t, 24, 3, 7, 12, s, 0, a, b, I);
      I = s[2]; S = s[3]; D = s[4]; vs = s[5]; vd = s[6];
    }
    I += J;
    let y = 0;
    if (noisy) {
      y = w[i * 4 + 2];
    }
    if (S != 0 || D != 0) {
      y += c[20] * S + c[21] * D;
    }
    output[i] = y + y0 * u + y1 * v + y2 + y3 * I;
    E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[2] = I0; s[3] = S0; s[4] = D0; s[7] = E0;
  if (to > from) { s[5] = vs; s[6] = vd; }
}

function smooth1(c: Float64Array, t: Float64Array, w: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0;
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
  const y0 = c[24];
  const y1 = c[25];
  const y2 = c[26];
  const y6 = c[30];
  const y7 = c[31];
  const on = c[50];
  const lambda = c[53];
  const scale = c[54];
  const inverseWidth = c[55];
  const slope = c[56];
  const pieces = c[60];
  let x0 = s[0];
  let u0 = s[1], v0 = s[2];
  let I0 = s[3], S0 = s[4], D0 = s[5], E0 = s[8], vs = s[6], vd = s[7];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    let a = a0 * x0 + a1 * u + a2 * v + a3 * u0 + a4 * v0 + a5 * I0 + a6;
    let b = b0 * x0 + b1 * u + b2 * v + b3 * u0 + b4 * v0 + b5 * I0 + b6;
    if (S0 != 0 || D0 != 0) {
      a += c[34] * S0 + c[35] * D0;
      b += c[38] * S0 + c[39] * D0;
    }
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      J = w[i * 5 + 4] * Math.sqrt(0.5 * (slopeAt(c, t, 48, vs) + slopeAt(c, t, 48, vd)));
      a += w[i * 5 + 0] + a7 * J;
      b += w[i * 5 + 1] + b7 * J;
    }
    I = 2 * I0 - E0;
    let settled = 0;
    for (let step = 0; step < 12; step++) {
      vs = a + a7 * I; vd = b + b7 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { Fs = termAt(c, t, 48, vs); fs = slopeAt(c, t, 48, vs); }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { Fd = termAt(c, t, 48, vd); fd = slopeAt(c, t, 48, vd); }
      }
      let h = Fs - Fd - I, slopes = a7 * fs - b7 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a7 * fs + b7 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b7 * fd + a7 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b7 - a7) * change;
      if (moved < 1e-8 && moved > -1e-8) { settled = 1; break; }
    }
    if (settled == 0) { I = searched(c, t, 48, 7, 15, a, b); s[9] += 1; }
    vs = a + a7 * I; vd = b + b7 * I;
    if (vs > on || vd > on) {
      conduct(c, t, 48, 7, 15, 32, s, 1, a, b, I);
      I = s[3]; S = s[4]; D = s[5]; vs = s[6]; vd = s[7];
    }
    I += J;
    let z0 = n0_0 * x0 + n0_1 * u + n0_2 * v + n0_3 * u0 + n0_4 * v0 + n0_5 * I0 + n0_6 + n0_7 * I;
    if (S0 != 0 || D0 != 0) {
      z0 += c[42] * S0 + c[43] * D0;
    }
    x0 = z0;
    let y = 0;
    if (noisy) {
      x0 += w[i * 5 + 2];
      y = w[i * 5 + 3];
    }
    if (S != 0 || D != 0) {
      x0 += c[40] * S + c[41] * D;
      y += c[44] * S + c[45] * D;
    }
    output[i] = y + y0 * x0 + y1 * u + y2 * v + y6 + y7 * I;
    u0 = u; v0 = v;
    E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = u0; s[2] = v0;
  s[3] = I0; s[4] = S0; s[5] = D0; s[8] = E0;
  if (to > from) { s[6] = vs; s[7] = vd; }
}

function smooth2(c: Float64Array, t: Float64Array, w: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0;
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
  const y0 = c[36];
  const y1 = c[37];
  const y2 = c[38];
  const y3 = c[39];
  const y7 = c[43];
  const y8 = c[44];
  const on = c[67];
  const lambda = c[70];
  const scale = c[71];
  const inverseWidth = c[72];
  const slope = c[73];
  const pieces = c[77];
  let x0 = s[0];
  let x1 = s[1];
  let u0 = s[2], v0 = s[3];
  let I0 = s[4], S0 = s[5], D0 = s[6], E0 = s[9], vs = s[7], vd = s[8];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    let a = a0 * x0 + a1 * x1 + a2 * u + a3 * v + a4 * u0 + a5 * v0 + a6 * I0 + a7;
    let b = b0 * x0 + b1 * x1 + b2 * u + b3 * v + b4 * u0 + b5 * v0 + b6 * I0 + b7;
    if (S0 != 0 || D0 != 0) {
      a += c[47] * S0 + c[48] * D0;
      b += c[51] * S0 + c[52] * D0;
    }
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      J = w[i * 6 + 5] * Math.sqrt(0.5 * (slopeAt(c, t, 65, vs) + slopeAt(c, t, 65, vd)));
      a += w[i * 6 + 0] + a8 * J;
      b += w[i * 6 + 1] + b8 * J;
    }
    I = 2 * I0 - E0;
    let settled = 0;
    for (let step = 0; step < 12; step++) {
      vs = a + a8 * I; vd = b + b8 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { Fs = termAt(c, t, 65, vs); fs = slopeAt(c, t, 65, vs); }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { Fd = termAt(c, t, 65, vd); fd = slopeAt(c, t, 65, vd); }
      }
      let h = Fs - Fd - I, slopes = a8 * fs - b8 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a8 * fs + b8 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b8 * fd + a8 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b8 - a8) * change;
      if (moved < 1e-8 && moved > -1e-8) { settled = 1; break; }
    }
    if (settled == 0) { I = searched(c, t, 65, 8, 17, a, b); s[10] += 1; }
    vs = a + a8 * I; vd = b + b8 * I;
    if (vs > on || vd > on) {
      conduct(c, t, 65, 8, 17, 45, s, 2, a, b, I);
      I = s[4]; S = s[5]; D = s[6]; vs = s[7]; vd = s[8];
    }
    I += J;
    let z0 = n0_0 * x0 + n0_1 * x1 + n0_2 * u + n0_3 * v + n0_4 * u0 + n0_5 * v0 + n0_6 * I0 + n0_7 + n0_8 * I;
    let z1 = n1_0 * x0 + n1_1 * x1 + n1_2 * u + n1_3 * v + n1_4 * u0 + n1_5 * v0 + n1_6 * I0 + n1_7 + n1_8 * I;
    if (S0 != 0 || D0 != 0) {
      z0 += c[55] * S0 + c[56] * D0;
      z1 += c[59] * S0 + c[60] * D0;
    }
    x0 = z0;
    x1 = z1;
    let y = 0;
    if (noisy) {
      x0 += w[i * 6 + 2];
      x1 += w[i * 6 + 3];
      y = w[i * 6 + 4];
    }
    if (S != 0 || D != 0) {
      x0 += c[53] * S + c[54] * D;
      x1 += c[57] * S + c[58] * D;
      y += c[61] * S + c[62] * D;
    }
    output[i] = y + y0 * x0 + y1 * x1 + y2 * u + y3 * v + y7 + y8 * I;
    u0 = u; v0 = v;
    E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = x1;
  s[2] = u0; s[3] = v0;
  s[4] = I0; s[5] = S0; s[6] = D0; s[9] = E0;
  if (to > from) { s[7] = vs; s[8] = vd; }
}

function smooth3(c: Float64Array, t: Float64Array, w: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const a4 = c[4];
  const a5 = c[5];
  const a6 = c[6];
  const a7 = c[7];
  const a8 = c[8];
  const a9 = c[9];
  const b0 = c[10];
  const b1 = c[11];
  const b2 = c[12];
  const b3 = c[13];
  const b4 = c[14];
  const b5 = c[15];
  const b6 = c[16];
  const b7 = c[17];
  const b8 = c[18];
  const b9 = c[19];
  const n0_0 = c[20];
  const n0_1 = c[21];
  const n0_2 = c[22];
  const n0_3 = c[23];
  const n0_4 = c[24];
  const n0_5 = c[25];
  const n0_6 = c[26];
  const n0_7 = c[27];
  const n0_8 = c[28];
  const n0_9 = c[29];
  const n1_0 = c[30];
  const n1_1 = c[31];
  const n1_2 = c[32];
  const n1_3 = c[33];
  const n1_4 = c[34];
  const n1_5 = c[35];
  const n1_6 = c[36];
  const n1_7 = c[37];
  const n1_8 = c[38];
  const n1_9 = c[39];
  const n2_0 = c[40];
  const n2_1 = c[41];
  const n2_2 = c[42];
  const n2_3 = c[43];
  const n2_4 = c[44];
  const n2_5 = c[45];
  const n2_6 = c[46];
  const n2_7 = c[47];
  const n2_8 = c[48];
  const n2_9 = c[49];
  const y0 = c[50];
  const y1 = c[51];
  const y2 = c[52];
  const y3 = c[53];
  const y4 = c[54];
  const y8 = c[58];
  const y9 = c[59];
  const on = c[86];
  const lambda = c[89];
  const scale = c[90];
  const inverseWidth = c[91];
  const slope = c[92];
  const pieces = c[96];
  let x0 = s[0];
  let x1 = s[1];
  let x2 = s[2];
  let u0 = s[3], v0 = s[4];
  let I0 = s[5], S0 = s[6], D0 = s[7], E0 = s[10], vs = s[8], vd = s[9];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    let a = a0 * x0 + a1 * x1 + a2 * x2 + a3 * u + a4 * v + a5 * u0 + a6 * v0 + a7 * I0 + a8;
    let b = b0 * x0 + b1 * x1 + b2 * x2 + b3 * u + b4 * v + b5 * u0 + b6 * v0 + b7 * I0 + b8;
    if (S0 != 0 || D0 != 0) {
      a += c[62] * S0 + c[63] * D0;
      b += c[66] * S0 + c[67] * D0;
    }
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      J = w[i * 7 + 6] * Math.sqrt(0.5 * (slopeAt(c, t, 84, vs) + slopeAt(c, t, 84, vd)));
      a += w[i * 7 + 0] + a9 * J;
      b += w[i * 7 + 1] + b9 * J;
    }
    I = 2 * I0 - E0;
    let settled = 0;
    for (let step = 0; step < 12; step++) {
      vs = a + a9 * I; vd = b + b9 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { Fs = termAt(c, t, 84, vs); fs = slopeAt(c, t, 84, vs); }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { Fd = termAt(c, t, 84, vd); fd = slopeAt(c, t, 84, vd); }
      }
      let h = Fs - Fd - I, slopes = a9 * fs - b9 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a9 * fs + b9 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b9 * fd + a9 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b9 - a9) * change;
      if (moved < 1e-8 && moved > -1e-8) { settled = 1; break; }
    }
    if (settled == 0) { I = searched(c, t, 84, 9, 19, a, b); s[11] += 1; }
    vs = a + a9 * I; vd = b + b9 * I;
    if (vs > on || vd > on) {
      conduct(c, t, 84, 9, 19, 60, s, 3, a, b, I);
      I = s[5]; S = s[6]; D = s[7]; vs = s[8]; vd = s[9];
    }
    I += J;
    let z0 = n0_0 * x0 + n0_1 * x1 + n0_2 * x2 + n0_3 * u + n0_4 * v + n0_5 * u0 + n0_6 * v0 + n0_7 * I0 + n0_8 + n0_9 * I;
    let z1 = n1_0 * x0 + n1_1 * x1 + n1_2 * x2 + n1_3 * u + n1_4 * v + n1_5 * u0 + n1_6 * v0 + n1_7 * I0 + n1_8 + n1_9 * I;
    let z2 = n2_0 * x0 + n2_1 * x1 + n2_2 * x2 + n2_3 * u + n2_4 * v + n2_5 * u0 + n2_6 * v0 + n2_7 * I0 + n2_8 + n2_9 * I;
    if (S0 != 0 || D0 != 0) {
      z0 += c[70] * S0 + c[71] * D0;
      z1 += c[74] * S0 + c[75] * D0;
      z2 += c[78] * S0 + c[79] * D0;
    }
    x0 = z0;
    x1 = z1;
    x2 = z2;
    let y = 0;
    if (noisy) {
      x0 += w[i * 7 + 2];
      x1 += w[i * 7 + 3];
      x2 += w[i * 7 + 4];
      y = w[i * 7 + 5];
    }
    if (S != 0 || D != 0) {
      x0 += c[68] * S + c[69] * D;
      x1 += c[72] * S + c[73] * D;
      x2 += c[76] * S + c[77] * D;
      y += c[80] * S + c[81] * D;
    }
    output[i] = y + y0 * x0 + y1 * x1 + y2 * x2 + y3 * u + y4 * v + y8 + y9 * I;
    u0 = u; v0 = v;
    E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = x1;
  s[2] = x2;
  s[3] = u0; s[4] = v0;
  s[5] = I0; s[6] = S0; s[7] = D0; s[10] = E0;
  if (to > from) { s[8] = vs; s[9] = vd; }
}

function smooth4(c: Float64Array, t: Float64Array, w: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const a4 = c[4];
  const a5 = c[5];
  const a6 = c[6];
  const a7 = c[7];
  const a8 = c[8];
  const a9 = c[9];
  const a10 = c[10];
  const b0 = c[11];
  const b1 = c[12];
  const b2 = c[13];
  const b3 = c[14];
  const b4 = c[15];
  const b5 = c[16];
  const b6 = c[17];
  const b7 = c[18];
  const b8 = c[19];
  const b9 = c[20];
  const b10 = c[21];
  const n0_0 = c[22];
  const n0_1 = c[23];
  const n0_2 = c[24];
  const n0_3 = c[25];
  const n0_4 = c[26];
  const n0_5 = c[27];
  const n0_6 = c[28];
  const n0_7 = c[29];
  const n0_8 = c[30];
  const n0_9 = c[31];
  const n0_10 = c[32];
  const n1_0 = c[33];
  const n1_1 = c[34];
  const n1_2 = c[35];
  const n1_3 = c[36];
  const n1_4 = c[37];
  const n1_5 = c[38];
  const n1_6 = c[39];
  const n1_7 = c[40];
  const n1_8 = c[41];
  const n1_9 = c[42];
  const n1_10 = c[43];
  const n2_0 = c[44];
  const n2_1 = c[45];
  const n2_2 = c[46];
  const n2_3 = c[47];
  const n2_4 = c[48];
  const n2_5 = c[49];
  const n2_6 = c[50];
  const n2_7 = c[51];
  const n2_8 = c[52];
  const n2_9 = c[53];
  const n2_10 = c[54];
  const n3_0 = c[55];
  const n3_1 = c[56];
  const n3_2 = c[57];
  const n3_3 = c[58];
  const n3_4 = c[59];
  const n3_5 = c[60];
  const n3_6 = c[61];
  const n3_7 = c[62];
  const n3_8 = c[63];
  const n3_9 = c[64];
  const n3_10 = c[65];
  const y0 = c[66];
  const y1 = c[67];
  const y2 = c[68];
  const y3 = c[69];
  const y4 = c[70];
  const y5 = c[71];
  const y9 = c[75];
  const y10 = c[76];
  const on = c[107];
  const lambda = c[110];
  const scale = c[111];
  const inverseWidth = c[112];
  const slope = c[113];
  const pieces = c[117];
  let x0 = s[0];
  let x1 = s[1];
  let x2 = s[2];
  let x3 = s[3];
  let u0 = s[4], v0 = s[5];
  let I0 = s[6], S0 = s[7], D0 = s[8], E0 = s[11], vs = s[9], vd = s[10];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    let a = a0 * x0 + a1 * x1 + a2 * x2 + a3 * x3 + a4 * u + a5 * v + a6 * u0 + a7 * v0 + a8 * I0 + a9;
    let b = b0 * x0 + b1 * x1 + b2 * x2 + b3 * x3 + b4 * u + b5 * v + b6 * u0 + b7 * v0 + b8 * I0 + b9;
    if (S0 != 0 || D0 != 0) {
      a += c[79] * S0 + c[80] * D0;
      b += c[83] * S0 + c[84] * D0;
    }
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      J = w[i * 8 + 7] * Math.sqrt(0.5 * (slopeAt(c, t, 105, vs) + slopeAt(c, t, 105, vd)));
      a += w[i * 8 + 0] + a10 * J;
      b += w[i * 8 + 1] + b10 * J;
    }
    I = 2 * I0 - E0;
    let settled = 0;
    for (let step = 0; step < 12; step++) {
      vs = a + a10 * I; vd = b + b10 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { Fs = termAt(c, t, 105, vs); fs = slopeAt(c, t, 105, vs); }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { Fd = termAt(c, t, 105, vd); fd = slopeAt(c, t, 105, vd); }
      }
      let h = Fs - Fd - I, slopes = a10 * fs - b10 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a10 * fs + b10 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b10 * fd + a10 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b10 - a10) * change;
      if (moved < 1e-8 && moved > -1e-8) { settled = 1; break; }
    }
    if (settled == 0) { I = searched(c, t, 105, 10, 21, a, b); s[12] += 1; }
    vs = a + a10 * I; vd = b + b10 * I;
    if (vs > on || vd > on) {
      conduct(c, t, 105, 10, 21, 77, s, 4, a, b, I);
      I = s[6]; S = s[7]; D = s[8]; vs = s[9]; vd = s[10];
    }
    I += J;
    let z0 = n0_0 * x0 + n0_1 * x1 + n0_2 * x2 + n0_3 * x3 + n0_4 * u + n0_5 * v + n0_6 * u0 + n0_7 * v0 + n0_8 * I0 + n0_9 + n0_10 * I;
    let z1 = n1_0 * x0 + n1_1 * x1 + n1_2 * x2 + n1_3 * x3 + n1_4 * u + n1_5 * v + n1_6 * u0 + n1_7 * v0 + n1_8 * I0 + n1_9 + n1_10 * I;
    let z2 = n2_0 * x0 + n2_1 * x1 + n2_2 * x2 + n2_3 * x3 + n2_4 * u + n2_5 * v + n2_6 * u0 + n2_7 * v0 + n2_8 * I0 + n2_9 + n2_10 * I;
    let z3 = n3_0 * x0 + n3_1 * x1 + n3_2 * x2 + n3_3 * x3 + n3_4 * u + n3_5 * v + n3_6 * u0 + n3_7 * v0 + n3_8 * I0 + n3_9 + n3_10 * I;
    if (S0 != 0 || D0 != 0) {
      z0 += c[87] * S0 + c[88] * D0;
      z1 += c[91] * S0 + c[92] * D0;
      z2 += c[95] * S0 + c[96] * D0;
      z3 += c[99] * S0 + c[100] * D0;
    }
    x0 = z0;
    x1 = z1;
    x2 = z2;
    x3 = z3;
    let y = 0;
    if (noisy) {
      x0 += w[i * 8 + 2];
      x1 += w[i * 8 + 3];
      x2 += w[i * 8 + 4];
      x3 += w[i * 8 + 5];
      y = w[i * 8 + 6];
    }
    if (S != 0 || D != 0) {
      x0 += c[85] * S + c[86] * D;
      x1 += c[89] * S + c[90] * D;
      x2 += c[93] * S + c[94] * D;
      x3 += c[97] * S + c[98] * D;
      y += c[101] * S + c[102] * D;
    }
    output[i] = y + y0 * x0 + y1 * x1 + y2 * x2 + y3 * x3 + y4 * u + y5 * v + y9 + y10 * I;
    u0 = u; v0 = v;
    E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = x1;
  s[2] = x2;
  s[3] = x3;
  s[4] = u0; s[5] = v0;
  s[6] = I0; s[7] = S0; s[8] = D0; s[11] = E0;
  if (to > from) { s[9] = vs; s[10] = vd; }
}

function smooth5(c: Float64Array, t: Float64Array, w: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const a4 = c[4];
  const a5 = c[5];
  const a6 = c[6];
  const a7 = c[7];
  const a8 = c[8];
  const a9 = c[9];
  const a10 = c[10];
  const a11 = c[11];
  const b0 = c[12];
  const b1 = c[13];
  const b2 = c[14];
  const b3 = c[15];
  const b4 = c[16];
  const b5 = c[17];
  const b6 = c[18];
  const b7 = c[19];
  const b8 = c[20];
  const b9 = c[21];
  const b10 = c[22];
  const b11 = c[23];
  const n0_0 = c[24];
  const n0_1 = c[25];
  const n0_2 = c[26];
  const n0_3 = c[27];
  const n0_4 = c[28];
  const n0_5 = c[29];
  const n0_6 = c[30];
  const n0_7 = c[31];
  const n0_8 = c[32];
  const n0_9 = c[33];
  const n0_10 = c[34];
  const n0_11 = c[35];
  const n1_0 = c[36];
  const n1_1 = c[37];
  const n1_2 = c[38];
  const n1_3 = c[39];
  const n1_4 = c[40];
  const n1_5 = c[41];
  const n1_6 = c[42];
  const n1_7 = c[43];
  const n1_8 = c[44];
  const n1_9 = c[45];
  const n1_10 = c[46];
  const n1_11 = c[47];
  const n2_0 = c[48];
  const n2_1 = c[49];
  const n2_2 = c[50];
  const n2_3 = c[51];
  const n2_4 = c[52];
  const n2_5 = c[53];
  const n2_6 = c[54];
  const n2_7 = c[55];
  const n2_8 = c[56];
  const n2_9 = c[57];
  const n2_10 = c[58];
  const n2_11 = c[59];
  const n3_0 = c[60];
  const n3_1 = c[61];
  const n3_2 = c[62];
  const n3_3 = c[63];
  const n3_4 = c[64];
  const n3_5 = c[65];
  const n3_6 = c[66];
  const n3_7 = c[67];
  const n3_8 = c[68];
  const n3_9 = c[69];
  const n3_10 = c[70];
  const n3_11 = c[71];
  const n4_0 = c[72];
  const n4_1 = c[73];
  const n4_2 = c[74];
  const n4_3 = c[75];
  const n4_4 = c[76];
  const n4_5 = c[77];
  const n4_6 = c[78];
  const n4_7 = c[79];
  const n4_8 = c[80];
  const n4_9 = c[81];
  const n4_10 = c[82];
  const n4_11 = c[83];
  const y0 = c[84];
  const y1 = c[85];
  const y2 = c[86];
  const y3 = c[87];
  const y4 = c[88];
  const y5 = c[89];
  const y6 = c[90];
  const y10 = c[94];
  const y11 = c[95];
  const on = c[130];
  const lambda = c[133];
  const scale = c[134];
  const inverseWidth = c[135];
  const slope = c[136];
  const pieces = c[140];
  let x0 = s[0];
  let x1 = s[1];
  let x2 = s[2];
  let x3 = s[3];
  let x4 = s[4];
  let u0 = s[5], v0 = s[6];
  let I0 = s[7], S0 = s[8], D0 = s[9], E0 = s[12], vs = s[10], vd = s[11];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    let a = a0 * x0 + a1 * x1 + a2 * x2 + a3 * x3 + a4 * x4 + a5 * u + a6 * v + a7 * u0 + a8 * v0 + a9 * I0 + a10;
    let b = b0 * x0 + b1 * x1 + b2 * x2 + b3 * x3 + b4 * x4 + b5 * u + b6 * v + b7 * u0 + b8 * v0 + b9 * I0 + b10;
    if (S0 != 0 || D0 != 0) {
      a += c[98] * S0 + c[99] * D0;
      b += c[102] * S0 + c[103] * D0;
    }
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      J = w[i * 9 + 8] * Math.sqrt(0.5 * (slopeAt(c, t, 128, vs) + slopeAt(c, t, 128, vd)));
      a += w[i * 9 + 0] + a11 * J;
      b += w[i * 9 + 1] + b11 * J;
    }
    I = 2 * I0 - E0;
    let settled = 0;
    for (let step = 0; step < 12; step++) {
      vs = a + a11 * I; vd = b + b11 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { Fs = termAt(c, t, 128, vs); fs = slopeAt(c, t, 128, vs); }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { Fd = termAt(c, t, 128, vd); fd = slopeAt(c, t, 128, vd); }
      }
      let h = Fs - Fd - I, slopes = a11 * fs - b11 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a11 * fs + b11 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b11 * fd + a11 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b11 - a11) * change;
      if (moved < 1e-8 && moved > -1e-8) { settled = 1; break; }
    }
    if (settled == 0) { I = searched(c, t, 128, 11, 23, a, b); s[13] += 1; }
    vs = a + a11 * I; vd = b + b11 * I;
    if (vs > on || vd > on) {
      conduct(c, t, 128, 11, 23, 96, s, 5, a, b, I);
      I = s[7]; S = s[8]; D = s[9]; vs = s[10]; vd = s[11];
    }
    I += J;
    let z0 = n0_0 * x0 + n0_1 * x1 + n0_2 * x2 + n0_3 * x3 + n0_4 * x4 + n0_5 * u + n0_6 * v + n0_7 * u0 + n0_8 * v0 + n0_9 * I0 + n0_10 + n0_11 * I;
    let z1 = n1_0 * x0 + n1_1 * x1 + n1_2 * x2 + n1_3 * x3 + n1_4 * x4 + n1_5 * u + n1_6 * v + n1_7 * u0 + n1_8 * v0 + n1_9 * I0 + n1_10 + n1_11 * I;
    let z2 = n2_0 * x0 + n2_1 * x1 + n2_2 * x2 + n2_3 * x3 + n2_4 * x4 + n2_5 * u + n2_6 * v + n2_7 * u0 + n2_8 * v0 + n2_9 * I0 + n2_10 + n2_11 * I;
    let z3 = n3_0 * x0 + n3_1 * x1 + n3_2 * x2 + n3_3 * x3 + n3_4 * x4 + n3_5 * u + n3_6 * v + n3_7 * u0 + n3_8 * v0 + n3_9 * I0 + n3_10 + n3_11 * I;
    let z4 = n4_0 * x0 + n4_1 * x1 + n4_2 * x2 + n4_3 * x3 + n4_4 * x4 + n4_5 * u + n4_6 * v + n4_7 * u0 + n4_8 * v0 + n4_9 * I0 + n4_10 + n4_11 * I;
    if (S0 != 0 || D0 != 0) {
      z0 += c[106] * S0 + c[107] * D0;
      z1 += c[110] * S0 + c[111] * D0;
      z2 += c[114] * S0 + c[115] * D0;
      z3 += c[118] * S0 + c[119] * D0;
      z4 += c[122] * S0 + c[123] * D0;
    }
    x0 = z0;
    x1 = z1;
    x2 = z2;
    x3 = z3;
    x4 = z4;
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
      x0 += c[104] * S + c[105] * D;
      x1 += c[108] * S + c[109] * D;
      x2 += c[112] * S + c[113] * D;
      x3 += c[116] * S + c[117] * D;
      x4 += c[120] * S + c[121] * D;
      y += c[124] * S + c[125] * D;
    }
    output[i] = y + y0 * x0 + y1 * x1 + y2 * x2 + y3 * x3 + y4 * x4 + y5 * u + y6 * v + y10 + y11 * I;
    u0 = u; v0 = v;
    E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = x1;
  s[2] = x2;
  s[3] = x3;
  s[4] = x4;
  s[5] = u0; s[6] = v0;
  s[7] = I0; s[8] = S0; s[9] = D0; s[12] = E0;
  if (to > from) { s[10] = vs; s[11] = vd; }
}

function smooth6(c: Float64Array, t: Float64Array, w: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const a4 = c[4];
  const a5 = c[5];
  const a6 = c[6];
  const a7 = c[7];
  const a8 = c[8];
  const a9 = c[9];
  const a10 = c[10];
  const a11 = c[11];
  const a12 = c[12];
  const b0 = c[13];
  const b1 = c[14];
  const b2 = c[15];
  const b3 = c[16];
  const b4 = c[17];
  const b5 = c[18];
  const b6 = c[19];
  const b7 = c[20];
  const b8 = c[21];
  const b9 = c[22];
  const b10 = c[23];
  const b11 = c[24];
  const b12 = c[25];
  const n0_0 = c[26];
  const n0_1 = c[27];
  const n0_2 = c[28];
  const n0_3 = c[29];
  const n0_4 = c[30];
  const n0_5 = c[31];
  const n0_6 = c[32];
  const n0_7 = c[33];
  const n0_8 = c[34];
  const n0_9 = c[35];
  const n0_10 = c[36];
  const n0_11 = c[37];
  const n0_12 = c[38];
  const n1_0 = c[39];
  const n1_1 = c[40];
  const n1_2 = c[41];
  const n1_3 = c[42];
  const n1_4 = c[43];
  const n1_5 = c[44];
  const n1_6 = c[45];
  const n1_7 = c[46];
  const n1_8 = c[47];
  const n1_9 = c[48];
  const n1_10 = c[49];
  const n1_11 = c[50];
  const n1_12 = c[51];
  const n2_0 = c[52];
  const n2_1 = c[53];
  const n2_2 = c[54];
  const n2_3 = c[55];
  const n2_4 = c[56];
  const n2_5 = c[57];
  const n2_6 = c[58];
  const n2_7 = c[59];
  const n2_8 = c[60];
  const n2_9 = c[61];
  const n2_10 = c[62];
  const n2_11 = c[63];
  const n2_12 = c[64];
  const n3_0 = c[65];
  const n3_1 = c[66];
  const n3_2 = c[67];
  const n3_3 = c[68];
  const n3_4 = c[69];
  const n3_5 = c[70];
  const n3_6 = c[71];
  const n3_7 = c[72];
  const n3_8 = c[73];
  const n3_9 = c[74];
  const n3_10 = c[75];
  const n3_11 = c[76];
  const n3_12 = c[77];
  const n4_0 = c[78];
  const n4_1 = c[79];
  const n4_2 = c[80];
  const n4_3 = c[81];
  const n4_4 = c[82];
  const n4_5 = c[83];
  const n4_6 = c[84];
  const n4_7 = c[85];
  const n4_8 = c[86];
  const n4_9 = c[87];
  const n4_10 = c[88];
  const n4_11 = c[89];
  const n4_12 = c[90];
  const n5_0 = c[91];
  const n5_1 = c[92];
  const n5_2 = c[93];
  const n5_3 = c[94];
  const n5_4 = c[95];
  const n5_5 = c[96];
  const n5_6 = c[97];
  const n5_7 = c[98];
  const n5_8 = c[99];
  const n5_9 = c[100];
  const n5_10 = c[101];
  const n5_11 = c[102];
  const n5_12 = c[103];
  const y0 = c[104];
  const y1 = c[105];
  const y2 = c[106];
  const y3 = c[107];
  const y4 = c[108];
  const y5 = c[109];
  const y6 = c[110];
  const y7 = c[111];
  const y11 = c[115];
  const y12 = c[116];
  const on = c[155];
  const lambda = c[158];
  const scale = c[159];
  const inverseWidth = c[160];
  const slope = c[161];
  const pieces = c[165];
  let x0 = s[0];
  let x1 = s[1];
  let x2 = s[2];
  let x3 = s[3];
  let x4 = s[4];
  let x5 = s[5];
  let u0 = s[6], v0 = s[7];
  let I0 = s[8], S0 = s[9], D0 = s[10], E0 = s[13], vs = s[11], vd = s[12];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    let a = a0 * x0 + a1 * x1 + a2 * x2 + a3 * x3 + a4 * x4 + a5 * x5 + a6 * u + a7 * v + a8 * u0 + a9 * v0 + a10 * I0 + a11;
    let b = b0 * x0 + b1 * x1 + b2 * x2 + b3 * x3 + b4 * x4 + b5 * x5 + b6 * u + b7 * v + b8 * u0 + b9 * v0 + b10 * I0 + b11;
    if (S0 != 0 || D0 != 0) {
      a += c[119] * S0 + c[120] * D0;
      b += c[123] * S0 + c[124] * D0;
    }
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      J = w[i * 10 + 9] * Math.sqrt(0.5 * (slopeAt(c, t, 153, vs) + slopeAt(c, t, 153, vd)));
      a += w[i * 10 + 0] + a12 * J;
      b += w[i * 10 + 1] + b12 * J;
    }
    I = 2 * I0 - E0;
    let settled = 0;
    for (let step = 0; step < 12; step++) {
      vs = a + a12 * I; vd = b + b12 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { Fs = termAt(c, t, 153, vs); fs = slopeAt(c, t, 153, vs); }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { Fd = termAt(c, t, 153, vd); fd = slopeAt(c, t, 153, vd); }
      }
      let h = Fs - Fd - I, slopes = a12 * fs - b12 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a12 * fs + b12 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b12 * fd + a12 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b12 - a12) * change;
      if (moved < 1e-8 && moved > -1e-8) { settled = 1; break; }
    }
    if (settled == 0) { I = searched(c, t, 153, 12, 25, a, b); s[14] += 1; }
    vs = a + a12 * I; vd = b + b12 * I;
    if (vs > on || vd > on) {
      conduct(c, t, 153, 12, 25, 117, s, 6, a, b, I);
      I = s[8]; S = s[9]; D = s[10]; vs = s[11]; vd = s[12];
    }
    I += J;
    let z0 = n0_0 * x0 + n0_1 * x1 + n0_2 * x2 + n0_3 * x3 + n0_4 * x4 + n0_5 * x5 + n0_6 * u + n0_7 * v + n0_8 * u0 + n0_9 * v0 + n0_10 * I0 + n0_11 + n0_12 * I;
    let z1 = n1_0 * x0 + n1_1 * x1 + n1_2 * x2 + n1_3 * x3 + n1_4 * x4 + n1_5 * x5 + n1_6 * u + n1_7 * v + n1_8 * u0 + n1_9 * v0 + n1_10 * I0 + n1_11 + n1_12 * I;
    let z2 = n2_0 * x0 + n2_1 * x1 + n2_2 * x2 + n2_3 * x3 + n2_4 * x4 + n2_5 * x5 + n2_6 * u + n2_7 * v + n2_8 * u0 + n2_9 * v0 + n2_10 * I0 + n2_11 + n2_12 * I;
    let z3 = n3_0 * x0 + n3_1 * x1 + n3_2 * x2 + n3_3 * x3 + n3_4 * x4 + n3_5 * x5 + n3_6 * u + n3_7 * v + n3_8 * u0 + n3_9 * v0 + n3_10 * I0 + n3_11 + n3_12 * I;
    let z4 = n4_0 * x0 + n4_1 * x1 + n4_2 * x2 + n4_3 * x3 + n4_4 * x4 + n4_5 * x5 + n4_6 * u + n4_7 * v + n4_8 * u0 + n4_9 * v0 + n4_10 * I0 + n4_11 + n4_12 * I;
    let z5 = n5_0 * x0 + n5_1 * x1 + n5_2 * x2 + n5_3 * x3 + n5_4 * x4 + n5_5 * x5 + n5_6 * u + n5_7 * v + n5_8 * u0 + n5_9 * v0 + n5_10 * I0 + n5_11 + n5_12 * I;
    if (S0 != 0 || D0 != 0) {
      z0 += c[127] * S0 + c[128] * D0;
      z1 += c[131] * S0 + c[132] * D0;
      z2 += c[135] * S0 + c[136] * D0;
      z3 += c[139] * S0 + c[140] * D0;
      z4 += c[143] * S0 + c[144] * D0;
      z5 += c[147] * S0 + c[148] * D0;
    }
    x0 = z0;
    x1 = z1;
    x2 = z2;
    x3 = z3;
    x4 = z4;
    x5 = z5;
    let y = 0;
    if (noisy) {
      x0 += w[i * 10 + 2];
      x1 += w[i * 10 + 3];
      x2 += w[i * 10 + 4];
      x3 += w[i * 10 + 5];
      x4 += w[i * 10 + 6];
      x5 += w[i * 10 + 7];
      y = w[i * 10 + 8];
    }
    if (S != 0 || D != 0) {
      x0 += c[125] * S + c[126] * D;
      x1 += c[129] * S + c[130] * D;
      x2 += c[133] * S + c[134] * D;
      x3 += c[137] * S + c[138] * D;
      x4 += c[141] * S + c[142] * D;
      x5 += c[145] * S + c[146] * D;
      y += c[149] * S + c[150] * D;
    }
    output[i] = y + y0 * x0 + y1 * x1 + y2 * x2 + y3 * x3 + y4 * x4 + y5 * x5 + y6 * u + y7 * v + y11 + y12 * I;
    u0 = u; v0 = v;
    E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = x1;
  s[2] = x2;
  s[3] = x3;
  s[4] = x4;
  s[5] = x5;
  s[6] = u0; s[7] = v0;
  s[8] = I0; s[9] = S0; s[10] = D0; s[13] = E0;
  if (to > from) { s[11] = vs; s[12] = vd; }
}

function smooth7(c: Float64Array, t: Float64Array, w: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const a4 = c[4];
  const a5 = c[5];
  const a6 = c[6];
  const a7 = c[7];
  const a8 = c[8];
  const a9 = c[9];
  const a10 = c[10];
  const a11 = c[11];
  const a12 = c[12];
  const a13 = c[13];
  const b0 = c[14];
  const b1 = c[15];
  const b2 = c[16];
  const b3 = c[17];
  const b4 = c[18];
  const b5 = c[19];
  const b6 = c[20];
  const b7 = c[21];
  const b8 = c[22];
  const b9 = c[23];
  const b10 = c[24];
  const b11 = c[25];
  const b12 = c[26];
  const b13 = c[27];
  const n0_0 = c[28];
  const n0_1 = c[29];
  const n0_2 = c[30];
  const n0_3 = c[31];
  const n0_4 = c[32];
  const n0_5 = c[33];
  const n0_6 = c[34];
  const n0_7 = c[35];
  const n0_8 = c[36];
  const n0_9 = c[37];
  const n0_10 = c[38];
  const n0_11 = c[39];
  const n0_12 = c[40];
  const n0_13 = c[41];
  const n1_0 = c[42];
  const n1_1 = c[43];
  const n1_2 = c[44];
  const n1_3 = c[45];
  const n1_4 = c[46];
  const n1_5 = c[47];
  const n1_6 = c[48];
  const n1_7 = c[49];
  const n1_8 = c[50];
  const n1_9 = c[51];
  const n1_10 = c[52];
  const n1_11 = c[53];
  const n1_12 = c[54];
  const n1_13 = c[55];
  const n2_0 = c[56];
  const n2_1 = c[57];
  const n2_2 = c[58];
  const n2_3 = c[59];
  const n2_4 = c[60];
  const n2_5 = c[61];
  const n2_6 = c[62];
  const n2_7 = c[63];
  const n2_8 = c[64];
  const n2_9 = c[65];
  const n2_10 = c[66];
  const n2_11 = c[67];
  const n2_12 = c[68];
  const n2_13 = c[69];
  const n3_0 = c[70];
  const n3_1 = c[71];
  const n3_2 = c[72];
  const n3_3 = c[73];
  const n3_4 = c[74];
  const n3_5 = c[75];
  const n3_6 = c[76];
  const n3_7 = c[77];
  const n3_8 = c[78];
  const n3_9 = c[79];
  const n3_10 = c[80];
  const n3_11 = c[81];
  const n3_12 = c[82];
  const n3_13 = c[83];
  const n4_0 = c[84];
  const n4_1 = c[85];
  const n4_2 = c[86];
  const n4_3 = c[87];
  const n4_4 = c[88];
  const n4_5 = c[89];
  const n4_6 = c[90];
  const n4_7 = c[91];
  const n4_8 = c[92];
  const n4_9 = c[93];
  const n4_10 = c[94];
  const n4_11 = c[95];
  const n4_12 = c[96];
  const n4_13 = c[97];
  const n5_0 = c[98];
  const n5_1 = c[99];
  const n5_2 = c[100];
  const n5_3 = c[101];
  const n5_4 = c[102];
  const n5_5 = c[103];
  const n5_6 = c[104];
  const n5_7 = c[105];
  const n5_8 = c[106];
  const n5_9 = c[107];
  const n5_10 = c[108];
  const n5_11 = c[109];
  const n5_12 = c[110];
  const n5_13 = c[111];
  const n6_0 = c[112];
  const n6_1 = c[113];
  const n6_2 = c[114];
  const n6_3 = c[115];
  const n6_4 = c[116];
  const n6_5 = c[117];
  const n6_6 = c[118];
  const n6_7 = c[119];
  const n6_8 = c[120];
  const n6_9 = c[121];
  const n6_10 = c[122];
  const n6_11 = c[123];
  const n6_12 = c[124];
  const n6_13 = c[125];
  const y0 = c[126];
  const y1 = c[127];
  const y2 = c[128];
  const y3 = c[129];
  const y4 = c[130];
  const y5 = c[131];
  const y6 = c[132];
  const y7 = c[133];
  const y8 = c[134];
  const y12 = c[138];
  const y13 = c[139];
  const on = c[182];
  const lambda = c[185];
  const scale = c[186];
  const inverseWidth = c[187];
  const slope = c[188];
  const pieces = c[192];
  let x0 = s[0];
  let x1 = s[1];
  let x2 = s[2];
  let x3 = s[3];
  let x4 = s[4];
  let x5 = s[5];
  let x6 = s[6];
  let u0 = s[7], v0 = s[8];
  let I0 = s[9], S0 = s[10], D0 = s[11], E0 = s[14], vs = s[12], vd = s[13];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    let a = a0 * x0 + a1 * x1 + a2 * x2 + a3 * x3 + a4 * x4 + a5 * x5 + a6 * x6 + a7 * u + a8 * v + a9 * u0 + a10 * v0 + a11 * I0 + a12;
    let b = b0 * x0 + b1 * x1 + b2 * x2 + b3 * x3 + b4 * x4 + b5 * x5 + b6 * x6 + b7 * u + b8 * v + b9 * u0 + b10 * v0 + b11 * I0 + b12;
    if (S0 != 0 || D0 != 0) {
      a += c[142] * S0 + c[143] * D0;
      b += c[146] * S0 + c[147] * D0;
    }
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      J = w[i * 11 + 10] * Math.sqrt(0.5 * (slopeAt(c, t, 180, vs) + slopeAt(c, t, 180, vd)));
      a += w[i * 11 + 0] + a13 * J;
      b += w[i * 11 + 1] + b13 * J;
    }
    I = 2 * I0 - E0;
    let settled = 0;
    for (let step = 0; step < 12; step++) {
      vs = a + a13 * I; vd = b + b13 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { Fs = termAt(c, t, 180, vs); fs = slopeAt(c, t, 180, vs); }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { Fd = termAt(c, t, 180, vd); fd = slopeAt(c, t, 180, vd); }
      }
      let h = Fs - Fd - I, slopes = a13 * fs - b13 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a13 * fs + b13 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b13 * fd + a13 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b13 - a13) * change;
      if (moved < 1e-8 && moved > -1e-8) { settled = 1; break; }
    }
    if (settled == 0) { I = searched(c, t, 180, 13, 27, a, b); s[15] += 1; }
    vs = a + a13 * I; vd = b + b13 * I;
    if (vs > on || vd > on) {
      conduct(c, t, 180, 13, 27, 140, s, 7, a, b, I);
      I = s[9]; S = s[10]; D = s[11]; vs = s[12]; vd = s[13];
    }
    I += J;
    let z0 = n0_0 * x0 + n0_1 * x1 + n0_2 * x2 + n0_3 * x3 + n0_4 * x4 + n0_5 * x5 + n0_6 * x6 + n0_7 * u + n0_8 * v + n0_9 * u0 + n0_10 * v0 + n0_11 * I0 + n0_12 + n0_13 * I;
    let z1 = n1_0 * x0 + n1_1 * x1 + n1_2 * x2 + n1_3 * x3 + n1_4 * x4 + n1_5 * x5 + n1_6 * x6 + n1_7 * u + n1_8 * v + n1_9 * u0 + n1_10 * v0 + n1_11 * I0 + n1_12 + n1_13 * I;
    let z2 = n2_0 * x0 + n2_1 * x1 + n2_2 * x2 + n2_3 * x3 + n2_4 * x4 + n2_5 * x5 + n2_6 * x6 + n2_7 * u + n2_8 * v + n2_9 * u0 + n2_10 * v0 + n2_11 * I0 + n2_12 + n2_13 * I;
    let z3 = n3_0 * x0 + n3_1 * x1 + n3_2 * x2 + n3_3 * x3 + n3_4 * x4 + n3_5 * x5 + n3_6 * x6 + n3_7 * u + n3_8 * v + n3_9 * u0 + n3_10 * v0 + n3_11 * I0 + n3_12 + n3_13 * I;
    let z4 = n4_0 * x0 + n4_1 * x1 + n4_2 * x2 + n4_3 * x3 + n4_4 * x4 + n4_5 * x5 + n4_6 * x6 + n4_7 * u + n4_8 * v + n4_9 * u0 + n4_10 * v0 + n4_11 * I0 + n4_12 + n4_13 * I;
    let z5 = n5_0 * x0 + n5_1 * x1 + n5_2 * x2 + n5_3 * x3 + n5_4 * x4 + n5_5 * x5 + n5_6 * x6 + n5_7 * u + n5_8 * v + n5_9 * u0 + n5_10 * v0 + n5_11 * I0 + n5_12 + n5_13 * I;
    let z6 = n6_0 * x0 + n6_1 * x1 + n6_2 * x2 + n6_3 * x3 + n6_4 * x4 + n6_5 * x5 + n6_6 * x6 + n6_7 * u + n6_8 * v + n6_9 * u0 + n6_10 * v0 + n6_11 * I0 + n6_12 + n6_13 * I;
    if (S0 != 0 || D0 != 0) {
      z0 += c[150] * S0 + c[151] * D0;
      z1 += c[154] * S0 + c[155] * D0;
      z2 += c[158] * S0 + c[159] * D0;
      z3 += c[162] * S0 + c[163] * D0;
      z4 += c[166] * S0 + c[167] * D0;
      z5 += c[170] * S0 + c[171] * D0;
      z6 += c[174] * S0 + c[175] * D0;
    }
    x0 = z0;
    x1 = z1;
    x2 = z2;
    x3 = z3;
    x4 = z4;
    x5 = z5;
    x6 = z6;
    let y = 0;
    if (noisy) {
      x0 += w[i * 11 + 2];
      x1 += w[i * 11 + 3];
      x2 += w[i * 11 + 4];
      x3 += w[i * 11 + 5];
      x4 += w[i * 11 + 6];
      x5 += w[i * 11 + 7];
      x6 += w[i * 11 + 8];
      y = w[i * 11 + 9];
    }
    if (S != 0 || D != 0) {
      x0 += c[148] * S + c[149] * D;
      x1 += c[152] * S + c[153] * D;
      x2 += c[156] * S + c[157] * D;
      x3 += c[160] * S + c[161] * D;
      x4 += c[164] * S + c[165] * D;
      x5 += c[168] * S + c[169] * D;
      x6 += c[172] * S + c[173] * D;
      y += c[176] * S + c[177] * D;
    }
    output[i] = y + y0 * x0 + y1 * x1 + y2 * x2 + y3 * x3 + y4 * x4 + y5 * x5 + y6 * x6 + y7 * u + y8 * v + y12 + y13 * I;
    u0 = u; v0 = v;
    E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = x1;
  s[2] = x2;
  s[3] = x3;
  s[4] = x4;
  s[5] = x5;
  s[6] = x6;
  s[7] = u0; s[8] = v0;
  s[9] = I0; s[10] = S0; s[11] = D0; s[14] = E0;
  if (to > from) { s[12] = vs; s[13] = vd; }
}

function smooth8(c: Float64Array, t: Float64Array, w: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
  const noisy = w.length > 0;
  const a0 = c[0];
  const a1 = c[1];
  const a2 = c[2];
  const a3 = c[3];
  const a4 = c[4];
  const a5 = c[5];
  const a6 = c[6];
  const a7 = c[7];
  const a8 = c[8];
  const a9 = c[9];
  const a10 = c[10];
  const a11 = c[11];
  const a12 = c[12];
  const a13 = c[13];
  const a14 = c[14];
  const b0 = c[15];
  const b1 = c[16];
  const b2 = c[17];
  const b3 = c[18];
  const b4 = c[19];
  const b5 = c[20];
  const b6 = c[21];
  const b7 = c[22];
  const b8 = c[23];
  const b9 = c[24];
  const b10 = c[25];
  const b11 = c[26];
  const b12 = c[27];
  const b13 = c[28];
  const b14 = c[29];
  const n0_0 = c[30];
  const n0_1 = c[31];
  const n0_2 = c[32];
  const n0_3 = c[33];
  const n0_4 = c[34];
  const n0_5 = c[35];
  const n0_6 = c[36];
  const n0_7 = c[37];
  const n0_8 = c[38];
  const n0_9 = c[39];
  const n0_10 = c[40];
  const n0_11 = c[41];
  const n0_12 = c[42];
  const n0_13 = c[43];
  const n0_14 = c[44];
  const n1_0 = c[45];
  const n1_1 = c[46];
  const n1_2 = c[47];
  const n1_3 = c[48];
  const n1_4 = c[49];
  const n1_5 = c[50];
  const n1_6 = c[51];
  const n1_7 = c[52];
  const n1_8 = c[53];
  const n1_9 = c[54];
  const n1_10 = c[55];
  const n1_11 = c[56];
  const n1_12 = c[57];
  const n1_13 = c[58];
  const n1_14 = c[59];
  const n2_0 = c[60];
  const n2_1 = c[61];
  const n2_2 = c[62];
  const n2_3 = c[63];
  const n2_4 = c[64];
  const n2_5 = c[65];
  const n2_6 = c[66];
  const n2_7 = c[67];
  const n2_8 = c[68];
  const n2_9 = c[69];
  const n2_10 = c[70];
  const n2_11 = c[71];
  const n2_12 = c[72];
  const n2_13 = c[73];
  const n2_14 = c[74];
  const n3_0 = c[75];
  const n3_1 = c[76];
  const n3_2 = c[77];
  const n3_3 = c[78];
  const n3_4 = c[79];
  const n3_5 = c[80];
  const n3_6 = c[81];
  const n3_7 = c[82];
  const n3_8 = c[83];
  const n3_9 = c[84];
  const n3_10 = c[85];
  const n3_11 = c[86];
  const n3_12 = c[87];
  const n3_13 = c[88];
  const n3_14 = c[89];
  const n4_0 = c[90];
  const n4_1 = c[91];
  const n4_2 = c[92];
  const n4_3 = c[93];
  const n4_4 = c[94];
  const n4_5 = c[95];
  const n4_6 = c[96];
  const n4_7 = c[97];
  const n4_8 = c[98];
  const n4_9 = c[99];
  const n4_10 = c[100];
  const n4_11 = c[101];
  const n4_12 = c[102];
  const n4_13 = c[103];
  const n4_14 = c[104];
  const n5_0 = c[105];
  const n5_1 = c[106];
  const n5_2 = c[107];
  const n5_3 = c[108];
  const n5_4 = c[109];
  const n5_5 = c[110];
  const n5_6 = c[111];
  const n5_7 = c[112];
  const n5_8 = c[113];
  const n5_9 = c[114];
  const n5_10 = c[115];
  const n5_11 = c[116];
  const n5_12 = c[117];
  const n5_13 = c[118];
  const n5_14 = c[119];
  const n6_0 = c[120];
  const n6_1 = c[121];
  const n6_2 = c[122];
  const n6_3 = c[123];
  const n6_4 = c[124];
  const n6_5 = c[125];
  const n6_6 = c[126];
  const n6_7 = c[127];
  const n6_8 = c[128];
  const n6_9 = c[129];
  const n6_10 = c[130];
  const n6_11 = c[131];
  const n6_12 = c[132];
  const n6_13 = c[133];
  const n6_14 = c[134];
  const n7_0 = c[135];
  const n7_1 = c[136];
  const n7_2 = c[137];
  const n7_3 = c[138];
  const n7_4 = c[139];
  const n7_5 = c[140];
  const n7_6 = c[141];
  const n7_7 = c[142];
  const n7_8 = c[143];
  const n7_9 = c[144];
  const n7_10 = c[145];
  const n7_11 = c[146];
  const n7_12 = c[147];
  const n7_13 = c[148];
  const n7_14 = c[149];
  const y0 = c[150];
  const y1 = c[151];
  const y2 = c[152];
  const y3 = c[153];
  const y4 = c[154];
  const y5 = c[155];
  const y6 = c[156];
  const y7 = c[157];
  const y8 = c[158];
  const y9 = c[159];
  const y13 = c[163];
  const y14 = c[164];
  const on = c[211];
  const lambda = c[214];
  const scale = c[215];
  const inverseWidth = c[216];
  const slope = c[217];
  const pieces = c[221];
  let x0 = s[0];
  let x1 = s[1];
  let x2 = s[2];
  let x3 = s[3];
  let x4 = s[4];
  let x5 = s[5];
  let x6 = s[6];
  let x7 = s[7];
  let u0 = s[8], v0 = s[9];
  let I0 = s[10], S0 = s[11], D0 = s[12], E0 = s[15], vs = s[13], vd = s[14];
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    let a = a0 * x0 + a1 * x1 + a2 * x2 + a3 * x3 + a4 * x4 + a5 * x5 + a6 * x6 + a7 * x7 + a8 * u + a9 * v + a10 * u0 + a11 * v0 + a12 * I0 + a13;
    let b = b0 * x0 + b1 * x1 + b2 * x2 + b3 * x3 + b4 * x4 + b5 * x5 + b6 * x6 + b7 * x7 + b8 * u + b9 * v + b10 * u0 + b11 * v0 + b12 * I0 + b13;
    if (S0 != 0 || D0 != 0) {
      a += c[167] * S0 + c[168] * D0;
      b += c[171] * S0 + c[172] * D0;
    }
    let I = 0, S = 0, D = 0, J = 0;
    if (noisy) {
      J = w[i * 12 + 11] * Math.sqrt(0.5 * (slopeAt(c, t, 209, vs) + slopeAt(c, t, 209, vd)));
      a += w[i * 12 + 0] + a14 * J;
      b += w[i * 12 + 1] + b14 * J;
    }
    I = 2 * I0 - E0;
    let settled = 0;
    for (let step = 0; step < 12; step++) {
      vs = a + a14 * I; vd = b + b14 * I;
      let Fs = 0, fs = 0, Fd = 0, fd = 0;
      if (vs * inverseWidth > -40) {
        const z = (vs * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fs = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fs = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { Fs = termAt(c, t, 209, vs); fs = slopeAt(c, t, 209, vs); }
      }
      if (vd * inverseWidth > -40) {
        const z = (vd * inverseWidth + 40) * 8;
        if (z < pieces) {
          const piece = z | 0, d = (z - piece - 0.5) * 0.125, o = piece * 6;
          Fd = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
          fd = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
        } else { Fd = termAt(c, t, 209, vd); fd = slopeAt(c, t, 209, vd); }
      }
      let h = Fs - Fd - I, slopes = a14 * fs - b14 * fd - 1;
      if (lambda != 0) {
        if (vd < 0) { h -= lambda * vd * Fs; slopes -= lambda * (vd * a14 * fs + b14 * Fs); }
        if (vs < 0) { h += lambda * vs * Fd; slopes += lambda * (vs * b14 * fd + a14 * Fd); }
      }
      const change = h / slopes;
      I -= change;
      const moved = (b14 - a14) * change;
      if (moved < 1e-8 && moved > -1e-8) { settled = 1; break; }
    }
    if (settled == 0) { I = searched(c, t, 209, 14, 29, a, b); s[16] += 1; }
    vs = a + a14 * I; vd = b + b14 * I;
    if (vs > on || vd > on) {
      conduct(c, t, 209, 14, 29, 165, s, 8, a, b, I);
      I = s[10]; S = s[11]; D = s[12]; vs = s[13]; vd = s[14];
    }
    I += J;
    let z0 = n0_0 * x0 + n0_1 * x1 + n0_2 * x2 + n0_3 * x3 + n0_4 * x4 + n0_5 * x5 + n0_6 * x6 + n0_7 * x7 + n0_8 * u + n0_9 * v + n0_10 * u0 + n0_11 * v0 + n0_12 * I0 + n0_13 + n0_14 * I;
    let z1 = n1_0 * x0 + n1_1 * x1 + n1_2 * x2 + n1_3 * x3 + n1_4 * x4 + n1_5 * x5 + n1_6 * x6 + n1_7 * x7 + n1_8 * u + n1_9 * v + n1_10 * u0 + n1_11 * v0 + n1_12 * I0 + n1_13 + n1_14 * I;
    let z2 = n2_0 * x0 + n2_1 * x1 + n2_2 * x2 + n2_3 * x3 + n2_4 * x4 + n2_5 * x5 + n2_6 * x6 + n2_7 * x7 + n2_8 * u + n2_9 * v + n2_10 * u0 + n2_11 * v0 + n2_12 * I0 + n2_13 + n2_14 * I;
    let z3 = n3_0 * x0 + n3_1 * x1 + n3_2 * x2 + n3_3 * x3 + n3_4 * x4 + n3_5 * x5 + n3_6 * x6 + n3_7 * x7 + n3_8 * u + n3_9 * v + n3_10 * u0 + n3_11 * v0 + n3_12 * I0 + n3_13 + n3_14 * I;
    let z4 = n4_0 * x0 + n4_1 * x1 + n4_2 * x2 + n4_3 * x3 + n4_4 * x4 + n4_5 * x5 + n4_6 * x6 + n4_7 * x7 + n4_8 * u + n4_9 * v + n4_10 * u0 + n4_11 * v0 + n4_12 * I0 + n4_13 + n4_14 * I;
    let z5 = n5_0 * x0 + n5_1 * x1 + n5_2 * x2 + n5_3 * x3 + n5_4 * x4 + n5_5 * x5 + n5_6 * x6 + n5_7 * x7 + n5_8 * u + n5_9 * v + n5_10 * u0 + n5_11 * v0 + n5_12 * I0 + n5_13 + n5_14 * I;
    let z6 = n6_0 * x0 + n6_1 * x1 + n6_2 * x2 + n6_3 * x3 + n6_4 * x4 + n6_5 * x5 + n6_6 * x6 + n6_7 * x7 + n6_8 * u + n6_9 * v + n6_10 * u0 + n6_11 * v0 + n6_12 * I0 + n6_13 + n6_14 * I;
    let z7 = n7_0 * x0 + n7_1 * x1 + n7_2 * x2 + n7_3 * x3 + n7_4 * x4 + n7_5 * x5 + n7_6 * x6 + n7_7 * x7 + n7_8 * u + n7_9 * v + n7_10 * u0 + n7_11 * v0 + n7_12 * I0 + n7_13 + n7_14 * I;
    if (S0 != 0 || D0 != 0) {
      z0 += c[175] * S0 + c[176] * D0;
      z1 += c[179] * S0 + c[180] * D0;
      z2 += c[183] * S0 + c[184] * D0;
      z3 += c[187] * S0 + c[188] * D0;
      z4 += c[191] * S0 + c[192] * D0;
      z5 += c[195] * S0 + c[196] * D0;
      z6 += c[199] * S0 + c[200] * D0;
      z7 += c[203] * S0 + c[204] * D0;
    }
    x0 = z0;
    x1 = z1;
    x2 = z2;
    x3 = z3;
    x4 = z4;
    x5 = z5;
    x6 = z6;
    x7 = z7;
    let y = 0;
    if (noisy) {
      x0 += w[i * 12 + 2];
      x1 += w[i * 12 + 3];
      x2 += w[i * 12 + 4];
      x3 += w[i * 12 + 5];
      x4 += w[i * 12 + 6];
      x5 += w[i * 12 + 7];
      x6 += w[i * 12 + 8];
      x7 += w[i * 12 + 9];
      y = w[i * 12 + 10];
    }
    if (S != 0 || D != 0) {
      x0 += c[173] * S + c[174] * D;
      x1 += c[177] * S + c[178] * D;
      x2 += c[181] * S + c[182] * D;
      x3 += c[185] * S + c[186] * D;
      x4 += c[189] * S + c[190] * D;
      x5 += c[193] * S + c[194] * D;
      x6 += c[197] * S + c[198] * D;
      x7 += c[201] * S + c[202] * D;
      y += c[205] * S + c[206] * D;
    }
    output[i] = y + y0 * x0 + y1 * x1 + y2 * x2 + y3 * x3 + y4 * x4 + y5 * x5 + y6 * x6 + y7 * x7 + y8 * u + y9 * v + y13 + y14 * I;
    u0 = u; v0 = v;
    E0 = I0; I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = x1;
  s[2] = x2;
  s[3] = x3;
  s[4] = x4;
  s[5] = x5;
  s[6] = x6;
  s[7] = x7;
  s[8] = u0; s[9] = v0;
  s[10] = I0; s[11] = S0; s[12] = D0; s[15] = E0;
  if (to > from) { s[13] = vs; s[14] = vd; }
}

/** By number of states. */
export const SMOOTH_KERNELS = [smooth0, smooth1, smooth2, smooth3, smooth4, smooth5, smooth6, smooth7, smooth8];
