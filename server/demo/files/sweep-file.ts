import type { Measurement } from '../measure.ts';

/** A file as an instrument leaves it. */
export interface SweepFile {
  readonly bytes: Uint8Array;
  /** With its dot. */
  readonly extension: string;
  readonly columns?: string;
  readonly port?: 1 | 2;
}

/** Writes a measurement down; `title` says in the file what it is, where the format lets it. */
export type WriteSweepFile = (measurement: Measurement, title: string) => SweepFile;

/** Lines as bytes, each ended by CR LF as instruments do. */
export function textBytes(lines: readonly string[]): Uint8Array {
  return new TextEncoder().encode(lines.map((line) => `${line}\r\n`).join(''));
}
