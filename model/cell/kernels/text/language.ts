/** What differs between the two languages that kernels are written in. */
export interface Language {
  /** The head of the solver for a conducting gate. */
  readonly conduct: (name: string) => string;
  readonly absolute: string;
  readonly least: string;
  readonly most: string;
  readonly constant: string;
  readonly variable: string;
  readonly sqrt: string;
  readonly open: (name: string) => string;
}

export const typescript: Language = {
  conduct: (name) =>
    `function ${name}(c: Float64Array, t: Float64Array, device: number, aI: number, bI: number, junction: number, s: Float64Array, n: number): void {`,
  absolute: 'Math.abs',
  least: 'Math.min',
  most: 'Math.max',
  constant: 'const',
  variable: 'let',
  sqrt: 'Math.sqrt',
  open: (name) =>
    `function ${name}(c: Float64Array, t: Float64Array, w: Float64Array, e: Float64Array, s: Float64Array, audio: Float64Array, control: Float64Array, output: Float64Array, from: number, to: number): void {\n` +
    '  const noisy = w.length > 0, marking = e.length > 0;\n  for (let i = from; i < to; i++) {',
};

export const c: Language = {
  conduct: (name) => `static void ${name}(const double *c, const double *t, int device, int aI, int bI, int junction, double *s, int n) {`,
  absolute: 'fabs',
  least: 'fmin',
  most: 'fmax',
  constant: 'const double',
  variable: 'double',
  sqrt: 'sqrt',
  open: (name) =>
    `void ${name}(const double *restrict c, const double *restrict t, const double *restrict w, double *restrict e, double *restrict s, const double *restrict audio, const double *restrict control, double *restrict output, int from, int to) {\n` +
    '  const int noisy = w != 0, marking = e != 0;\n  for (int i = from; i < to; i++) {',
};
