import { useSignal } from '@preact/signals';
import { formatQuantity, parseQuantity } from '../../model/design/values.ts';
import { dbuFromPeak, decimals, peakFromDbu, valueVolts } from '../draw/words.ts';
import { useBench } from './BenchContext.ts';
import { LiveCaution } from './LiveCaution.tsx';
import { EditableValue } from './parts/EditableValue.tsx';
import { E24 } from './parts/stepping.ts';
import { SourceWords } from './SourceWords.tsx';

/** What is put through the cell, at which level and temperature. */
export function Conditions() {
  const bench = useBench();
  const { fullScaleV, tempC } = bench.design.value;
  const asking = useSignal(false);
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
          onSet={(volts) => bench.setDesignValue('fullScaleV', volts)}
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
            onSet={(dbu) => bench.setDesignValue('fullScaleV', peakFromDbu(dbu as number))}
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
          onSet={(c) => bench.setDesignValue('tempC', c)}
        />
        .
      </p>
      {asking.value && <LiveCaution onDone={() => (asking.value = false)} />}
    </>
  );
}
