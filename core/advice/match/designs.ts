import type { Complex } from '../../line/complex.ts';
import { LIGHT_M_PER_S } from '../../line/propagation.ts';
import type { MatchElement } from './element.ts';
import { lElements, lNetworks } from './l-network.ts';
import { quarterWaves, seriesSections } from './line-sections.ts';
import type { MatchKind, MatchRequest } from './match-request.ts';
import { singleStubs } from './single-stub.ts';
import { standardLineOhm, standardRatios } from './standard-values.ts';

/** A network for one frequency, parts from load to source. */
export interface Design {
  readonly kind: MatchKind;
  readonly elements: readonly MatchElement[];
}

/** From here a line is taken for a balanced pair, into which a stub can be cut in series. */
const BALANCED_LINE_OHM = 200;

/** Every network of the kinds offered that matches `load` at `designHz`; transformers come as near as they do. */
export function designs(load: Complex, designHz: number, request: MatchRequest): readonly Design[] {
  const { targetOhm, velocityFactor } = request;
  const wavelengthM = (velocityFactor * LIGHT_M_PER_S) / designHz;
  const line = (characteristicOhm: number, wavelengths: number): MatchElement => ({
    kind: 'line',
    characteristicOhm,
    lengthM: wavelengths * wavelengthM,
    velocityFactor,
  });
  const placements =
    targetOhm < BALANCED_LINE_OHM ? ['shunt' as const] : (['shunt', 'series'] as const);
  const stubs = placements
    .flatMap((placement) => singleStubs(load, targetOhm, placement))
    .map(({ placement, end, distance, length }): Design => {
      const stub = { characteristicOhm: targetOhm, lengthM: length * wavelengthM, velocityFactor };
      return {
        kind: end === 'open' ? 'open_stub' : 'short_stub',
        elements: [line(targetOhm, distance), { kind: `${placement}_stub`, end, ...stub }],
      };
    });
  const sections = standardLineOhm
    .filter((ohm) => ohm !== targetOhm)
    .flatMap((ohm) => seriesSections(load, targetOhm, ohm))
    .map(
      ({ distance, length, sectionOhm }): Design => ({
        kind: 'series_section',
        elements: [line(targetOhm, distance), line(sectionOhm, length)],
      }),
    );
  return [
    ...lNetworks(load, targetOhm).map(
      (network): Design => ({ kind: 'l_network', elements: lElements(network, designHz) }),
    ),
    ...quarterWaves(load, targetOhm).map(
      ({ distance, sectionOhm }): Design => ({
        kind: 'quarter_wave',
        elements: [line(targetOhm, distance), line(sectionOhm, 0.25)],
      }),
    ),
    ...sections,
    ...stubs,
    ...standardRatios
      .flatMap((ratio) => [ratio, 1 / ratio])
      .map(
        (impedanceRatio): Design => ({
          kind: 'transformer',
          elements: [{ kind: 'transformer', impedanceRatio }],
        }),
      ),
  ];
}
