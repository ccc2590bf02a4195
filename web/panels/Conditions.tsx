import { useSignal } from '@preact/signals';
import { fieldAt, rangeFault } from '../../model/design/path.ts';
import { formatQuantity, parseQuantity } from '../../model/design/values.ts';
import { dbuFromPeak, decimals, peakFromDbu, valueVolts } from '../draw/words.ts';
import { useBench } from './BenchContext.ts';
import { LiveCaution } from './LiveCaution.tsx';
import { namedSentence } from './parts/bareSentence.ts';
import { EditableValue } from './parts/EditableValue.tsx';
import { E24 } from './parts/stepping.ts';
import { SourceWords } from './SourceWords.tsx';

/** What is put through the cell, at which level and temperature. */
export function Conditions() {
  const bench = useBench();
  const { fullScaleV, tempC } = bench.design.value;
  const asking = useSignal(false);
  const set = (path: 'fullScaleV' | 'tempC', value: number | null, name: string) =>
    (value === null ? null : rangeFault(fieldAt(path), value, name)) ?? namedSentence(bench.setDesignValue(path, value), path, name);
  return (
    <>
      <p class="sentence">
        <i class="lead">Conditions:</i> <SourceWords askLive={() => (asking.value = true)} />
        <EditableValue
          label="Full scale, the voltage of a digital sample of 1.0, peak"
          short="Full scale"
          value={fullScaleV}
          stepping={E24}
          format={valueVolts}
          read={(text) => parseQuantity(text, 'V')}
          onSet={(volts) => set('fullScaleV', volts, 'The full scale')}
        />{' '}
        peak ={' '}
        <span class="together">
          <EditableValue
            label="Full scale as the level of a sine, dBu"
            short="Full scale"
            value={dbuFromPeak(fullScaleV)}
            stepping={{ kind: 'linear', step: 0.5 }}
            format={(dbu) => `${decimals(dbu, 1)}\u2009dBu`}
            read={(text) => parseQuantity(text.replace(/dBu\s*$/i, ''), 'dB')}
            onSet={(dbu) => set('fullScaleV', peakFromDbu(dbu as number), 'The full scale')}
          />
          ;
        </span>{' '}
        <EditableValue
          label="Temperature of the circuit"
          short="Temperature"
          value={tempC}
          stepping={{ kind: 'linear', step: 1 }}
          format={(c) => formatQuantity(c, '°C', Number.isInteger(c) ? 2 : 3)}
          read={(text) => parseQuantity(text, '°C')}
          onSet={(c) => set('tempC', c, 'The temperature')}
        />
        .
      </p>
      {asking.value && <LiveCaution onDone={() => (asking.value = false)} />}
    </>
  );
}
