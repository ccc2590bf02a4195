import { useBench } from './BenchContext.ts';
import { EditableText } from './parts/EditableText.tsx';
import { WordActions } from './parts/WordActions.tsx';

const LETTERS = ['A', 'B', 'C', 'D'];

interface HeadingProps {
  readonly onOpen: () => void;
  readonly onKeys: () => void;
}

/** Title, variants as suffix letters, and what is done with the document. */
export function Heading({ onOpen, onKeys }: HeadingProps) {
  const bench = useBench();
  const { title } = bench.design.value;
  return (
    <header class="heading">
      <h1>
        <EditableText label="Title of the design" value={title} onSet={(text) => bench.setDesignValue('title', text)} className="title" />
      </h1>
      <Variants />
      <nav class="document" aria-label="Document">
        <WordActions
          actions={[
            { words: 'Undo', run: bench.undo, disabled: !bench.canUndo.value },
            { words: 'Redo', run: bench.redo, disabled: !bench.canRedo.value },
            { words: 'Open…', run: onOpen },
            { words: 'Save…', run: bench.saveDesign, label: 'Save… the design as a file' },
            { words: 'Keys', run: onKeys, label: 'Keys: the keyboard' },
          ]}
        />
        <i class="fettle">Fettle</i>
      </nav>
    </header>
  );
}

/** The heard one reversed; the first empty letter takes a copy of the heard one. */
function Variants() {
  const bench = useBench();
  const { variants } = bench.design.value;
  const heard = bench.heardVariant.value;
  return (
    <fieldset class="variants">
      <legend class="offscreen">Variants of the circuit</legend>
      {LETTERS.map((letter, index) => {
        const variant = variants[index];
        if (variant !== undefined) {
          const name = variant.name === letter ? '' : `, ${variant.name}`;
          return (
            <button
              key={letter}
              type="button"
              class="letter"
              aria-pressed={index === heard}
              aria-label={`Variant ${letter}${name}`}
              title={`Variant ${letter}${name}`}
              onClick={() => bench.hearVariant(index)}
            >
              {letter}
            </button>
          );
        }
        const words = `Copy variant ${LETTERS[heard]} to ${letter}`;
        return index === variants.length ? (
          <button key={letter} type="button" class="letter empty" aria-label={words} title={words} onClick={() => bench.addVariant()}>
            {letter}
          </button>
        ) : (
          <span key={letter} class="letter empty" aria-hidden="true">
            {letter}
          </span>
        );
      })}
      <span class="hint" aria-hidden="true">
        variants
      </span>
    </fieldset>
  );
}
