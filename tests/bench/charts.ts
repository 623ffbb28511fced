import { analyse } from '../../core/analysis/analysis.ts';
import { curveOf } from '../../core/analysis/refined-swr.ts';
import { summariseAnalysis } from '../../core/analysis/summarise.ts';
import { findPlan } from '../../core/bands/plans.ts';
import { usableBands } from '../../core/bands/usable.ts';
import { swrChart } from '../../core/chart/swr-chart.ts';
import { writeSweepJson } from '../../core/formats/json/write-sweep-json.ts';
import type { ComplexSweep } from '../../core/sweep.ts';
import { type Figure, sideBySide } from './measure.ts';
import { typicalSweep } from './typical-sweep.ts';

/** Drawing an analysed sweep against writing the same points as JSON. */
export function chartFigures(): readonly Figure[] {
  const { frequencyHz, reflectionRe, reflectionIm } = typicalSweep(1601);
  const sweep: ComplexSweep = {
    phase: 'signed',
    frequencyHz: Float64Array.from(frequencyHz),
    reflectionRe: Float64Array.from(reflectionRe),
    reflectionIm: Float64Array.from(reflectionIm),
    referenceOhm: 50,
  };
  const analysis = analyse(sweep, null);
  const plan = findPlan('iaru-r1');
  if (plan === null) throw new Error('The plan is gone.');
  const chart = {
    heading: { title: 'Bench', subtitle: 'invented', tableUrl: null },
    sweep,
    summary: summariseAnalysis(analysis, {
      plane: 'measured',
      assumptions: [],
      swrLimits: [2],
    }),
    report: usableBands(curveOf(analysis), plan, { maxSwr: 2 }),
  };
  const style = { widthPx: 720, heightPx: 432, theme: 'light', numbers: 'en' } as const;
  const { firstUs, secondUs, ratio } = sideBySide(
    () => swrChart(chart, style),
    () => writeSweepJson(sweep, { note: 'Bench' }),
  );
  return [
    {
      key: 'chart_svg_us',
      value: firstUs,
      aim: 'report',
      unit: 'us',
      detail: `SWR chart of 1601 points, ${swrChart(chart, style).length} bytes`,
    },
    {
      key: 'chart_svg_vs_json',
      value: ratio,
      aim: '<= 3',
      unit: 'chart / JSON of the points',
      detail: `JSON ${secondUs.toFixed(0)} us`,
    },
  ];
}
