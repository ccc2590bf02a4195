import { Dialog } from './Dialog.tsx';
import { SHORTCUTS } from './shortcuts.ts';

const ON_VALUES = [
  ['Enter, or a digit', 'type into the value that has the focus'],
  ['↑ ↓', 'next and previous preferred value, or a small step'],
  ['Page Up, Page Down', 'a decade, or ten steps'],
  ['Esc', 'leave it as it was'],
  ['Drag, Shift and drag', 'through the steps, or freely'],
] as const;
const ON_FIGURES = [
  ['← →, Page Up, Page Down', 'move the cursor of the figure that has the focus'],
  ['Home, End', 'to the ends of its axis; Esc puts it away'],
] as const;

const ON_PLACE = [
  ['← →, Page Up, Page Down', 'half a second, or five'],
  ['Home, End', 'the ends of the loop'],
  ['[ and ]', 'the loop begins here, ends here'],
  ['Esc', 'loop it whole'],
] as const;

/** What the keyboard does. */
export function KeysDialog({ onClose }: { readonly onClose: () => void }) {
  return (
    <Dialog title="Keys" onClose={onClose}>
      <dl class="keys">
        {SHORTCUTS.map(({ keys, words }) => (
          <div key={keys}>
            <dt>{keys}</dt>
            <dd>{words}</dd>
          </div>
        ))}
        {[...ON_VALUES, ...ON_FIGURES].map(([keys, words]) => (
          <div key={keys}>
            <dt>{keys}</dt>
            <dd>{words}</dd>
          </div>
        ))}
        {ON_PLACE.map(([keys, words]) => (
          <div key={`place ${keys}`}>
            <dt>{keys}</dt>
            <dd>in the source: {words}</dd>
          </div>
        ))}
      </dl>
    </Dialog>
  );
}
