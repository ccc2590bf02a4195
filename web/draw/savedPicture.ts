/** A figure as an SVG file of its own: with the colours and type of the sheet written into it, since it leaves the sheet's styles behind. */
import type { PlotArea } from './plotArea.ts';
import { type Trace, traceElements } from './traces.ts';

const PROPERTIES = [
  ...['fill', 'fill-opacity', 'stroke', 'stroke-width', 'stroke-dasharray', 'stroke-linejoin', 'stroke-linecap', 'paint-order'],
  ...['font-size', 'font-style', 'font-weight', 'text-anchor'],
] as const;
const FONT = 'Fettle Serif, Charter, Cambria, Liberation Serif, Times New Roman, serif';
const CLIP = 'fettle-frame';

/** `under` and `over` are the figure's own drawings on the page, below and above its canvas; `traces` is what stands on the canvas. */
export function savedPicture(
  { under, over }: { readonly under: SVGSVGElement; readonly over: SVGSVGElement | null },
  area: PlotArea,
  traces: readonly Trace[],
  title: string,
): string {
  const { width, height, left, top, right, bottom } = area;
  const sheet = getComputedStyle(under);
  const inkOf = (name: string) => sheet.getPropertyValue(name).trim();
  const ground = getComputedStyle(under.ownerDocument.body).backgroundColor;
  return [
    `<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 ${width} ${height}" width="${width}" height="${height}" font-family="${FONT}" role="img">`,
    `<title>${escaped(title)}</title>`,
    `<clipPath id="${CLIP}"><rect x="${left}" y="${top}" width="${right - left}" height="${bottom - top}"/></clipPath>`,
    `<rect width="${width}" height="${height}" fill="${ground}"/>`,
    insideOf(under),
    `<g clip-path="url(#${CLIP})">${traceElements(traces, inkOf)}</g>`,
    over === null ? '' : insideOf(over),
    '</svg>\n',
  ].join('\n');
}

/** What a drawing holds, each part with the style that it has on the page. */
function insideOf(drawn: SVGSVGElement): string {
  const copy = drawn.cloneNode(true) as SVGSVGElement;
  const originals = drawn.querySelectorAll('*');
  for (const [n, element] of copy.querySelectorAll('*').entries()) writeStyle(element, getComputedStyle(originals[n]));
  const serializer = new XMLSerializer();
  return [...copy.children].map((child) => serializer.serializeToString(child)).join('');
}

function writeStyle(element: Element, style: CSSStyleDeclaration): void {
  element.removeAttribute('class');
  for (const name of PROPERTIES) {
    const value = style.getPropertyValue(name);
    if (value !== '') element.setAttribute(name, value);
  }
}

function escaped(text: string): string {
  return text.replaceAll('&', '&amp;').replaceAll('<', '&lt;');
}
