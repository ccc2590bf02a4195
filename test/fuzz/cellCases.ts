/**
 * Random cells judged sample by sample. One case is one solved sample: its own signal and control, in a circuit of its own or with values of its own
 * since the last move.
 */
import { advanceCell, type Cell, type CellNumbers, compileCell, createCell, settle, forReadings } from '../../model/cell/cell.ts';
import { loadValues } from '../../model/cell/values.ts';
import type { Circuit } from '../../model/cell/circuit.ts';
import { FALLBACKS } from '../../model/cell/kernels/layout.ts';
import { shuntCircuit } from '../../model/cell/shunt.ts';
import type { Design } from '../../model/design/types.ts';
import { atTemperature } from '../../model/device/temperature.ts';
import { Dice } from './dice.ts';
import { movedDesign, randomDesign, type Temper } from './randomDesign.ts';
import { type Place, type Residual, Witness } from './witness.ts';

/** What a run found. `worst` in parts of what is allowed. */
export interface CellReport {
  cases: number;
  designs: number;
  moves: number;
  /** Circuits left out because a buffer makes them active. */
  active: number;
  fallbacks: number;
  /** Samples of boards while playing, and how many of them needed the number format's floor. */
  boardCases: number;
  boardAtFloor: number;
  readonly worst: Map<Place, { share: number; seed: number }>;
  readonly faults: string[];
}

export type Spoil = (cell: Cell) => void;

/** Allowed residual: 1 pA (V for an inductor and the output) + 1e-9 of the currents in real time; 1 fA + 1e-12 in readings; and the number format's floor. */
export const REAL_TIME = { absolute: 1e-12, relative: 1e-9 };
export const READING = { absolute: 1e-15, relative: 1e-12 };

const SAMPLES_A_DESIGN = 200;
const MOST_FAULTS = 20;
/** Share of a run that ends a stretch of one set of values. */
const MOVE_CHANCE = 0.02;

export function emptyCellReport(): CellReport {
  return { cases: 0, designs: 0, moves: 0, active: 0, fallbacks: 0, boardCases: 0, boardAtFloor: 0, worst: new Map(), faults: [] };
}

/** Runs the design of one seed. Every other seed is a board, every fourth a reading by the trapezoidal rule. */
export function runCellSeed(seed: number, report: CellReport, samples = SAMPLES_A_DESIGN, spoil?: Spoil): void {
  const dice = new Dice(seed);
  const temper = dice.chance(0.5) ? 'board' : 'wild';
  const design = randomDesign(dice, temper);
  const isReading = dice.chance(0.25);
  const { circuit, numbers } = compiled(design, isReading);
  const cell = createCell(numbers, 1 / dice.decades(8000, 384000 * 16));
  spoil?.(cell);
  report.designs += 1;
  const witness = new Witness(cell, circuit);
  if (!witness.isPassive()) {
    report.active += 1;
    return;
  }
  const targets = !isReading && dice.chance(0.3) ? compiled(movedDesign(design, dice, temper), isReading).numbers : null;
  const drive = isReading ? smoothDrive(dice) : randomDrive(dice);
  const [firstV, firstControlV] = drive();
  const restV = settle(cell, firstV, firstControlV);
  if (!Number.isFinite(restV)) complain(report, `seed ${seed}: no operating point`);
  const signal = new Float64Array(1);
  const control = new Float64Array(1);
  for (let i = 0; i < samples; i++) {
    if (targets && targets.shape === numbers.shape && dice.chance(MOVE_CHANCE)) move(cell, numbers, targets, dice, witness, seed, report);
    if (!witness.isPassive()) break;
    const [audioV, controlV] = drive();
    signal[0] = audioV;
    control[0] = controlV;
    witness.remember();
    advanceCell(cell, signal, control, 0, 1);
    report.cases += 1;
    if (!judge(report, seed, i, witness.residuals(audioV, controlV, signal[0]), isReading, temper)) break;
  }
  report.fallbacks += cell.state[cell.slots + FALLBACKS];
}

