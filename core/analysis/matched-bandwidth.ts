import { halfWidthAt, type PiecewiseModel, valueAt } from './piecewise-model.ts';
import type { Scan } from './scan.ts';
import type { MatchedBandwidth } from './summary.ts';
import { zeroBetween } from './zero.ts';

/** The SWR at which matched bandwidths are compared. */
const maxSwr = 2;
const squareLimit = ((maxSwr - 1) / (maxSwr + 1)) ** 2;

/**
 * Bandwidth at SWR 2 of an antenna matched at its resonance (reference = its resistance there): as Q
 * predicts it, 2 sqrt(β)/Q of the frequency with sqrt(β) = (s - 1)/(2 sqrt s) (A. D. Yaghjian,
 * S. R. Best, IEEE Trans. Antennas and Propagation 53(4), 2005), and as the sweep has it.
 * `real`: the reflection at the resonance. Null where Q is not known.
 */
export function matchedBandwidth(
  model: PiecewiseModel,
  scan: Scan,
  frequencyHz: number,
  real: number,
  q: number | null,
  qU95: number | null,
): MatchedBandwidth | null {
  if (q === null || !(q > 0)) return null;
  const predictedHz = ((maxSwr - 1) / (Math.sqrt(maxSwr) * q)) * frequencyHz;
  const low = matchedEdge(model, scan, frequencyHz, real, -1);
  const high = matchedEdge(model, scan, frequencyHz, real, 1);
  const isMeasured = low !== null && high !== null;
  return {
    maxSwr,
    predictedHz,
    predictedU95Hz: qU95 === null ? null : (predictedHz * qU95) / q,
    measuredHz: isMeasured ? high.frequencyHz - low.frequencyHz : null,
    measuredU95Hz:
      isMeasured && low.u95Hz !== null && high.u95Hz !== null
        ? Math.hypot(low.u95Hz, high.u95Hz)
        : null,
  };
}

interface Edge {
  readonly frequencyHz: number;
  readonly u95Hz: number | null;
}

/** Where the SWR against the resistance at resonance passes the limit on one side; null if nowhere. */
function matchedEdge(
  model: PiecewiseModel,
  scan: Scan,
  resonanceHz: number,
  real: number,
  direction: 1 | -1,
): Edge | null {
  const excessOf = (re: number, im: number) =>
    (re - real) ** 2 + im ** 2 - squareLimit * ((1 - real * re) ** 2 + (real * im) ** 2);
  const excessAt = (f: number) => {
    const { re, im } = valueAt(model, f);
    return excessOf(re, im);
  };
  const { frequencyHz, re, im } = scan;
  let inside = resonanceHz;
  const start = direction > 0 ? 0 : frequencyHz.length - 1;
  for (let i = start; i >= 0 && i < frequencyHz.length; i += direction) {
    if ((frequencyHz[i] - resonanceHz) * direction <= 0) continue;
    if (excessOf(re[i], im[i]) > 0) {
      const [low, high] = direction > 0 ? [inside, frequencyHz[i]] : [frequencyHz[i], inside];
      const at = zeroBetween(excessAt, low, high);
      return { frequencyHz: at, u95Hz: edgeU95(model, at, real) };
    }
    inside = frequencyHz[i];
  }
  return null;
}

function edgeU95(model: PiecewiseModel, frequencyHz: number, real: number): number | null {
  const v = valueAt(model, frequencyHz);
  // Of the excess by the reflection: 2 conj(Γ - r) + 2 limit r conj(1 - rΓ).
  const valueRe = 2 * (v.re - real) + 2 * squareLimit * real * (1 - real * v.re);
  const valueIm = -2 * v.im + 2 * squareLimit * real * real * v.im;
  const slope = valueRe * v.slopeRe - valueIm * v.slopeIm;
  const u95 = halfWidthAt(model, frequencyHz, { valueRe, valueIm, slopeRe: 0, slopeIm: 0 });
  return u95 === null || slope === 0 ? null : u95 / Math.abs(slope);
}
