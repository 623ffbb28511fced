/** Columns of numbers that grow together, and where each of their rows stands in the file. */
export class NumberColumns {
  values: Float64Array[];
  /** Place in the text of each cell that was read. */
  cellStart: Int32Array[];
  line: Int32Array;
  count = 0;

  constructor(columns: number, rowsExpected: number) {
    this.values = Array.from({ length: columns }, () => new Float64Array(rowsExpected));
    this.cellStart = Array.from({ length: columns }, () => new Int32Array(rowsExpected));
    this.line = new Int32Array(rowsExpected);
  }

  /** Makes room for one more row. */
  makeRoom(): void {
    const room = this.line.length;
    if (this.count < room) return;
    this.values = this.values.map((old) => {
      const wider = new Float64Array(room * 2);
      wider.set(old);
      return wider;
    });
    this.cellStart = this.cellStart.map((old) => grown(old));
    this.line = grown(this.line);
  }

  /** Keeps the rows that are wanted, in their order. */
  filter(isWanted: (row: number) => boolean): void {
    let kept = 0;
    for (let row = 0; row < this.count; row++) {
      if (!isWanted(row)) continue;
      for (const column of this.values) column[kept] = column[row];
      for (const column of this.cellStart) column[kept] = column[row];
      this.line[kept] = this.line[row];
      kept += 1;
    }
    this.count = kept;
  }
}

function grown(old: Int32Array): Int32Array {
  const wider = new Int32Array(old.length * 2);
  wider.set(old);
  return wider;
}
