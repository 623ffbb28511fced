import { type ReadSweepOptions, readSweep } from '../../core/formats/read-sweep.ts';
import type { ReadError, ReadSweep } from '../../core/formats/read-types.ts';
import type { ComplexSweep, ScalarSweep } from '../../core/sweep.ts';

/** A text as the bytes of a file. */
export function fileOf(text: string): Uint8Array {
  return new TextEncoder().encode(text);
}

/** What a text reads as; throws with the refusal if it is refused. */
export function readText(text: string, options: ReadSweepOptions = {}): ReadSweep {
  const read = readSweep(fileOf(text), options);
  if (!read.ok) throw new Error(`${read.error.code}: ${read.error.detail}`);
  return read.value;
}

/** Why a text is refused; throws if it is not. */
export function refusalOf(text: string, options: ReadSweepOptions = {}): ReadError {
  const read = readSweep(fileOf(text), options);
  if (read.ok) throw new Error('The text was read.');
  return read.error;
}

/** The complex sweep of a reading; throws if its phase is unknown. */
export function complexOf({ sweep }: ReadSweep): ComplexSweep {
  if (sweep.phase === 'none') throw new Error('The phase is unknown.');
  return sweep;
}

/** The scalar sweep of a reading; throws if its phase is known. */
export function scalarOf({ sweep }: ReadSweep): ScalarSweep {
  if (sweep.phase !== 'none') throw new Error('The phase is known.');
  return sweep;
}

/** The codes of what was assumed. */
export function assumedIn({ assumptions }: ReadSweep): string[] {
  return assumptions.map(({ code }) => code);
}
