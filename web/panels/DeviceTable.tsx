import { deviceOf } from '../../model/cell/fromDesign.ts';
import { parseQuantity } from '../../model/design/values.ts';
import { valueVolts } from '../draw/words.ts';
import { useBench, useVariant } from './BenchContext.ts';
import { CircuitValue } from './CircuitValue.tsx';
import { Choice } from './parts/Choice.tsx';
import { DataTable } from './parts/DataTable.tsx';
import { EditableValue } from './parts/EditableValue.tsx';
import { useReverseLimit } from './sheetLimits.ts';

interface Entry {
  readonly path: string;
  readonly what: string;
  readonly short: string;
  readonly zeroIsAbsent?: boolean;
}

const CHANNEL: readonly Entry[] = [
  { path: 'device.lambdaPerV', what: 'Channel-length modulation, beyond the knee', short: 'λ' },
  { path: 'device.readAtC', what: 'Values read at', short: 'The temperature of reading' },
];
const LAWS = {
  square: [],
  gradual: [{ path: 'device.barrierV', what: 'Barrier of the gate junction', short: 'The barrier' }],
  smooth: [
    { path: 'device.exponent', what: 'Exponent of the smooth law', short: 'The exponent' },
    { path: 'device.tailV', what: 'Width of its tail below VGS(off)', short: 'The tail' },
  ],
} as const;
const GATE: readonly Entry[] = [
  { path: 'device.junction.reverseA', what: 'Saturation current of each gate junction', short: 'The saturation current' },
  { path: 'device.junction.ideality', what: 'Ideality of the junctions', short: 'The ideality' },
  { path: 'device.junction.leakageS', what: 'Leakage across each', short: 'The leakage' },
  { path: 'device.gateSourceF', what: 'Capacitance, gate to source', short: 'Cgs', zeroIsAbsent: true },
  { path: 'device.gateDrainF', what: 'Capacitance, gate to drain', short: 'Cgd', zeroIsAbsent: true },
  { path: 'device.grading', what: 'Grading of the capacitances, 0 for constant ones', short: 'The grading' },
];
const AMPLIFIER: readonly Entry[] = [
  { path: 'output.gainBandwidthHz', what: 'Gain-bandwidth of the amplifier', short: 'The gain-bandwidth' },
  { path: 'output.slewVPerSec', what: 'Slew rate', short: 'The slew rate' },
  { path: 'output.swingV', what: 'Swing, either side of 0\u2009V', short: 'The swing' },
];

/** Of a right channel's part; its channel and law are chosen with the left one's. */
const RIGHT: readonly Entry[] = [
  { path: 'devices.1.idssA', what: 'IDSS of the right channel’s J1', short: 'The right channel’s IDSS' },
  { path: 'devices.1.gateOffV', what: 'VGS(off) of the right channel’s J1', short: 'The right channel’s VGS(off)' },
];
const PARTS: readonly { value: 'same' | 'own'; words: string }[] = [
  { value: 'same', words: 'the same values' },
  { value: 'own', words: 'values of its own' },
];

const WHAT = { key: 'what', head: 'Value' };
const FITTED = { key: 'number', head: 'Fitted' };

/** Table 5: what of the FET and the amplifier has no place in the drawing, in as many columns as there is room for. */
export function DeviceTable({ across }: { readonly across: 1 | 2 | 3 }) {
  const bench = useBench();
  const variant = useVariant();
  const device = deviceOf(variant, 0);
  const barrierToo = device.law !== 'gradual' && device.grading > 0;
  const channel = [...LAWS[device.law], ...(barrierToo ? LAWS.gradual : []), ...CHANNEL];
  const cells = [
    ...[...channel, ...GATE].map((entry) => <EntryCells key={entry.path} {...entry} />),
    <ReverseCells key="reverse" />,
    ...(variant.devices ? RIGHT : []).map((entry) => <EntryCells key={entry.path} {...entry} />),
    ...AMPLIFIER.map((entry) => <EntryCells key={entry.path} {...entry} />),
  ];
  const rows = Math.ceil(cells.length / across);
  const columns = Array.from({ length: across }, () => [WHAT, FITTED]).flat();
  return (
    <DataTable
      number={5}
      className="device-table"
      caption={
        <>
          J1 and the amplifier, in variant {variant.name}. «none» is ideal, or absent. The right channel’s J1 has{' '}
          <Choice
            label="J1 of the right channel"
            value={variant.devices ? 'own' : 'same'}
            options={PARTS}
            onChoose={(part) =>
              bench.setValues(
                part === 'own'
                  ? [['devices', [device, device]]]
                  : [
                      ['device', device],
                      ['devices', undefined],
                    ],
              )
            }
          />
          {variant.devices && '; shown and read is the left one’s'}.
        </>
      }
      columns={columns}
    >
      <tbody>
        {Array.from({ length: rows }, (_, row) => (
          <tr key={cells[row].key}>{Array.from({ length: across }, (_, n) => cells[row + n * rows])}</tr>
        ))}
      </tbody>
    </DataTable>
  );
}

function EntryCells({ path, what, short, zeroIsAbsent = false }: Entry) {
  return (
    <>
      <th scope="row" class="what">
        {what}
      </th>
      <td class="number">
        <CircuitValue path={path} label={what} short={short} zeroIsAbsent={zeroIsAbsent} />
      </td>
    </>
  );
}

/** A limit of the sheet, not a value of the circuit. */
function ReverseCells() {
  const limit = useReverseLimit();
  return (
    <>
      <th scope="row" class="what">
        Limit of the gate’s reverse voltage, by its sheet
      </th>
      <td class="number">
        <EditableValue
          label="Limit of the gate’s reverse voltage"
          short="The limit"
          value={limit.value}
          stepping={{ kind: 'linear', step: 5 }}
          format={valueVolts}
          read={(text) => parseQuantity(text, 'V')}
          onSet={limit.set}
        />
      </td>
    </>
  );
}
