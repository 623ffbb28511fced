import { execFileSync, spawnSync } from 'node:child_process';
import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, describe, expect, it } from 'vitest';
import { reflectionMagnitude } from '../../core/sweep.ts';
import { taken } from '../core/formats/touchstone/reading.ts';
import { Random } from '../support/random.ts';
import { temporaryFolders } from '../support/temporary-folders.ts';

// Source: scikit-rf 0.15.4, a general-purpose network library, as Debian carries it.
const python = '/usr/bin/python3';
const isThere = spawnSync(python, ['-c', 'import skrf']).status === 0;
if (!isThere)
  console.warn('scikit-rf is not installed (python3-scikit-rf): its comparison is skipped.');

interface TheirAnswer {
  readonly frequency_hz: number[];
  readonly re: number[];
  readonly im: number[];
  readonly reference_ohm: number;
  readonly minimum_swr: number;
  readonly minimum_hz: number;
}

const formats = {
  RI: (re: number, im: number) => [re, im],
  MA: (re: number, im: number) => [Math.hypot(re, im), (Math.atan2(im, re) * 180) / Math.PI],
  DB: (re: number, im: number) => [
    20 * Math.log10(Math.hypot(re, im)),
    (Math.atan2(im, re) * 180) / Math.PI,
  ],
} as const;

const { newFolder, removeAll } = temporaryFolders();
afterAll(removeAll);

function makeFile(format: keyof typeof formats, reference: number): { path: string; text: string } {
  const random = new Random(reference * 7 + format.charCodeAt(0));
  const rows = Array.from({ length: 201 }, (_, i) => {
    const magnitude = random.uniform(0.02, 0.98);
    const angle = random.uniform(-Math.PI, Math.PI);
    const pair = formats[format](magnitude * Math.cos(angle), magnitude * Math.sin(angle));
    return `${(13.9 + i * 0.0025).toFixed(4)} ${pair.map((x) => x.toFixed(9)).join(' ')}`;
  });
  const text = `! made for a comparison\n# MHz S ${format} R ${reference}\n${rows.join('\n')}\n`;
  const path = join(newFolder(), `${format}-${reference}.s1p`);
  writeFileSync(path, text);
  return { path, text };
}

describe.skipIf(!isThere)('the reader and a general-purpose network library', () => {
  const cases = (['RI', 'MA', 'DB'] as const).flatMap((format) =>
    [50, 75, 300].map((reference) => ({ format, reference, ...makeFile(format, reference) })),
  );
  const script = fileURLToPath(new URL('./scikit_rf_check.py', import.meta.url));
  const output = isThere
    ? execFileSync(python, ['-W', 'ignore', script, ...cases.map(({ path }) => path)], {
        encoding: 'utf8',
      })
    : '[]';
  // The library may print a word about optional packages first.
  const theirs: readonly TheirAnswer[] = JSON.parse(output.trim().split('\n').at(-1) ?? '[]');

  it.each(cases.map((one, i) => [one.format, one.reference, i] as const))(
    'see the same in %s at %d ohm',
    (_, reference, i) => {
      const { sweep } = taken(cases[i].text);
      const their = theirs[i];
      expect(their.reference_ohm).toBe(reference);
      expect(sweep.referenceOhm).toBe(reference);
      expect(their.re).toHaveLength(sweep.frequencyHz.length);
      for (let point = 0; point < their.re.length; point++) {
        expect(Math.abs(sweep.reflectionRe[point] - their.re[point])).toBeLessThan(1e-12);
        expect(Math.abs(sweep.reflectionIm[point] - their.im[point])).toBeLessThan(1e-12);
        expect(Math.abs(sweep.frequencyHz[point] / their.frequency_hz[point] - 1)).toBeLessThan(
          1e-15,
        );
      }
      const magnitude = reflectionMagnitude(sweep);
      const lowest = magnitude.indexOf(Math.min(...magnitude));
      const swr = (1 + magnitude[lowest]) / (1 - magnitude[lowest]);
      expect(Math.abs(swr - their.minimum_swr)).toBeLessThan(1e-12);
      expect(Math.abs(sweep.frequencyHz[lowest] - their.minimum_hz)).toBeLessThan(1e-6);
    },
  );
});
