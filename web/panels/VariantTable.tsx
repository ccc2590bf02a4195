import { useMemo } from 'preact/hooks';
import { feedbackFraction } from '../../model/design/feedback.ts';
import { decimals, percentText } from '../draw/words.ts';
import { differences } from '../draw/differences.ts';
import { useBench, useBenchView } from './BenchContext.ts';
import { DataTable } from './parts/DataTable.tsx';
import { EditableText } from './parts/EditableText.tsx';
import { WordActions } from './parts/WordActions.tsx';
import { overLimit, useThdLimit } from './sheetLimits.ts';

const LETTERS = ['A', 'B', 'C', 'D'];
/** Differences told of; the rest is counted. */
const MOST_TOLD = 3;
const COLUMNS = [
  { key: 'which', head: 'Variant' },
  { key: 'what', head: 'What it tries' },
  { key: 'number k', head: <i>k</i> },
  { key: 'number gain', head: 'Gain' },
  { key: 'number', head: 'THD, rest' },
  { key: 'number', head: 'Worst' },
  { key: 'number level', head: 'Peak now' },
];

/** Table 3: the variants side by side. */
export function VariantTable() {
  const { variants } = useBench().design.value;
  return (
    <DataTable
      number={3}
      className="variant-table"
      caption="Variants by the shadow tone: gain and worst THD over the control’s swing, THD with it at rest; what each puts out now."
      columns={COLUMNS}
    >
      <tbody>
        {variants.map((variant, index) => (
          <VariantRow key={variant.name} index={index} />
        ))}
        {variants.length < LETTERS.length && <EmptyRow letter={LETTERS[variants.length]} />}
      </tbody>
    </DataTable>
  );
}

function VariantRow({ index }: { readonly index: number }) {
  const { bench, slowLive } = useBenchView();
  const limit = useThdLimit();
  const live = slowLive.value?.variants[index] ?? null;
  const { variants } = bench.design.value;
  const variant = variants[index];
  const heard = bench.heardVariant.value === index;
  const summary = bench.summaries.value[index] ?? null;
  const tries = useMemo(() => (index === 0 ? 'the first' : told(differences(variants[0], variant))), [variants[0], variant]);
  const over = summary !== null && overLimit(summary.worstThd, limit.value);
  return (
    <tr class={heard ? 'heard' : undefined}>
      <th scope="row" class="which">
        {LETTERS[index]}
        {heard && <span class="heard-word">, heard</span>}
      </th>
      <td class="what">
        {heard ? <VariantName name={variant.name} letter={LETTERS[index]} /> : variant.name !== LETTERS[index] && `${variant.name}: `}
        <span class="tries">{tries}</span>
        {live && <Faults faults={live.faults} />}
      </td>
      <td class="number k">{feedbackFraction(variant.cell).toFixed(3)}</td>
      <td class="number gain">{summary && gainWords(summary.gainDb)}</td>
      <td class="number">
        {summary && (
          <span>
            {percentText(summary.restThd)}
            {'\u2009'}%
          </span>
        )}
      </td>
      <td class="number">
        {summary && (
          <span class={over ? 'over' : undefined}>
            {percentText(summary.worstThd)}
            {'\u2009'}%
          </span>
        )}
      </td>
      <td class="number level">{live && <Level peakDbfs={live.peakDbfs} />}</td>
    </tr>
  );
}

function gainWords([least, most]: readonly [number, number]): string {
  const [from, to] = [decimals(least, 1), decimals(most, 1)];
  return `${from === to ? from : `${from} to ${to}`}\u2009dB`;
}

function Level({ peakDbfs }: { readonly peakDbfs: number }) {
  if (!Number.isFinite(peakDbfs)) return <span class="aside">silent</span>;
  return (
    <span class="live">
      {decimals(peakDbfs, 1)}
      {'\u2009'}dBFS
    </span>
  );
}

/** Times that its chain fell back to its last good values. */
function Faults({ faults }: { readonly faults: number }) {
  if (faults === 0) return null;
  return <span class="fault tries">, fell back {faults === 1 ? 'once' : `${faults} times`}</span>;
}

/** The heard one's name is changed where it stands. */
function VariantName({ name, letter }: { readonly name: string; readonly letter: string }) {
  const bench = useBench();
  return (
    <>
      <EditableText label={`Name of variant ${letter}`} value={name} onSet={(text) => bench.setValue('name', text)} />{' '}
    </>
  );
}

function EmptyRow({ letter }: { readonly letter: string }) {
  const bench = useBench();
  return (
    <tr>
      <th scope="row" class="which aside">
        {letter}
      </th>
      <td colSpan={6} class="aside">
        empty{' '}
        <WordActions
          actions={[{ words: 'Copy here', label: `Copy here, to ${letter}, the variant that is heard`, run: () => bench.addVariant() }]}
        />
      </td>
    </tr>
  );
}

/** As narrow as the space before a unit, but where no line ends. */
const NARROW_SPACE = '\u202f';

function told(words: readonly string[]): string {
  if (words.length === 0) return 'the same as A';
  const rest = words.length - MOST_TOLD;
  return [...words.slice(0, MOST_TOLD), ...(rest > 0 ? [`and ${rest} more`] : [])].join(', ').replaceAll('\u2009', NARROW_SPACE);
}
