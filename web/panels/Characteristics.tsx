import type { ComponentChildren } from 'preact';
import { formatQuantity, parseQuantity } from '../../model/design/values.ts';
import { decimals, valueVolts } from '../draw/words.ts';
import { type Row, characteristicRows } from './characteristicRows.ts';
import { useBench, useBenchView, useReading, useVariant } from './BenchContext.ts';
import { DataTable } from './parts/DataTable.tsx';
import { EditableValue } from './parts/EditableValue.tsx';
import { E24 } from './parts/stepping.ts';
import { Sym } from './parts/Symbol.tsx';
import { RowLimit } from './RowLimit.tsx';
import { useSheetLimits } from './sheetLimits.ts';

const COLUMNS = [
  { key: 'what', head: 'Characteristic' },
  { key: 'symbol', head: 'Symbol' },
  { key: 'number min', head: 'Min' },
  { key: 'number now', head: 'Now' },
  { key: 'number max', head: 'Max' },
  { key: 'number limit', head: 'Limit' },
  { key: 'unit', head: 'Unit' },
];

/** Table 1: what the shadow tone finds at this moment, and the ends of the swing where they are known. */
export function Characteristics() {
  const { bench, slowLive } = useBenchView();
  const { feedthroughV, controlV, pastOffV } = useSheetLimits();
  const limits = { feedthroughV: feedthroughV.value, controlV: controlV.value, pastOffV: pastOffV.value };
  const measured = { limits, levels: slowLive.value, swing: bench.swing.value, noise: bench.noise.value };
  const variant = useVariant();
  const reading = useReading();
  const found = bench.period.value;
  const picture = found === null || 'fault' in found ? null : found;
  const groups = characteristicRows(variant, { ...measured, reading, picture });
  return (
    <DataTable number={1} className="characteristics" caption={<ToneCaption />} columns={COLUMNS}>
      {groups.map((rows) => (
        <tbody key={rows[0].what}>
          {rows.map((row) => (
            <CharacteristicRow key={row.what} {...row} />
          ))}
        </tbody>
      ))}
      {reading && <Regions {...reading.regions} />}
      {reading === null && (
        <tbody>
          <tr>
            <td colSpan={7} class="unread">
              no reading
            </td>
          </tr>
        </tbody>
      )}
    </DataTable>
  );
}

function CharacteristicRow({ what, short, symbol, min, now, max, unit, limit, over = [], measured }: Row) {
  const marked = (which: 'min' | 'max', text: string) => (over.includes(which) ? <span class="over">{text}</span> : text);
  return (
    <tr>
      <th scope="row" class="what">
        <span class="long">{what}</span>
        <span class="short">{short}</span>
      </th>
      <td class="symbol">{symbol && <Sym of={symbol[0]} {...(symbol[1] && { sub: symbol[1] })} />}</td>
      <td class="number min">{marked('min', min)}</td>
      <td class="number now">{now !== null && <span class={over.includes('now') ? 'over' : measured ? 'live' : undefined}>{now}</span>}</td>
      <td class="number max">{marked('max', max)}</td>
      <td class="number limit">{limit && <RowLimit limit={limit} />}</td>
      <td class="unit">{unit}</td>
    </tr>
  );
}

function Regions({ ohmic, saturated, cutoff, gateOn }: { ohmic: number; saturated: number; cutoff: number; gateOn: number }) {
  const share = (fraction: number, limit: boolean): ComponentChildren => (
    <span class={limit && fraction > 0.0005 ? 'over' : 'live'}>{decimals(100 * fraction, 0)}</span>
  );
  return (
    <tbody>
      <tr>
        <th scope="row" class="what">
          <span class="long">Regions, share of the tone</span>
          <span class="short">Regions</span>
        </th>
        <td colSpan={6}>
          <span class="share">ohmic {share(ohmic, false)},</span> <span class="share">saturated {share(saturated, true)},</span>{' '}
          <span class="share">cut off {share(cutoff, false)},</span>{' '}
          <span class="share">
            gate on {share(gateOn, true)}
            {'\u2009%'}
          </span>
        </td>
      </tr>
    </tbody>
  );
}

/** The shadow tone's frequency and level are changed in the caption that names them. */
function ToneCaption() {
  const bench = useBench();
  return (
    <>
      Characteristics, by shadow tone of{' '}
      <EditableValue
        label="Frequency of the shadow tone"
        short="The tone"
        value={bench.toneHz.value}
        stepping={E24}
        format={(hz) => formatQuantity(hz, 'Hz', 3, { trimmed: true })}
        read={(text) => parseQuantity(text, 'Hz')}
        onSet={(hz) => bench.setToneHz(hz as number)}
      />{' '}
      at{' '}
      <EditableValue
        label="Level of the shadow tone, peak"
        short="The tone"
        value={bench.toneV.value}
        stepping={E24}
        format={valueVolts}
        read={(text) => parseQuantity(text, 'V')}
        onSet={(volts) => bench.setToneV(volts as number)}
      />{' '}
      peak.
    </>
  );
}
