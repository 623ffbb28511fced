import { describe, expect, it } from 'vitest';
import { feedPointStress, lineStress, powerCautions } from '../../../core/advice/power.ts';
import { accepted, refusalOf } from '../line/builders.ts';

describe('voltage and current at a feed point', () => {
  it.each([
    // I = sqrt(P/R), V = I |Z|: recomputed
    [100, 73.13, 42.5, 1.169370715, 98.90862746],
    [100, 50, 0, Math.SQRT2, 70.71067812],
    [100, 10, -1000, 3.16227766, 3162.43577],
    [400, 35, -900, 3.380617019, 3044.855146],
    [1500, 3000, 0, Math.SQRT1_2, 2121.320344],
  ])('at %d W into %d + j%d ohm', (powerW, re, im, current, voltage) => {
    const stress = accepted(feedPointStress({ re, im }, powerW));
    expect(stress.currentA).toBeCloseTo(current, 8);
    expect(stress.voltageV).toBeCloseTo(voltage, 5);
    expect(stress.voltagePeakV).toBeCloseTo(voltage * Math.SQRT2, 4);
    expect(stress.currentPeakA).toBeCloseTo(current * Math.SQRT2, 8);
  });

  it.each([
    ['power_not_positive', { re: 50, im: 0 }, 0],
    ['power_not_positive', { re: 50, im: 0 }, Number.NaN],
    ['resistance_not_positive', { re: -5, im: 10 }, 100],
  ])('are refused as %s', (code, impedance, powerW) => {
    expect(refusalOf(feedPointStress(impedance, powerW))).toBe(code);
  });
});

describe('the voltage maximum on a line', () => {
  it.each([
    // Vmax = sqrt(P Z0 s), Vmin = sqrt(P Z0/s), Imax = sqrt(P s/Z0): recomputed
    [100, 50, 3, 122.474487139, 40.8248290464, 2.44948974278],
    [400, 450, 20, 1897.3665961, 94.8683298051, 4.21637021356],
  ])('at %d W, %d ohm, SWR %d', (powerW, ohm, swr, most, least, current) => {
    const stress = accepted(lineStress(ohm, swr, powerW));
    expect(stress.largestVoltageV).toBeCloseTo(most, 6);
    expect(stress.smallestVoltageV).toBeCloseTo(least, 7);
    expect(stress.largestCurrentA).toBeCloseTo(current, 9);
    expect(stress.largestVoltagePeakV).toBeCloseTo(most * Math.SQRT2, 5);
  });

  it.each([
    ['power_not_positive', 50, 2, -1],
    ['resistance_not_positive', 0, 2, 100],
    ['swr_below_one', 50, 0.9, 100],
    ['swr_below_one', 50, Number.POSITIVE_INFINITY, 100],
  ])('is refused as %s', (code, ohm, swr, powerW) => {
    expect(refusalOf(lineStress(ohm, swr, powerW))).toBe(code);
  });
});

describe('the cautions beside power', () => {
  it('leave exposure to the rules of the place and declare nothing safe', () => {
    const exposure = powerCautions.find((caution) => caution.code === 'power_exposure_local');
    expect(exposure?.detail).toMatch(/set locally/);
    expect(exposure?.detail).toMatch(/differ by country/);
    expect(exposure?.detail).toMatch(/declare nothing safe/);
    expect(powerCautions).toHaveLength(4);
  });
});
