import { describe, expect, it } from 'vitest';
import { attenuationDbPer100M } from '../../../core/line/attenuation.ts';
import { cables, findCable } from '../../../core/line/cables.ts';

describe('the built-in cables', () => {
  it('are found by id and by alias', () => {
    expect(findCable('m17-74-rg213')?.name).toBe('M17/74-RG213');
    expect(findCable('coax-50-pe-10mm')?.id).toBe('m17-74-rg213');
    expect(findCable('no-such-cable')).toBeNull();
  });

  it('have ids and aliases that are unique and plain', () => {
    const names = cables.flatMap((cable) => [cable.id, ...cable.aliases]);
    expect(names.length).toBeGreaterThanOrEqual(13);
    expect(new Set(names).size).toBe(names.length);
    for (const name of names) expect(name).toMatch(/^[a-z0-9]+(-[a-z0-9]+)*$/);
  });

  it('say of every loss where it was read, or that it is recalled', () => {
    const losses = cables.flatMap((cable) => cable.losses);
    expect(losses.length).toBeGreaterThanOrEqual(60);
    for (const loss of losses) expect(loss.verified).toMatch(/^(read in: |value from memory)/);
  });

  it('fit their nominal losses to a residual that is kept and below their stated half-width', () => {
    expect(cables.length).toBeGreaterThanOrEqual(13);
    for (const cable of cables) {
      const { residualRms, residualLargest } = cable.attenuation;
      expect(residualRms, cable.id).toBeGreaterThan(0);
      expect(residualLargest, cable.id).toBeLessThanOrEqual(cable.lossU95Fraction);
    }
  });

  it('do not fit limits and figures whose source contradicts itself', () => {
    const rg213 = findCable('m17-74-rg213');
    expect(rg213?.losses.filter((loss) => loss.use !== 'nominal')).toHaveLength(2);
    expect(rg213?.attenuation.highHz).toBe(850e6);
  });

  it('lose more at higher frequencies and are ordinary lines', () => {
    for (const cable of cables) {
      expect(attenuationDbPer100M(cable.attenuation, 30e6)).toBeGreaterThan(
        attenuationDbPer100M(cable.attenuation, 3e6),
      );
      expect(cable.velocityFactor).toBeGreaterThan(0.6);
      expect(cable.velocityFactor).toBeLessThan(1);
      expect(cable.velocityFactor + cable.velocityFactorU95).toBeLessThan(1);
    }
  });
});
