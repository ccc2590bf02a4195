/** The kernels in C, of the same algorithm from the same source text, built with gcc and timed beside the TypeScript. */
import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import * as L from '../../model/cell/kernels/layout.ts';
import { kernelInC, kernelName, type Shape } from '../../model/cell/kernels/source.ts';

export interface NativeKernel {
  /** Nanoseconds a sample, the best of its runs. */
  time(): number;
  dispose(): void;
}

const doubles = (values: Float64Array) => Buffer.from(values.buffer, values.byteOffset, values.byteLength);

/** Builds the kernel of a shape with its coefficients, state and signals. Throws when there is no gcc. */
export function buildNative(
  shape: Shape,
  data: { coefficients: Float64Array; state: Float64Array; audio: Float64Array; control: Float64Array },
): NativeKernel {
  const folder = mkdtempSync(join(tmpdir(), 'fettle-bench-'));
  const { coefficients, state, audio, control } = data;
  writeFileSync(join(folder, 'data'), Buffer.concat([coefficients, state, audio, control].map(doubles)));
  writeFileSync(join(folder, 'kernel.c'), program(shape, coefficients.length, state.length, audio.length));
  const binary = join(folder, 'kernel');
  execFileSync('gcc', ['-O3', '-march=native', '-o', binary, join(folder, 'kernel.c'), '-lm']);
  return {
    time: () => Number(execFileSync(binary, [join(folder, 'data')], { encoding: 'utf8' })),
    dispose: () => rmSync(folder, { recursive: true }),
  };
}

function program(shape: Shape, coefficientCount: number, slotCount: number, sampleCount: number): string {
  return `#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <time.h>
static double fmx(double a, double b) { return a > b ? a : b; }
static void conduct(const double *c, const double *t, int device, int aI, int bI, int junction, double *s, int n, double a, double b, double I) {
  (void)t;
  const double rate = c[device + ${L.INVERSE_NVT}], off = c[device + ${L.GATE_OFF_V}], reverse = c[device + ${L.REVERSE_A}];
  const double on = c[device + ${L.ON_V}], scale = c[device + ${L.SCALE}], knee = on + 20 / rate;
  const double aS = c[junction], aD = c[junction + 1], bS = c[junction + 2], bD = c[junction + 3];
  const double freeS = a + c[aI] * I, freeD = b + c[bI] * I;
  double vs = freeS < knee ? freeS : fmin(freeS, fmx(s[n + ${L.OVERDRIVE_S}], knee));
  double vd = freeD < knee ? freeD : fmin(freeD, fmx(s[n + ${L.OVERDRIVE_D}], knee));
  double S = 0, D = 0, channel = 0;
  for (int step = 0; step < 40; step++) {
    const double ps = fmx(vs, 0), pd = fmx(vd, 0);
    S = vs > on ? reverse * exp((vs + off) * rate) : 0;
    D = vd > on ? reverse * exp((vd + off) * rate) : 0;
    channel = scale * (ps - pd) * (ps + pd);
    const double rs = vs - a - c[aI] * channel - aS * S - aD * D, rd = vd - b - c[bI] * channel - bS * S - bD * D;
    const double ss = 1 - 2 * scale * ps * c[aI] - aS * S * rate, sd = 2 * scale * pd * c[aI] - aD * D * rate;
    const double ds = -2 * scale * ps * c[bI] - bS * S * rate, dd = 1 + 2 * scale * pd * c[bI] - bD * D * rate;
    const double determinant = ss * dd - sd * ds, stepS = (sd * rd - dd * rs) / determinant, stepD = (ds * rs - ss * rd) / determinant;
    vs += stepS * rate > 2 ? (2 + stepS * rate / (1 + 0.1 * stepS * rate)) / rate : stepS;
    vd += stepD * rate > 2 ? (2 + stepD * rate / (1 + 0.1 * stepD * rate)) / rate : stepD;
    if (fabs(stepS) < 1e-11 && fabs(stepD) < 1e-11) break;
  }
  const double ps = fmx(vs, 0), pd = fmx(vd, 0);
  s[n + ${L.CHANNEL_A}] = scale * (ps - pd) * (ps + pd);
  s[n + ${L.JUNCTION_S}] = vs > on ? reverse * exp((vs + off) * rate) : 0;
  s[n + ${L.JUNCTION_D}] = vd > on ? reverse * exp((vd + off) * rate) : 0;
  s[n + ${L.OVERDRIVE_S}] = vs;
  s[n + ${L.OVERDRIVE_D}] = vd;
}
static void evaluate(const double *c, const double *t, int device, double v, double *out, int at) {
  (void)c; (void)t; (void)device; (void)v; (void)out; (void)at;
}
static void bent(const double *c, const double *t, int device, int aI, int bI, double a, double b, double I, double *out, int at) {
  (void)c; (void)t; (void)device; (void)aI; (void)bI; (void)a; (void)b;
  out[at] = I;
}
__attribute__((noinline)) ${kernelInC('square', shape)}
static double c[${coefficientCount}], s[${slotCount}], u[${sampleCount}], v[${sampleCount}], y[${sampleCount}];
int main(int argc, char **argv) {
  FILE *f = fopen(argv[argc - 1], "rb");
  size_t got = fread(c, 8, ${coefficientCount}, f) + fread(s, 8, ${slotCount}, f) + fread(u, 8, ${sampleCount}, f) + fread(v, 8, ${sampleCount}, f);
  if (got != ${coefficientCount + slotCount + 2 * sampleCount}) return 1;
  double best = 1e9;
  for (int run = 0; run < 60; run++) {
    struct timespec t0, t1;
    clock_gettime(CLOCK_MONOTONIC, &t0);
    ${kernelName('square', shape)}(c, s, 0, s, u, v, y, 0, ${sampleCount});
    clock_gettime(CLOCK_MONOTONIC, &t1);
    double ns = ((t1.tv_sec - t0.tv_sec) * 1e9 + (t1.tv_nsec - t0.tv_nsec)) / ${sampleCount};
    if (ns < best) best = ns;
  }
  printf("%.4f", best);
  return isfinite(y[${sampleCount - 1}]) ? 0 : 1;
}
`;
}
