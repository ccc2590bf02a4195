/** A quantity's symbol: italic, with its subscript upright. */
export function Sym({ of, sub }: { readonly of: string; readonly sub?: string }) {
  return (
    <span class="sym">
      <i>{of}</i>
      {sub !== undefined && <sub>{sub}</sub>}
    </span>
  );
}
