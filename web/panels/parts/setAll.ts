/** Moves a part of a drawing outside rendering; nothing where it is not there. */
export function setAll(element: Element | null, attributes: Readonly<Record<string, string | number>>): void {
  for (const [name, value] of Object.entries(attributes)) element?.setAttribute(name, String(value));
}
