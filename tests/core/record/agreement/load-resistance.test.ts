import { describe, expect, it } from 'vitest';
import { loadResistanceOhm } from '../../../../core/record/agreement/load-resistance.ts';

const frequencyHz = Float64Array.of(1e6, 2e6, 3e6);

describe('the resistance that a sweep shows of a load', () => {
  it('is the load’s own where the sweep is exact', () => {
    // Γ = (100 - 50) / (100 + 50) = 1/3.
    const reflectionRe = Float64Array.of(1 / 3, 1 / 3, 1 / 3);
    const reflectionIm = new Float64Array(3);
    const sweep = { frequencyHz, referenceOhm: 50, phase: 'signed', reflectionRe, reflectionIm };
    expect(loadResistanceOhm({ ...sweep, phase: 'signed' })).toBeCloseTo(100, 10);
  });

  it('is not moved by one wild point', () => {
    const reflectionRe = Float64Array.of(1 / 3, 0.9, 1 / 3);
    const reflectionIm = new Float64Array(3);
    const sweep = { frequencyHz, referenceOhm: 50, reflectionRe, reflectionIm };
    expect(loadResistanceOhm({ ...sweep, phase: 'unsigned' })).toBeCloseTo(100, 10);
  });

  it('is unknown of an open, and without phase', () => {
    const reflectionRe = Float64Array.of(1, 1, 1);
    const reflectionIm = new Float64Array(3);
    const open = { frequencyHz, referenceOhm: 50, reflectionRe, reflectionIm };
    expect(loadResistanceOhm({ ...open, phase: 'signed' })).toBeNull();
    const reflectionMagnitude = Float64Array.of(0.3, 0.3, 0.3);
    const scalar = { frequencyHz, referenceOhm: 50, reflectionMagnitude };
    expect(loadResistanceOhm({ ...scalar, phase: 'none' })).toBeNull();
  });
});
