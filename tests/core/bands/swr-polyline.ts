import type { UsableSpan } from '../../../core/analysis/summary.ts';
import type { SwrCurve, SwrExtremes } from '../../../core/analysis/swr-curve.ts';

type Knot = readonly [frequencyHz: number, swr: number];

export interface HalfWidths {
  readonly edgeHz?: number;
  readonly swr?: number;
}

/** An SWR curve of straight pieces between knots: every answer is exact by hand. */
export function swrPolyline(knots: readonly Knot[], halfWidths: HalfWidths = {}): SwrCurve {
  const lowHz = knots[0][0];
  const highHz = knots[knots.length - 1][0];
  return {
    lowHz,
    highHz,
    spans: (maxSwr) => spansOf(knots, maxSwr, halfWidths.edgeHz ?? null),
    extremes: (fromHz, toHz) => {
      const low = Math.max(fromHz, lowHz);
      const high = Math.min(toHz, highHz);
      if (low > high) return null;
      const inside = knots.filter(([hz]) => hz > low && hz < high);
      const looked: Knot[] = [[low, swrAt(knots, low)], ...inside, [high, swrAt(knots, high)]];
      return extremesOf(looked, halfWidths.swr ?? null);
    },
  };
}

function swrAt(knots: readonly Knot[], hz: number): number {
  const above = knots.findIndex(([knotHz]) => knotHz >= hz);
  if (above <= 0) return knots[0][1];
  const [[f1, s1], [f2, s2]] = [knots[above - 1], knots[above]];
  return s1 + ((s2 - s1) * (hz - f1)) / (f2 - f1);
}

function extremesOf(looked: readonly Knot[], swrU95: number | null): SwrExtremes {
  const worst = looked.reduce((a, b) => (b[1] > a[1] ? b : a));
  const least = looked.reduce((a, b) => (b[1] < a[1] ? b : a));
  const finite = (swr: number) => (Number.isFinite(swr) ? swr : null);
  return {
    worstSwr: finite(worst[1]),
    worstSwrHz: worst[0],
    worstSwrU95: Number.isFinite(worst[1]) ? swrU95 : null,
    minimumSwr: finite(least[1]),
    minimumSwrHz: least[0],
  };
}

function spansOf(
  knots: readonly Knot[],
  maxSwr: number,
  edgeU95Hz: number | null,
): readonly UsableSpan[] {
  const spans: UsableSpan[] = [];
  let openedAt: number | null = knots[0][1] <= maxSwr ? knots[0][0] : null;
  let lowOpen = openedAt !== null;
  const close = (highHz: number, highOpen: boolean) => {
    if (openedAt === null) return;
    const [lowHz, widthHz] = [openedAt, highHz - openedAt];
    const lowU95Hz = lowOpen ? null : edgeU95Hz;
    const highU95Hz = highOpen ? null : edgeU95Hz;
    spans.push({ maxSwr, lowHz, lowU95Hz, highHz, highU95Hz, widthHz, lowOpen, highOpen });
    openedAt = null;
    lowOpen = false;
  };
  for (let i = 1; i < knots.length; i++) {
    const [[f1, s1], [f2, s2]] = [knots[i - 1], knots[i]];
    if (s1 <= maxSwr === s2 <= maxSwr) continue;
    const crossingHz = f1 + ((f2 - f1) * (maxSwr - s1)) / (s2 - s1);
    if (s2 <= maxSwr) openedAt = crossingHz;
    else close(crossingHz, false);
  }
  close(knots[knots.length - 1][0], true);
  return spans;
}
