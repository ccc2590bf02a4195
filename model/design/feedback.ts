/**
 * The feedback fraction k: how much of VDS reaches the gate.
 *
 * Law      resistors: k = R3/(R2 + R3), with R2 = drainOhm and R3 = controlOhm; buffered: k is the fraction itself; none: 0.
 *          The gate at rest (drain at about 0 V) is 1 − k of the control where the resistors divide it, else all of it.
 * Valid    audio frequencies, where the blocking capacitor is a short and the gate's capacitance an open circuit
 * Source   voltage divider; for an equal pair it gives the usual VGS = VC/2 + VDS/2
 */
import { checkVariant } from './read.ts';
import type { Cell, Control, Variant } from './types.ts';
import { plainly } from './wording.ts';

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
 * The gate's voltage at rest for each volt of control: 1 − k where the resistors divide the control at DC, 1 with a blocking capacitor,
 * a buffered fraction or no feedback. With a blocking capacitor it holds at DC only: from about 1/(2πC(R2 + R3)) upwards an
 * LFO's swing is divided too, down to 1 − k.
 */
export function restGateFraction(cell: Cell): number {
  return cell.feedback.kind === 'resistor' && cell.feedback.blockingF === null ? 1 - feedbackFraction(cell) : 1;
}

/**
 * The same variant at another k: resistors move drainOhm, a buffered cell its fraction.
 *
 * @param keep 'gate' scales every control voltage so that the gate keeps its bias and swing, by `restGateFraction`;
 *   'control' leaves the control as it is, and the gate moves
 * @throws RangeError with a sentence where k cannot be had with values within their limits
 */
export function withFeedbackFraction(variant: Variant, k: number, keep: 'gate' | 'control'): Variant {
  const cell = cellWithFraction(variant.cell, k);
  const [before, after] = keep === 'gate' ? [restGateFraction(variant.cell), restGateFraction(cell)] : [1, 1];
  const control = scaledControl(variant.control, (volts) => (volts * before) / after);
  const result = checkVariant({ ...variant, cell, control });
  if ('variant' in result) return result.variant;
  throw new RangeError(`k = ${plainly(k, '', 3)} cannot be set: ${result.faults.map((fault) => fault.sentence).join('; ')}`);
}

function cellWithFraction(cell: Cell, k: number): Cell {
  const { feedback, controlOhm } = cell;
  switch (feedback.kind) {
    case 'none':
      if (k === 0) return cell;
      throw new RangeError(`k is ${k}; expected 0 while cell.feedback.kind is none`);
    case 'resistor':
      if (k > 0 && k < 1) return { ...cell, feedback: { ...feedback, drainOhm: (controlOhm * (1 - k)) / k } };
      throw new RangeError(`k is ${k}; expected more than 0 and less than 1, as two resistors give`);
    case 'buffered':
      if (k >= 0 && k <= 1) return { ...cell, feedback: { ...feedback, fraction: k } };
      throw new RangeError(`k is ${k}; expected 0 to 1`);
  }
}

function scaledControl(control: Control, scaled: (volts: number) => number): Control {
  switch (control.source) {
    case 'fixed':
      return { ...control, controlV: scaled(control.controlV) };
    case 'lfo':
      return { ...control, fromV: scaled(control.fromV), toV: scaled(control.toV) };
    case 'envelope':
      return { ...control, restV: scaled(control.restV), limitV: scaled(control.limitV), gainVPerV: scaled(control.gainVPerV) };
    case 'external':
      return { ...control, fullScaleV: scaled(control.fullScaleV), offsetV: scaled(control.offsetV) };
  }
}
