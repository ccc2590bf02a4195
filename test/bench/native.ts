/** The kernels in C, of the same algorithm from the same source text, built with gcc and timed beside the TypeScript. */
import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { kernelInC } from '../../model/cell/kernels/source.ts';
import { kernelName, type Shape } from '../../model/cell/kernels/text/unrolled.ts';

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
  const text = kernelInC('square', shape);
  return `#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <time.h>
static void expAt(double *s, int at) {
  s[at] = exp(s[at]);
}
static void addGraded(const double *c, int device, int perStep, double *s, int charges, int at) {
  (void)c; (void)device; (void)perStep; (void)charges;
  s[at] = 0;
}
static void keepCharges(double *s, int n) {
  (void)s; (void)n;
}
static void currents(const double *c, const double *t, int device, double *s, int n) {
  (void)c; (void)t; (void)device; (void)s; (void)n;
}
static void stay(double *s, int n) {
  (void)s; (void)n;
}
static void searchPorts(const double *c, const double *t, int device, int aI, int bI, int junction, double *s, int n, double a, double b) {
  (void)c; (void)t; (void)device; (void)aI; (void)bI; (void)junction; (void)s; (void)n; (void)a; (void)b;
  fprintf(stderr, "the benchmark's signal must not need the search\\n");
  exit(1);
}
static void markKink(const double *c, const double *t, int device, int aI, int bI, double *e, int i, double *s, int n) {
  (void)c; (void)t; (void)device; (void)aI; (void)bI; (void)e; (void)i; (void)s; (void)n;
}
static void searched(const double *c, const double *t, int device, int aI, int bI, double *s, int n) {
  (void)c; (void)t; (void)device; (void)aI; (void)bI; (void)s; (void)n;
}
static void evaluate(const double *c, const double *t, int device, double *s, int from, int at) {
  (void)c; (void)t; (void)device; (void)s; (void)from; (void)at;
}
static void bent(const double *c, const double *t, int device, int aI, int bI, double *s, int n) {
  (void)c; (void)t; (void)device; (void)aI; (void)bI; (void)s; (void)n;
}
${text.conductor}
__attribute__((noinline)) ${text.kernel}
static double c[${coefficientCount}], s[${slotCount}], u[${sampleCount}], v[${sampleCount}], y[${sampleCount}];
int main(int argc, char **argv) {
  FILE *f = fopen(argv[argc - 1], "rb");
  size_t got = fread(c, 8, ${coefficientCount}, f) + fread(s, 8, ${slotCount}, f) + fread(u, 8, ${sampleCount}, f) + fread(v, 8, ${sampleCount}, f);
  if (got != ${coefficientCount + slotCount + 2 * sampleCount}) return 1;
  double best = 1e9;
  for (int run = 0; run < 60; run++) {
    struct timespec t0, t1;
    clock_gettime(CLOCK_PROCESS_CPUTIME_ID, &t0);
    ${kernelName('square', shape)}(c, s, 0, 0, s, u, v, y, 0, ${sampleCount});
    clock_gettime(CLOCK_PROCESS_CPUTIME_ID, &t1);
    double ns = ((t1.tv_sec - t0.tv_sec) * 1e9 + (t1.tv_nsec - t0.tv_nsec)) / ${sampleCount};
    if (ns < best) best = ns;
  }
  printf("%.4f", best);
  return isfinite(y[${sampleCount - 1}]) ? 0 : 1;
}
`;
}
