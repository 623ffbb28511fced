import type { BenchFigure, BenchReport } from './figure.ts';

/** The bench's figures as lines for people: value, aim, and what each family contributes. */
export function tableOf(report: BenchReport): string {
  return Object.entries(report)
    .map(([key, figure]) => linesOf(key, figure).join('\n'))
    .join('\n');
}

function linesOf(key: string, { value, aim, met, detail }: BenchFigure): string[] {
  const shown = typeof value === 'number' ? short(value) : flat(value);
  return [
    `${met ? 'met ' : 'FAR '} ${key}: ${shown}  (aim ${aim})`,
    ...Object.entries(detail)
      .filter(([name]) => name !== 'worst' && name !== 'cases')
      .map(([name, part]) => `       ${name}: ${plain(part)}`),
  ];
}

function plain(part: unknown): string {
  if (typeof part === 'number') return short(part);
  return typeof part === 'object' && part !== null ? flat(part) : String(part);
}

function flat(part: object): string {
  return Object.entries(part)
    .filter(([name]) => name !== 'worst')
    .map(([name, value]) =>
      typeof value === 'object' && value !== null
        ? `${name} {${flat(value)}}`
        : `${name} ${plain(value)}`,
    )
    .join(', ');
}

function short(value: number): string {
  return Number.isInteger(value) ? String(value) : value.toPrecision(3);
}
