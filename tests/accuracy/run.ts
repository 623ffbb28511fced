import { writeFileSync } from 'node:fs';
import { parseArgs } from 'node:util';
import { benchCase, runBench } from './bench.ts';
import { driftBench } from './drift-bench.ts';
import type { Estimator } from './estimator.ts';
import { fitModel } from './model-fit.ts';
import { families } from './models/families.ts';
import { reportOf } from './report.ts';
import { scoreCase } from './scores.ts';
import { summaryEstimator } from './summary-estimator.ts';
import { tableOf } from './table.ts';

const REPORT_SEED = 20_261_201;
const CASES = 3000;
const QUICK_CASES = 400;
const STATIONS = 60;
const QUICK_STATIONS = 6;

const usage = `npm run accuracy -- [--json FILE] [--seed N] [--cases N] [--family NAME] [--quick] [--case N]

  --json FILE     write every figure with its details
  --seed N        other random antennas (default ${REPORT_SEED}; tune on others only)
  --cases N       sweeps as files carry them (default ${CASES}); a quarter as many run without noise
  --family NAME   one of ${families.map((family) => family.name).join(', ')}
  --quick         ${QUICK_CASES} cases
  --case N        one case of the seed in full: its antenna, its truth, what was answered
`;

function main(): number {
  const { values } = parseArgs({
    options: {
      json: { type: 'string' },
      seed: { type: 'string' },
      cases: { type: 'string' },
      family: { type: 'string' },
      case: { type: 'string' },
      quick: { type: 'boolean', default: false },
      help: { type: 'boolean', default: false },
    },
  });
  if (values.help) {
    console.log(usage);
    return 0;
  }
  const seed = Number(values.seed ?? REPORT_SEED);
  const cases = Number(values.cases ?? (values.quick ? QUICK_CASES : CASES));
  const family = families.find((candidate) => candidate.name === values.family)?.name;
  const familyUnknown = values.family !== undefined && family === undefined;
  if (!Number.isInteger(seed) || !(cases >= 1) || familyUnknown) {
    console.error(usage);
    return 2;
  }
  if (values.case !== undefined) {
    showCase(seed, Number(values.case), summaryEstimator);
    return 0;
  }
  const started = performance.now();
  const plan = family === undefined ? { seed, cases } : { seed, cases, family };
  const stations = values.quick ? QUICK_STATIONS : STATIONS;
  const ofStations = family === undefined ? driftBench({ seed, stations }) : {};
  const report = { ...reportOf(runBench(plan, summaryEstimator)), ...ofStations };
  console.log(`Accuracy bench: seed ${seed}, ${cases} cases, ${family ?? 'all families'}`);
  console.log(tableOf(report));
  console.log(`${((performance.now() - started) / 1000).toFixed(0)} s`);
  if (values.json !== undefined) writeFileSync(values.json, `${JSON.stringify(report, null, 2)}\n`);
  return 0;
}

/** Everything about one case, as files carry it and exact. */
function showCase(seed: number, index: number, estimator: Estimator): void {
  for (const imperfection of ['as_in_files', 'exact'] as const) {
    const bench = benchCase(seed, index, imperfection);
    const { antenna, referenceOhm, stepHz, noise, rounding, sigma, truth } = bench;
    const score = scoreCase(
      bench,
      estimator(bench.sweep),
      imperfection === 'exact' ? null : fitModel(bench),
    );
    const { comparisons, resonances, edges, minimumLost, verdicts } = score;
    console.log(
      JSON.stringify(
        {
          imperfection,
          family: antenna.family.name,
          parameters: antenna.parameters,
          referenceOhm,
          sweep: [bench.sweep.frequencyHz[0], stepHz, bench.clean.length],
          noise,
          rounding,
          sigma,
          truth,
          answered: comparisons.map(({ bench: _, ...comparison }) => comparison),
          resonances,
          edges,
          minimumLost,
          verdicts,
          reported: estimator(bench.sweep).resonances,
        },
        null,
        1,
      ),
    );
  }
}

process.exitCode = main();
