import type { ComponentChildren } from 'preact';
import { useContext } from 'preact/hooks';
import type { Control } from '../../model/design/types.ts';
import { useBench, useBenchView, useVariant } from './BenchContext.ts';
import { CircuitValue } from './CircuitValue.tsx';
import { CONTROL_KINDS, controlOf, kindOf } from './controlOf.ts';
import { CaptionContext } from './parts/CaptionContext.ts';
import { Choice } from './parts/Choice.tsx';
import { Sym } from './parts/Symbol.tsx';

/** What moves the gate, and between which voltages: a steady one, an LFO, a follower (the rest of which stands under the figure), a recording. */
export function ControlValues() {
  const bench = useBench();
  const variant = useVariant();
  const { control } = variant;
  return (
    <div class="control-values">
      <span class="name">
        <Sym of="V" sub="C" />
      </span>
      <Choice
        label="Control: what moves the gate"
        value={kindOf(control)}
        options={CONTROL_KINDS}
        onChoose={(kind) => bench.setValue('control', controlOf(kind, variant))}
      />
      {control.source === 'fixed' && <CircuitValue path="control.controlV" label="Control voltage" short="VC" />}
      {control.source === 'lfo' && <Lfo shape={control.shape} />}
      {control.source === 'envelope' && <Swing from="restV" to="limitV" names={['rest', 'limit']} />}
      {control.source === 'external' && <CircuitValue path="control.offsetV" label="Control voltage for a sample of 0" short="VC" />}
    </div>
  );
}

function Lfo({ shape }: { readonly shape: Extract<Control, { source: 'lfo' }>['shape'] }) {
  return (
    <>
      <span class="rate">
        <CircuitValue path="control.rateHz" label="Rate of the LFO" short="The rate" /> <TapButton />
      </span>
      <Swing from="fromV" to="toV" names={['from', 'to']}>
        {shape !== 'sine' && shape !== 'triangle' && (
          <span>
            <span class="name">edge</span>{' '}
            <CircuitValue
              path="control.edgeSec"
              label="Time of an edge of the square or of a ramp’s flyback, 0 to 100 %"
              short="The edge"
            />
          </span>
        )}
      </Swing>
    </>
  );
}

/** Taps count at the press, where a hand is most even; a key counts as a press too. */
function TapButton() {
  const { tapRate } = useBenchView();
  const caption = useContext(CaptionContext);
  const tap = (event: Event) => {
    const refused = tapRate(event.timeStamp);
    caption.value = refused === null ? null : { words: refused, refused: true };
  };
  return (
    <button
      type="button"
      class="word tap"
      aria-label="Tap the rate of the LFO"
      title="Press in time, twice or more; Alt T anywhere"
      onPointerDown={tap}
      onClick={(event) => event.detail === 0 && tap(event)}
    >
      tap
    </button>
  );
}

interface SwingProps {
  readonly from: string;
  readonly to: string;
  readonly names: readonly [string, string];
  readonly children?: ComponentChildren;
}

function Swing({ from, to, names, children }: SwingProps) {
  return (
    <span class="swing">
      <span>
        <span class="name from">{names[0]}</span>{' '}
        <CircuitValue path={`control.${from}`} label={`Control voltage, ${names[0]}`} short={`VC ${names[0]}`} />
      </span>
      <span>
        <span class="name">{names[1]}</span>{' '}
        <CircuitValue path={`control.${to}`} label={`Control voltage, ${names[1]}`} short={`VC ${names[1]}`} />
      </span>
      {children}
    </span>
  );
}
