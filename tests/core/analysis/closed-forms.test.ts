import { describe, expect, it } from 'vitest';
import { summarise } from '../../../core/analysis/summarise.ts';
import { dipoleImpedance } from '../../../server/demo/models/induced-emf.ts';
import {
  evenFrequencies,
  type ImpedanceOf,
  parallelCircuit,
  seriesCircuit,
  sweepOf,
} from '../../support/make-sweep.ts';

// Every expected value here follows from the formula beside it and was recomputed with 25 digits;
// where a publication is named it states the same formula.

function seriesSpans(resistance: number, q: number, f0: number, maxSwr: number) {
  const sweep = sweepOf(seriesCircuit(resistance, q, f0), evenFrequencies(0.9 * f0, 1.1 * f0, 201));
  return summarise(sweep, { swrLimits: [maxSwr] }).spans;
}

describe('a series circuit', () => {
  // k = sqrt((s r - 1)(s - r)/s)/(r Q), u = sqrt(1 + k²/4) -+ k/2: H. F. Pues, A. R. Van de Capelle,
  // IEEE Trans. Antennas and Propagation 37 (1989).
  it.each([
    [50, 10, 2, 0.96526946575, 1.03598014387],
    [50, 10, 1.5, 0.979795897113, 1.02062072616],
    [40, 10, 2, 0.963202877981, 1.03820287798],
    [62.5, 10, 2, 0.970449898796, 1.0304498988],
  ])(
    'of %d ohm and Q %d has its band of SWR %d between %d and %d of its resonance',
    (r, q, s, low, high) => {
      const [span] = seriesSpans(r, q, 7.1e6, s);
      expect(span.lowHz / 7.1e6).toBeCloseTo(low, 10);
      expect(span.highHz / 7.1e6).toBeCloseTo(high, 10);
    },
  );

  it('of 28.125 ohm and Q 5 has no band of SWR 1.5, since its least is 1.7778', () => {
    expect(seriesSpans(28.125, 5, 7.1e6, 1.5)).toEqual([]);
    expect(seriesSpans(28.125, 5, 7.1e6, 1.8)).toHaveLength(1);
  });

  it('of 30 ohm and Q 15 at 7.1 MHz is as in the worked example', () => {
    const sweep = sweepOf(seriesCircuit(30, 15, 7.1e6), evenFrequencies(6.8e6, 7.4e6, 121));
    const { minimumSwr, resonances, spans } = summarise(sweep, { swrLimits: [2] });
    expect(minimumSwr?.swr).toBeCloseTo(5 / 3, 9);
    expect(spans[0].lowHz).toBeCloseTo(6_953_946.18803, 2);
    expect(spans[0].highHz).toBeCloseTo(7_249_121.38187, 2);
    expect(resonances).toHaveLength(1);
    expect(resonances[0].kind).toBe('series');
    expect(resonances[0].frequencyHz).toBeCloseTo(7.1e6, 2);
    expect(resonances[0].resistanceOhm).toBeCloseTo(30, 6);
    // Yaghjian and Best's Q of a series circuit at its resonance is its own.
    expect(resonances[0].q).toBeCloseTo(15, 6);
  });

  it('is as wide, when matched, as its Q predicts', () => {
    // FBW = (s - 1)/(Q sqrt s), exact for a series circuit.
    const sweep = sweepOf(seriesCircuit(20, 12, 14e6), evenFrequencies(13e6, 15e6, 201));
    const bandwidth = summarise(sweep).resonances[0].matchedBandwidth;
    expect(bandwidth?.predictedHz).toBeCloseTo(14e6 / (12 * Math.SQRT2), 1);
    expect(bandwidth?.measuredHz).toBeCloseTo(14e6 / (12 * Math.SQRT2), 1);
  });
});

