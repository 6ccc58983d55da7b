import { saveFile } from '../plot/save.ts';
import { drawFrame, shapesIn } from './draw.ts';
import { type PaneControl, paneControls } from './paneControl.ts';
import { sayMap } from './words.ts';

/** Side of one map in an exported picture. */
const side = 720;
const gap = 28;
const foot = 64;

/** A map as a picture by itself: the same drawing, on paper, without the crosshair. */
export function pictureOf(control: PaneControl, width = side): HTMLCanvasElement {
  const { rows, columns } = control.ground;
  const aspect = Math.min(3, Math.max(1 / 3, columns / Math.max(1, rows)));
  const canvas = document.createElement('canvas');
  canvas.width = width;
  canvas.height = Math.round(width / aspect);
  const context = canvas.getContext('2d') as CanvasRenderingContext2D;
  const frame = control.frame(context, canvas.width, canvas.height, width / 360);
  drawFrame({ ...frame, crosshair: null });
  context.globalCompositeOperation = 'destination-over';
  context.fillStyle = frame.colours.paper;
  context.fillRect(0, 0, canvas.width, canvas.height);
  return canvas;
}

/** The maps on the sheet as pictures, for the report. */
export function mapPictures(): readonly { readonly title: string; readonly words: string; readonly png: string }[] {
  return [...paneControls.values()].map((control) => ({
    title: titleOf(control),
    words: wordsOf(control),
    png: pictureOf(control).toDataURL('image/png'),
  }));
}

function titleOf({ pane }: PaneControl): string {
  return pane.letter === '' ? pane.title : `${pane.letter} ${pane.title}`;
}

function wordsOf(control: PaneControl): string {
  return sayMap(control.pane.title, control.ground.rows, control.ground.columns, control.images.whole);
}

const escaped = (text: string): string =>
  text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('"', '&quot;');

/** All maps on the sheet side by side, with titles and legend. Single entries are drawn as shapes, dots as an image. */
export function mapsAsSvg(controls: readonly PaneControl[]): string {
  const pictures = controls.map((control) => ({ control, canvas: pictureOf(control) }));
  const height = Math.max(...pictures.map((p) => p.canvas.height)) + foot;
  const width = pictures.length * (side + gap) + gap;
  const { colours } = controls[0].frame(pictures[0].canvas.getContext('2d') as CanvasRenderingContext2D, side, side, 1);
  const parts = pictures.map(({ control, canvas }, k) => {
    const x = gap + k * (side + gap);
    const inside = shapesAsSvg(control, canvas) ?? imageOf(canvas);
    const frame = `<rect width="${canvas.width}" height="${canvas.height}" fill="none" stroke="${colours.ink}" stroke-width="2"/>`;
    const title = `<text y="${canvas.height + 30}" font-size="22" fill="${colours.ink}">${escaped(titleOf(control))}</text>`;
    const words = `<title>${escaped(wordsOf(control))}</title>`;
    return `<g transform="translate(${x} ${gap})">${words}${inside}${frame}${title}</g>`;
  });
  const legend = `<g transform="translate(${gap} ${height + gap - 14})" font-size="16" fill="${colours.ink}">
<rect width="14" height="14" y="-12" fill="${colours.ink}"/><text x="22">entry of the matrix</text>
<rect width="12" height="12" x="201" y="-11" fill="none" stroke="${colours.fill}" stroke-width="2"/><text x="222">fill-in (in dots: hatched)</text>
<rect width="12" height="12" x="441" y="-11" fill="none" stroke="${colours.separator}" stroke-width="2"/><text x="462">separators, blocks</text></g>`;
  return `<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 ${width} ${height + 2 * gap}" width="${width}" height="${height + 2 * gap}" font-family="Georgia, serif"><rect width="100%" height="100%" fill="${colours.paper}"/>${parts.join('')}${legend}</svg>`;
}

function imageOf(canvas: HTMLCanvasElement): string {
  return `<image width="${canvas.width}" height="${canvas.height}" href="${canvas.toDataURL('image/png')}"/>`;
}

/** Entries as squares where they are drawn singly, null where the map is of dots. */
function shapesAsSvg(control: PaneControl, canvas: HTMLCanvasElement): string | null {
  const context = canvas.getContext('2d') as CanvasRenderingContext2D;
  const frame = control.frame(context, canvas.width, canvas.height, canvas.width / 360);
  const squares = shapesIn(frame);
  if (squares === null) return null;
  const { colours } = frame;
  const out = squares.map(({ x, y, width, height, stroke, original }) =>
    original
      ? `<rect x="${x.toFixed(2)}" y="${y.toFixed(2)}" width="${width.toFixed(2)}" height="${height.toFixed(2)}" fill="${colours.ink}"/>`
      : `<rect x="${x.toFixed(2)}" y="${y.toFixed(2)}" width="${width.toFixed(2)}" height="${height.toFixed(2)}" fill="none" stroke="${colours.fill}" stroke-width="${stroke.toFixed(2)}"/>`,
  );
  return `<svg width="${canvas.width}" height="${canvas.height}">${out.join('')}</svg>`;
}

/** Saves the maps on the sheet as one picture, named after the sheet. */
export async function saveMaps(sheet: string, form: 'svg' | 'png'): Promise<void> {
  const name = sheet.replace(/\.[a-z]+$/i, '').replace(/[^\w.-]+/g, '-');
  const controls = [...paneControls.values()];
  if (controls.length === 0) return;
  const svg = mapsAsSvg(controls);
  if (form === 'svg') {
    saveFile(`${name}-maps.svg`, svg, 'image/svg+xml');
    return;
  }
  const image = new Image();
  image.src = `data:image/svg+xml;charset=utf-8,${encodeURIComponent(svg)}`;
  await image.decode();
  const canvas = document.createElement('canvas');
  canvas.width = image.naturalWidth;
  canvas.height = image.naturalHeight;
  canvas.getContext('2d')?.drawImage(image, 0, 0);
  const blob = await new Promise<Blob | null>((done) => canvas.toBlob(done, 'image/png'));
  if (blob !== null) saveFile(`${name}-maps.png`, blob, 'image/png');
}
