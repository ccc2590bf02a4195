import { followerTimesSec } from '../../model/control/follower.ts';
import type { Control } from '../../model/design/types.ts';
import { formatQuantity } from '../../model/design/values.ts';
import { useBench, useVariant } from './BenchContext.ts';
import { CircuitValue } from './CircuitValue.tsx';
import { Choice } from './parts/Choice.tsx';

type Envelope = Extract<Control, { source: 'envelope' }>;

const SENSES: readonly { value: Envelope['senses']; words: string }[] = [
  { value: 'input', words: 'the cell’s input' },
  { value: 'output', words: 'the cell’s output' },
];
const RECTIFIERS: readonly { value: Envelope['rectifier']; words: string }[] = [
  { value: 'full', words: 'full-wave' },
  { value: 'half', words: 'half-wave' },
];
const LINKS = [
  { value: 'linked', words: 'by one control' },
  { value: 'apart', words: 'each by its own' },
] as const;

/** What of the control has no room in the drawing: the follower's circuit, or where a recording comes from. */
export function ControlSentence() {
  const { control } = useVariant();
  if (control.source === 'envelope') return <Follower control={control} />;
  if (control.source !== 'external') return null;
  return (
    <p class="sentence fitting">
      <i class="lead">Control:</i> a recording,{' '}
      <CircuitValue path="control.fullScaleV" label="Change of control voltage for a sample of 1.0" short="A sample of 1.0" /> for a sample
      of 1.0. It is given to the command line so far; here the gate rests.
    </p>
  );
}

function Follower({ control }: { readonly control: Envelope }) {
  const bench = useBench();
  const { attackSec, releaseSec } = followerTimesSec(control);
  const time = (seconds: number) => formatQuantity(seconds, 's', 2);
  return (
    <p class="sentence fitting">
      <i class="lead">Follower:</i> hears{' '}
      <Choice
        label="Where the follower listens"
        value={control.senses}
        options={SENSES}
        onChoose={(senses) => bench.setValue('control.senses', senses)}
      />
      ,{' '}
      <Choice
        label="Rectifier of the follower"
        value={control.rectifier}
        options={RECTIFIERS}
        onChoose={(rectifier) => bench.setValue('control.rectifier', rectifier)}
      />
      ; charges <CircuitValue path="control.timingF" label="Timing capacitor of the follower" short="The timing capacitor" /> through{' '}
      <CircuitValue path="control.attackOhm" label="Attack resistor of the follower" short="The attack resistor" /> (attack{' '}
      {time(attackSec)}), discharges it through{' '}
      <CircuitValue path="control.releaseOhm" label="Release resistor of the follower" short="The release resistor" /> (release{' '}
      {time(releaseSec)}); above <CircuitValue path="control.thresholdV" label="Threshold of the follower" short="The threshold" /> it moves
      the control by{' '}
      <CircuitValue
        path="control.gainVPerV"
        label="Gain of the follower, volts of control for each volt"
        short="The gain"
        signed
        stepping={{ kind: 'linear', step: 0.1 }}
      />{' '}
      V for each volt. Two channels are moved{' '}
      <Choice
        label="Link of two channels"
        value={control.linked ? 'linked' : 'apart'}
        options={LINKS}
        onChoose={(link) => bench.setValue('control.linked', link === 'linked')}
      />
      .
    </p>
  );
}
