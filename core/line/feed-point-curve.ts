import { swrU95OfSquare } from '../analysis/refined-swr.ts';
import type { Summary } from '../analysis/summary.ts';
import type { SwrCurve, SwrExtremes } from '../analysis/swr-curve.ts';
import type { Removal } from './removal-half-width.ts';

/**
 * The SWR at the feed point with the half-widths that the removal of the line left: those of the
 * span edges from `summary`, which must have been made for the limits that will be asked, those of
 * SWR from the removal.
 */
export function feedPointCurve(curve: SwrCurve, removal: Removal, summary: Summary): SwrCurve {
  return {
    lowHz: curve.lowHz,
    highHz: curve.highHz,
    spans: (maxSwr) => summary.spans.filter((span) => span.maxSwr === maxSwr),
    extremes: (lowHz, highHz) => {
      const extremes = curve.extremes(lowHz, highHz);
      return extremes === null ? null : grown(extremes, removal);
    },
  };
}

function grown(extremes: SwrExtremes, removal: Removal): SwrExtremes {
  const { worstSwr, worstSwrHz, worstSwrU95 } = extremes;
  if (worstSwr === null || worstSwrU95 === null) return extremes;
  const rho = (worstSwr - 1) / (worstSwr + 1);
  const moved = swrU95OfSquare(rho * rho, magnitudeU95At(removal, worstSwrHz));
  return { ...extremes, worstSwrU95: moved === null ? null : Math.hypot(worstSwrU95, moved) };
}

/** Of the nearest point at or above; the half-width hardly moves in one step. */
function magnitudeU95At({ sweep, magnitudeU95 }: Removal, hz: number): number {
  const upper = sweep.frequencyHz.findIndex((each) => each >= hz);
  return magnitudeU95[upper < 0 ? magnitudeU95.length - 1 : upper];
}
