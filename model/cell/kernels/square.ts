/**
 * Square-law kernels, one for each number of states: written from source.ts by `npm run kernels`, where the method is explained. Not to be edited.
 *
 * Each advances a cell over the samples `from` to `to`: `c` coefficients and `s` state as in layout.ts, `audio` and `control` in V, `output` in V.
 */
// biome-ignore-all lint: written by a program
// biome-ignore-all format: written by a program
import { conduct } from '../ports.ts';

function square0(c: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
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
  const beta = c[24], bent = c[25], fall = c[26], rise = c[27], on = c[29];
  let I0 = s[2], S0 = s[3], D0 = s[4], vs = 0, vd = 0;
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    let a = a0 * u + a1 * v + a2;
    let b = b0 * u + b1 * v + b2;
    let I = 0, S = 0, D = 0;
    if (a > 0 || b > 0) {
      const q = 1 + fall * a + rise * b;
      const w = beta * (a - b) * (a + b);
      I = 2 * w / (q + Math.sqrt(q * q - 4 * bent * w));
      if (!(a + a3 * I >= 0 && b + b3 * I >= 0)) {
        if (a > b) {
          I = 2 * beta * a * a / (1 + fall * a + Math.sqrt(1 + 2 * fall * a));
        } else {
          I = -2 * beta * b * b / (1 + rise * b + Math.sqrt(1 + 2 * rise * b));
        }
      }
    }
    vs = a + a3 * I;
    vd = b + b3 * I;
    if (vs > on || vd > on) {
      conduct(c, 24, 3, 7, 12, s, 0, a, b, I);
      I = s[2]; S = s[3]; D = s[4]; vs = s[5]; vd = s[6];
    }
    let y = 0;
    if (S != 0 || D != 0) {
      y = c[20] * S + c[21] * D;
    }
    output[i] = y + y0 * u + y1 * v + y2 + y3 * I;
    I0 = I; S0 = S; D0 = D;
  }
  s[2] = I0; s[3] = S0; s[4] = D0;
  if (to > from) { s[5] = vs; s[6] = vd; }
}

function square1(c: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
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
  const beta = c[48], bent = c[49], fall = c[50], rise = c[51], on = c[53];
  let x0 = s[0];
  let u0 = s[1], v0 = s[2];
  let I0 = s[3], S0 = s[4], D0 = s[5], vs = 0, vd = 0;
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    let a = a0 * x0 + a1 * u + a2 * v + a3 * u0 + a4 * v0 + a5 * I0 + a6;
    let b = b0 * x0 + b1 * u + b2 * v + b3 * u0 + b4 * v0 + b5 * I0 + b6;
    if (S0 != 0 || D0 != 0) {
      a += c[34] * S0 + c[35] * D0;
      b += c[38] * S0 + c[39] * D0;
    }
    let I = 0, S = 0, D = 0;
    if (a > 0 || b > 0) {
      const q = 1 + fall * a + rise * b;
      const w = beta * (a - b) * (a + b);
      I = 2 * w / (q + Math.sqrt(q * q - 4 * bent * w));
      if (!(a + a7 * I >= 0 && b + b7 * I >= 0)) {
        if (a > b) {
          I = 2 * beta * a * a / (1 + fall * a + Math.sqrt(1 + 2 * fall * a));
        } else {
          I = -2 * beta * b * b / (1 + rise * b + Math.sqrt(1 + 2 * rise * b));
        }
      }
    }
    vs = a + a7 * I;
    vd = b + b7 * I;
    if (vs > on || vd > on) {
      conduct(c, 48, 7, 15, 32, s, 1, a, b, I);
      I = s[3]; S = s[4]; D = s[5]; vs = s[6]; vd = s[7];
    }
    let z0 = n0_0 * x0 + n0_1 * u + n0_2 * v + n0_3 * u0 + n0_4 * v0 + n0_5 * I0 + n0_6 + n0_7 * I;
    if (S0 != 0 || D0 != 0) {
      z0 += c[42] * S0 + c[43] * D0;
    }
    x0 = z0;
    let y = 0;
    if (S != 0 || D != 0) {
      x0 += c[40] * S + c[41] * D;
      y = c[44] * S + c[45] * D;
    }
    output[i] = y + y0 * x0 + y1 * u + y2 * v + y6 + y7 * I;
    u0 = u; v0 = v;
    I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = u0; s[2] = v0;
  s[3] = I0; s[4] = S0; s[5] = D0;
  if (to > from) { s[6] = vs; s[7] = vd; }
}

