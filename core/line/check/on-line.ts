import type { ComplexSweep } from '../../sweep.ts';
import type { Cable } from '../cable.ts';
import { add, divide, multiply, subtract } from '../complex.ts';
import { propagation } from '../propagation.ts';

/**
 * The reflection re the cable's own complex impedance: a uniform line then shows nothing but its
 * end, G' = (G + k)/(1 + k G) with k = (R - Zc)/(R + Zc). `referenceOhm` becomes the nominal one.
 */
export function referredToCable(sweep: ComplexSweep, cable: Cable): ComplexSweep {
  const reflectionRe = sweep.reflectionRe.slice();
  const reflectionIm = sweep.reflectionIm.slice();
  const reference = { re: sweep.referenceOhm, im: 0 };
  for (let i = 0; i < reflectionRe.length; i++) {
    const { characteristic } = propagation(cable, sweep.frequencyHz[i]);
    const k = divide(subtract(reference, characteristic), add(reference, characteristic));
    const g = { re: reflectionRe[i], im: reflectionIm[i] };
    const referred = divide(add(g, k), add({ re: 1, im: 0 }, multiply(k, g)));
    reflectionRe[i] = referred.re;
    reflectionIm[i] = referred.im;
  }
  return { ...sweep, referenceOhm: cable.characteristicOhm, reflectionRe, reflectionIm };
}
