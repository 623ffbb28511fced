import { ok, type Result } from '../../result.ts';
import { parseDecimal } from '../decimal.ts';
import type { Assumption, ReadError } from '../read-types.ts';
import { type Place, refuse } from './faults.ts';

/** Ports beyond this are no antenna measurement; the check comes before anything grows with it. */
const mostPorts = 2;

/** Where in a version 2 file the reading is. */
export type Phase = 'header' | 'information' | 'network' | 'noise' | 'ended';

/** What the keywords of a version 2 file have said so far. */
export class Keywords {
  ports: number | null = null;
  twoPortOrder: '12_21' | '21_12' | null = null;
  frequencies: number | null = null;
  matrixFormat: 'full' | 'lower' | 'upper' = 'full';
  referenceOhm: number[] | null = null;
  phase: Phase = 'header';
  hasVersion = false;
  /** Names of the keywords met so far: none may say its thing twice. */
  readonly met = new Set<string>();
  private wanted = 0;

  /** `[Reference]` has not got all its numbers yet. */
  get wantsArguments(): boolean {
    return this.wanted > 0;
  }

  /** Begins `[Reference]`, which goes on until every port has its resistance. */
  startReference(text: string, place: Place): Result<never, ReadError> | null {
    if (this.ports === null) {
      const remedy = 'Put `[Number of Ports]` directly after the option line.';
      return refuse(
        'ports_missing',
        '`[Reference]` stands before `[Number of Ports]`.',
        remedy,
        place,
      );
    }
    this.referenceOhm = [];
    this.wanted = this.ports;
    return this.takeArguments(text, place);
  }

  /** Takes resistances from a line. */
  takeArguments(text: string, place: Place): Result<never, ReadError> | null {
    for (const word of text.split(/[ \t]+/)) {
      if (word === '') continue;
      const value = parseDecimal(word);
      if (!(value > 0) || this.wanted === 0) {
        const detail = `\`[Reference]\` has \`${word}\` where ${this.wanted === 0 ? 'nothing more' : 'a positive real number of ohms'} is expected.`;
        const remedy =
          'Give one positive resistance for each port; complex references are not read.';
        return refuse('reference_not_positive', detail, remedy, place);
      }
      this.referenceOhm?.push(value);
      this.wanted -= 1;
    }
    return null;
  }
}

type Taken = Result<readonly Assumption[], ReadError>;
type KeywordReader = (keywords: Keywords, argument: string, place: Place) => Taken;

const nothing: Taken = ok([]);

interface Keyword {
  readonly read: KeywordReader;
  /** Where it may stand. */
  readonly phases: readonly Phase[];
}

function inHeader(read: KeywordReader): Keyword {
  return { read, phases: ['header'] };
}

function startsPhase(phase: Phase, ...phases: readonly Phase[]): Keyword {
  const read: KeywordReader = (keywords) => {
    keywords.phase = phase;
    return nothing;
  };
  return { read, phases };
}

/** Every keyword of the format, by its name in lower case with single blanks. */
const known = new Map<string, Keyword>([
  ['number of ports', inHeader(readPorts)],
  ['two-port data order', inHeader(readOrder)],
  ['two-port order', inHeader(readOrderAlias)],
  ['number of frequencies', inHeader(readFrequencies)],
  ['number of noise frequencies', inHeader((_, argument, place) => positiveWhole(argument, place))],
  [
    'reference',
    inHeader((keywords, argument, place) => keywords.startReference(argument, place) ?? nothing),
  ],
  ['matrix format', inHeader(readMatrixFormat)],
  ['mixed-mode order', inHeader(refuseMixedMode)],
  ['begin information', startsPhase('information', 'header')],
  ['end information', startsPhase('header', 'information')],
  ['network data', startsPhase('network', 'header')],
  ['noise data', startsPhase('noise', 'network')],
  ['end', startsPhase('ended', 'network', 'noise')],
]);

