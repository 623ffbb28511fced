import { fail, ok, type Result } from '../../result.ts';
import type { Sweep } from '../../sweep.ts';

export interface WriteError {
  readonly code: 'phase_not_signed';
  readonly detail: string;
}

/**
 * Writes a sweep as a version 1 file: Hz, S, real and imaginary part, CR+LF. Numbers are the
 * shortest that read back bit for bit. Comments are cut to printable ASCII. Refuses sweeps without
 * signed phase: the format has no way to say that a sign or a phase is unknown.
 */
export function writeTouchstone(
  sweep: Sweep,
  { comments = [] }: { readonly comments?: readonly string[] } = {},
): Result<string, WriteError> {
  if (sweep.phase !== 'signed') {
    const detail =
      'Touchstone holds complex reflections; the sign of the reactance or the whole phase of this sweep is unknown.';
    return fail({ code: 'phase_not_signed', detail });
  }
  const { frequencyHz, reflectionRe, reflectionIm, referenceOhm } = sweep;
  const lines = comments.map((comment) => `! ${printable(comment)}`);
  lines.push(`# Hz S RI R ${referenceOhm}`);
  for (let i = 0; i < frequencyHz.length; i++) {
    lines.push(`${frequencyHz[i]} ${signed(reflectionRe[i])} ${signed(reflectionIm[i])}`);
  }
  lines.push('');
  return ok(lines.join('\r\n'));
}

/** The shortest decimal; a negative zero keeps its sign, so that it reads back as it was. */
function signed(value: number): string {
  return Object.is(value, -0) ? '-0' : String(value);
}

/** A comment can neither end its line nor hold anything that readers may stumble over. */
function printable(text: string): string {
  return text.replace(/[^\x20-\x7e]/g, '?');
}
