import type { DensityMap, PictureWindow } from '../../engine/picture/window.ts';
import { pool, resultOf } from '../state/vault.ts';
import type { MapAnswer, MapOutlines } from '../workers/mapOperations.ts';
import type { Task } from '../workers/pool.ts';
import type { Pane } from './contract.ts';
import type { RasterInks } from './raster.ts';

/** A counted and coloured window, ready to be drawn. */
export interface MapImage {
  readonly counts: DensityMap;
  readonly canvas: HTMLCanvasElement;
  readonly shade: 'density' | 'any';
  readonly inks: RasterInks;
}

interface Wish {
  readonly window: PictureWindow;
  readonly cellRows: number;
  readonly cellColumns: number;
  readonly shade: 'density' | 'any';
  readonly inks: RasterInks;
}

/**
 * The images of one pane: the whole map, kept, and the sharpest one for where the pane looks. At most one request is under way, the
 * latest wish goes next, and an answer to an older state is dropped.
 */
export class PaneImages {
  whole: MapImage | null = null;
  close: MapImage | null = null;
  failed: string | null = null;
  /** null until the maps of a trial are laid, and for the matrix as read */
  outlines: MapOutlines | null = null;
  private readonly pane: Pane;
  private readonly changed: () => void;
  private task: Task<MapAnswer> | null = null;
  private next: { wish: Wish; whole: boolean } | null = null;
  private version = 0;
  private gone = false;

  constructor(pane: Pane, changed: () => void) {
    this.pane = pane;
    this.changed = changed;
  }

  /** Whether something is under way. */
  get busy(): boolean {
    return this.task !== null;
  }

  wantWhole(wish: Wish): void {
    if (this.whole !== null && fits(this.whole, wish)) return;
    this.ask(wish, true);
  }

  wantClose(wish: Wish): void {
    if (this.close !== null && fits(this.close, wish)) return;
    this.ask(wish, false);
  }

  /** Forgets everything under way. */
  end(): void {
    this.gone = true;
    this.version++;
    this.next = null;
    this.task?.stop();
  }

  private ask(wish: Wish, whole: boolean): void {
    if (this.task !== null) {
      // the whole map is never given up for a closer look: without it there is nothing to scale
      if (this.next === null || !this.next.whole || whole) this.next = { wish, whole };
      return;
    }
    void this.run(wish, whole);
  }

  private async run(wish: Wish, whole: boolean): Promise<void> {
    const version = ++this.version;
    // laid at the first request of a pane, and again if the worker was replaced meanwhile
    let answer = this.pane.trial !== null && this.outlines === null ? laidFirst : await this.request(wish);
    if (answer !== null && !answer.laid && (await this.lay())) answer = await this.request(wish);
    this.task = null;
    if (this.gone || version !== this.version) return;
    if (answer?.laid) {
      const image = imageOf(answer, wish);
      if (whole) this.whole = image;
      else this.close = image;
      this.failed = null;
    }
    const { next } = this;
    this.next = null;
    if (next !== null) void this.run(next.wish, next.whole);
    this.changed();
  }

  private async request(wish: Wish): Promise<MapAnswer | null> {
    const { matrix, trial } = this.pane;
    this.task = pool.run('map', { key: matrix, trial, ...wish }, { lane: 'quick', matrices: [matrix] });
    const reply = await this.task.reply;
    if (reply.ok) return reply.value;
    if (reply.failure.kind !== 'stopped') this.failed = reply.failure.message;
    return null;
  }

  private async lay(): Promise<boolean> {
    const { matrix, trial } = this.pane;
    const result = trial === null ? null : resultOf(trial);
    if (trial === null || result === null) return false;
    const reply = await pool.run('layMap', { key: matrix, trial, result }, { lane: 'quick', matrices: [matrix] }).reply;
    if (reply.ok) this.outlines = reply.value;
    else if (reply.failure.kind !== 'stopped') this.failed = reply.failure.message;
    return reply.ok;
  }
}

const laidFirst: MapAnswer = { laid: false };

function fits({ counts, shade, inks }: MapImage, wish: Wish): boolean {
  const a = counts.window;
  const b = wish.window;
  return (
    shade === wish.shade &&
    inks === wish.inks &&
    counts.rows === wish.cellRows &&
    counts.columns === wish.cellColumns &&
    a.rowStart === b.rowStart &&
    a.rowEnd === b.rowEnd &&
    a.columnStart === b.columnStart &&
    a.columnEnd === b.columnEnd
  );
}

function imageOf(answer: MapAnswer & { laid: true }, { shade, inks }: Wish): MapImage {
  const { counts, pixels } = answer;
  const canvas = document.createElement('canvas');
  canvas.width = counts.columns;
  canvas.height = counts.rows;
  canvas.getContext('2d')?.putImageData(new ImageData(pixels, counts.columns, counts.rows), 0, 0);
  return { counts, canvas, shade, inks };
}
