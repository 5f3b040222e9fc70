import { pageGround } from '@/components/charts/page-ground';

const copied = [
  'fill',
  'fill-opacity',
  'stroke',
  'stroke-width',
  'stroke-dasharray',
  'stroke-linecap',
  'stroke-linejoin',
  'opacity',
  'font-family',
  'font-size',
  'font-weight',
  'text-anchor',
] as const;

function inline(from: Element, to: Element): void {
  const style = getComputedStyle(from);
  for (const name of copied) {
    const value = style.getPropertyValue(name);
    // Pattern fills come back as absolute addresses of the page; the document carries its own patterns.
    if (value) to.setAttribute(name, value.replace(/url\(["']?[^#"')]*#([^"')]+)["']?\)/, 'url(#$1)'));
  }
  to.removeAttribute('style');
  to.removeAttribute('class');
  Array.from(from.children).forEach((child, index) => inline(child, to.children[index]));
}

/**
 * A stand-alone SVG document of a drawing on the page: the page's colours and type are written into it, and the
 * hatchings that it uses come with it. Elements marked data-screen-only (cursor, ring) are left out.
 */
export function svgDocument(drawing: SVGSVGElement): string {
  const copy = drawing.cloneNode(true) as SVGSVGElement;
  inline(drawing, copy);
  copy.querySelectorAll('[data-screen-only]').forEach((element) => element.remove());
  const used = new Set(Array.from(copy.outerHTML.matchAll(/url\(#([^)]+)\)/g), (match) => match[1]));
  const defs = document.createElementNS('http://www.w3.org/2000/svg', 'defs');
  for (const id of used) {
    const pattern = document.getElementById(id);
    if (!pattern || copy.querySelector(`[id="${id}"]`)) continue;
    const patternCopy = pattern.cloneNode(true) as Element;
    inline(pattern, patternCopy);
    patternCopy.setAttribute('id', id);
    defs.append(patternCopy);
  }
  const ground = document.createElementNS('http://www.w3.org/2000/svg', 'rect');
  ground.setAttribute('width', '100%');
  ground.setAttribute('height', '100%');
  ground.setAttribute('fill', pageGround());
  copy.prepend(defs, ground);
  copy.setAttribute('xmlns', 'http://www.w3.org/2000/svg');
  copy.removeAttribute('tabindex');
  return `<?xml version="1.0" encoding="UTF-8"?>\n${new XMLSerializer().serializeToString(copy)}`;
}
