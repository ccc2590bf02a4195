/** A figure as an SVG file of its own: with the colours and type of the sheet written into it, since it leaves the sheet's styles behind. */
import type { PlotArea } from './plotArea.ts';
import { type Trace, traceElements } from './traces.ts';

const PROPERTIES = [
  ...['fill', 'fill-opacity', 'stroke', 'stroke-width', 'stroke-dasharray', 'stroke-linejoin', 'stroke-linecap', 'paint-order'],
  ...['font-size', 'font-style', 'font-weight', 'text-anchor'],
] as const;
const FONT = 'Fettle Serif, Charter, Cambria, Liberation Serif, Times New Roman, serif';
const CLIP = 'fettle-frame';

/** `drawn` is the figure's own drawing on the page; `traces` is what stands on its canvas. */
export function savedPicture(drawn: SVGSVGElement, area: PlotArea, traces: readonly Trace[], title: string): string {
  const copy = drawn.cloneNode(true) as SVGSVGElement;
  const originals = [drawn, ...drawn.querySelectorAll('*')];
  for (const [n, element] of [copy, ...copy.querySelectorAll('*')].entries()) writeStyle(element, getComputedStyle(originals[n]));
  const sheet = getComputedStyle(drawn);
  const inkOf = (name: string) => sheet.getPropertyValue(name).trim();
  const { width, height, left, top, right, bottom } = area;
  const { body } = copy.ownerDocument;
  for (const [name, value] of Object.entries({ width, height, 'font-family': FONT, role: 'img', 'aria-label': title }))
    copy.setAttribute(name, String(value));
  const ground = `<rect width="${width}" height="${height}" fill="${getComputedStyle(body).backgroundColor}"/>`;
  const clip = `<clipPath id="${CLIP}"><rect x="${left}" y="${top}" width="${right - left}" height="${bottom - top}"/></clipPath>`;
  const lines = `<g clip-path="url(#${CLIP})">${traceElements(traces, inkOf)}</g>`;
  const text = new XMLSerializer().serializeToString(copy);
  const inside = text.indexOf('>') + 1;
  const heading = `<title>${escaped(title)}</title>`;
  return `${text.slice(0, inside)}${heading}${clip}${ground}${text.slice(inside, text.lastIndexOf('</svg>'))}${lines}</svg>\n`;
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
