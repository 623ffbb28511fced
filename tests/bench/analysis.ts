import { swrCurve } from '../../core/analysis/refined-swr.ts';
import { summarise } from '../../core/analysis/summarise.ts';
import { findPlan } from '../../core/bands/plans.ts';
import { usableBands } from '../../core/bands/usable.ts';
import type { ComplexSweep } from '../../core/sweep.ts';
import { type Figure, sideBySide } from './measure.ts';
import { typicalSweep } from './typical-sweep.ts';

/** The full summary against one plain pass that computes SWR, and how it grows with the points. */
export function analysisFigures(): readonly Figure[] {
  const typical = sweepOf(1601);
  const longest = sweepOf(100_001);
  const summaryAndPass = sideBySide(
    () => summarise(typical),
    () => swrPass(typical),
  );
  const growth = sideBySide(
    () => summarise(longest),
    () => summarise(typical),
    { rounds: 7 },
  );
  const curve = swrCurve(typical);
  const plan = findPlan('iaru-r1');
  if (plan === null) throw new Error('The plan is gone.');
  const designBands = ['80m', '40m', '30m', '20m', '17m', '15m', '12m', '10m'];
  const usable = sideBySide(
    () => usableBands(curve, plan, { maxSwr: 2, designBands }),
    () => swrPass(typical),
  );
  return [
    {
      key: 'analyse_vs_pass',
      value: summaryAndPass.ratio,
      aim: '<= 12',
      unit: 'summary / plain pass',
      detail: `1601 points: ${summaryAndPass.firstUs.toFixed(0)} us, pass ${summaryAndPass.secondUs.toFixed(1)} us`,
    },
    {
      key: 'usable_us',
      value: usable.firstUs,
      aim: 'report',
      unit: 'us',
      detail: 'usable report of 8 bands from an analysed sweep',
    },
    {
      key: 'analysis_scale',
      value: (growth.ratio * 1601) / 100_001,
      aim: '<= 1.3',
      unit: 'time per point at 100,001 / at 1601',
      detail: `100,001 points: ${(growth.firstUs / 1000).toFixed(1)} ms`,
    },
  ];
}

function sweepOf(points: number): ComplexSweep {
  const { frequencyHz, reflectionRe, reflectionIm } = typicalSweep(points);
  return {
    phase: 'signed',
    frequencyHz: Float64Array.from(frequencyHz),
    reflectionRe: Float64Array.from(reflectionRe),
    reflectionIm: Float64Array.from(reflectionIm),
    referenceOhm: 50,
  };
}

function swrPass({ reflectionRe, reflectionIm }: ComplexSweep): Float64Array {
  const swr = new Float64Array(reflectionRe.length);
  for (let i = 0; i < swr.length; i++) {
    const magnitude = Math.sqrt(reflectionRe[i] ** 2 + reflectionIm[i] ** 2);
    swr[i] = (1 + magnitude) / (1 - magnitude);
  }
  return swr;
}
