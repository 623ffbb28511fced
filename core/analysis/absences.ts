import type { Analysis } from './analysis.ts';
import type { Absence, Resonance, SwrMinimum } from './summary.ts';

/** Why fields of the summary are empty. */
export function absences(
  { sweep, noise }: Analysis,
  resonances: readonly Resonance[],
  minimum: SwrMinimum | null,
): readonly Absence[] {
  const absent: Absence[] = [];
  const add = (field: string, code: string, detail: string) => absent.push({ field, code, detail });
  const { phase, frequencyHz } = sweep;
  if (phase === 'none') {
    const detail = 'Only the magnitude of the reflection was measured, so no impedance is known.';
    add('resonances', 'phase_not_measured', detail);
    add('resonance_offset_hz', 'phase_not_measured', detail);
    add('minimum_swr.resistance_ohm', 'phase_not_measured', detail);
    add('minimum_swr.reactance_ohm', 'phase_not_measured', detail);
  } else if (phase === 'unsigned') {
    const detail =
      'The sign of the reactance was not measured: where it changes, and so where the antenna resonates, cannot be told.';
    add('resonances', 'reactance_sign_unknown', detail);
    add('resonance_offset_hz', 'reactance_sign_unknown', detail);
    add('minimum_swr.reactance_ohm', 'reactance_sign_unknown', detail);
  } else if (frequencyHz.length < 2) {
    add('resonances', 'one_point', 'One point shows no change of sign.');
    add('resonance_offset_hz', 'one_point', 'One point shows no change of sign.');
  } else if (resonances.length === 0) {
    const detail = 'The reactance does not change its sign within the sweep. Sweep wider.';
    add('resonances', 'no_crossing', detail);
    add('resonance_offset_hz', 'no_crossing', detail);
  } else if (minimum?.atEdge === true) {
    add('resonance_offset_hz', 'minimum_at_edge', 'The sweep ends before the SWR turns.');
  }
  if (minimum === null) {
    add(
      'minimum_swr',
      'total_reflection',
      'The reflection is total everywhere, so SWR has no value.',
    );
  }
  if (noise === null && phase === 'signed') {
    add('quality.reflection_noise', 'too_few_points', 'Too few points to tell noise from shape.');
  }
  return absent;
}
