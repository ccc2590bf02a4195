import { useContext } from 'preact/hooks';
import { useBench, useVariant } from './BenchContext.ts';
import { BOARD_PARTS, type Changes } from './boardParts.ts';
import { CaptionContext } from './parts/CaptionContext.ts';
import { Choice } from './parts/Choice.tsx';
import { WordActions } from './parts/WordActions.tsx';

/** Parts of the board by their names: what is fitted, each taken out again by a press, and what can be added. */
export function Fittings() {
  const bench = useBench();
  const variant = useVariant();
  const caption = useContext(CaptionContext);
  const takeOut = (changes: Changes) => {
    const refused = bench.setValues(changes);
    caption.value = refused === null ? null : { words: refused, refused: true };
  };
  const fitted = BOARD_PARTS.filter((part) => part.fitted(variant.cell));
  const missing = BOARD_PARTS.filter((part) => !part.fitted(variant.cell));
  const options = [{ value: '', words: 'a part' }, ...missing.map(({ words }) => ({ value: words, words }))];
  return (
    <p class="fittings">
      <i class="lead">Board:</i> add{' '}
      <Choice
        label="Add a part to the board"
        value=""
        options={options}
        onChoose={(words) => {
          const part = BOARD_PARTS.find((each) => each.words === words);
          return part ? bench.setValues(part.fit(variant)) : null;
        }}
      />
      {fitted.length === 0 ? (
        ': pickup, pad, coupling, smoothing, half supply and more.'
      ) : (
        <>
          ; take out{' '}
          <WordActions
            actions={fitted.map((part) => ({
              words: part.words,
              label: `Take out: ${part.words}`,
              run: () => takeOut(part.takeOut(variant)),
            }))}
          />
        </>
      )}
    </p>
  );
}
