import type { Variant } from '../../model/design/types.ts';
import { fieldAt, getAt, rangeFault } from '../../model/design/path.ts';
import { formatQuantity, parseQuantity, type Unit } from '../../model/design/values.ts';
import { valueVolts } from '../draw/words.ts';
import { useBench, useVariant } from './BenchContext.ts';
import { namedSentence } from './parts/bareSentence.ts';
import { EditableValue } from './parts/EditableValue.tsx';
import type { Stepping } from './parts/stepping.ts';

interface CircuitValueProps {
  /** Path in the heard variant: `cell.seriesOhm`. */
  readonly path: string;
  readonly label: string;
  readonly short: string;
  /** Zero means that the part is absent, as for the load's capacitance. */
  readonly zeroIsAbsent?: boolean;
  readonly signed?: boolean;
  readonly stepping?: Stepping;
}

/** One value of the heard variant, with the unit and limits that the document's schema gives it. */
export function CircuitValue({ path: stated, label, short, zeroIsAbsent = false, signed = false, stepping }: CircuitValueProps) {
  const bench = useBench();
  const variant = useVariant();
  const path = shownPath(variant, stated);
  const field = fieldAt(path);
  if (field.kind !== 'number') throw new Error(`${path} is not a number and cannot be edited as one`);
  const raw = getAt(variant, path) as number | null;
  const { unit, min, max } = field;
  return (
    <EditableValue
      label={label}
      short={short}
      value={zeroIsAbsent && raw === 0 ? null : raw}
      optional={zeroIsAbsent || field.nullable === true}
      stepping={stepping ?? steppingFor(unit)}
      format={(value) => printed(value, unit, signed)}
      read={(text) => parseQuantity(text, unit)}
      min={min}
      max={max}
      onSet={(value) =>
        (value === null ? null : rangeFault(field, value, short)) ??
        namedSentence(bench.setValue(path, value ?? (zeroIsAbsent ? 0 : null)), path, short)
      }
    />
  );
}

/** Where the channels' devices differ, the sheet shows the first channel's: the one that is read. */
function shownPath(variant: Variant, path: string): string {
  return variant.devices === undefined ? path : path.replace(/^device\./, 'devices.0.');
}

function printed(value: number, unit: Unit, signed: boolean): string {
  return unit === 'V' ? valueVolts(value) : formatQuantity(value, unit, 3, { signed });
}

/** Where a step up from nothing lands, and what a step is. */
function steppingFor(unit: Unit): Stepping {
  switch (unit) {
    case 'V':
      return { kind: 'linear', step: 0.05 };
    case 'dB':
      return { kind: 'linear', step: 0.5 };
    case '':
      return { kind: 'linear', step: 0.01 };
    case 'F':
      return { kind: 'preferred', series: 'E24', from: 1e-12 };
    case 's':
      return { kind: 'preferred', series: 'E24', from: 1e-3 };
    default:
      return { kind: 'preferred', series: 'E24', from: 1 };
  }
}
