/**
 * The feedback fraction k: how much of VDS reaches the gate.
 *
 * Law      resistors: k = R3/(R2 + R3), with R2 = drainOhm and R3 = controlOhm; buffered: k is the fraction itself; none: 0.
 *          The gate at rest, from the source pin, is R2/(R0 + R2 + R3) of the control where the resistors divide it, else all of it;
 *          R0 is what stands outside the pair, driverOhm and the smoothing resistor.
 * Error    k is the designer's number, of the two resistors alone. At audio frequencies the driver's resistance, unless a smoothing capacitor
 *          shorts it, adds to R3: 1 kΩ before 100 kΩ and 100 kΩ makes 0.5025 of ½, and leaves HD2 at −46 dB of what it is without feedback
 * Valid    audio frequencies, where the blocking capacitor is a short and the gate's capacitance an open circuit; drain at rest at the
 *          voltage of the source pin
 * Source   voltage divider; for an equal pair it gives the usual VGS = VC/2 + VDS/2
 */
import { checkVariant } from './read.ts';
import type { Cell, Control, Variant } from './types.ts';
import { plainly } from './wording.ts';

/** Which resistors of a pair make another k: one of them, or both so that their sum or the value of both in parallel stays. */
export const MOVES = ['drainOhm', 'controlOhm', 'bothKeepSum', 'bothKeepParallel'] as const;
export type Moves = (typeof MOVES)[number];

/** k, 0 to 1. */
export function feedbackFraction(cell: Cell): number {
  switch (cell.feedback.kind) {
    case 'none':
      return 0;
    case 'resistor':
      return cell.controlOhm / (cell.controlOhm + cell.feedback.drainOhm);
    case 'buffered':
      return cell.feedback.fraction;
  }
}

/**
 * The gate's voltage at rest for each volt of control: R2/(R0 + R2 + R3) where the resistors divide the control at DC, 1 with a blocking
 * capacitor, a buffered fraction or no feedback. With a blocking capacitor it holds at DC only: from about 1/(2πC(R0 + R2 + R3)) upwards an
 * LFO's swing is divided too, down to the same fraction.
 */
export function restGateFraction({ feedback, driverOhm, smoothing, controlOhm }: Cell): number {
  if (feedback.kind !== 'resistor' || feedback.blockingF !== null) return 1;
  const outsideOhm = driverOhm + (smoothing.kind === 'rc' ? smoothing.smoothingOhm : 0);
  return feedback.drainOhm / (outsideOhm + controlOhm + feedback.drainOhm);
}

/**
 * The same variant at another k: a pair of resistors moves as `moves` says, a buffered cell has its fraction alone to move.
 *
 * @param keep 'gate' scales the control, from the source pin's voltage, so that the gate keeps its bias and swing (`restGateFraction`);
 *   'control' leaves the control as it is, and the gate moves
 * @throws RangeError with a sentence where k cannot be had with values within their limits
 */
export function withFeedbackFraction(variant: Variant, k: number, keep: 'gate' | 'control', moves: Moves = 'drainOhm'): Variant {
  const cell = cellWithFraction(variant.cell, k, moves);
  const factor = keep === 'gate' ? restGateFraction(variant.cell) / restGateFraction(cell) : 1;
  const control = factor === 1 ? variant.control : scaledControl(variant.control, factor, sourcePinV(variant.cell));
  const result = checkVariant({ ...variant, cell, control });
  if ('variant' in result) return result.variant;
  throw new RangeError(`k = ${plainly(k, '', 6)} cannot be set: ${result.faults.map((fault) => fault.sentence).join('; ')}`);
}

function cellWithFraction(cell: Cell, k: number, moves: Moves): Cell {
  const { feedback, controlOhm } = cell;
  switch (feedback.kind) {
    case 'none':
      if (k === 0) return cell;
      throw new RangeError(`k is ${String(k).replace('-', '−')}; expected 0 while cell.feedback.kind is none`);
    case 'resistor': {
      if (!(k > 0 && k < 1))
        throw new RangeError(`k is ${String(k).replace('-', '−')}; expected more than 0 and less than 1, as two resistors give`);
      const pair = pairAt(k, controlOhm, feedback.drainOhm, moves);
      return { ...cell, controlOhm: pair.controlOhm, feedback: { ...feedback, drainOhm: pair.drainOhm } };
    }
    case 'buffered':
      if (k >= 0 && k <= 1) return { ...cell, feedback: { ...feedback, fraction: k } };
      throw new RangeError(`k is ${String(k).replace('-', '−')}; expected 0 to 1`);
  }
}

function pairAt(k: number, controlOhm: number, drainOhm: number, moves: Moves): { controlOhm: number; drainOhm: number } {
  const sumOhm = controlOhm + drainOhm;
  switch (moves) {
    case 'drainOhm':
      return { controlOhm, drainOhm: (controlOhm * (1 - k)) / k };
    case 'controlOhm':
      return { controlOhm: (drainOhm * k) / (1 - k), drainOhm };
    case 'bothKeepSum':
      return { controlOhm: sumOhm * k, drainOhm: sumOhm * (1 - k) };
    case 'bothKeepParallel': {
      const parallelOhm = (controlOhm * drainOhm) / sumOhm;
      return { controlOhm: parallelOhm / (1 - k), drainOhm: parallelOhm / k };
    }
  }
}

/** Voltage of the source pin at rest; a divided supply without the FET's current, which is 0 on average. */
function sourcePinV({ reference }: Cell): number {
  if (reference.kind === 'ground') return 0;
  return (reference.supplyV * reference.lowerOhm) / (reference.upperOhm + reference.lowerOhm);
}

/** Voltages scaled as distances from `pinV`; gains are differences already. */
function scaledControl(control: Control, factor: number, pinV: number): Control {
  const moved = (volts: number) => pinV + (volts - pinV) * factor;
  switch (control.source) {
    case 'fixed':
      return { ...control, controlV: moved(control.controlV) };
    case 'lfo':
      return { ...control, fromV: moved(control.fromV), toV: moved(control.toV) };
    case 'envelope':
      return { ...control, restV: moved(control.restV), limitV: moved(control.limitV), gainVPerV: control.gainVPerV * factor };
    case 'external':
      return { ...control, fullScaleV: control.fullScaleV * factor, offsetV: moved(control.offsetV) };
  }
}
