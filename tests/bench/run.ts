import { writeFileSync } from 'node:fs';
import { parseArgs } from 'node:util';
import { analysisFigures } from './analysis.ts';
import { type Figure, meetsAim } from './measure.ts';
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
  service: serviceFigures,
};

const figures: Figure[] = [];
for (const [name, measure] of Object.entries(groups)) {
  if (values.only !== undefined && values.only !== name) continue;
  figures.push(...(await measure()));
}

console.table(
  figures.map((figure) => ({
    key: figure.key,
    value: Number(figure.value.toPrecision(4)),
    unit: figure.unit,
    aim: figure.aim,
    met: { true: 'yes', false: 'no', null: '' }[String(meetsAim(figure))],
    detail: figure.detail,
  })),
);

if (values.json !== undefined) {
  const byKey = Object.fromEntries(
    figures.map(({ key, value, aim, unit, detail }) => [key, { value, aim, unit, detail }]),
  );
  writeFileSync(values.json, `${JSON.stringify(byKey, null, 2)}\n`);
}
