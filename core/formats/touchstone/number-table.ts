/** The numbers of a data section, and where each line of them begins. Grows as it is filled. */
export class NumberTable {
  values: Float64Array;
  valueCount = 0;
  /** For each line of numbers: index of its first value, line in the file, place in the text. */
  firstValue: Int32Array;
  lineNumber: Int32Array;
  textStart: Int32Array;
  rowCount = 0;

  /** With room for what a text of this length holds if its numbers and lines are of usual size. */
  constructor(textLength: number) {
    const rows = 16 + (textLength >> 4);
    this.values = new Float64Array(3 * rows);
    this.firstValue = new Int32Array(rows);
    this.lineNumber = new Int32Array(rows);
    this.textStart = new Int32Array(rows);
  }

  startRow(lineNumber: number, textStart: number): void {
    if (this.rowCount === this.firstValue.length) {
      this.firstValue = grown(this.firstValue);
      this.lineNumber = grown(this.lineNumber);
      this.textStart = grown(this.textStart);
    }
    this.firstValue[this.rowCount] = this.valueCount;
    this.lineNumber[this.rowCount] = lineNumber;
    this.textStart[this.rowCount] = textStart;
    this.rowCount += 1;
  }

  push(value: number): void {
    if (this.valueCount === this.values.length) {
      const wider = new Float64Array(this.values.length * 2);
      wider.set(this.values);
      this.values = wider;
    }
    this.values[this.valueCount] = value;
    this.valueCount += 1;
  }

  /** How many numbers every row has; null where they differ. */
  commonWidth(): number | null {
    const { firstValue, rowCount } = this;
    const width = this.widthOf(0);
    for (let row = 1; row < rowCount; row++) if (firstValue[row] !== row * width) return null;
    return this.valueCount === rowCount * width ? width : null;
  }

  /** How many numbers a row has. */
  widthOf(row: number): number {
    const end = row + 1 < this.rowCount ? this.firstValue[row + 1] : this.valueCount;
    return end - this.firstValue[row];
  }
}

function grown(array: Int32Array): Int32Array<ArrayBuffer> {
  const wider = new Int32Array(array.length * 2);
  wider.set(array);
  return wider;
}
