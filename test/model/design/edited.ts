/** A deep copy with one value put at a path of dots (`variants.0.cell.seriesOhm`), whether it belongs there or not; where nothing leads there, an equal copy. */
export function edited(object: unknown, path: string, value: unknown): unknown {
  const copy = structuredClone(object);
  const keys = path.split('.');
  const last = keys.pop() as string;
  const parent = keys.reduce<unknown>((inner, key) => (isContainer(inner) ? inner[key] : undefined), copy);
  if (isContainer(parent)) parent[last] = value;
  return copy;
}

function isContainer(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null;
}
