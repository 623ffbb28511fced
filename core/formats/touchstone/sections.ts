import { ok, type Result } from '../../result.ts';
import { DecimalScanner } from '../decimal.ts';
import type { Assumption, ReadError } from '../read-types.ts';
import { DataLineReader, type Tolerated } from './data-line.ts';
import { refuse } from './faults.ts';
import { LineWalker } from './file-lines.ts';
import { Keywords, readKeyword } from './keywords.ts';
import { NumberTable } from './number-table.ts';
import { type OptionLine, type ReadOptionLine, readOptionLine } from './option-line.ts';

/** A Touchstone file taken apart, its numbers read, nothing yet made of them. */
export interface Sections {
  /** Null without a `[Version]`. */
  readonly keywords: Keywords | null;
  readonly option: OptionLine;
  /** Over the text of the file, for second looks at its numbers. */
  readonly scanner: DecimalScanner;
  readonly network: NumberTable;
  readonly tolerated: Tolerated;
  readonly assumptions: readonly Assumption[];
}

const noOptionLine =
  'Add the option line that the instrument should have written, for instance `# Hz S RI R 50` with the unit, format and reference that hold. No default is taken, since a wrong unit changes every frequency.';
const otherReference =
  /(?:port\s*impedance|reference\s*impedance|port\s*z|\bz0\b|\bgamma\b)[^0-9]{0,40}\d/i;

/** Takes the lines of a file apart. `givenOption`: an option line for a file that has none. */
export function readSections(text: string, givenOption?: string): Result<Sections, ReadError> {
  const reader = new SectionReader(text, givenOption);
  return reader.read();
}

class SectionReader {
  private readonly text: string;
  private readonly walker: LineWalker;
  private readonly scanner: DecimalScanner;
  private readonly givenOption: string | undefined;
  private readonly assumptions: Assumption[] = [];
  private readonly network: NumberTable;
  private keywords: Keywords | null = null;
  private option: OptionLine | null = null;
  private optionText = '';
  private numbers: DataLineReader | null = null;

  constructor(text: string, givenOption: string | undefined) {
    this.text = text;
    this.walker = new LineWalker(text);
    this.scanner = new DecimalScanner(text);
    this.network = new NumberTable(text.length);
    this.givenOption = givenOption;
  }

  read(): Result<Sections, ReadError> {
    const { walker, text } = this;
    while (walker.advance()) {
      const ink = walker.firstInk();
      if (ink === walker.end) continue;
      const fault = this.readLine(text.charCodeAt(ink));
      if (fault !== null) return fault;
    }
    return this.finish();
  }

  private readLine(ink: number): Result<never, ReadError> | null {
    if (ink === 33) return this.readComment();
    if (this.keywords?.phase === 'information') return this.passInformation();
    if (ink === 35) return this.readOption();
    if (ink === 91) return this.readKeywordLine();
    return this.readNumbers();
  }

  /** Liberties that could recur on every line are told once. */
  private hasTold(told: string): boolean {
    return this.assumptions.some(({ code }) => code === told);
  }

  private readComment(): null {
    const { walker, text } = this;
    if (this.hasTold('comment_names_reference')) return null;
    const comment = text.slice(walker.start, Math.min(walker.end, walker.start + 400));
    if (otherReference.test(comment)) {
      const detail =
        'A comment names a port impedance or propagation constant. Comments are not data: the reference of the option line holds.';
      this.assumptions.push({ code: 'comment_names_reference', detail, line: walker.number });
    }
    return null;
  }

  /** An information block is opaque text up to its end. */
  private passInformation(): Result<never, ReadError> | null {
    return /^\[\s*end\s+information\s*\]/i.test(this.walker.content())
      ? this.readKeywordLine()
      : null;
  }

  private readOption(): Result<never, ReadError> | null {
    const { walker } = this;
    const content = walker.content();
    const place = { line: walker.number, column: walker.firstInk() - walker.start + 1 };
    if (this.option !== null) return this.passSecondOption(content, place.line);
    const read = readOptionLine(content, place);
    if (!read.ok) return read;
    this.take(read.value, content);
    return null;
  }

  private take({ option, assumptions }: ReadOptionLine, content: string): void {
    this.option = option;
    this.optionText = content;
    this.assumptions.push(...assumptions);
    this.numbers = new DataLineReader(this.scanner, this.network, option.frequencyShift);
  }

  private passSecondOption(content: string, line: number): null {
    const same = (one: string) => one.toUpperCase().replace(/\s+/g, ' ');
    if (!this.hasTold('second_option_line') && same(content) !== same(this.optionText)) {
      const detail = `A second option line differs from the first (\`${this.optionText}\`); the first holds.`;
      this.assumptions.push({ code: 'second_option_line', detail, line });
    }
    return null;
  }

