import { createHash } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { findPlan } from '../../../core/bands/plans.ts';
import { readSweep } from '../../../core/formats/read-sweep.ts';
import { findCable } from '../../../core/line/cables.ts';
import { checkLine } from '../../../core/line/check/check-line.ts';
import { demoClub } from '../../../server/demo/demo-club.ts';
import { demoStories } from '../../../server/demo/stories.ts';

const club = demoClub();

function sha256(bytes: Uint8Array): string {
  return createHash('sha256').update(bytes).digest('hex');
}

const reads = club.uploads.map((upload) => {
  const { bytes, fileName, columns, port } = upload;
  const told = {
    ...(columns === undefined ? {} : { columns }),
    ...(port === undefined ? {} : { port }),
  };
  const read = readSweep(bytes, { fileName, ...told });
  if (!read.ok) throw new Error(`${fileName}: ${read.error.detail}`);
  return { upload, ...read.value };
});

describe('the demo club', () => {
  it('has two sites, ten antennas and three analyzers', () => {
    expect(club.sites).toHaveLength(2);
    expect(club.antennas).toHaveLength(10);
    expect(club.analyzers).toHaveLength(3);
  });

  it('has antennas of many kinds', () => {
    const kinds = new Set(club.antennas.map(({ facts }) => facts.kind));
    for (const kind of [
      'dipole',
      'loaded_dipole',
      'off_centre_fed',
      'vertical_with_radials',
      'small_loop',
      'beam',
      'trap_dipole',
      'vertical',
    ] as const) {
      expect(kinds).toContain(kind);
    }
  });

  it('names only sites, antennas, analyzers, plans and cables that exist', () => {
    const keys = (records: readonly { readonly key: string }[]) => records.map(({ key }) => key);
    for (const { siteKey, facts } of club.antennas) {
      expect(keys(club.sites)).toContain(siteKey);
      const bands = findPlan(facts.plan)?.segments.map(({ band }) => band);
      expect(bands).toEqual(expect.arrayContaining([...facts.designBands]));
      for (const { cable } of facts.feedLine ?? []) expect(findCable(cable)).not.toBeNull();
    }
    for (const { antennaKey, analyzerKey } of club.uploads) {
      expect(keys(club.antennas)).toContain(antennaKey);
      expect(keys(club.analyzers)).toContain(analyzerKey);
    }
  });

  it('has a check of a line before and after it was replaced, which the sweeps went through', () => {
    expect(club.lineChecks).toHaveLength(2);
    const lengths = club.lineChecks.map(({ antennaKey, bytes, tested }) => {
      expect(club.antennas.map(({ key }) => key)).toContain(antennaKey);
      const read = readSweep(bytes);
      if (!read.ok) throw new Error(read.error.detail);
      const cable = findCable(tested.cable ?? '');
      const checked = checkLine(read.value.sweep, { ...tested, cable });
      if (!checked.ok) throw new Error(checked.error.detail);
      return checked.value;
    });
    for (const { lengthM } of lengths) expect(lengthM).toBeCloseTo(22, 1);
    // The aged line was made to lose 2.4 times what its kind does.
    expect(lengths[0].loss?.ratio).toBeGreaterThan(2);
    expect(lengths[1].loss?.ratio).toBeLessThan(1.1);
  });

  it('has keys of lower-case letters, digits and hyphens', () => {
    const keys = [...club.sites, ...club.antennas, ...club.analyzers].map(({ key }) => key);
    expect([club.key, ...keys].every((key) => /^[a-z0-9-]+$/.test(key))).toBe(true);
    expect(new Set(keys).size).toBe(keys.length);
  });

  it('has at least five sweeps of each antenna over two years, ascending in time', () => {
    for (const { key } of club.antennas) {
      const own = club.uploads.filter(({ antennaKey }) => antennaKey === key);
      expect(own.length, key).toBeGreaterThanOrEqual(5);
    }
    const times = club.uploads.map(({ measuredAt }) => measuredAt);
    expect(times).toHaveLength(77);
    expect(times).toEqual(times.toSorted());
    expect(times[0] < '2025-01').toBe(true);
    expect(times.at(-1)?.startsWith('2026-11')).toBe(true);
    expect(times.every((time) => /^\d{4}-\d\d-\d\dT\d\d:\d\d:00Z$/.test(time))).toBe(true);
  });

  it('is the same, byte for byte, each time', () => {
    const again = demoClub().uploads.map(({ bytes }) => sha256(bytes));
    expect(again).toEqual(club.uploads.map(({ bytes }) => sha256(bytes)));
  });

  it('has no file twice', () => {
    expect(new Set(club.uploads.map(({ bytes }) => sha256(bytes))).size).toBe(club.uploads.length);
    expect(new Set(club.uploads.map(({ fileName }) => fileName)).size).toBe(club.uploads.length);
  });

  it('says of every record that it is invented', () => {
    expect(club.name).toContain('(invented)');
    const records = [...club.sites, ...club.antennas, ...club.analyzers];
    for (const { facts } of records) {
      expect(facts.invented).toBe(true);
      expect(facts.name).toContain('(invented)');
      expect(facts.note).toContain('Invented for the demo.');
    }
    expect(club.uploads.every(({ note }) => note.startsWith('Invented for the demo.'))).toBe(true);
  });

  // One or two letters (or a digit and a letter), a digit, up to four letters: ITU Radio
  // Regulations, Article 19, section III (from memory).
  it('holds nothing that looks like a call sign', () => {
    const looksLikeOne = /\b([A-Z]{1,2}|\d[A-Z]|[A-Z]\d)\d[A-Z]{1,4}\b/i;
    expect(looksLikeOne.test('AA0ZZZ')).toBe(true);
    const records = JSON.stringify({ ...club, uploads: [], lineChecks: [] });
    const told = [...club.uploads, ...club.lineChecks].flatMap(({ fileName, note }) => [
      fileName.replace(/\.\w+$/, ''),
      note,
    ]);
    const conditions = club.uploads.map((upload) => upload.conditions);
    for (const text of [records, JSON.stringify(demoStories), ...told, ...conditions]) {
      expect(text.match(looksLikeOne)).toBeNull();
    }
  });
});

describe('the files of the demo club', () => {
  it('are read, all of them', () => {
    expect(reads).toHaveLength(77);
  });

  it('are of every kind that the service takes', () => {
    const formats = reads.map(({ format }) => format);
    for (const format of ['touchstone-1', 'touchstone-2', 'delimited', 'json'] as const) {
      expect(formats.filter((one) => one === format).length, format).toBeGreaterThanOrEqual(3);
    }
    expect(reads.some(({ port }) => port === 1)).toBe(true);
  });

  it('know the phase of the reflection to different degrees', () => {
    const phases = reads.map(({ sweep }) => sweep.phase);
    for (const phase of ['signed', 'unsigned', 'none'] as const) {
      expect(phases.filter((one) => one === phase).length, phase).toBeGreaterThanOrEqual(3);
    }
  });

  it('differ in their grids from analyzer to analyzer', () => {
    const points = (key: string) =>
      new Set(
        reads
          .filter(({ upload }) => upload.analyzerKey === key)
          .map(({ sweep }) => sweep.frequencyHz.length),
      );
    expect(points('handheld')).toEqual(new Set([101]));
    expect(points('logger')).toEqual(new Set([201]));
    expect(points('bench')).toEqual(new Set([401, 801]));
  });

  it('are read as they were meant: the columns told are those used', () => {
    for (const { upload, columns } of reads)
      expect(columns !== undefined).toBe(upload.columns !== undefined);
  });
});
