import { deviceOf } from '../../model/cell/fromDesign.ts';
import type { Channel, Control, Device, Law } from '../../model/design/types.ts';
import type { Form } from '../draw/schematic.ts';
import { useBench, useVariant } from './BenchContext.ts';
import { CircuitValue } from './CircuitValue.tsx';
import { Choice } from './parts/Choice.tsx';
import { Sym } from './parts/Symbol.tsx';

const LAWS: readonly { value: Law; words: string }[] = [
  { value: 'square', words: 'square law' },
  { value: 'gradual', words: 'gradual channel' },
  { value: 'smooth', words: 'smooth law' },
];
const CHANNELS: readonly { value: Channel; words: string }[] = [
  { value: 'n', words: 'n-channel' },
  { value: 'p', words: 'p-channel' },
];

/** The JFET by its data-sheet values. */
export function DeviceValues({ form }: { readonly form: Form }) {
  const bench = useBench();
  const variant = useVariant();
  const { channel, law } = deviceOf(variant, 0);
  const chooseChannel = (next: Channel) => {
    if (next === channel) return null;
    return bench.setValues([
      ['control', mirrored(variant.control)],
      ...ofBoth((device) => ({ ...device, channel: next, gateOffV: -device.gateOffV })),
    ]);
  };
  /** Both channels' parts are of one kind: what is chosen here is chosen for both. */
  const ofBoth = (changed: (device: Device) => Device) =>
    (variant.devices ?? [variant.device]).map((device, n): readonly [string, unknown] => [
      variant.devices ? `devices.${n}` : 'device',
      changed(device),
    ]);
  const short = form === 'upright';
  return (
    <div class={short ? 'device upright' : 'device'}>
      <span>
        <span class="name">J1{form === 'wide' && ','}</span>{' '}
        <Choice
          label="Channel of J1"
          value={channel}
          options={CHANNELS}
          onChoose={chooseChannel}
          {...(short && { shown: `${channel}-chan.` })}
        />
      </span>
      <span>
        <span class="name">
          <Sym of="I" sub="DSS" />
        </span>{' '}
        <CircuitValue path="device.idssA" label="IDSS of J1" short="IDSS" />
      </span>
      <span>
        <span class="name">
          <Sym of="V" sub="GS(off)" />
        </span>{' '}
        <CircuitValue path="device.gateOffV" label="VGS(off) of J1" short="VGS(off)" />
      </span>
      <span>
        <Choice
          label="Law of J1"
          value={law}
          options={LAWS}
          onChoose={(next) => bench.setValues(ofBoth((device) => ({ ...device, law: next })))}
          {...(short && { shown: law })}
        />
      </span>
    </div>
  );
}

/** Every voltage of the control with the other sign, as the other channel needs it. */
function mirrored(control: Control): Control {
  switch (control.source) {
    case 'fixed':
      return { ...control, controlV: -control.controlV };
    case 'lfo':
      return { ...control, fromV: -control.fromV, toV: -control.toV };
    case 'envelope':
      return { ...control, restV: -control.restV, limitV: -control.limitV, gainVPerV: -control.gainVPerV };
    case 'external':
      return { ...control, fullScaleV: -control.fullScaleV, offsetV: -control.offsetV };
  }
}
