import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { projectRoot } from '../../server/project-files.ts';

const root = projectRoot();
const lines = readFileSync(join(root, 'Dockerfile'), 'utf8').split('\n');
const instructions = (name: string) =>
  lines.filter((line) => line.startsWith(`${name} `)).map((line) => line.slice(name.length + 1));

describe('the container', () => {
  it('copies nothing that is not there', () => {
    const sources = instructions('COPY')
      .filter((copy) => !copy.startsWith('--from='))
      .flatMap((copy) => copy.split(' ').slice(0, -1));
    expect(sources.length).toBeGreaterThan(5);
    for (const source of sources) expect(existsSync(join(root, source)), source).toBe(true);
  });

  it('builds and runs on the oldest Node.js that the package admits', () => {
    const { engines } = JSON.parse(readFileSync(join(root, 'package.json'), 'utf8'));
    const [, major] = /^>=(\d+)\./.exec(engines.node) ?? [];
    const images = instructions('FROM').map((from) => from.split(' ')[0]);
    expect(new Set(images)).toEqual(new Set([`node:${major}-bookworm-slim`]));
  });

  it('runs as nobody in particular, keeps its data in a volume, and says whether it is well', () => {
    const [user] = instructions('USER');
    expect(user).toMatch(/^[1-9]\d*:[1-9]\d*$/);
    expect(instructions('VOLUME')).toEqual(['/data']);
    expect(instructions('HEALTHCHECK')).toHaveLength(1);
    expect(lines.indexOf(`USER ${user}`)).toBeGreaterThan(lines.indexOf('COPY openapi openapi'));
  });
});
