import { clockText } from '../draw/words.ts';
import type { Take, TakeFormat } from '../state/bench.ts';
import { useBench } from './BenchContext.ts';
import { EditableText } from './parts/EditableText.tsx';
import { WordActions } from './parts/WordActions.tsx';

/** One take: its name is changed where it stands; deleting asks nothing and can be taken back. */
export function TakeRow({ take, format }: { readonly take: Take; readonly format: TakeFormat }) {
  const bench = useBench();
  const playing = bench.playingTake.value === take.id;
  if (take.deleted) {
    return (
      <tr class="deleted">
        <td class="no">{take.id}</td>
        <td class="what" colSpan={4}>
          “{take.name}” deleted
        </td>
        <td class="actions">
          <WordActions actions={[{ words: 'Undo', run: () => bench.restoreTake(take.id), label: `Undo the deletion of “${take.name}”` }]} />
        </td>
      </tr>
    );
  }
  const rename = (name: string) => {
    if (name === '') return 'A take needs a name.';
    bench.renameTake(take.id, name);
    return null;
  };
  return (
    <tr class={playing ? 'heard' : undefined}>
      <td class="no">{take.id}</td>
      <td class="what">
        <EditableText label="Name of the take" value={take.name} onSet={rename} />
        {take.how === 'rendered' && <span class="aside how"> rendered</span>}
      </td>
      <td class="variant">{take.variant}</td>
      <td class="number k">{take.k === null ? '–' : take.k.toFixed(3)}</td>
      <td class="number length">{clockText(take.seconds, true)}</td>
      <td class="actions">
        <WordActions
          actions={[
            {
              words: playing ? 'Stop' : 'Play',
              run: () => void bench.playTake(playing ? null : take.id),
              label: `${playing ? 'Stop' : 'Play'} “${take.name}”`,
            },
            { words: 'Save', run: () => void bench.saveTake(take.id, format), label: `Save “${take.name}”` },
            { words: 'Delete', run: () => bench.deleteTake(take.id), label: `Delete “${take.name}”` },
          ]}
        />
      </td>
    </tr>
  );
}
