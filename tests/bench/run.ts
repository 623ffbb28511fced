import { parseArgs } from 'node:util';
import { analysisFigures } from './analysis.ts';
import { chartFigures } from './charts.ts';
import { type Figure, printFigures } from './measure.ts';
import { pageFigures } from './pages.ts';
import { readingFigures } from './reading.ts';
import { serviceFigures } from './service.ts';

const { values } = parseArgs({
  options: {
    json: { type: 'string' },
    only: { type: 'string' },
  },
});

const groups: Record<string, () => Promise<readonly Figure[]> | readonly Figure[]> = {
  reading: readingFigures,
  analysis: analysisFigures,
  charts: chartFigures,
  pages: pageFigures,
  service: serviceFigures,
};

const figures: Figure[] = [];
for (const [name, measure] of Object.entries(groups)) {
  if (values.only !== undefined && values.only !== name) continue;
  figures.push(...(await measure()));
}

printFigures(figures, values.json);
