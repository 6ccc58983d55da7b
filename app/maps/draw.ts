import { cellStart } from '../../engine/picture/window.ts';
import type { MapOutlines } from '../workers/mapOperations.ts';
import type { Ground } from './ground.ts';
import type { MapCursor, Outlines } from './mapsStore.ts';
import type { MarkedPlaces } from './marks.ts';
import type { Palette } from './palette.ts';
import type { MapImage } from './paneImages.ts';
import type { Viewport } from './viewport.ts';

/** Everything a frame of one map is drawn from. */
export interface Frame {
  readonly context: CanvasRenderingContext2D;
  /** device pixels */
  readonly width: number;
  readonly height: number;
  readonly ratio: number;
  readonly viewport: Viewport;
  readonly ground: Ground;
  readonly whole: MapImage | null;
  readonly close: MapImage | null;
  /** where the crosshair stands in this pane, positions; null for none */
  readonly crosshair: { readonly row: number; readonly column: number } | null;
  /** null draws none */
  readonly outlines: MapOutlines | null;
  readonly outlined: Outlines;
  /** unknowns at the end that are held there */
  readonly held: number;
  /** positions of a fill path, ends first and last */
  readonly path: Int32Array | null;
  readonly marks: MarkedPlaces;
  readonly colours: Palette;
}

/** least size of a cell, in CSS pixels, at which single entries are drawn as shapes */
export const shapeFrom = 5;

/** Draws one frame. No allocation that grows with the matrix. */
export function drawFrame(f: Frame): void {
  const { context, width, height } = f;
  context.setTransform(1, 0, 0, 1, 0, 0);
  context.clearRect(0, 0, width, height);
  const shapes = shapesOf(f);
  if (shapes !== null) drawShapes(f, shapes);
  else {
    if (f.whole !== null) drawImage(f, f.whole);
    if (f.close !== null && (f.whole === null || finer(f.close, f.whole))) drawImage(f, f.close);
  }
  drawOutlines(f);
  drawMarks(f);
  if (f.path !== null) drawPath(f, f.path);
  drawCrosshair(f);
}

/** device pixel of a position's upper or left edge */
function xOf(f: Frame, column: number): number {
  return ((column / f.ground.columns - f.viewport.left) / f.viewport.width) * f.width;
}

function yOf(f: Frame, row: number): number {
  return ((row / f.ground.rows - f.viewport.top) / f.viewport.height) * f.height;
}

/** Whether an image shows all that the pane looks at, at its resolution. */
function covers(f: Frame, image: MapImage): boolean {
  const { window } = image.counts;
  const { viewport: v, ground: g } = f;
  const slack = 1.0001;
  return (
    window.rowStart <= v.top * g.rows + slack &&
    window.rowEnd >= (v.top + v.height) * g.rows - slack &&
    window.columnStart <= v.left * g.columns + slack &&
    window.columnEnd >= (v.left + v.width) * g.columns - slack
  );
}

function finer(a: MapImage, b: MapImage): boolean {
  return cellSide(a) < cellSide(b);
}

/** positions along a side of a cell */
function cellSide({ counts }: MapImage): number {
  return (counts.window.columnEnd - counts.window.columnStart) / counts.columns;
}

/**
 * Draws the part of an image that is in sight, in the place of what lies there: its cells are translucent, so what is under it goes
 * first. Only that part is handed to the canvas: a close look stretches the whole image to a thousand times the screen.
 */
function drawImage(f: Frame, image: MapImage): void {
  const { context } = f;
  const { window, rows, columns } = image.counts;
  const x = xOf(f, window.columnStart);
  const y = yOf(f, window.rowStart);
  const width = xOf(f, window.columnEnd) - x;
  const height = yOf(f, window.rowEnd) - y;
  const left = Math.max(0, x);
  const top = Math.max(0, y);
  const right = Math.min(f.width, x + width);
  const bottom = Math.min(f.height, y + height);
  if (right <= left || bottom <= top) return;
  const across = columns / width;
  const down = rows / height;
  context.imageSmoothingEnabled = false;
  context.clearRect(left, top, right - left, bottom - top);
  context.drawImage(
    image.canvas,
    (left - x) * across,
    (top - y) * down,
    (right - left) * across,
    (bottom - top) * down,
    left,
    top,
    right - left,
    bottom - top,
  );
}

/** The image whose cells are single positions, large enough on the screen for shapes. */
function shapesOf(f: Frame): MapImage | null {
  for (const image of [f.close, f.whole]) {
    if (image === null || !covers(f, image)) continue;
    const { counts } = image;
    const { window } = counts;
    const single =
      counts.rows === window.rowEnd - window.rowStart && counts.columns === window.columnEnd - window.columnStart;
    const size = f.width / (f.viewport.width * f.ground.columns) / f.ratio;
    if (single && size >= shapeFrom) return image;
  }
  return null;
}