function square2(c: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
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
  const beta = c[65], bent = c[66], fall = c[67], rise = c[68], on = c[70];
  let x0 = s[0];
  let x1 = s[1];
  let u0 = s[2], v0 = s[3];
  let I0 = s[4], S0 = s[5], D0 = s[6], vs = 0, vd = 0;
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    let a = a0 * x0 + a1 * x1 + a2 * u + a3 * v + a4 * u0 + a5 * v0 + a6 * I0 + a7;
    let b = b0 * x0 + b1 * x1 + b2 * u + b3 * v + b4 * u0 + b5 * v0 + b6 * I0 + b7;
    if (S0 != 0 || D0 != 0) {
      a += c[47] * S0 + c[48] * D0;
      b += c[51] * S0 + c[52] * D0;
    }
    let I = 0, S = 0, D = 0;
    if (a > 0 || b > 0) {
      const q = 1 + fall * a + rise * b;
      const w = beta * (a - b) * (a + b);
      I = 2 * w / (q + Math.sqrt(q * q - 4 * bent * w));
      if (!(a + a8 * I >= 0 && b + b8 * I >= 0)) {
        if (a > b) {
          I = 2 * beta * a * a / (1 + fall * a + Math.sqrt(1 + 2 * fall * a));
        } else {
          I = -2 * beta * b * b / (1 + rise * b + Math.sqrt(1 + 2 * rise * b));
        }
      }
    }
    vs = a + a8 * I;
    vd = b + b8 * I;
    if (vs > on || vd > on) {
      conduct(c, 65, 8, 17, 45, s, 2, a, b, I);
      I = s[4]; S = s[5]; D = s[6]; vs = s[7]; vd = s[8];
    }
    let z0 = n0_0 * x0 + n0_1 * x1 + n0_2 * u + n0_3 * v + n0_4 * u0 + n0_5 * v0 + n0_6 * I0 + n0_7 + n0_8 * I;
    let z1 = n1_0 * x0 + n1_1 * x1 + n1_2 * u + n1_3 * v + n1_4 * u0 + n1_5 * v0 + n1_6 * I0 + n1_7 + n1_8 * I;
    if (S0 != 0 || D0 != 0) {
      z0 += c[55] * S0 + c[56] * D0;
      z1 += c[59] * S0 + c[60] * D0;
    }
    x0 = z0;
    x1 = z1;
    let y = 0;
    if (S != 0 || D != 0) {
      x0 += c[53] * S + c[54] * D;
      x1 += c[57] * S + c[58] * D;
      y = c[61] * S + c[62] * D;
    }
    output[i] = y + y0 * x0 + y1 * x1 + y2 * u + y3 * v + y7 + y8 * I;
    u0 = u; v0 = v;
    I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = x1;
  s[2] = u0; s[3] = v0;
  s[4] = I0; s[5] = S0; s[6] = D0;
  if (to > from) { s[7] = vs; s[8] = vd; }
}