describe('a parallel circuit', () => {
  it('of Q 8 is a parallel resonance of Q 8', () => {
    const sweep = sweepOf(parallelCircuit(200, 8, 7e6), evenFrequencies(6e6, 8e6, 101));
    const { resonances } = summarise(sweep);
    expect(resonances).toHaveLength(1);
    expect(resonances[0].kind).toBe('parallel');
    expect(resonances[0].frequencyHz).toBeCloseTo(7e6, 2);
    expect(resonances[0].resistanceOhm).toBeCloseTo(200, 5);
    expect(resonances[0].q).toBeCloseTo(8, 6);
  });

  it('behind a capacitor resonates in series below it and in parallel near it', () => {
    const circuit = parallelCircuit(2000, 20, 7e6);
    const behind: ImpedanceOf = (f) => {
      const { resistance, reactance } = circuit(f);
      return { resistance, reactance: reactance - 200 * (7e6 / f) };
    };
    const { resonances } = summarise(sweepOf(behind, evenFrequencies(5e6, 8e6, 301)));
    expect(resonances.map(({ kind }) => kind)).toEqual(['series', 'parallel']);
    for (const { frequencyHz } of resonances) {
      expect(behind(frequencyHz).reactance).toBeCloseTo(0, 3);
    }
  });

  it('without loss to speak of passes through infinity and is one resonance, not two', () => {
    const sweep = sweepOf(parallelCircuit(1e7, 2000, 7e6), evenFrequencies(6e6, 8e6, 100));
    const { resonances } = summarise(sweep);
    expect(resonances).toHaveLength(1);
    expect(resonances[0].kind).toBe('parallel');
    expect(resonances[0].frequencyHz).toBeCloseTo(7e6, 0);
  });
});

describe('an antenna whose resistance changes along the band', () => {
  // Z = 28.125 + (f - 7)(46.875 + j62.5), f in MHz. The minimum lies where the resistance over the
  // reference is sqrt((a² r0² + b²)/(a² + b²)), a and b the slopes over the reference: 7.2 MHz.
  const antenna: ImpedanceOf = (f) => ({
    resistance: 28.125 + (f / 1e6 - 7) * 46.875,
    reactance: (f / 1e6 - 7) * 62.5,
  });
  const summary = summarise(sweepOf(antenna, evenFrequencies(6.8e6, 7.7e6, 181)), {
    swrLimits: [2],
  });

  it('resonates at 7.0 MHz with SWR 16/9', () => {
    expect(summary.resonances).toHaveLength(1);
    expect(summary.resonances[0].frequencyHz).toBeCloseTo(7e6, 2);
    expect(summary.resonances[0].swr).toBeCloseTo(16 / 9, 8);
  });

  it('has its lowest SWR of exactly 1.5 at 7.2 MHz, at 37.5 + j12.5 ohm', () => {
    expect(summary.minimumSwr?.frequencyHz).toBeCloseTo(7.2e6, 1);
    expect(summary.minimumSwr?.swr).toBeCloseTo(1.5, 9);
    expect(summary.minimumSwr?.resistanceOhm).toBeCloseTo(37.5, 4);
    expect(summary.minimumSwr?.reactanceOhm).toBeCloseTo(12.5, 4);
  });

  it('has the two 200 kHz apart', () => {
    expect(summary.resonanceOffsetHz).toBeCloseTo(200e3, 1);
  });

  it('is usable at SWR 2 between 7.264 -+ 0.064 sqrt 26 MHz', () => {
    const [span] = summary.spans;
    expect(span.lowHz).toBeCloseTo(1e6 * (7.264 - 0.064 * Math.sqrt(26)), 1);
    expect(span.highHz).toBeCloseTo(1e6 * (7.264 + 0.064 * Math.sqrt(26)), 1);
  });
});

describe('a series circuit behind 45 degrees of line', () => {
  // A lossless line keeps the magnitude, so the minimum stays; the reactance is zero elsewhere:
  // u = k/2 + sqrt(1 + k²/4), k = -+ sqrt(3)/10, with SWR 2 + sqrt 3 at both.
  const load = seriesCircuit(25, 10, 7e6);
  const behindLine: ImpedanceOf = (f) => {
    const { resistance: r, reactance: x } = load(f);
    // Z = Z0 (Z + jZ0)/(Z0 + jZ) for tan 45° = 1.
    const [nr, ni, dr, di] = [r, x + 50, 50 - x, r];
    const d = dr * dr + di * di;
    return {
      resistance: (50 * (nr * dr + ni * di)) / d,
      reactance: (50 * (ni * dr - nr * di)) / d,
    };
  };
  const { minimumSwr, resonances } = summarise(sweepOf(behindLine, evenFrequencies(6e6, 8e6, 201)));

  it('keeps its lowest SWR of 2 at 7 MHz, where the input reads 40 + j30 ohm', () => {
    expect(minimumSwr?.frequencyHz).toBeCloseTo(7e6, 0);
    expect(minimumSwr?.swr).toBeCloseTo(2, 8);
    expect(minimumSwr?.resistanceOhm).toBeCloseTo(40, 4);
    expect(minimumSwr?.reactanceOhm).toBeCloseTo(30, 4);
  });

  it('resonates at 6.42 and 7.63 MHz with SWR 2 + sqrt 3', () => {
    expect(resonances).toHaveLength(2);
    expect(resonances[0].frequencyHz).toBeCloseTo(6_419_983.18231, 0);
    expect(resonances[0].resistanceOhm).toBeCloseTo(13.3974596216, 4);
    expect(resonances[1].frequencyHz).toBeCloseTo(7_632_418.74761, 0);
    expect(resonances[1].resistanceOhm).toBeCloseTo(186.602540378, 3);
    for (const { swr } of resonances) expect(swr).toBeCloseTo(2 + Math.sqrt(3), 6);
  });
});

