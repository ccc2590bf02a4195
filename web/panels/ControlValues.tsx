import type { Control } from '../../model/design/types.ts';
import { useBench, useVariant } from './BenchContext.ts';
import { CircuitValue } from './CircuitValue.tsx';
import { Choice } from './parts/Choice.tsx';
import { Sym } from './parts/Symbol.tsx';

type Shape = 'fixed' | 'sine' | 'triangle' | 'square';
const SHAPES: readonly { value: Shape; words: string }[] = [
  { value: 'fixed', words: 'fixed' },
  { value: 'sine', words: 'sine' },
  { value: 'triangle', words: 'triangle' },
  { value: 'square', words: 'square' },
];

/** What moves the gate: a steady voltage, or an LFO's shape, rate and the two ends of its swing. */
export function ControlValues() {
  const bench = useBench();
  const { control } = useVariant();
  const choose = (shape: string) => {
    if (shape === 'fixed' || shape === 'sine' || shape === 'triangle' || shape === 'square')
      bench.setValue('control', controlOf(shape, control));
  };
  const present = control.source === 'lfo' ? control.shape : control.source;
  const options = SHAPES.some(({ value }) => value === present) ? SHAPES : [{ value: present, words: present }, ...SHAPES];
  return (
    <div class="control-values">
      <span class="name">
        <Sym of="V" sub="C" />
      </span>
      <Choice<string> label="Control: fixed, or the LFO’s shape" value={present} options={options} onChoose={choose} />
      {control.source === 'fixed' && <CircuitValue path="control.controlV" label="Control voltage" short="VC" />}
      {control.source === 'lfo' && <Lfo shape={control.shape} />}
    </div>
  );
}

function Lfo({ shape }: { readonly shape: Extract<Control, { source: 'lfo' }>['shape'] }) {
  return (
    <>
      <CircuitValue path="control.rateHz" label="Rate of the LFO" short="The rate" />
      {shape === 'square' && (
        <span>
          <span class="name">edge</span> <CircuitValue path="control.edgeSec" label="Edge of the square, 0 to 100 %" short="The edge" />
        </span>
      )}
      <span class="swing">
        <span>
          <span class="name from">from</span>{' '}
          <CircuitValue path="control.fromV" label="Control voltage at one end of the swing" short="From" />
        </span>
        <span>
          <span class="name">to</span> <CircuitValue path="control.toV" label="Control voltage at the other end of the swing" short="To" />
        </span>
      </span>
    </>
  );
}

/** The control in another shape: an LFO keeps its rate and swing; a swing grows out of a fixed voltage and shrinks to its middle. */
function controlOf(shape: Shape, control: Control): unknown {
  if (control.source === 'lfo')
    return shape === 'fixed' ? { source: 'fixed', controlV: middle(control.fromV, control.toV) } : { ...control, shape };
  if (shape === 'fixed') return { source: 'fixed' };
  return control.source === 'fixed'
    ? { source: 'lfo', shape, fromV: control.controlV / 2, toV: control.controlV * 1.5 }
    : { source: 'lfo', shape };
}

const middle = (a: number, b: number) => Number(((a + b) / 2).toPrecision(4));
