import { useRef } from 'preact/hooks';
import { formatQuantity, parseQuantity } from '../../model/design/values.ts';
import { clockText, dbuFromPeak, decimals, peakFromDbu, valueVolts } from '../draw/words.ts';
import { useBench } from './BenchContext.ts';
import { Choice } from './parts/Choice.tsx';
import { EditableValue } from './parts/EditableValue.tsx';
import { E24 } from './parts/stepping.ts';

/** What is put through the cell, at which level and temperature. */
export function Conditions() {
  const bench = useBench();
  const { fullScaleV, tempC } = bench.design.value;
  return (
    <p class="sentence">
      <i class="lead">Conditions:</i> <SourceChoice /> at{' '}
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
      <EditableValue
        label="Full scale as the level of a sine, dBu"
        short="Full scale"
        value={dbuFromPeak(fullScaleV)}
        stepping={{ kind: 'linear', step: 0.5 }}
        format={(dbu) => `${decimals(dbu, 1)}\u2009dBu`}
        read={(text) => parseQuantity(text.replace(/dBu\s*$/i, ''), 'dB')}
        onSet={(dbu) => bench.setDesignValue('fullScaleV', peakFromDbu(dbu as number))}
      />
      ;{' '}
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
  );
}

/** A phrase, or the user's own file: chosen here, or dropped anywhere on the sheet. */
function SourceChoice() {
  const bench = useBench();
  const picker = useRef<HTMLInputElement>(null);
  const source = bench.source.value;
  const phrases = bench.phrases.value.map(({ name, title }) => ({ value: name, words: title }));
  const current = phrases.find((phrase) => source.kind === 'phrase' && phrase.words === source.title);
  const options = current ? phrases : [{ value: '', words: source.title }, ...phrases];
  return (
    <>
      <Choice
        label="Phrase"
        hint={bench.phrases.value.find(({ title }) => title === source.title)?.listenFor}
        value={current?.value ?? ''}
        options={options}
        onChoose={(name) => {
          if (name !== '') void bench.choosePhrase(name);
          return null;
        }}
      />{' '}
      or{' '}
      <button
        type="button"
        class="value-like"
        title="Choose an audio file, or drop one on the sheet"
        onClick={() => picker.current?.click()}
      >
        your own file
      </button>
      <input
        ref={picker}
        type="file"
        hidden
        accept="audio/*,.wav,.flac,.aif,.aiff,.mp3,.ogg,.m4a"
        onChange={(event) => {
          const file = event.currentTarget.files?.[0];
          event.currentTarget.value = '';
          if (file) void bench.openAudio(file);
        }}
      />
      , looped 0:00–{clockText(source.seconds)},
    </>
  );
}
