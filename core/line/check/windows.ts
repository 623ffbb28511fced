/** A published taper and what it does to a lone reflection. */
export interface Window {
  readonly id: WindowId;
  readonly name: string;
  /** Full width of the main lobe at half magnitude, in units of c VF/(2 span). */
  readonly widthAtHalf: number;
  /** From its peak to its first null, in the same units. */
  readonly firstNull: number;
  /** Highest sidelobe below the peak, dB (negative). */
  readonly sidelobeDb: number;
  readonly weights: (points: number) => Float64Array;
}

export type WindowId = 'rectangular' | 'hann' | 'kaiser_6' | 'kaiser_3pi';

/**
 * Widths and levels recomputed at 1024 points; they agree with F. J. Harris, Proc. IEEE 66(1) (1978)
 * 51-83, Table 1 (values from memory), to its rounding.
 */
export const windows: Readonly<Record<WindowId, Window>> = {
  rectangular: {
    id: 'rectangular',
    name: 'rectangular',
    widthAtHalf: 1.2067,
    firstNull: 1,
    sidelobeDb: -13.26,
    weights: (points) => new Float64Array(points).fill(1),
  },
  hann: {
    id: 'hann',
    name: 'Hann',
    widthAtHalf: 2,
    firstNull: 2,
    sidelobeDb: -31.47,
    weights: hann,
  },
  kaiser_6: {
    id: 'kaiser_6',
    name: 'Kaiser, beta = 6',
    widthAtHalf: 1.9544,
    firstNull: 2.156,
    sidelobeDb: -43.79,
    weights: (points) => kaiser(points, 6),
  },
  kaiser_3pi: {
    id: 'kaiser_3pi',
    name: 'Kaiser, beta = 3 pi',
    widthAtHalf: 2.3892,
    firstNull: 3.162,
    sidelobeDb: -69.62,
    weights: (points) => kaiser(points, 3 * Math.PI),
  },
};

/** w[n] = [1 - cos(2 pi n/(N-1))]/2. */
function hann(points: number): Float64Array {
  return Float64Array.from(
    { length: points },
    (_, n) => (1 - Math.cos((2 * Math.PI * n) / (points - 1))) / 2,
  );
}

/**
 * w[n] = I0(beta sqrt(1 - (2n/(N-1) - 1)^2))/I0(beta)
 * (J. F. Kaiser; F. J. Harris, Proc. IEEE 66(1) (1978), eq. 46a by memory).
 */
function kaiser(points: number, beta: number): Float64Array {
  const full = besselI0(beta);
  return Float64Array.from({ length: points }, (_, n) => {
    const x = (2 * n) / (points - 1) - 1;
    return besselI0(beta * Math.sqrt(Math.max(0, 1 - x * x))) / full;
  });
}

/** Modified Bessel function of order zero by its power series (DLMF 10.25.2). */
export function besselI0(x: number): number {
  const quarter = (x * x) / 4;
  let term = 1;
  let sum = 1;
  for (let k = 1; term > sum * 1e-17; k++) {
    term *= quarter / (k * k);
    sum += term;
  }
  return sum;
}
