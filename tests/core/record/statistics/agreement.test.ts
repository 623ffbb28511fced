import { describe, expect, it } from 'vitest';
import { precision } from '../../../../core/record/statistics/agreement.ts';
import { cochran, grubbs } from '../../../../core/record/statistics/outliers.ts';

/** The tables print three digits, some of them cut off rather than rounded. */
const tableStep = 0.001;

describe('repeatability and reproducibility', () => {
  it("agree with NIST's certified sums of squares for SiRstv", () => {
    // NIST StRD, one-way ANOVA, SiRstv: certified residual standard deviation.
    const result = precision([
      [196.3052, 196.124, 196.189, 196.2569, 196.3403],
      [196.3042, 196.3825, 196.1669, 196.3257, 196.0422],
      [196.1303, 196.2005, 196.2889, 196.0343, 196.1811],
      [196.2795, 196.1748, 196.1494, 196.1485, 195.9885],
      [196.2119, 196.1051, 196.185, 196.0052, 196.209],
    ]);
    expect(result?.mean).toBeCloseTo(196.189156, 9);
    expect(result?.repeatability).toBeCloseTo(0.104076068334656, 12);
    expect(result?.betweenGroups).toBeCloseTo(0.0197723918634, 11);
    expect(result?.reproducibility).toBeCloseTo(0.105937601823, 11);
  });

  it('lose no digits where seven leading ones are the same', () => {
    // The first six values of each instrument of NIST StRD AtmWtAg; recomputed for this part.
    const result = precision([
      [107.8681568, 107.8681465, 107.8681572, 107.8681785, 107.8681446, 107.8681903],
      [107.8681079, 107.8681344, 107.8681513, 107.8681197, 107.8681604, 107.8681385],
    ]);
    const small = precision([
      [568, 465, 572, 785, 446, 903],
      [79, 344, 513, 197, 604, 385],
    ]);
    expect((result?.repeatability ?? 0) * 1e7).toBeCloseTo(small?.repeatability ?? Number.NaN, 4);
  });

  it('take groups of unequal size as ISO 5725-2 does', () => {
    // ISO 5725-2:1994 annex B.1, sulphur in coal, level 1: data and published result (0.690, 0.015,
    // 0.026) from memory; the digits beyond are recomputed.
    const result = precision([
      [0.71, 0.71, 0.7, 0.71],
      [0.69, 0.67, 0.68],
      [0.66, 0.65, 0.69],
      [0.67, 0.65, 0.66],
      [0.7, 0.69, 0.66, 0.71, 0.69],
      [0.73, 0.74, 0.73],
      [0.71, 0.71, 0.69],
      [0.7, 0.65, 0.68],
    ]);
    expect(result?.mean).toBeCloseTo(0.69037037, 8);
    expect(result?.repeatability).toBeCloseTo(0.015116507, 8);
    expect(result?.reproducibility).toBeCloseTo(0.026363792, 8);
  });

  it('are not known from one group or from single measurements', () => {
    expect(precision([[1, 2, 3]])).toBeNull();
    expect(precision([[1], [2], []])).toBeNull();
  });

  it('claim no difference between groups that repeatability explains', () => {
    expect(
      precision([
        [1, 3],
        [3, 1],
        [2, 2],
      ])?.betweenGroups,
    ).toBe(0);
  });
});

describe("Cochran's test", () => {
  // ISO 5725-2:1994, table 4, p = 5 and n = 3: 0.788 (1 %) and 0.684 (5 %); values from memory.
  it('has the tabulated critical values', () => {
    const test = cochran([1, 1, 1, 1, 1], 3);
    expect(Math.abs((test?.critical1 ?? 0) - 0.788)).toBeLessThan(tableStep);
    expect(Math.abs((test?.critical5 ?? 0) - 0.684)).toBeLessThan(tableStep);
    expect(test?.verdict).toBe('none');
  });

  it('names the group whose scatter stands out', () => {
    expect(cochran([1, 1.2, 40, 0.9, 1], 3)).toMatchObject({ verdict: 'outlier', index: 2 });
    expect(cochran([1, 1, 9, 1, 1], 3)).toMatchObject({ verdict: 'straggler', index: 2 });
  });

  it('has nothing to say of one group, single measurements or no scatter', () => {
    expect(cochran([1], 3)).toBeNull();
    expect(cochran([1, 2], 1)).toBeNull();
    expect(cochran([0, 0], 3)).toBeNull();
  });
});

describe("Grubbs' test", () => {
  // ISO 5725-2:1994, table 5, p = 8, one largest or one smallest: 2.274 (1 %), 2.126 (5 %); from memory.
  it('has the tabulated critical values', () => {
    const test = grubbs([1, 2, 3, 4, 5, 6, 7, 8]);
    expect(Math.abs((test?.critical1 ?? 0) - 2.274)).toBeLessThan(tableStep);
    expect(Math.abs((test?.critical5 ?? 0) - 2.126)).toBeLessThan(tableStep);
    expect(test?.verdict).toBe('none');
  });

  it('names the value that stands out, above or below', () => {
    expect(grubbs([5, 5.1, 4.9, 5, 5.2, 4.8, 9])).toMatchObject({ verdict: 'outlier', index: 6 });
    expect(grubbs([1, 5.1, 4.9, 5, 5.2, 4.8, 5])).toMatchObject({ verdict: 'outlier', index: 0 });
  });

  it('has nothing to say of two values or of equal ones', () => {
    expect(grubbs([1, 2])).toBeNull();
    expect(grubbs([3, 3, 3])).toBeNull();
  });
});
