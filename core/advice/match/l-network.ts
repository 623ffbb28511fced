import type { Complex } from '../../line/complex.ts';
import { add, reciprocal } from '../../line/complex.ts';
import type { MatchElement } from './element.ts';

/** Two reactances that turn a load into a resistance. */
export interface LNetwork {
  /** Which part is next to the load. */
  readonly topology: 'shunt_at_load' | 'series_at_load';
  readonly seriesReactanceOhm: number;
  readonly shuntSusceptanceS: number;
}

/**
 * All L-networks that turn `load` into `targetOhm`: up to two of each topology
 * (D. M. Pozar, Microwave Engineering, sec. 5.1; equation numbers from memory). Which topologies
 * exist depends on the load's conductance and resistance, not on its resistance alone.
 */
export function lNetworks(load: Complex, targetOhm: number): readonly LNetwork[] {
  return [...shuntAtLoad(load, targetOhm), ...seriesAtLoad(load, targetOhm)];
}

/** B = {X -+ sqrt(R/Z0) sqrt(R^2 + X^2 - Z0 R)}/(R^2 + X^2), then the reactance left is cancelled. */
function shuntAtLoad(load: Complex, targetOhm: number): readonly LNetwork[] {
  const { re: r, im: x } = load;
  const square = r * r + x * x;
  const inside = square - targetOhm * r;
  if (inside < 0) return [];
  const root = Math.sqrt(r / targetOhm) * Math.sqrt(inside);
  const signs = root === 0 ? [0] : [1, -1];
  return signs.map((sign) => {
    const shuntSusceptanceS = (x + sign * root) / square;
    const left = reciprocal(add(reciprocal(load), { re: 0, im: shuntSusceptanceS }));
    return { topology: 'shunt_at_load', seriesReactanceOhm: -left.im, shuntSusceptanceS };
  });
}

/** X = -+sqrt(R(Z0 - R)) - XL; B = -+sqrt((Z0 - R)/R)/Z0. At R = Z0 the other topology has it all. */
function seriesAtLoad(load: Complex, targetOhm: number): readonly LNetwork[] {
  const { re: r, im: x } = load;
  if (r >= targetOhm) return [];
  const root = Math.sqrt(r * (targetOhm - r));
  return [1, -1].map((sign) => ({
    topology: 'series_at_load',
    seriesReactanceOhm: sign * root - x,
    shuntSusceptanceS: (sign * Math.sqrt((targetOhm - r) / r)) / targetOhm,
  }));
}

/** The parts of an L-network at its design frequency, from load to source; zero parts are left out. */
export function lElements(network: LNetwork, frequencyHz: number): readonly MatchElement[] {
  const series = seriesPart(network.seriesReactanceOhm, frequencyHz);
  const shunt = shuntPart(network.shuntSusceptanceS, frequencyHz);
  return network.topology === 'shunt_at_load' ? [...shunt, ...series] : [...series, ...shunt];
}

const NEGLIGIBLE = 1e-9;

function seriesPart(reactanceOhm: number, frequencyHz: number): readonly MatchElement[] {
  const omega = 2 * Math.PI * frequencyHz;
  if (Math.abs(reactanceOhm) < NEGLIGIBLE) return [];
  return reactanceOhm > 0
    ? [{ kind: 'series_inductor', inductanceH: reactanceOhm / omega }]
    : [{ kind: 'series_capacitor', capacitanceF: -1 / (omega * reactanceOhm) }];
}

function shuntPart(susceptanceS: number, frequencyHz: number): readonly MatchElement[] {
  const omega = 2 * Math.PI * frequencyHz;
  if (Math.abs(susceptanceS) < NEGLIGIBLE) return [];
  return susceptanceS > 0
    ? [{ kind: 'shunt_capacitor', capacitanceF: susceptanceS / omega }]
    : [{ kind: 'shunt_inductor', inductanceH: -1 / (omega * susceptanceS) }];
}
