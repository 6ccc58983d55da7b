import { cellCount, type PictureWindow } from '../../engine/picture/window.ts';
import type { MapOutlines } from '../workers/mapOperations.ts';
import type { Pane } from './contract.ts';
import { type CellFacts, cellFacts, drawFrame, type Frame } from './draw.ts';
import { type Ground, groundOf, placeOf } from './ground.ts';
import { type MapCursor, type MapsState, mapsStore, setCursor, setViewport } from './mapsStore.ts';
import { type MarkedPlaces, noMarks } from './marks.ts';
import { followPalette, palette } from './palette.ts';
import { PaneImages } from './paneImages.ts';
import { centreOn, clampViewport, panBy, positionsOf, type Viewport, zoomAt } from './viewport.ts';

/** Asking for a sharper image waits until the hand has rested so long, in milliseconds. */
const restBeforeSharp = 70;
/** Positions on a side of the closest look. */
const closest = 8;

/** All panes on the sheet, by id: for reading what lies under the crosshair, and for saving pictures. */
export const paneControls = new Map<string, PaneControl>();

const due = new Set<PaneControl>();

function drawDue(): void {
  const now = [...due];
  due.clear();
  for (const control of now) control.draw();
}

/** One map outside React: its canvas, its images, where the pointer is. Lives as long as its canvas. */
export class PaneControl {
  readonly pane: Pane;
  readonly ground: Ground;
  readonly images: PaneImages;
  marks: MarkedPlaces = noMarks;
  private readonly canvas: HTMLCanvasElement;
  private readonly context: CanvasRenderingContext2D;
  private readonly told: () => void;
  private readonly leave: (() => void)[] = [];
  private ratio = 1;
  private resting = 0;

  /** @param told hears of every change of the images: new counts, a failure */
  constructor(canvas: HTMLCanvasElement, pane: Pane, rows: number, columns: number, told: () => void) {
    this.canvas = canvas;
    this.pane = pane;
    this.told = told;
    this.ground = groundOf(pane, rows, columns);
    this.context = canvas.getContext('2d') as CanvasRenderingContext2D;
    this.images = new PaneImages(pane, () => {
      this.schedule();
      this.told();
    });
    this.leave.push(mapsStore.subscribe((now, before) => this.follow(now, before)));
    this.leave.push(followPalette(() => this.refresh()));
    const observer = new ResizeObserver(() => this.resize());
    observer.observe(canvas);
    this.leave.push(() => observer.disconnect());
    paneControls.set(pane.id, this);
    this.resize();
  }

  end(): void {
    for (const leave of this.leave) leave();
    clearTimeout(this.resting);
    due.delete(this);
    this.images.end();
    if (paneControls.get(this.pane.id) === this) paneControls.delete(this.pane.id);
  }

  /** least share of the ground on a side that can be looked at */
  get least(): number {
    return Math.min(1, closest / Math.max(1, this.ground.rows, this.ground.columns));
  }

  get outlines(): MapOutlines | null {
    return this.images.outlines;
  }

  schedule(): void {
    if (due.size === 0) requestAnimationFrame(drawDue);
    due.add(this);
  }

  setMarks(marks: MarkedPlaces): void {
    this.marks = marks;
    this.schedule();
  }

  draw(): void {
    drawFrame(this.frame(this.context, this.canvas.width, this.canvas.height, this.ratio));
  }

  /** Everything a frame is drawn from, on any canvas. */
  frame(context: CanvasRenderingContext2D, width: number, height: number, ratio: number): Frame {
    const { outlines, path } = mapsStore.getState();
    const viewport = this.look();
    return {
      context,
      width,
      height,
      ratio,
      viewport,
      ground: this.ground,
      whole: this.images.whole,
      close: this.images.close,
      crosshair: this.crosshair(),
      outlines: outlines === 'none' ? null : this.images.outlines,
      outlined: outlines,
      held: this.pane.held,
      path: path !== null && path.pane === this.pane.id ? path.positions : null,
      marks: this.marks,
      colours: palette(),
    };
  }

  /**
   * What this pane looks at: the places that all maps share, or, when the maps follow a held entry, the places around where that
   * entry lies in this order.
   */
  look(): Viewport {
    const { viewport, linked, cursor, pinned } = mapsStore.getState();
    if (linked === 'places' || !pinned || cursor === null || cursor.pane === this.pane.id) return viewport;
    const place = this.crosshair();
    const source = paneControls.get(cursor.pane);
    if (place === null || source === undefined) return viewport;
    const { top, left, height, width } = viewport;
    const down = ((cursor.row + 0.5) / source.ground.rows - top) / height;
    const right = ((cursor.column + 0.5) / source.ground.columns - left) / width;
    return clampViewport(
      {
        height,
        width,
        top: (place.row + 0.5) / this.ground.rows - down * height,
        left: (place.column + 0.5) / this.ground.columns - right * width,
      },
      this.least,
    );
  }

  /** Where the crosshair stands here: where it was set, or where the same entry lies in this order. */
  private crosshair(): { row: number; column: number } | null {
    const { cursor } = mapsStore.getState();
    if (cursor === null) return null;
    if (cursor.pane === this.pane.id) return cursor;
    if (cursor.originalRow >= this.ground.rows || cursor.originalColumn >= this.ground.columns) return null;
    return placeOf(this.ground, cursor.originalRow, cursor.originalColumn);
  }