function compiled(design: Design, isReading: boolean): { circuit: Circuit; numbers: CellNumbers } {
  // The witness knows constant capacitances; graded ones run in the chain's sessions and have a test of their own.
  const { cell, device: drawn } = design.variants[0];
  const device = { ...drawn, grading: 0 };
  const circuit = shuntCircuit(cell, atTemperature(device, design.tempC).device);
  const numbers = compileCell(circuit, device, design.tempC);
  return { circuit, numbers: isReading ? forReadings(numbers) : numbers };
}

/** Somewhere on the straight line between two sets of values, ends included, as the chain moves them. */
function move(cell: Cell, from: CellNumbers, to: CellNumbers, dice: Dice, witness: Witness, seed: number, report: CellReport): void {
  const share = dice.chance(0.2) ? dice.whole(0, 1) : dice.next();
  const values = from.values.map((value, i) => value + share * (to.values[i] - value));
  if (!loadValues(cell, values)) complain(report, `seed ${seed}: values between two designs make a singular network`);
  witness.refresh();
  report.moves += 1;
}

function judge(
  report: CellReport,
  seed: number,
  sample: number,
  residuals: readonly Residual[],
  isReading: boolean,
  temper: Temper,
): boolean {
  const { absolute, relative } = isReading ? READING : REAL_TIME;
  let atFloor = false;
  let faults = 0;
  for (const { where, value, currents, floor } of residuals) {
    const allowed = absolute + relative * currents;
    const share = Math.abs(value) / (allowed + floor);
    if (Math.abs(value) > allowed) atFloor = true;
    if (!(share <= 1)) {
      faults += 1;
      if (faults === 1)
        complain(report, `seed ${seed}, sample ${sample}: ${where} misses by ${value}, ${share} times what is allowed at ${currents}`);
    }
    if (share > (report.worst.get(where)?.share ?? 0)) report.worst.set(where, { share, seed });
  }
  if (temper === 'board' && !isReading) {
    report.boardCases += 1;
    if (atFloor) report.boardAtFloor += 1;
  }
  return faults === 0;
}

function complain(report: CellReport, sentence: string): void {
  if (report.faults.length < MOST_FAULTS) report.faults.push(sentence);
}

/** Audio and control, V, sample after sample: silence, tones, noise, and steps of up to 1 kV; controls that stand, jump or sweep. */
function randomDrive(dice: Dice): () => [number, number] {
  const kind = dice.pick(['silence', 'tone', 'noise', 'steps', 'faint'] as const);
  const peakV = kind === 'faint' ? dice.pick([1e-310, 1e-30, 1e-9]) : dice.decades(1e-3, 1000);
  const controlPeakV = dice.decades(0.1, 100);
  const controlMoves = dice.pick([0, 0.05, 1]);
  const turns = dice.decades(1e-4, 0.5);
  let phase = 0;
  let audioV = 0;
  let controlV = dice.chance(0.5) ? -dice.between(0, 3) : controlPeakV * dice.sign();
  return () => {
    phase += turns;
    if (kind === 'tone') audioV = peakV * Math.sin(2 * Math.PI * phase);
    else if (kind === 'noise' || kind === 'faint' || (kind === 'steps' && dice.chance(0.1))) audioV = peakV * dice.sign();
    if (dice.chance(controlMoves)) controlV = controlPeakV * dice.sign();
    return [audioV, controlV];
  };
}

/** What readings are made with: a tone that begins at rest, at least 48 samples a cycle, and a control that stands. */
function smoothDrive(dice: Dice): () => [number, number] {
  const peakV = dice.decades(1e-3, 100);
  const turns = 1 / dice.decades(48, 10000);
  const controlV = dice.chance(0.5) ? -dice.between(0, 3) : 100 * dice.sign();
  let phase = -turns;
  return () => {
    phase += turns;
    return [peakV * Math.sin(2 * Math.PI * phase), controlV];
  };
}
