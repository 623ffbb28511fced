/** Goes through the lines of a text (LF, CR+LF or CR) without cutting it into strings. */
export class LineWalker {
  private readonly text: string;
  start = 0;
  end = -1;
  number = 0;
  private next = 0;

  constructor(text: string) {
    this.text = text;
  }

  /** Moves to the next line; false behind the last one. */
  advance(): boolean {
    const { text } = this;
    if (this.next > text.length || (this.next === text.length && this.number > 0)) return false;
    this.start = this.next;
    let at = this.next;
    let code = text.charCodeAt(at);
    while (at < text.length && code !== 10 && code !== 13) code = text.charCodeAt(++at);
    this.end = at;
    this.number += 1;
    this.next = at + (code === 13 && text.charCodeAt(at + 1) === 10 ? 2 : 1);
    return true;
  }

  /** Tells that lines were read elsewhere: the next to move to begins at `next`. */
  skipTo(next: number, linesBefore: number): void {
    this.next = next;
    this.number = linesBefore;
  }

  /** Place of the first character that is no blank; `end` if there is none. */
  firstInk(): number {
    const { text } = this;
    let at = this.start;
    while (at < this.end) {
      const code = text.charCodeAt(at);
      if (code !== 32 && code !== 9) break;
      at += 1;
    }
    return at;
  }

  /** The line without its comment and the blanks around. */
  content(): string {
    const line = this.text.slice(this.start, this.end);
    const comment = line.indexOf('!');
    return (comment < 0 ? line : line.slice(0, comment)).trim();
  }
}
