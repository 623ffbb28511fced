import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { ConfigError, configSchema, readConfig } from '../../server/config.ts';

describe('the configuration', () => {
  it('listens on this machine only, unless told otherwise', () => {
    expect(readConfig({}).host).toBe('127.0.0.1');
    expect(readConfig({ HOST: '0.0.0.0' }).host).toBe('0.0.0.0');
  });

  it('takes the public URL from host and port, unless told otherwise', () => {
    expect(readConfig({ PORT: '9000' }).publicUrl).toBe('http://127.0.0.1:9000');
    expect(readConfig({ HOST: '0.0.0.0' }).publicUrl).toBe('http://127.0.0.1:8080');
    expect(readConfig({ HOST: '::1' }).publicUrl).toBe('http://[::1]:8080');
    expect(readConfig({ PUBLIC_URL: 'https://club.example/' }).publicUrl).toBe(
      'https://club.example',
    );
  });

  it('counts an empty variable as not set', () => {
    expect(readConfig({ PORT: '', DEMO: '' })).toEqual(readConfig({}));
  });

  it('names every fault at once', () => {
    const read = () => readConfig({ PORT: 'eighty', DEMO: 'maybe', MAX_UPLOAD_BYTES: '1' });
    expect(read).toThrow(ConfigError);
    expect(read).toThrow(/PORT.*DEMO.*MAX_UPLOAD_BYTES/s);
  });

  it('wants a public URL with a port that is not known beforehand', () => {
    expect(() => readConfig({ PORT: '0' })).toThrow(/PUBLIC_URL/);
    expect(readConfig({ PORT: '0', PUBLIC_URL: 'http://club.example' }).port).toBe(0);
  });

  it('refuses a public URL that is not of the web', () => {
    expect(() => readConfig({ PUBLIC_URL: 'file:///etc' })).toThrow(ConfigError);
  });

  it('cannot be changed afterwards', () => {
    expect(Object.isFrozen(readConfig({}))).toBe(true);
  });
});

describe('the table of settings in README.md', () => {
  const readme = readFileSync(new URL('../../README.md', import.meta.url), 'utf8');
  const rows = [...readme.matchAll(/^\| `([A-Z_]+)` \| ([^|]*) \|/gm)].map(
    ([, name, byDefault]) => [name, byDefault.trim()] as const,
  );

  it('has the settings of the schema, all of them and no other', () => {
    expect(rows.map(([name]) => name).sort()).toEqual(Object.keys(configSchema.shape).sort());
    expect(rows.length).toBeGreaterThan(5);
  });

  it('has the defaults of the schema', () => {
    const defaults = configSchema.parse({});
    for (const [name, byDefault] of rows) {
      const actual = new Map<string, unknown>(Object.entries(defaults)).get(name);
      if (actual === undefined) expect(byDefault).not.toMatch(/^`/);
      else expect(byDefault).toBe(`\`${actual}\``);
    }
  });
});