/** One entry drawn singly, device pixels. */
export interface Square {
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
  /** width of the line of an open square */
  readonly stroke: number;
  readonly original: boolean;
}

/** The entries in sight where they are drawn singly; null where the map is of dots. */
export function shapesIn(f: Frame): readonly Square[] | null {
  const image = shapesOf(f);
  if (image === null) return null;
  const out: Square[] = [];
  eachShape(f, image, (square) => out.push(square));
  return out;
}

/** Original entries as filled squares, fill-in as open ones. */
function drawShapes(f: Frame, image: MapImage): void {
  const { context } = f;
  context.fillStyle = f.colours.ink;
  context.strokeStyle = f.colours.fill;
  eachShape(f, image, ({ x, y, width, height, stroke, original }) => {
    if (original) {
      context.fillRect(x, y, width, height);
      return;
    }
    context.lineWidth = stroke;
    context.strokeRect(x, y, width, height);
  });
}

function eachShape(f: Frame, { counts }: MapImage, take: (square: Square) => void): void {
  const { ratio } = f;
  const { window } = counts;
  const size = f.width / (f.viewport.width * f.ground.columns);
  const sizeY = f.height / (f.viewport.height * f.ground.rows);
  const gap = Math.max(ratio, Math.min(size, sizeY) * 0.12);
  const stroke = Math.max(ratio, Math.min(size, sizeY) * 0.14);
  for (let r = 0; r < counts.rows; r++) {
    const y = yOf(f, window.rowStart + r);
    if (y > f.height || y + sizeY < 0) continue;
    for (let c = 0; c < counts.columns; c++) {
      const at = r * counts.columns + c;
      if (counts.original[at] === 0 && counts.fill[at] === 0) continue;
      const x = xOf(f, window.columnStart + c);
      if (x > f.width || x + size < 0) continue;
      const original = counts.original[at] > 0;
      const inset = original ? gap : gap + stroke / 2;
      take({
        x: x + inset,
        y: y + inset,
        width: size - 2 * inset,
        height: sizeY - 2 * inset,
        stroke,
        original,
      });
    }
  }
}

/** Squares along the diagonal, blue: separators (thinner for deeper levels), diagonal blocks, unknowns held last; or supernodes. */
function drawOutlines(f: Frame): void {
  const { outlines, held, ground } = f;
  if (outlines === null) return;
  f.context.strokeStyle = f.colours.separator;
  if (f.outlined === 'supernodes') {
    if (outlines.supernodes !== null) drawRuns(f, outlines.supernodes);
    return;
  }
  for (const { start, end, level } of outlines.separators) square(f, start, end, Math.max(1, 2.5 - 0.5 * level));
  if (outlines.blockStart !== null) drawRuns(f, outlines.blockStart);
  if (held > 0) square(f, ground.rows - held, ground.rows, 2.5);
}

/** The runs between increasing starts that are in sight and wide enough to be seen; at most so many that a frame stays a frame. */
function drawRuns(f: Frame, start: Int32Array): void {
  const count = start.length - 1;
  const { viewport: v, ground } = f;
  const from = Math.max(v.left, v.top) === 0 ? 0 : Math.floor(Math.min(v.left, v.top) * ground.columns);
  let k = lastAtOrBefore(start, Math.max(0, from));
  const to = Math.ceil(Math.max(v.left + v.width, v.top + v.height) * ground.columns);
  const least = (3 * f.ratio * v.width * ground.columns) / f.width;
  for (let looked = 0; k < count && start[k] < to && looked < mostRuns; k++, looked++) {
    if (start[k + 1] - start[k] >= least) square(f, start[k], start[k + 1], 1.2);
  }
}

const mostRuns = 400_000;

function lastAtOrBefore(start: Int32Array, position: number): number {
  let low = 0;
  let high = start.length - 1;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if (start[middle] <= position) low = middle;
    else high = middle - 1;
  }
  return low;
}

function square(f: Frame, start: number, end: number, width: number): void {
  const x = xOf(f, start);
  const y = yOf(f, start);
  const w = xOf(f, end) - x;
  const h = yOf(f, end) - y;
  if (w < 3 * f.ratio || x > f.width || y > f.height || x + w < 0 || y + h < 0) return;
  f.context.lineWidth = width * f.ratio;
  f.context.strokeRect(x, y, w, h);
}

