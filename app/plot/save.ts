/**
 * Pictures as files. An SVG on the page takes its colours and faces from the page's styles; in a file they are written out.
 */

const written = [
  'fill',
  'stroke',
  'stroke-width',
  'stroke-dasharray',
  'font-family',
  'font-size',
  'font-style',
  'font-weight',
  'color',
  'opacity',
  'text-anchor',
];

/** A copy of the picture that needs no style sheet: every style that matters as an attribute, on the paper of the page. */
export function standalone(svg: SVGSVGElement): string {
  const copy = svg.cloneNode(true) as SVGSVGElement;
  const from = [svg, ...svg.querySelectorAll('*')];
  const to = [copy, ...copy.querySelectorAll('*')];
  from.forEach((element, k) => {
    const style = getComputedStyle(element);
    for (const name of written) {
      const value = style.getPropertyValue(name);
      if (value !== '') to[k].setAttribute(name, value);
    }
    to[k].removeAttribute('class');
  });
  const { width, height } = svg.viewBox.baseVal;
  copy.setAttribute('xmlns', 'http://www.w3.org/2000/svg');
  copy.setAttribute('width', String(width));
  copy.setAttribute('height', String(height));
  const paper = document.createElementNS('http://www.w3.org/2000/svg', 'rect');
  paper.setAttribute('width', '100%');
  paper.setAttribute('height', '100%');
  paper.setAttribute('fill', getComputedStyle(document.documentElement).backgroundColor);
  copy.prepend(paper);
  return new XMLSerializer().serializeToString(copy);
}

/** Hands bytes to the user as a file of that name. */
export function saveFile(name: string, content: BlobPart, type: string): void {
  const url = URL.createObjectURL(new Blob([content], { type }));
  const link = document.createElement('a');
  link.href = url;
  link.download = name;
  link.click();
  // the download has begun by then; holding the address longer would hold the bytes
  setTimeout(() => URL.revokeObjectURL(url), 10_000);
}

export function saveSvg(svg: SVGSVGElement, name: string): void {
  saveFile(`${name}.svg`, standalone(svg), 'image/svg+xml');
}

/** The picture as PNG, at twice its size on the page. */
export async function savePng(svg: SVGSVGElement, name: string): Promise<void> {
  const { width, height } = svg.viewBox.baseVal;
  const image = new Image();
  image.src = `data:image/svg+xml;charset=utf-8,${encodeURIComponent(standalone(svg))}`;
  await image.decode();
  const canvas = document.createElement('canvas');
  canvas.width = 2 * width;
  canvas.height = 2 * height;
  canvas.getContext('2d')?.drawImage(image, 0, 0, canvas.width, canvas.height);
  const blob = await new Promise<Blob | null>((done) => canvas.toBlob(done, 'image/png'));
  if (blob !== null) saveFile(`${name}.png`, blob, 'image/png');
}
