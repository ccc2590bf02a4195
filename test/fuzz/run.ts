/**
 * npm run fuzz [-- cases [first seed]]: 10⁷ solved samples, each with Kirchhoff's residual checked, and a chain session for every hundredth design. Progress
 * as it goes, the last line a summary; ends with 1 and the seeds where anything failed.
 */
import { emptyCellReport, runCellSeed } from './cellCases.ts';
import { emptyChainReport, runChainSeed } from './chainCases.ts';

const DESIGNS_A_SESSION = 100;
const [wanted = 1e7, first = 1] = process.argv.slice(2).map(Number);
if (!(wanted > 0) || !Number.isInteger(first)) throw new RangeError('expected a number of cases above 0 and a whole first seed');

const cells = emptyCellReport();
const chains = emptyChainReport();
const began = Date.now();
let told = began;
for (let seed = first; cells.cases < wanted; seed++) {
  runCellSeed(seed, cells);
  if (seed % DESIGNS_A_SESSION === 0) runChainSeed(seed, chains);
  if (cells.faults.length + chains.faults.length > 0) break;
  if (Date.now() - told < 10000) continue;
  told = Date.now();
  console.log(`${cells.cases} of ${wanted} cases, seed ${seed}, ${chains.sessions} sessions, ${Math.round((told - began) / 1000)} s`);
}
const faults = [...cells.faults, ...chains.faults];
for (const fault of faults) console.error(fault);
const worst = [...cells.worst].map(([where, { share, seed }]) => `${where} ${share.toPrecision(2)} (seed ${seed})`).join(', ');
console.log(`worst residuals, in parts of what is allowed: ${worst}`);
const atFloor = ((100 * cells.boardAtFloor) / cells.boardCases).toPrecision(2);
const perTenThousand = ((1e4 * cells.fallbacks) / cells.cases).toPrecision(2);
console.log(
  `${cells.cases} cases in ${cells.designs} circuits (${cells.active} active ones left out), ${cells.moves} moves, ${perTenThousand} fallbacks in 10 000, ${atFloor} % of boards' samples at the floor, ` +
    `${chains.sessions} sessions with ${chains.solved} samples, ${chains.recoveries} recoveries: ${faults.length === 0 ? 'passed' : 'FAILED'}`,
);
process.exitCode = faults.length === 0 ? 0 : 1;
