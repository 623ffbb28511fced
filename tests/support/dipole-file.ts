import { writeTouchstone } from '../../core/formats/touchstone/write-touchstone.ts';
import { evenFrequencies, sweepOf } from './make-sweep.ts';

/** The file of an invented dipole: resonant at 14.15 MHz, too sharp for the whole of 20 m. */
export function dipoleFile(comment = 'invented'): string {
  const frequencyHz = evenFrequencies(13_900_000, 14_500_000, 121);
  const sweep = sweepOf(
    (f) => ({ resistance: 60, reactance: (f - 14_150_000) * 6e-4 }),
    frequencyHz,
  );
  const file = writeTouchstone(sweep, { comments: [comment] });
  if (!file.ok) throw new Error(file.error.detail);
  return file.value;
}
