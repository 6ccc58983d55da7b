import type { Symmetry } from '../matrix/pattern.ts';
import type { MarketHeader } from './marketHeader.ts';

/** The place of the next value of an array: column by column, of symmetric ones the lower triangle; or row by row on request. */
export class ArrayCursor {
  row = 0;
  column = 0;
  private readonly rows: number;
  private readonly columns: number;
  private readonly symmetry: Symmetry;
  private readonly byRows: boolean;

  constructor(header: MarketHeader, symmetry: Symmetry, by: 'columns' | 'rows') {
    this.rows = header.rows;
    this.columns = header.columns;
    this.symmetry = symmetry;
    this.byRows = by === 'rows' && symmetry === 'general';
    if (symmetry === 'skew-symmetric') this.row = 1;
  }

  advance(): void {
    if (this.byRows) {
      if (++this.column < this.columns) return;
      this.column = 0;
      this.row++;
      return;
    }
    if (++this.row < this.rows) return;
    this.column++;
    const below = this.symmetry === 'skew-symmetric' ? this.column + 1 : this.column;
    this.row = this.symmetry === 'general' ? 0 : below;
  }
}