  private readKeywordLine(): Result<never, ReadError> | null {
    const { walker } = this;
    const place = { line: walker.number, column: walker.firstInk() - walker.start + 1 };
    if (this.keywords === null) {
      if (this.option !== null || this.network.rowCount > 0) {
        const detail = `Line ${place.line} has a keyword, but the file does not begin with \`[Version]\`.`;
        const remedy = 'Put `[Version] 2.0` before the option line, or remove the keywords.';
        return refuse('keyword_without_version', detail, remedy, place);
      }
      this.keywords = new Keywords();
    }
    const read = readKeyword(this.keywords, walker.content(), place, this.option !== null);
    if (!read.ok) return read;
    this.assumptions.push(...read.value.filter(({ code }) => !this.hasTold(code)));
    return null;
  }

  private readNumbers(): Result<never, ReadError> | null {
    const { walker, keywords } = this;
    const line = walker.number;
    if (keywords !== null) {
      if (keywords.wantsArguments) return keywords.takeArguments(walker.content(), { line });
      if (keywords.phase === 'ended') {
        const detail = `Line ${line} has data after \`[End]\`.`;
        return refuse('data_after_end', detail, 'Remove what stands after `[End]`.', { line });
      }
      if (keywords.phase === 'noise') return this.passNoise(line);
      if (keywords.phase !== 'network') {
        const detail = `Line ${line} has data before \`[Network Data]\`.`;
        return refuse('data_before_network', detail, 'Put `[Network Data]` before the data.', {
          line,
        });
      }
    }
    if (this.numbers === null) {
      const given = this.takeGivenOption(line);
      if (given !== null) return given;
    }
    return this.numbers === null ? null : this.readRows(this.numbers);
  }

  private passNoise(line: number): null {
    if (this.hasTold('noise_passed_over')) return null;
    const detail = 'The rows of noise parameters were passed over.';
    this.assumptions.push({ code: 'noise_passed_over', detail, line });
    return null;
  }

  private readRows(numbers: DataLineReader): Result<never, ReadError> | null {
    const { walker } = this;
    const fault = numbers.read(walker.start, walker.number);
    walker.skipTo(numbers.next, numbers.linesBefore);
    return fault;
  }

  private takeGivenOption(line: number): Result<never, ReadError> | null {
    if (this.givenOption === undefined) {
      return refuse(
        'option_line_missing',
        `The data begin at line ${line} without an option line before them.`,
        noOptionLine,
        { line },
      );
    }
    const read = readOptionLine(this.givenOption.replace(/^\s*#?/, '#'), { line });
    if (!read.ok) return read;
    const detail = `The file has no option line; \`${this.givenOption}\` was given with the upload.`;
    this.assumptions.push({ code: 'option_line_given', detail, line });
    this.take(read.value, this.givenOption);
    return null;
  }

  private finish(): Result<Sections, ReadError> {
    const { option, network, keywords } = this;
    if (option === null || this.numbers === null || network.rowCount === 0) {
      const detail = 'The file has no data lines.';
      return refuse(
        'no_points',
        detail,
        'Export the sweep again; it should have a line for each frequency.',
      );
    }
    const { tolerated } = this.numbers;
    const fault = this.checkCommas(tolerated);
    if (fault !== null) return fault;
    if (keywords !== null && keywords.phase !== 'ended') {
      const detail = 'The file does not close with `[End]`; it was taken as whole.';
      this.assumptions.push({ code: 'end_missing', detail, line: this.walker.number });
    }
    return ok({
      keywords,
      option,
      scanner: this.scanner,
      network,
      tolerated,
      assumptions: this.assumptions,
    });
  }

  /** A comma is taken for the decimal mark only if no number speaks against it and one for it. */
  private checkCommas({ commaLine, isCommaSure }: Tolerated): Result<never, ReadError> | null {
    if (commaLine === null) return null;
    const remedy = 'Write all numbers with a decimal point and without thousands marks.';
    const pointLine = firstRowWithPoint(this.text, this.network);
    if (pointLine !== null) {
      const detail = `Some numbers have a comma (line ${commaLine}), others a point (line ${pointLine}): which is the decimal mark cannot be told.`;
      return refuse('decimal_mixed', detail, remedy, { line: commaLine });
    }
    if (isCommaSure) return null;
    const detail = `Every comma (from line ${commaLine} on) stands before three digits: whether it is a decimal mark or parts thousands cannot be told.`;
    return refuse('decimal_ambiguous', detail, remedy, { line: commaLine });
  }
}

/** Line of the first row that has a point before its comment; null if none has. */
function firstRowWithPoint(text: string, table: NumberTable): number | null {
  for (let row = 0; row < table.rowCount; row++) {
    for (let at = table.textStart[row]; at < text.length; at++) {
      const code = text.charCodeAt(at);
      if (code === 46) return table.lineNumber[row];
      if (code === 10 || code === 13 || code === 33) break;
    }
  }
  return null;
}
