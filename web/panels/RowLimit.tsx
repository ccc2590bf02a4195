import { parseQuantity } from '../../model/design/values.ts';
import { valueVolts } from '../draw/words.ts';
import type { RowLimits } from './characteristicRows.ts';
import { EditableValue } from './parts/EditableValue.tsx';
import { useSheetLimits } from './sheetLimits.ts';

interface LimitWords {
  readonly label: string;
  readonly short: string;
  readonly sign: '' | '±';
  readonly step: number;
}

const WORDS: Readonly<Record<keyof RowLimits, LimitWords>> = {
  feedthroughV: { label: 'Most control feedthrough, peak', short: 'The limit', sign: '', step: 0.001 },
  controlV: { label: 'Most control voltage, either side of 0 V', short: 'The limit', sign: '±', step: 0.5 },
  pastOffV: { label: 'Least way past VGS(off)', short: 'The limit', sign: '', step: 0.05 },
};

/** A limit of Table 1, in the designer's hands; «none» asks nothing. */
export function RowLimit({ limit }: { readonly limit: keyof RowLimits }) {
  const kept = useSheetLimits()[limit];
  const { label, short, sign, step } = WORDS[limit];
  return (
    <EditableValue
      label={label}
      short={short}
      value={kept.value}
      optional
      stepping={{ kind: 'linear', step }}
      format={(volts) => `${sign}${valueVolts(volts)}`}
      read={(text) => parseQuantity(text.replace(/^\s*±/, ''), 'V')}
      onSet={kept.set}
    />
  );
}
