import { attenuationDbPer100M } from '../attenuation.ts';
import type { Cable } from '../cable.ts';
import { DB_PER_NEPER } from '../propagation.ts';
import type { LocatedDiscontinuity } from './checked-line.ts';
import type { Discontinuity, FoundDiscontinuities } from './discontinuities.ts';
import type { ReflectometryGrid } from './grid.ts';

/** Of the strongest reflection: one at the stated length that has as much is taken for the end. */
const END_SHARE = 0.3;
/** Both orders of a pair add up, and short faults reflect more towards the top of the sweep. */
const ECHO_MARGIN = 4;

/** The strongest reflection beyond the near end, or that at the stated length if it is a match for it. */
export function endPlace(
  places: FoundDiscontinuities,
  lengthM: number | null,
): Discontinuity | null {
  const beyond = places.found.filter((place) => place.distanceM > places.separableM / 2);
  if (beyond.length === 0) return null;
  const [strongest] = beyond;
  if (lengthM === null) return strongest;
  const tolerance = Math.max(places.separableM / 2, 0.05 * lengthM);
  const stated = beyond.find((place) => Math.abs(place.distanceM - lengthM) <= tolerance);
  if (stated === undefined) return strongest;
  return stated.magnitude >= END_SHARE * strongest.magnitude ? stated : strongest;
}

/** The places by distance, with half-widths, freed of the cable's loss, each told what it is. */
export function located(
  places: FoundDiscontinuities,
  end: Discontinuity | null,
  grid: ReflectometryGrid,
  cable: Cable | null,
  velocityShare: number,
): readonly LocatedDiscontinuity[] {
  const f = grid.sweep.frequencyHz;
  const middleHz = (f[0] + f[f.length - 1]) / 2;
  const growth = (distanceM: number): number | null => {
    if (cable === null) return null;
    const lossDb = (attenuationDbPer100M(cable.attenuation, middleHz) * distanceM) / 100;
    return Math.exp((2 * Math.max(0, lossDb)) / DB_PER_NEPER);
  };
  const seen = places.found
    .map((place): LocatedDiscontinuity => {
      const grown = growth(place.distanceM);
      return {
        distanceM: place.distanceM,
        distanceU95M: Math.hypot(place.distanceNoiseU95M, place.distanceM * velocityShare),
        magnitude: place.magnitude,
        magnitudeThere: grown === null ? null : place.magnitude * grown,
        kind: kindOf(place, end, places.separableM),
      };
    })
    .sort((a, b) => a.distanceM - b.distanceM);
  return seen.map(
    (place): LocatedDiscontinuity =>
      place.kind === 'on_line' && isEcho(place, seen, places.separableM)
        ? { ...place, kind: 'echo' }
        : place,
  );
}

/**
 * A wave that turned at a, back at c and again at b arrives from a + b - c with the product of the
 * three reflections. A place where two others would put such an echo, no stronger than it, is one.
 */
function isEcho(
  place: LocatedDiscontinuity,
  seen: readonly LocatedDiscontinuity[],
  separableM: number,
): boolean {
  const before = seen.filter((other) => place.distanceM - other.distanceM > separableM / 2);
  return before.some((a) =>
    before.some((b) =>
      before.some((c) => {
        if (!(c.distanceM < a.distanceM && c.distanceM < b.distanceM)) return false;
        const from = a.distanceM + b.distanceM - c.distanceM;
        const product = strength(a) * strength(b) * strength(c);
        return (
          Math.abs(from - place.distanceM) < separableM / 2 &&
          strength(place) <= ECHO_MARGIN * product
        );
      }),
    ),
  );
}

function strength(place: LocatedDiscontinuity): number {
  return place.magnitudeThere ?? place.magnitude;
}

function kindOf(
  place: Discontinuity,
  end: Discontinuity | null,
  separableM: number,
): LocatedDiscontinuity['kind'] {
  if (place === end) return 'end';
  if (place.distanceM <= separableM / 2) return 'near_end';
  return end !== null && place.distanceM > end.distanceM ? 'echo' : 'on_line';
}