  /** Facts of the cell under a cursor of this pane. */
  facts(cursor: Pick<MapCursor, 'row' | 'column'>): CellFacts | null {
    return cellFacts([this.images.close, this.images.whole], cursor);
  }

  /** The position under a point, shares of the pane. */
  positionAt(x: number, y: number): { row: number; column: number } {
    const v = this.look();
    const at = (share: number, n: number): number => Math.max(0, Math.min(n - 1, Math.floor(share * n)));
    return { row: at(v.top + y * v.height, this.ground.rows), column: at(v.left + x * v.width, this.ground.columns) };
  }

  /** Puts the crosshair on a position of this pane. */
  point(place: { row: number; column: number } | null, pinned: boolean, byKeys = false): void {
    if (place === null) {
      setCursor(null);
      return;
    }
    const { row, column } = place;
    const originalRow = this.ground.originalRow(row);
    const originalColumn = this.ground.originalColumn(column);
    setCursor({ pane: this.pane.id, row, column, originalRow, originalColumn, byKeys }, pinned);
  }

  /** Positions along the sides of a dot in a look; at least 1. */
  cellSize(viewport: Viewport): { readonly rows: number; readonly columns: number } {
    const { width, height } = this.canvas;
    return {
      rows: Math.max(1, (viewport.height * this.ground.rows) / Math.max(1, height)),
      columns: Math.max(1, (viewport.width * this.ground.columns) / Math.max(1, width)),
    };
  }

  /** Whether a position of this pane is in sight. */
  inSight({ row, column }: { row: number; column: number }): boolean {
    const v = this.look();
    const y = (row + 0.5) / this.ground.rows;
    const x = (column + 0.5) / this.ground.columns;
    return y >= v.top && y <= v.top + v.height && x >= v.left && x <= v.left + v.width;
  }

  zoom(factor: number, x: number, y: number): void {
    setViewport(zoomAt(mapsStore.getState().viewport, factor, x, y, this.least));
  }

  pan(dx: number, dy: number): void {
    setViewport(panBy(mapsStore.getState().viewport, dx, dy, this.least));
  }

  /** Shows all these positions, rows and columns alike, with some ground around them. */
  goToAll(positions: ArrayLike<number>): void {
    let first = Number.POSITIVE_INFINITY;
    let last = 0;
    for (let k = 0; k < positions.length; k++) {
      first = Math.min(first, positions[k]);
      last = Math.max(last, positions[k]);
    }
    const middle = (first + last) >> 1;
    this.goTo({ row: middle, column: middle }, Math.max(closest, 1.2 * (last - first) + 4));
  }

  /** Brings a position to the middle, `across` positions wide; keeps the scale without it. */
  goTo(place: { row: number; column: number }, across?: number): void {
    let { viewport } = mapsStore.getState();
    if (across !== undefined) {
      const share = Math.max(this.least, Math.min(1, across / Math.max(this.ground.rows, this.ground.columns, 1)));
      viewport = { ...viewport, height: share, width: share };
    }
    const { rows, columns } = this.ground;
    setViewport(centreOn(viewport, (place.row + 0.5) / rows, (place.column + 0.5) / columns, this.least));
  }

  private follow(now: MapsState, before: MapsState): void {
    this.schedule();
    const heldElsewhere = now.linked === 'entry' && (now.cursor !== before.cursor || now.pinned !== before.pinned);
    // a sharper image is asked for when the hand rests, never while it moves: counting and receiving one costs frames
    if (now.viewport !== before.viewport || now.linked !== before.linked || heldElsewhere) this.rest();
    else if (now.shade !== before.shade) this.wish();
  }

  private rest(): void {
    clearTimeout(this.resting);
    this.resting = window.setTimeout(() => this.wish(), restBeforeSharp);
  }

  private refresh(): void {
    this.wish();
    this.schedule();
  }

  private resize(): void {
    const ratio = Math.min(2, devicePixelRatio || 1);
    const width = Math.round(this.canvas.clientWidth * ratio);
    const height = Math.round(this.canvas.clientHeight * ratio);
    if (width === 0 || height === 0) return;
    if (this.canvas.width === width && this.canvas.height === height && this.ratio === ratio && this.images.whole)
      return;
    this.ratio = ratio;
    this.canvas.width = width;
    this.canvas.height = height;
    // drawn at once: a canvas that changes its size is empty until then
    this.draw();
    this.rest();
    if (this.images.whole === null) this.wish();
  }

  /** Asks for the images that this look needs. */
  private wish(): void {
    const { width, height } = this.canvas;
    const { rows, columns } = this.ground;
    if (width < 2 || height < 2 || rows === 0 || columns === 0) return;
    const { shade } = mapsStore.getState();
    const v = this.look();
    const { inks } = palette();
    const cells = (window: PictureWindow) => ({
      window,
      cellRows: cellCount(window.rowEnd - window.rowStart, height),
      cellColumns: cellCount(window.columnEnd - window.columnStart, width),
      shade,
      inks,
    });
    this.images.wantWhole(cells({ rowStart: 0, rowEnd: rows, columnStart: 0, columnEnd: columns }));
    if (v.width >= 1 && v.height >= 1) return;
    const [rowStart, rowEnd] = positionsOf(v.top, v.height, rows);
    const [columnStart, columnEnd] = positionsOf(v.left, v.width, columns);
    this.images.wantClose(cells({ rowStart, rowEnd, columnStart, columnEnd }));
  }
}
