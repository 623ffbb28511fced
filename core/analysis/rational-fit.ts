import {
  type LeastSquares,
  solveLeastSquares,
  type TallSystem,
  tallSystem,
} from './least-squares.ts';
import {
  chebyshevColumns,
  type FrequencyScale,
  frequencyScale,
  polynomialsOf,
  type RationalForm,
} from './rational-basis.ts';

/** Samples of a function of frequency; `im` is all zero for a real one. */
export interface Samples {
  readonly frequencyHz: Float64Array;
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/** A rational function of frequency, N/D of one degree and form, fitted to samples. */
export interface RationalFit {
  readonly form: RationalForm;
  readonly degree: number;
  readonly scale: FrequencyScale;
  readonly numerator: Float64Array;
  readonly denominator: Float64Array;
  /** The denominator's coefficient that stands still; the others and the numerator are unknowns. */
  readonly still: number;
  /** Triangle of the unknowns' covariance for unit noise; null if they depend on each other. */
  readonly triangle: Float64Array | null;
  /** Sum of the squared residuals. */
  readonly squares: number;
  /** Model less sample. */
  readonly residualRe: Float64Array;
  readonly residualIm: Float64Array;
}

/** Number of real unknowns of a fit. */
export function unknownsOf(degree: number): number {
  return 2 * degree + 1;
}

/** Number of real measured numbers in so many samples. */
export function numbersIn(form: RationalForm, samples: number): number {
  return form === 'square' ? samples : 2 * samples;
}

const linearSteps = 4;
const newtonSteps = 8;
const halvings = 3;
const settledBelow = 1e-6;

/** What a fit works on. */
interface Workspace {
  readonly samples: Samples;
  readonly form: RationalForm;
  readonly degree: number;
  readonly scale: FrequencyScale;
  readonly columns: Float64Array;
}

interface Coefficients {
  readonly numerator: Float64Array;
  readonly denominator: Float64Array;
}

/** The coefficients with the function they make at the samples. */
interface Evaluated extends Coefficients {
  readonly inverseRe: Float64Array;
  readonly inverseIm: Float64Array;
  readonly valueRe: Float64Array;
  readonly valueIm: Float64Array;
  readonly squares: number;
}

/**
 * Fits by the iteration of C. K. Sanathanan and J. Koerner (IEEE Trans. Automatic Control 8(1),
 * 1963) and then by Gauss–Newton steps on the true residual, so that the answer is the least-squares
 * one and its covariance is known. Needs at least as many numbers as unknowns; null where it
 * degenerates.
 */
export function fitRational(
  samples: Samples,
  form: RationalForm,
  degree: number,
): RationalFit | null {
  const { frequencyHz } = samples;
  const scale = frequencyScale(frequencyHz[0], frequencyHz[frequencyHz.length - 1]);
  const columns = chebyshevColumns(frequencyHz, scale, polynomialsOf(form, degree));
  const space: Workspace = { samples, form, degree, scale, columns };
  const start = linearStart(space);
  return start === null ? null : polish(space, start);
}

/** The Sanathanan–Koerner iterate of least residual. */
function linearStart(space: Workspace): Evaluated | null {
  const flat = { numerator: new Float64Array(space.degree + 1), denominator: unit(space.degree) };
  let here = evaluate(space, flat);
  let best: Evaluated | null = null;
  for (let i = 0; i < linearSteps; i++) {
    const next = linearStep(space, here);
    if (next === null) break;
    here = evaluate(space, next);
    if (!Number.isFinite(here.squares)) break;
    if (best !== null && here.squares > best.squares * (1 - settledBelow)) break;
    best = here;
  }
  return best;
}

function unit(degree: number): Float64Array {
  const coefficients = new Float64Array(degree + 1);
  coefficients[0] = 1;
  return coefficients;
}

/** Solves (N - sample D)/D' = 0 with D' the denominator before, whose largest coefficient stays. */
function linearStep(space: Workspace, before: Evaluated): Coefficients | null {
  const { samples } = space;
  const still = largest(before.denominator);
  const system = columnsOf(space, before, samples.re, samples.im, still);
  const rightHand = system.unknowns * system.rows;
  const held = before.denominator[still];
  fillColumn(space, before, still, system.values, rightHand);
  turnInto(system, space, rightHand, samples.re, samples.im, held);
  const solved = solveLeastSquares(system);
  return solved === null ? null : withStill(space, solved, still, held);
}

function largest(coefficients: Float64Array): number {
  let at = 0;
  for (let k = 1; k < coefficients.length; k++) {
    if (Math.abs(coefficients[k]) > Math.abs(coefficients[at])) at = k;
  }
  return at;
}

/** Columns term/D for the numerator and -value term/D for all of the denominator but one. */
function columnsOf(
  space: Workspace,
  at: Evaluated,
  valueRe: Float64Array,
  valueIm: Float64Array,
  still: number,
): TallSystem {
  const { degree, form, samples } = space;
  const system = tallSystem(numbersIn(form, samples.re.length), unknownsOf(degree));
  const { rows, values } = system;
  let free = degree + 1;
  for (let k = 0; k <= degree; k++) {
    fillColumn(space, at, k, values, k * rows);
    if (k === still) continue;
    values.copyWithin(free * rows, k * rows, (k + 1) * rows);
    turnInto(system, space, free * rows, valueRe, valueIm, -1);
    free += 1;
  }
  return system;
}

/** Writes term k over D into a column. */
function fillColumn(
  { samples, form, scale, columns }: Workspace,
  { inverseRe, inverseIm }: Evaluated,
  k: number,
  into: Float64Array,
  start: number,
): void {
  const count = samples.re.length;
  if (form === 'square') {
    for (let i = 0; i < count; i++) into[start + i] = columns[k * count + i] * inverseRe[i];
    return;
  }
  const t = (k >> 1) * count;
  const im = start + count;
  if (k % 2 === 0) {
    for (let i = 0; i < count; i++) {
      into[start + i] = columns[t + i] * inverseRe[i];
      into[im + i] = columns[t + i] * inverseIm[i];
    }
    return;
  }
  for (let i = 0; i < count; i++) {
    const odd = (columns[t + i] * samples.frequencyHz[i]) / scale.centreHz;
    into[start + i] = -odd * inverseIm[i];
    into[im + i] = odd * inverseRe[i];
  }
}

/** Multiplies a column by a complex value of each sample and a factor. */
function turnInto(
  { values }: TallSystem,
  { form, samples }: Workspace,
  start: number,
  valueRe: Float64Array,
  valueIm: Float64Array,
  factor: number,
): void {
  const count = samples.re.length;
  if (form === 'square') {
    for (let i = 0; i < count; i++) values[start + i] *= factor * valueRe[i];
    return;
  }
  const end = start + count;
  for (let i = 0; i < count; i++) {
    const re = values[start + i];
    const im = values[end + i];
    values[start + i] = factor * (re * valueRe[i] - im * valueIm[i]);
    values[end + i] = factor * (re * valueIm[i] + im * valueRe[i]);
  }
}

function withStill(
  { degree }: Workspace,
  { solution }: LeastSquares,
  still: number,
  held: number,
): Coefficients {
  const denominator = new Float64Array(degree + 1);
  let free = degree + 1;
  for (let k = 0; k <= degree; k++) {
    if (k === still) denominator[k] = held;
    else {
      denominator[k] = solution[free];
      free += 1;
    }
  }
  return { numerator: solution.slice(0, degree + 1), denominator };
}

/** The function at the samples, scaled so that the largest coefficient of its denominator is 1. */
function evaluate(space: Workspace, raw: Coefficients): Evaluated {
  const { samples } = space;
  const count = samples.re.length;
  const size = Math.abs(raw.denominator[largest(raw.denominator)]);
  const numerator = raw.numerator.map((c) => c / size);
  const denominator = raw.denominator.map((c) => c / size);
  const inverseRe = new Float64Array(count);
  const inverseIm = new Float64Array(count);
  const valueRe = new Float64Array(count);
  const valueIm = new Float64Array(count);
  addSeries(space, numerator, valueRe, valueIm);
  addSeries(space, denominator, inverseRe, inverseIm);
  let squares = 0;
  for (let i = 0; i < count; i++) {
    const q2 = inverseRe[i] ** 2 + inverseIm[i] ** 2;
    inverseRe[i] /= q2;
    inverseIm[i] /= -q2;
    const re = valueRe[i] * inverseRe[i] - valueIm[i] * inverseIm[i];
    const im = valueRe[i] * inverseIm[i] + valueIm[i] * inverseRe[i];
    valueRe[i] = re;
    valueIm[i] = im;
    squares += (re - samples.re[i]) ** 2 + (im - samples.im[i]) ** 2;
  }
  return { numerator, denominator, inverseRe, inverseIm, valueRe, valueIm, squares };
}

/** Adds a series of terms at every sample. */
function addSeries(
  { samples, form, scale, columns }: Workspace,
  coefficients: Float64Array,
  re: Float64Array,
  im: Float64Array,
): void {
  const count = samples.re.length;
  for (let k = 0; k < coefficients.length; k++) {
    const c = coefficients[k];
    const isOdd = form === 'reflection' && k % 2 === 1;
    const t = (form === 'square' ? k : k >> 1) * count;
    const into = isOdd ? im : re;
    for (let i = 0; i < count; i++) into[i] += c * columns[t + i];
  }
  if (form === 'square') return;
  for (let i = 0; i < count; i++) im[i] *= samples.frequencyHz[i] / scale.centreHz;
}

/** Gauss–Newton steps while they help; one that does not is halved a few times and then given up. */
function polish(space: Workspace, start: Evaluated): RationalFit | null {
  let here = start;
  for (let i = 0; i < newtonSteps; i++) {
    const step = newtonStep(space, here);
    if (step === null) break;
    const there = improved(space, here, step);
    if (there === null) break;
    const gain = 1 - there.squares / here.squares;
    here = there;
    if (gain < settledBelow) break;
  }
  return Number.isFinite(here.squares) ? asFit(space, here) : null;
}

function newtonStep(space: Workspace, here: Evaluated): Coefficients | null {
  const still = largest(here.denominator);
  const system = columnsOf(space, here, here.valueRe, here.valueIm, still);
  writeResiduals(space, here, system);
  const solved = solveLeastSquares(system);
  return solved === null ? null : withStill(space, solved, still, 0);
}

function writeResiduals({ samples, form }: Workspace, at: Evaluated, system: TallSystem): void {
  const { rows, unknowns, values } = system;
  const count = samples.re.length;
  const start = unknowns * rows;
  for (let i = 0; i < count; i++) values[start + i] = samples.re[i] - at.valueRe[i];
  if (form === 'square') return;
  for (let i = 0; i < count; i++) values[start + count + i] = samples.im[i] - at.valueIm[i];
}

function improved(space: Workspace, here: Evaluated, step: Coefficients): Evaluated | null {
  let part = 1;
  for (let i = 0; i <= halvings; i++) {
    const moved = (from: Float64Array, by: Float64Array) => from.map((c, k) => c + part * by[k]);
    const there = evaluate(space, {
      numerator: moved(here.numerator, step.numerator),
      denominator: moved(here.denominator, step.denominator),
    });
    if (there.squares < here.squares) return there;
    part /= 2;
  }
  return null;
}

function asFit(space: Workspace, at: Evaluated): RationalFit {
  const { form, degree, scale, samples } = space;
  const { numerator, denominator, squares, valueRe, valueIm } = at;
  const still = largest(denominator);
  const system = columnsOf(space, at, valueRe, valueIm, still);
  const solved = solveLeastSquares(system);
  return {
    form,
    degree,
    scale,
    numerator,
    denominator,
    still,
    triangle: solved?.triangle ?? null,
    squares,
    residualRe: valueRe.map((value, i) => value - samples.re[i]),
    residualIm: valueIm.map((value, i) => value - samples.im[i]),
  };
}
