/** How a band, or an antenna over all of its design bands, stands; what needs a look comes first. */
export const standingStates = [
  'unusable',
  'partly_usable',
  'untested',
  'partly_tested',
  'usable',
] as const;
export type StandingState = (typeof standingStates)[number];

/**
 * The state of a band by the fractions of it that were swept and that are usable. It claims no more
 * than holds whatever the part that was not swept may be.
 */
export function bandState(sweptFraction: number, usableFraction: number): StandingState {
  if (sweptFraction === 0) return 'untested';
  if (usableFraction > 0 && usableFraction < sweptFraction) return 'partly_usable';
  if (sweptFraction < 1) return 'partly_tested';
  return usableFraction > 0 ? 'usable' : 'unusable';
}

/** The state of an antenna: the first that one of its design bands is in. */
export function antennaState(bands: readonly StandingState[]): StandingState {
  return standingStates.find((state) => bands.includes(state)) ?? 'untested';
}
