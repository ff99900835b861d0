/** Cells for each point of a column: with more of them few points share one. */
const CELLS_A_POINT = 4;

/**
 * Finds the piece of a rising column that holds a value: the column is laid over even cells, each of which knows the piece at
 * its beginning, so that a look costs the same however long the column is.
 */
export class PieceFinder {
  private readonly from: number;
  private readonly to: number;
  private readonly perUnit: number;
  private readonly cells: Int32Array;

  constructor(private readonly column: Float64Array) {
    const count = column.length * CELLS_A_POINT;
    this.from = column[0]!;
    this.to = column[column.length - 1]!;
    this.perUnit = count / (this.to - this.from);
    // One more than there are: the end itself may be rounded up into it.
    this.cells = new Int32Array(count + 1);
    for (let cell = 0, piece = 1; cell <= count; cell += 1) {
      while (piece < column.length - 1 && column[piece]! <= this.from + cell / this.perUnit) piece += 1;
      this.cells[cell] = piece;
    }
  }

  /** Index of the piece that holds `value`; 0 before the first point, the number of points from the last on. */
  at(value: number): number {
    const { column, from, to } = this;
    if (!(value >= from)) return 0;
    if (value >= to) return column.length;
    let piece = this.cells[Math.floor((value - from) * this.perUnit)]!;
    while (value >= column[piece]!) piece += 1;
    while (value < column[piece - 1]!) piece -= 1;
    return piece;
  }
}