/** Takes one keyword line. The assumptions are what had to be tolerated in it. */
export function readKeyword(
  keywords: Keywords,
  content: string,
  place: Place,
  hasOption: boolean,
): Taken {
  const match = /^\[([^\]]*)\](.*)$/.exec(content);
  if (match === null) {
    const detail = 'A keyword is not closed by `]`.';
    return refuse('keyword_open', detail, 'Close it on its own line.', place);
  }
  const name = match[1].trim().toLowerCase().replace(/\s+/g, ' ');
  const argument = match[2].trim();
  if (name === 'version') return readVersion(keywords, argument, place);
  if (!keywords.hasVersion) {
    const detail = `The file begins with \`[${match[1]}]\`, not with \`[Version]\`.`;
    return refuse('version_missing', detail, 'Write `[Version] 2.0` on the first line.', place);
  }
  if (keywords.wantsArguments) {
    const detail = `\`[${match[1]}]\` stands where a resistance of \`[Reference]\` is missing.`;
    return refuse('reference_short', detail, 'Give one resistance for each port.', place);
  }
  if (!hasOption) {
    const detail = `\`[${match[1]}]\` stands before the option line.`;
    return refuse(
      'option_line_missing',
      detail,
      'Put the option line directly after `[Version]`.',
      place,
    );
  }
  const keyword = known.get(name);
  if (keyword === undefined) return passUnknown(keywords, match[1], place);
  if (keywords.met.has(name)) {
    const detail = `\`[${match[1]}]\` stands twice.`;
    return refuse('keyword_twice', detail, 'Send one sweep in one file.', place);
  }
  if (!keyword.phases.includes(keywords.phase)) {
    const detail = `\`[${match[1]}]\` does not belong here.`;
    const remedy =
      'Order the file: `[Version]`, option line, `[Number of Ports]`, other keywords, `[Network Data]`, `[Noise Data]`, `[End]`.';
    return refuse('keyword_misplaced', detail, remedy, place);
  }
  keywords.met.add(name);
  return keyword.read(keywords, argument, place);
}

function passUnknown(keywords: Keywords, name: string, place: Place): Taken {
  if (keywords.phase !== 'header') {
    const detail = `The keyword \`[${name}]\` is unknown.`;
    return refuse('keyword_unknown', detail, 'Remove it, or correct its spelling.', place);
  }
  const detail = `The unknown keyword \`[${name}]\` was passed over.`;
  return ok([{ code: 'keyword_unknown', detail, line: place.line }]);
}

function readVersion(keywords: Keywords, argument: string, place: Place): Taken {
  if (keywords.hasVersion) {
    return refuse(
      'keyword_twice',
      '`[Version]` stands twice.',
      'Send one sweep in one file.',
      place,
    );
  }
  if (argument !== '2.0' && argument !== '2.1') {
    const detail = `\`[Version] ${argument}\` is not known; 2.0 and 2.1 are read, and files without keywords.`;
    return refuse('version_unknown', detail, 'Export the file as version 1 or 2.0.', place);
  }
  keywords.hasVersion = true;
  return nothing;
}

function readPorts(keywords: Keywords, argument: string, place: Place): Taken {
  const ports = parseDecimal(argument);
  if (!Number.isInteger(ports) || ports < 1) {
    return refuse(
      'ports_bad',
      `\`[Number of Ports] ${argument}\` is no count.`,
      'Give 1 or 2.',
      place,
    );
  }
  if (ports > mostPorts) {
    const remedy = 'Export the one port that the antenna is at.';
    return refuse('too_many_ports', `The file has ${ports} ports; 1 or 2 are read.`, remedy, place);
  }
  keywords.ports = ports;
  return nothing;
}

function readOrder(keywords: Keywords, argument: string, place: Place): Taken {
  if (keywords.twoPortOrder !== null) {
    const detail = 'The order of the two-port data stands twice.';
    return refuse('keyword_twice', detail, 'Keep one of the keywords.', place);
  }
  if (argument !== '12_21' && argument !== '21_12') {
    const detail = `\`[Two-Port Data Order] ${argument}\` is neither 12_21 nor 21_12.`;
    return refuse('order_unknown', detail, 'Write 12_21 or 21_12.', place);
  }
  keywords.twoPortOrder = argument;
  return nothing;
}

function readOrderAlias(keywords: Keywords, argument: string, place: Place): Taken {
  const read = readOrder(keywords, argument, place);
  if (!read.ok) return read;
  const detail = '`[Two-Port Order]` was read as `[Two-Port Data Order]`.';
  return ok([{ code: 'order_alias', detail, line: place.line }]);
}

function readFrequencies(keywords: Keywords, argument: string, place: Place): Taken {
  const read = positiveWhole(argument, place);
  if (read.ok) keywords.frequencies = parseDecimal(argument);
  return read;
}

function positiveWhole(argument: string, place: Place): Taken {
  const value = parseDecimal(argument);
  if (Number.isInteger(value) && value > 0) return nothing;
  return refuse(
    'count_bad',
    `\`${argument}\` is no count of frequencies.`,
    'Give a whole number.',
    place,
  );
}

function readMatrixFormat(keywords: Keywords, argument: string, place: Place): Taken {
  const form = argument.toLowerCase();
  if (form !== 'full' && form !== 'lower' && form !== 'upper') {
    const detail = `\`[Matrix Format] ${argument}\` is not known.`;
    return refuse('matrix_format_unknown', detail, 'Write Full, Lower or Upper.', place);
  }
  keywords.matrixFormat = form;
  return nothing;
}

function refuseMixedMode(_: Keywords, __: string, place: Place): Taken {
  const detail =
    'The file holds mixed-mode parameters: its first one is not the reflection at a single port.';
  return refuse('mixed_mode', detail, 'Export single-ended S-parameters.', place);
}
