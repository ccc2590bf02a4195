import { useRef } from 'preact/hooks';
import { formatQuantity, parseQuantity } from '../../model/design/values.ts';
import { readClock } from '../draw/overview.ts';
import { clockText, dbuFromPeak, decimals, peakFromDbu, valueVolts } from '../draw/words.ts';
import type { Region } from '../state/bench.ts';
import { useBench } from './BenchContext.ts';
import { delayWords } from './delayWords.ts';
import { Choice, chosen } from './parts/Choice.tsx';
import { EditableValue } from './parts/EditableValue.tsx';
import { E24 } from './parts/stepping.ts';

const TONE = 'test tone';
const LIVE = 'live input';
const TENTH = { kind: 'linear', step: 0.1 } as const;

/** What is put through the cell: a phrase, the user's own file, the test tone or live input, each with what can be set of it. */
export function SourceWords({ askLive }: { readonly askLive: () => void }) {
  const { kind } = useBench().source.value;
  return (
    <>
      <SourceChoice askLive={askLive} /> or <OwnFile />
      {kind === 'tone' ? <ToneWords /> : kind === 'live' ? <LiveWords /> : <LoopWords />}
    </>
  );
}

function SourceChoice({ askLive }: { readonly askLive: () => void }) {
  const bench = useBench();
  const { kind, title } = bench.source.value;
  const phrases = bench.phrases.value.map((phrase) => ({ value: `phrase ${phrase.name}`, words: phrase.title }));
  const others = [
    { value: TONE, words: TONE },
    { value: LIVE, words: kind === 'live' ? LIVE : `${LIVE}…` },
  ];
  const own = { value: '', words: title };
  const phrase = phrases.find(({ words }) => kind === 'phrase' && words === title);
  const current = kind === 'tone' ? TONE : kind === 'live' ? LIVE : (phrase?.value ?? '');
  const choose = (value: string) => {
    if (value === LIVE) askLive();
    else if (value === TONE) void bench.chooseTestTone();
    else if (value !== '') void bench.choosePhrase(value.slice('phrase '.length));
  };
  return (
    <Choice
      label="Source"
      hint={bench.phrases.value.find((each) => each.title === title)?.listenFor}
      value={current}
      options={[...(current === '' ? [own] : []), ...phrases, ...others]}
      onChoose={(value) => {
        choose(value);
        return null;
      }}
      stays
    />
  );
}

function OwnFile() {
  const bench = useBench();
  const picker = useRef<HTMLInputElement>(null);
  return (
    <>
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
    </>
  );
}

/** Tenths where there are any. */
function placeText(seconds: number): string {
  const tenths = Math.round(10 * seconds);
  return clockText(tenths / 10 + 1e-6, tenths % 10 !== 0);
}

/** The part that loops, its ends typed or stepped. */
function LoopWords() {
  const bench = useBench();
  const { seconds } = bench.source.value;
  const region = bench.region.value ?? { fromSec: 0, toSec: seconds };
  const end = (label: string, value: number, with_: (sec: number) => Region) => (
    <EditableValue
      label={`${label}, minutes and seconds`}
      short={label}
      value={value}
      stepping={TENTH}
      format={placeText}
      read={readClock}
      min={0}
      max={seconds}
      onSet={(sec) => bench.setRegion(with_(sec as number))}
    />
  );
  return (
    <>
      , looped {end('Loop begins', region.fromSec, (fromSec) => ({ ...region, fromSec }))}–
      {end('Loop ends', region.toSec, (toSec) => ({ ...region, toSec }))}
      {bench.region.value !== null && (
        <>
          {' '}
          or{' '}
          <button type="button" class="value-like" aria-label="Loop it whole" onClick={() => bench.setRegion(null)}>
            whole
          </button>
        </>
      )}
      , at{' '}
    </>
  );
}

function ToneWords() {
  const bench = useBench();
  return (
    <>
      ,{' '}
      <EditableValue
        label="Frequency of the test tone"
        short="The test tone"
        value={bench.testToneHz.value}
        stepping={E24}
        format={(hz) => formatQuantity(hz, 'Hz', 3, { trimmed: true })}
        read={(text) => parseQuantity(text, 'Hz')}
        min={1}
        max={20000}
        onSet={(hz) => bench.setTestToneHz(hz as number)}
      />{' '}
      at{' '}
      <EditableValue
        label="Level of the test tone, peak"
        short="The test tone"
        value={bench.testToneV.value}
        stepping={E24}
        format={valueVolts}
        read={(text) => parseQuantity(text, 'V')}
        onSet={(volts) => bench.setTestToneV(volts as number)}
      />{' '}
      peak ={' '}
      <EditableValue
        label="Level of the test tone, dBu"
        short="The test tone"
        value={dbuFromPeak(bench.testToneV.value)}
        stepping={{ kind: 'linear', step: 0.5 }}
        format={(dbu) => `${decimals(dbu, 1)}\u2009dBu`}
        read={(text) => parseQuantity(text.replace(/dBu\s*$/i, ''), 'dB')}
        onSet={(dbu) => bench.setTestToneV(peakFromDbu(dbu as number))}
      />
      ; full scale{' '}
    </>
  );
}

/** The device, how it is heard and how late. */
function LiveWords() {
  const bench = useBench();
  const input = bench.input.value;
  if (input === null) return <>; full scale </>;
  const options = bench.inputs.value.map(({ id, title }) => ({ value: id, words: title || 'input without a name' }));
  const known = options.some(({ value }) => value === input.deviceId);
  return (
    <>
      {' '}
      from{' '}
      <Choice
        label="Input device"
        value={input.deviceId}
        options={known ? options : [{ value: input.deviceId, words: input.title }, ...options]}
        onChoose={chosen((id) => void bench.openInput(id))}
      />
      , {input.channels === 1 ? 'one channel' : 'two channels'} at {formatQuantity(input.sampleRateHz, 'Hz', 4, { trimmed: true })},{' '}
      {delayWords(input.latencySec, bench.latencySec.value, bench.outputLatencySec.value)}; full scale{' '}
    </>
  );
}
