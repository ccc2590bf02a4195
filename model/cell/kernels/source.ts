/**
 * The text of the kernels: one function for each law and shape (how many trapezoidal and stiff states), unrolled, its coefficients in local constants. Written at build time,
 * because code made at run time is refused by the page's policy; in TypeScript for the tool and in C for the bench, from the same template.
 *
 * Law      each row remembers one sum of the past; overdrives a, b of the two ends for no channel current are linear in these, the inputs and
 *          the constants; with the current I they are
 *          a − αI and b + γI, and I = F(a − αI) − F(b + γI), which has one solution as its two sides move apart monotonically for α, γ ≥ 0.
 *          Beyond the knee F of the driving end is multiplied by 1 + λ·(the overdrive by which the other end is past VGS(off))
 * Scheme   square law: a quadratic in each region, roots as 2c/(q + √…), free of cancellation; the root that is consistent is the only one.
 *          Where γ < 0 bends the curve back (more than the drain's voltage fed back), the search of channel.ts.
 *          Other laws, and λ: Newton from the current extrapolated along a straight line; where that does not settle, bisection.
 *          Junction currents, when one conducts, by the solver in ports.ts. Noise, where there is a row of it for each sample, adds to the rows;
 *          the channel's own is white with the conductance of the sample before (4kT/r: van der Ziel, Proc. IRE 50 (1962) 1808)
 *          Where an end passes VGS(off) the output's curvature jumps: such kinks are marked for chain/kinks.ts to soften
 * Error    Newton stops at a step under `ENOUGH_V` in the overdrives; what is left is about its square over twice the overdrive
 */
import type { Law } from '../../design/types.ts';
import { conductor, conductorName } from './text/conductor.ts';
import { c, typescript } from './text/language.ts';
import { loopedKernel, loopedName } from './text/looped.ts';
import { kernel, kernelName, type Shape } from './text/unrolled.ts';

/** `x` serves for every letter, and the kernel in loops for every other shape. */
export const SHAPES: readonly Shape[] = [
  ...written([0, 1, 2, 3, 4], '', 'd'),
  ...written([0, 1], 'x', 'd'),
  ...written([0, 1, 2], 'xg', 'd'),
  ...written([0, 1], 'gm', 'd'),
  ...written([0, 1, 2, 3], '', 'x'),
  ...written([0, 1, 2, 3], 'xx', 'x'),
  ...written([1, 2], 'xxx', 'x'),
];

function written(counts: readonly number[], stiff: string, output: 'd' | 'x'): Shape[] {
  return counts.map((trapezoidal) => ({ trapezoidal, stiff, output }));
}

/** By which a kernel is found. */
export function shapeKey({ trapezoidal, stiff, output }: Shape): string {
  return `${trapezoidal} ${stiff} ${output}`;
}

/** The TypeScript module with all kernels of one law. */
export function kernelModule(law: Law): string {
  const kernels = SHAPES.map((shape) => kernel(law, shape, typescript)).join('\n\n');
  const helpers = law === 'square' ? 'bent, searched' : 'evaluate, searched';
  return `/**
 * Kernels of the ${law} law by number of trapezoidal and of stiff states: written from source.ts by \`npm run kernels\`, where the method is
 * explained. Not to be edited.
 *
 * Each advances a cell over the samples \`from\` to \`to\`: \`c\` coefficients, \`t\` the law's table, \`w\` noise (or empty), \`e\` kinks (or empty) and
 * \`s\` state as in layout.ts, \`audio\` and \`control\` in V, \`output\` in V.
 */
// biome-ignore-all lint: written by a program
// biome-ignore-all format: written by a program
import { ${helpers} } from './channel.ts';
import type { Conductor, Kernel, LoopedKernel } from './kernel.ts';
import { layoutOf, slotStart } from './layout.ts';
import { addGraded, keepCharges } from './graded.ts';
${law === 'smooth' ? '' : "import { markKink } from './kinks.ts';\n"}import { currents, searchPorts, stay } from './ports.ts';
import { expAt } from '../../device/math.ts';

${conductor(law, typescript)}

${kernels}

${loopedKernel(law)}

export const ${law.toUpperCase()}_CONDUCTOR: Conductor = ${conductorName(law)};

/** For shapes that are not written out. */
export const ${law.toUpperCase()}_LOOPED: LoopedKernel = ${loopedName(law)};

/** By the key of a shape. */
export const ${law.toUpperCase()}_KERNELS: Readonly<Record<string, Kernel>> = {
${SHAPES.map((shape) => `  '${shapeKey(shape)}': ${kernelName(law, shape)},`).join('\n')}
};
`;
}

/** The same kernel in C, for the bench, with its solver for a conducting gate. */
export function kernelInC(law: Law, shape: Shape): { conductor: string; kernel: string } {
  return { conductor: conductor(law, c), kernel: kernel(law, shape, c) };
}