/** Triangles at the edges where whole lines are meant, rings where entries are. */
function drawMarks(f: Frame): void {
  const { context, ratio } = f;
  const length = 9 * ratio;
  context.fillStyle = f.colours.separator;
  context.strokeStyle = f.colours.separator;
  context.lineWidth = 1.5 * ratio;
  for (const row of f.marks.rows) {
    const y = yOf(f, row + 0.5);
    if (y < 0 || y > f.height) continue;
    triangle(context, 0, y, length, 0);
    triangle(context, f.width, y, -length, 0);
  }
  for (const column of f.marks.columns) {
    const x = xOf(f, column + 0.5);
    if (x < 0 || x > f.width) continue;
    triangle(context, x, 0, 0, length);
    triangle(context, x, f.height, 0, -length);
  }
  const { entries } = f.marks;
  const radius = Math.max(5 * ratio, (0.7 * f.width) / (f.viewport.width * f.ground.columns));
  for (let k = 0; k + 1 < entries.length; k += 2) {
    const x = xOf(f, entries[k + 1] + 0.5);
    const y = yOf(f, entries[k] + 0.5);
    if (x < -radius || y < -radius || x > f.width + radius || y > f.height + radius) continue;
    context.beginPath();
    context.arc(x, y, radius, 0, 2 * Math.PI);
    context.stroke();
  }
}

function triangle(context: CanvasRenderingContext2D, x: number, y: number, dx: number, dy: number): void {
  context.beginPath();
  context.moveTo(x + dx, y + dy);
  context.lineTo(x - dy / 2, y - dx / 2);
  context.lineTo(x + dy / 2, y + dx / 2);
  context.closePath();
  context.fill();
}

/** The eliminated unknowns of a fill path, on the diagonal, joined by steps along rows and columns. */
function drawPath(f: Frame, positions: Int32Array): void {
  const { context, ratio } = f;
  context.strokeStyle = f.colours.fill;
  context.fillStyle = f.colours.paper;
  context.lineWidth = 1.5 * ratio;
  context.setLineDash([4 * ratio, 3 * ratio]);
  context.beginPath();
  for (let k = 0; k + 1 < positions.length; k++) {
    const a = positions[k];
    const b = positions[k + 1];
    context.moveTo(xOf(f, a + 0.5), yOf(f, a + 0.5));
    context.lineTo(xOf(f, Math.min(a, b) + 0.5), yOf(f, Math.max(a, b) + 0.5));
    context.lineTo(xOf(f, b + 0.5), yOf(f, b + 0.5));
  }
  context.stroke();
  context.setLineDash([]);
  for (let k = 0; k < positions.length; k++) {
    context.beginPath();
    context.arc(xOf(f, positions[k] + 0.5), yOf(f, positions[k] + 0.5), 4 * ratio, 0, 2 * Math.PI);
    context.fill();
    context.stroke();
  }
}

function drawCrosshair(f: Frame): void {
  if (f.crosshair === null) return;
  const { context, ratio } = f;
  const x = xOf(f, f.crosshair.column + 0.5);
  const y = yOf(f, f.crosshair.row + 0.5);
  context.strokeStyle = f.colours.crosshair;
  context.lineWidth = ratio;
  const gap = 7 * ratio;
  context.beginPath();
  context.moveTo(0, y);
  context.lineTo(x - gap, y);
  context.moveTo(x + gap, y);
  context.lineTo(f.width, y);
  context.moveTo(x, 0);
  context.lineTo(x, y - gap);
  context.moveTo(x, y + gap);
  context.lineTo(x, f.height);
  context.stroke();
}

/** What the cell at two positions stands for: its ranges (half-open positions) and its counts. */
export interface CellFacts {
  readonly rowStart: number;
  readonly rowEnd: number;
  readonly columnStart: number;
  readonly columnEnd: number;
  readonly original: number;
  readonly fill: number;
  readonly kind: 'exact' | 'sampled';
}

/** Facts of the cell under a cursor, from the sharpest image that shows it; null where none does. */
export function cellFacts(
  images: readonly (MapImage | null)[],
  cursor: Pick<MapCursor, 'row' | 'column'>,
): CellFacts | null {
  for (const image of images) {
    if (image === null) continue;
    const { counts } = image;
    const { window: w } = counts;
    if (cursor.row < w.rowStart || cursor.row >= w.rowEnd) continue;
    if (cursor.column < w.columnStart || cursor.column >= w.columnEnd) continue;
    const height = w.rowEnd - w.rowStart;
    const width = w.columnEnd - w.columnStart;
    const r = cellAt(cursor.row - w.rowStart, height, counts.rows);
    const c = cellAt(cursor.column - w.columnStart, width, counts.columns);
    const at = r * counts.columns + c;
    return {
      rowStart: w.rowStart + cellStart(r, height, counts.rows),
      rowEnd: w.rowStart + cellStart(r + 1, height, counts.rows),
      columnStart: w.columnStart + cellStart(c, width, counts.columns),
      columnEnd: w.columnStart + cellStart(c + 1, width, counts.columns),
      original: counts.original[at],
      fill: counts.fill[at],
      kind: counts.kind,
    };
  }
  return null;
}

/** The cell that holds a position; consistent with `cellStart`. */
function cellAt(position: number, positions: number, cells: number): number {
  let cell = Math.min(cells - 1, Math.floor((position * cells) / positions));
  while (cell + 1 < cells && cellStart(cell + 1, positions, cells) <= position) cell++;
  while (cell > 0 && cellStart(cell, positions, cells) > position) cell--;
  return cell;
}
