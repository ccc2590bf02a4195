/**
 * What an envelope follower makes of a steady tone, level by level.
 *
 * Scheme   the envelope is in proportion to the tone, so one periodic envelope of a tone of 1 V gives all levels; the control's voltages between
 *          rest and limit are walked through, each with the level that calls for it. A follower of the output divides that by the cell's gain there
 * Valid    a steady tone, long after attack and release; one that follows the output hears a small tone's gain
 */
import { cosTurns } from '../../model/device/math.ts';
import {
  BEFORE,
  CHANNELS,
  EARLIER,
  ENVELOPE,
  FOLLOWER_SLOTS,
  follow,
  followerValues,
  HEARD,
  keepStep,
} from '../../model/control/follower.ts';
import type { Control, Design } from '../../model/design/types.ts';
import { deviceOf } from '../../model/cell/fromDesign.ts';
import { conductsFromV } from '../../model/device/junction.ts';
import { lawConstants } from '../../model/device/law.ts';
import { measureTone } from '../../model/study/tone.ts';
import type { FollowerCurve } from './bench.ts';

type Envelope = Extract<Control, { source: 'envelope' }>;

const STEPS = 32;
const POINTS = 256;
const SMALL_V = 1e-3;
/** How far the curve goes on before the threshold and past the limit, as a ratio of levels. */
const BEYOND = 4;

/** Throws a RangeError where the cell cannot be computed. */
export function followerCurve(design: Design, variantIndex: number, control: Envelope, toneHz: number): FollowerCurve {
  const device = deviceOf(design.variants[variantIndex], 0);
  const { restV, limitV, thresholdV, gainVPerV, senses } = control;
  const perVolt = steadyEnvelope(control, toneHz);
  const moves = gainVPerV !== 0 && limitV !== restV;
  const walked = Array.from({ length: moves ? STEPS + 1 : 1 }, (_, n) => {
    const controlV = restV + ((limitV - restV) * n) / STEPS;
    const { vgsV, gainDb } = measureTone(design, variantIndex, { controlV, toneHz, toneV: SMALL_V });
    const envelopeV = thresholdV + (moves ? (controlV - restV) / gainVPerV : 0);
    const heardV = Math.max(envelopeV, 1e-6) / perVolt;
    return { levelV: senses === 'input' ? heardV : heardV / 10 ** (gainDb / 20), controlV, gateV: vgsV };
  });
  const [first, last] = [walked[0], walked[walked.length - 1]];
  const points = [
    { ...first, levelV: Math.min(...walked.map(({ levelV }) => levelV)) / BEYOND },
    ...walked,
    { ...last, levelV: Math.max(...walked.map(({ levelV }) => levelV)) * BEYOND },
  ];
  const column = (pick: (point: (typeof points)[number]) => number) => Float64Array.from(points, pick);
  return {
    levelV: column(({ levelV }) => levelV),
    control: column(({ controlV }) => controlV),
    gate: column(({ gateV }) => gateV),
    gateOffV: Math.sign(device.gateOffV) * Math.abs(lawConstants(device, design.tempC).gateOffV),
    gateOnV: conductsFromV(device, design.tempC),
  };
}

/** Mean of the envelope of a tone of 1 V peak once it repeats, V. */
export function steadyEnvelope(control: Envelope, toneHz: number): number {
  const values = followerValues(control, POINTS * toneHz);
  const toneAt = (n: number) => cosTurns((n % POINTS) / POINTS);
  const over = (startV: number) => {
    const slots = new Float64Array(FOLLOWER_SLOTS);
    slots[ENVELOPE] = startV;
    slots[CHANNELS + EARLIER] = toneAt(POINTS - 1);
    slots[CHANNELS + BEFORE] = toneAt(0);
    let sum = 0;
    for (let n = 0; n < POINTS; n++) {
      slots[CHANNELS + HEARD] = toneAt(n + 1);
      follow(values, slots, control.rectifier === 'full', 1);
      keepStep(slots);
      sum += slots[ENVELOPE];
    }
    return { endV: slots[ENVELOPE], meanV: sum / POINTS };
  };
  // The end of a period rises with its start, by less than the start does: halving finds where both are the same.
  let [low, high] = [0, 1];
  for (let halving = 0; halving < 50; halving++) {
    const middle = (low + high) / 2;
    if (over(middle).endV > middle) low = middle;
    else high = middle;
  }
  return over(low).meanV;
}