describe('a series circuit with a stray susceptance at its feed', () => {
  // R 25, Q 10, B 5.6 mS: X = 0 where the antenna's own X = (1 - sqrt(1 - 4B²R²))/(2B) = 3.571428571,
  // the minimum where it is B/(B² + 1/Z0²) = 12.9821958457.
  const load = seriesCircuit(25, 10, 7e6);
  const strayed: ImpedanceOf = (f) => {
    const { resistance: r, reactance: x } = load(f);
    const d = r * r + x * x;
    const [g, b] = [r / d, -x / d + 5.6e-3];
    return { resistance: g / (g * g + b * b), reactance: -b / (g * g + b * b) };
  };
  const { minimumSwr, resonances } = summarise(
    sweepOf(strayed, evenFrequencies(6.8e6, 7.4e6, 121)),
  );

  it('resonates at 1.007168367 of its own frequency with SWR 1.96', () => {
    const series = resonances.filter(({ kind }) => kind === 'series');
    expect(series).toHaveLength(1);
    expect(series[0].frequencyHz / 7e6).toBeCloseTo(1.007168367, 8);
    expect(series[0].swr).toBeCloseTo(1.96, 6);
  });

  it('has its lowest SWR of 1.8546 at 1.02630141 of it', () => {
    expect((minimumSwr?.frequencyHz ?? 0) / 7e6).toBeCloseTo(1.02630141, 7);
    expect(minimumSwr?.swr).toBeCloseTo(1.854599407, 7);
  });
});

describe('a wire dipole of 10 m with 1 mm radius', () => {
  // Induced-EMF method (C. A. Balanis, Antenna Theory, ch. 8), recomputed with 25 digits.
  const wire: ImpedanceOf = (f) => {
    const { re, im } = dipoleImpedance(f, { lengthM: 10, radiusM: 1e-3 });
    return { resistance: re, reactance: im };
  };
  const sweep = sweepOf(wire, evenFrequencies(13.8e6, 15.3e6, 301));

  it('resonates at 14.57036522 MHz with 67.29034 ohm and Q 11.0555', () => {
    const { resonances } = summarise(sweep);
    expect(resonances).toHaveLength(1);
    expect(resonances[0].frequencyHz).toBeCloseTo(14_570_365.22, 1);
    expect(resonances[0].resistanceOhm).toBeCloseTo(67.2903409, 6);
    expect(resonances[0].q).toBeCloseTo(11.05548655, 6);
  });

  it.each([
    [50, 14_551_216.12, 1.34325502],
    [75, 14_580_747.29, 1.11342827],
    [100, 14_622_317.67, 1.47848931],
  ])('has its lowest SWR against %d ohm at %d Hz', (referenceOhm, frequencyHz, swr) => {
    const { minimumSwr } = summarise(sweep, { referenceOhm });
    expect(Math.abs((minimumSwr?.frequencyHz ?? 0) - frequencyHz)).toBeLessThan(0.01);
    expect(minimumSwr?.swr).toBeCloseTo(swr, 8);
  });

  it('is usable at SWR 2 from 14.19991877 to 14.92770758 MHz', () => {
    const [span] = summarise(sweep, { swrLimits: [2] }).spans;
    expect(Math.abs(span.lowHz - 14_199_918.77)).toBeLessThan(0.01);
    expect(Math.abs(span.highHz - 14_927_707.58)).toBeLessThan(0.01);
  });
});
