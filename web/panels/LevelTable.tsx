import { useSignal } from '@preact/signals';
import { type LevelNode, type LevelUnit, levelNodes, levelText } from '../draw/levelRows.ts';
import { signedDecimals } from '../draw/words.ts';
import { useBenchView, useReading, useVariant } from './BenchContext.ts';
import { noiseAt } from './characteristicRows.ts';
import { Choice, chosen } from './parts/Choice.tsx';
import { DataTable } from './parts/DataTable.tsx';

const COLUMNS = [
  { key: 'what', head: 'At' },
  { key: 'number', head: 'Nominal' },
  { key: 'number', head: 'Peak' },
  { key: 'number noise', head: 'Noise, rms' },
  { key: 'number', head: 'Clips at' },
  { key: 'number', head: 'Margin, dB' },
];

const UNITS: readonly { value: LevelUnit; words: string }[] = [
  { value: 'V', words: 'volts, peak' },
  { value: 'dBu', words: 'dBu' },
  { value: 'dBFS', words: 'dBFS' },
];

/** Table 4: levels at every point of the chain, and how far each is from its limit. */
export function LevelTable() {
  const { bench, slowLive } = useBenchView();
  const unit = useSignal<LevelUnit>('dBu');
  const reading = useReading();
  const found = bench.period.value;
  const noise = bench.noise.value;
  const { fullScaleV } = bench.design.value;
  const nodes = levelNodes({
    variant: useVariant(),
    fullScaleV,
    toneV: bench.toneV.value,
    reading,
    live: slowLive.value,
    noiseRmsV: noise === null || reading === null ? null : noiseAt(noise, reading.vgsV),
    gateOffV: found === null || 'fault' in found ? null : found.gateOffV,
    listenDb: bench.listenDb.value,
    ceilingDbfs: bench.ceilingDbfs.value,
  });
  const caption = (
    <>
      Levels along the chain, in{' '}
      <Choice label="Unit of the levels" value={unit.value} options={UNITS} onChoose={chosen((next) => (unit.value = next))} />; nominal is
      the shadow tone.
    </>
  );
  return (
    <DataTable number={4} className="level-table" caption={caption} columns={COLUMNS}>
      <tbody>
        {nodes.map((node) => (
          <LevelRow key={node.name} node={node} print={(volts, rms) => levelText(volts, unit.value, fullScaleV, rms)} />
        ))}
      </tbody>
    </DataTable>
  );
}

interface LevelRowProps {
  readonly node: LevelNode;
  readonly print: (volts: number | null, rms?: boolean) => string;
}

function LevelRow({ node, print }: LevelRowProps) {
  const { name, clipsBy, nominalV, peakV, noiseV, clipV, marginDb } = node;
  return (
    <tr>
      <th scope="row" class="what">
        {name}
        {clipV !== null && <span class="clips-by">limit: {clipsBy}</span>}
      </th>
      <td class="number">{print(nominalV)}</td>
      <td class="number">{peakV !== null && <span class="live">{print(peakV)}</span>}</td>
      <td class="number noise">{print(noiseV, true)}</td>
      <td class="number">{print(clipV)}</td>
      <td class="number">{marginDb !== null && <span class={marginDb < 0 ? 'over' : undefined}>{signedDecimals(marginDb, 1)}</span>}</td>
    </tr>
  );
}