function square3(c: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
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
  const beta = c[84], bent = c[85], fall = c[86], rise = c[87], on = c[89];
  let x0 = s[0];
  let x1 = s[1];
  let x2 = s[2];
  let u0 = s[3], v0 = s[4];
  let I0 = s[5], S0 = s[6], D0 = s[7], vs = 0, vd = 0;
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    let a = a0 * x0 + a1 * x1 + a2 * x2 + a3 * u + a4 * v + a5 * u0 + a6 * v0 + a7 * I0 + a8;
    let b = b0 * x0 + b1 * x1 + b2 * x2 + b3 * u + b4 * v + b5 * u0 + b6 * v0 + b7 * I0 + b8;
    if (S0 != 0 || D0 != 0) {
      a += c[62] * S0 + c[63] * D0;
      b += c[66] * S0 + c[67] * D0;
    }
    let I = 0, S = 0, D = 0;
    if (a > 0 || b > 0) {
      const q = 1 + fall * a + rise * b;
      const w = beta * (a - b) * (a + b);
      I = 2 * w / (q + Math.sqrt(q * q - 4 * bent * w));
      if (!(a + a9 * I >= 0 && b + b9 * I >= 0)) {
        if (a > b) {
          I = 2 * beta * a * a / (1 + fall * a + Math.sqrt(1 + 2 * fall * a));
        } else {
          I = -2 * beta * b * b / (1 + rise * b + Math.sqrt(1 + 2 * rise * b));
        }
      }
    }
    vs = a + a9 * I;
    vd = b + b9 * I;
    if (vs > on || vd > on) {
      conduct(c, 84, 9, 19, 60, s, 3, a, b, I);
      I = s[5]; S = s[6]; D = s[7]; vs = s[8]; vd = s[9];
    }
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
    if (S != 0 || D != 0) {
      x0 += c[68] * S + c[69] * D;
      x1 += c[72] * S + c[73] * D;
      x2 += c[76] * S + c[77] * D;
      y = c[80] * S + c[81] * D;
    }
    output[i] = y + y0 * x0 + y1 * x1 + y2 * x2 + y3 * u + y4 * v + y8 + y9 * I;
    u0 = u; v0 = v;
    I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = x1;
  s[2] = x2;
  s[3] = u0; s[4] = v0;
  s[5] = I0; s[6] = S0; s[7] = D0;
  if (to > from) { s[8] = vs; s[9] = vd; }
}

function square4(c: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {
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
  const beta = c[105], bent = c[106], fall = c[107], rise = c[108], on = c[110];
  let x0 = s[0];
  let x1 = s[1];
  let x2 = s[2];
  let x3 = s[3];
  let u0 = s[4], v0 = s[5];
  let I0 = s[6], S0 = s[7], D0 = s[8], vs = 0, vd = 0;
  for (let i = from; i < to; i++) {
    const u = audio[i], v = control[i];
    let a = a0 * x0 + a1 * x1 + a2 * x2 + a3 * x3 + a4 * u + a5 * v + a6 * u0 + a7 * v0 + a8 * I0 + a9;
    let b = b0 * x0 + b1 * x1 + b2 * x2 + b3 * x3 + b4 * u + b5 * v + b6 * u0 + b7 * v0 + b8 * I0 + b9;
    if (S0 != 0 || D0 != 0) {
      a += c[79] * S0 + c[80] * D0;
      b += c[83] * S0 + c[84] * D0;
    }
    let I = 0, S = 0, D = 0;
    if (a > 0 || b > 0) {
      const q = 1 + fall * a + rise * b;
      const w = beta * (a - b) * (a + b);
      I = 2 * w / (q + Math.sqrt(q * q - 4 * bent * w));
      if (!(a + a10 * I >= 0 && b + b10 * I >= 0)) {
        if (a > b) {
          I = 2 * beta * a * a / (1 + fall * a + Math.sqrt(1 + 2 * fall * a));
        } else {
          I = -2 * beta * b * b / (1 + rise * b + Math.sqrt(1 + 2 * rise * b));
        }
      }
    }
    vs = a + a10 * I;
    vd = b + b10 * I;
    if (vs > on || vd > on) {
      conduct(c, 105, 10, 21, 77, s, 4, a, b, I);
      I = s[6]; S = s[7]; D = s[8]; vs = s[9]; vd = s[10];
    }
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
    if (S != 0 || D != 0) {
      x0 += c[85] * S + c[86] * D;
      x1 += c[89] * S + c[90] * D;
      x2 += c[93] * S + c[94] * D;
      x3 += c[97] * S + c[98] * D;
      y = c[101] * S + c[102] * D;
    }
    output[i] = y + y0 * x0 + y1 * x1 + y2 * x2 + y3 * x3 + y4 * u + y5 * v + y9 + y10 * I;
    u0 = u; v0 = v;
    I0 = I; S0 = S; D0 = D;
  }
  s[0] = x0;
  s[1] = x1;
  s[2] = x2;
  s[3] = x3;
  s[4] = u0; s[5] = v0;
  s[6] = I0; s[7] = S0; s[8] = D0;
  if (to > from) { s[9] = vs; s[10] = vd; }
}

/** By number of states. */
export const SQUARE_KERNELS = [square0, square1, square2, square3, square4];
