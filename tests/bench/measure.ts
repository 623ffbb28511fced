import { writeFileSync } from 'node:fs';

/** One line of the benchmark's table: a figure, what it should be, and how it came about. */
export interface Figure {
  readonly key: string;
  readonly value: number;
  /** For instance `>= 1.3`; `report` where there is no aim. */
  readonly aim: string;
  readonly unit: string;
  readonly detail: string;
}

/** Times of two pieces of work that took turns, in microseconds per call, and their ratio. */
export interface SideBySide {
  readonly firstUs: number;
  readonly secondUs: number;
  /** Median over the rounds of (time of first / time of second). */
  readonly ratio: number;
}

/**
 * Runs two pieces of work in turns, so that both see the same machine, and compares round by
 * round. Each batch lasts about `batchMs`; a warm-up of one uncounted round comes first.
 */
export function sideBySide(
  first: () => unknown,
  second: () => unknown,
  { rounds = 15, batchMs = 60 } = {},
): SideBySide {
  const firstCalls = callsFor(first, batchMs);
  const secondCalls = callsFor(second, batchMs);
  const firstTimes: number[] = [];
  const secondTimes: number[] = [];
  const ratios: number[] = [];
  for (let round = 0; round <= rounds; round++) {
    const a = timePerCallUs(first, firstCalls);
    const b = timePerCallUs(second, secondCalls);
    if (round === 0) continue;
    firstTimes.push(a);
    secondTimes.push(b);
    ratios.push(a / b);
  }
  return { firstUs: median(firstTimes), secondUs: median(secondTimes), ratio: median(ratios) };
}

function callsFor(work: () => unknown, batchMs: number): number {
  const warmUntil = performance.now() + batchMs;
  let calls = 0;
  do {
    work();
    calls += 1;
  } while (performance.now() < warmUntil);
  return Math.max(1, calls);
}

function timePerCallUs(work: () => unknown, calls: number): number {
  const start = performance.now();
  for (let i = 0; i < calls; i++) kept[0] = work();
  return ((performance.now() - start) * 1000) / calls;
}

/** Keeps the last result alive, so that no call can be optimised away. */
const kept: unknown[] = [null];

/** The middle value; the mean of the two middle ones for an even number. */
export function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[middle] : (sorted[middle - 1] + sorted[middle]) / 2;
}

/** Whether a figure meets its aim; null where it has none. */
function meetsAim({ value, aim }: Figure): boolean | null {
  const match = /^(>=|<=) ([\d.]+)$/.exec(aim);
  if (match === null) return null;
  const bound = Number(match[2]);
  return match[1] === '>=' ? value >= bound : value <= bound;
}

/** The figures as a table for people and, where a file is named, as JSON by key. */
export function printFigures(figures: readonly Figure[], file: string | undefined): void {
  console.table(
    figures.map((figure) => ({
      key: figure.key,
      value: Number(figure.value.toPrecision(4)),
      unit: figure.unit,
      aim: figure.aim,
      met: { true: 'yes', false: 'no', null: '' }[String(meetsAim(figure))],
      detail: figure.detail,
    })),
  );
  if (file === undefined) return;
  const byKey = Object.fromEntries(
    figures.map(({ key, value, aim, unit, detail }) => [key, { value, aim, unit, detail }]),
  );
  writeFileSync(file, `${JSON.stringify(byKey, null, 2)}\n`);
}
