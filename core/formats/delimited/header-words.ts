import { factsOf, type Quantity, quantities, type Unit } from './quantities.ts';

/** What a header says by its words alone. */
export interface HeaderWords {
  /** Null if the words name nothing that is known here. */
  readonly quantity: Quantity | null;
  /** Whether the name leaves no other meaning. */
  readonly isSure: boolean;
  readonly unit: Unit | null;
  /** The unit as a word, where one was written that does not fit the quantity. */
  readonly strayUnit: Unit | null;
}

const unitWords: Readonly<Record<string, Unit>> = {
  hz: 'Hz',
  khz: 'kHz',
  mhz: 'MHz',
  ghz: 'GHz',
  ohm: 'ohm',
  ohms: 'ohm',
  ω: 'ohm',
  kohm: 'kohm',
  kω: 'kohm',
  s: 'S',
  siemens: 'S',
  ms: 'mS',
  deg: 'deg',
  degs: 'deg',
  degree: 'deg',
  degrees: 'deg',
  '°': 'deg',
  rad: 'rad',
  radian: 'rad',
  radians: 'rad',
  db: 'dB',
  '%': 'percent',
  percent: 'percent',
};

const reflectionWords = ['s11', 'gamma', 'γ', 'reflection', 'reflection coefficient'];
const impedanceWords = ['z', 'impedance'];
const sizeWords = ['magnitude', 'mag', 'abs', 'modulus'];
const angleWords = ['angle', 'ang', 'phase', 'arg'];
const realWords = ['re', 'real', 'real part'];
const imaginaryWords = ['im', 'imag', 'imaginary', 'imaginary part'];

/** Both orders: `re s11` and `s11 re`. */
function pairs(things: readonly string[], words: readonly string[]): string[] {
  return things.flatMap((thing) =>
    words.flatMap((word) => [`${thing} ${word}`, `${word} ${thing}`, `${word} of ${thing}`]),
  );
}

/** Names with one meaning only, in lower case, marks as blanks. Terms of the field, no layouts. */
const sureNames: Readonly<Partial<Record<Quantity, readonly string[]>>> = {
  frequency: ['freq', 'f', 'frequenz', 'frecuencia', 'fréquence', 'frequenza', 'frequência'],
  swr: ['vswr', 'swv', 'ros', 'roe', 'tos', 'standing wave ratio'],
  return_loss: ['returnloss', 'rl'],
  reflection_magnitude: [
    '|s11|',
    '|gamma|',
    '|γ|',
    'rho',
    '|rho|',
    'ρ',
    '|ρ|',
    'reflection coefficient',
    ...pairs(reflectionWords, sizeWords),
  ],
  reflection_re: pairs(reflectionWords, realWords),
  reflection_im: pairs(reflectionWords, imaginaryWords),
  reflection_angle: pairs(reflectionWords, angleWords),
  resistance: [
    'rs',
    'series resistance',
    'r series',
    'series r',
    ...pairs(impedanceWords, realWords),
  ],
  reactance: [
    'xs',
    'series reactance',
    'x series',
    'series x',
    ...pairs(impedanceWords, imaginaryWords),
  ],
  reactance_magnitude: ['|x|', '|xs|', 'abs x', '|reactance|', 'magnitude of reactance'],
  impedance_magnitude: ['|z|', '|impedance|', ...pairs(impedanceWords, sizeWords)],
  impedance_angle: pairs(impedanceWords, angleWords),
  parallel_resistance: ['rp', 'r parallel', 'parallel r'],
  parallel_reactance: ['xp', 'x parallel', 'parallel x'],
};

/** Names that may mean several things: good for a proposal, never for more. */
const looseNames: Readonly<Record<string, Quantity>> = {
  r: 'resistance',
  x: 'reactance',
  z: 'impedance_magnitude',
  impedance: 'impedance_magnitude',
  s11: 'reflection_db',
  gamma: 'reflection_magnitude',
  γ: 'reflection_magnitude',
  mag: 'reflection_magnitude',
  magnitude: 'reflection_magnitude',
  phase: 'impedance_angle',
  angle: 'impedance_angle',
  theta: 'impedance_angle',
  θ: 'impedance_angle',
  db: 'return_loss',
  loss: 'return_loss',
  re: 'reflection_re',
  real: 'reflection_re',
  im: 'reflection_im',
  imag: 'reflection_im',
};

const sureByName = new Map<string, Quantity>(
  quantities.flatMap((quantity) =>
    [quantity.replaceAll('_', ' '), ...(sureNames[quantity] ?? [])].map(
      (name): [string, Quantity] => [name, quantity],
    ),
  ),
);

const longestHeader = 100;

/** Reads a header; `unitBelow` is the cell of a row of units under it. */
export function readHeader(header: string, unitBelow = ''): HeaderWords {
  const plain = header.normalize('NFKC').toLowerCase().trim().slice(0, longestHeader);
  const { name, unit: unitInName } = splitUnit(plain);
  const unit = unitInName ?? unitOf(unitBelow);
  const nameless = name === '' && unit !== null && factsOf('frequency').units.includes(unit);
  if (nameless) return fitted('frequency', true, unit);
  if (unit === 'dB' && (name === 's11' || sureByName.get(name) === 'reflection_magnitude')) {
    return fitted('reflection_db', true, unit);
  }
  const sure = sureByName.get(name);
  if (sure !== undefined) return fitted(sure, true, unit);
  const loose = Object.hasOwn(looseNames, name) ? looseNames[name] : null;
  if (loose === null) return { quantity: null, isSure: false, unit, strayUnit: null };
  return fitted(loose, false, unit);
}

function fitted(quantity: Quantity, isSure: boolean, unit: Unit | null): HeaderWords {
  const fits = unit === null || factsOf(quantity).units.includes(unit);
  return { quantity, isSure, unit: fits ? unit : null, strayUnit: fits ? null : unit };
}

/** Whether a line is a row of units under the names, blanks allowed. */
export function isUnitRow(cells: readonly string[]): boolean {
  const written = cells.filter((cell) => cell !== '');
  return written.length > 0 && written.every((cell) => unitOf(cell) !== null);
}

function unitOf(text: string): Unit | null {
  const bare = text
    .normalize('NFKC')
    .toLowerCase()
    .replace(/^[\s([]+|[\s)\]]+$/g, '');
  return Object.hasOwn(unitWords, bare) ? unitWords[bare] : null;
}

/** Takes the unit off a header: in brackets, or the last word behind a blank, comma, `/` or `_`. */
function splitUnit(text: string): { readonly name: string; readonly unit: Unit | null } {
  const inBrackets = /^([^([]*|.*?[)\]]) ?[([]([^()[\]]*)[)\]]$/.exec(text);
  if (inBrackets !== null) {
    const unit = unitOf(inBrackets[2]);
    if (unit !== null) return { name: plainName(inBrackets[1]), unit };
  }
  const whole = unitOf(text);
  if (whole !== null && whole !== 'dB' && whole !== 'S') return { name: '', unit: whole };
  const behind = /^(.*[^\s_/,])[\s_/,]+(\S+)$/.exec(text);
  const unit = behind === null ? null : unitOf(behind[2]);
  if (behind !== null && unit !== null) return { name: plainName(behind[1]), unit };
  return { name: plainName(text), unit: null };
}

function plainName(text: string): string {
  return text
    .replace(/[_\-.:()[\]/,]+/g, ' ')
    .replace(/\s+/g, ' ')
    .trim();
}
