import { describe, expect, it } from 'vitest';
import { swrCurve } from '../../../core/analysis/refined-swr.ts';
import { summarise } from '../../../core/analysis/summarise.ts';
import type { Summary } from '../../../core/analysis/summary.ts';
import type { SwrCurve } from '../../../core/analysis/swr-curve.ts';
import { usableBands } from '../../../core/bands/usable.ts';
import type { BandUse } from '../../../core/bands/usable-report.ts';
import { readSweep } from '../../../core/formats/read-sweep.ts';
import type { DemoUpload } from '../../../server/demo/club.ts';
import { demoClub } from '../../../server/demo/demo-club.ts';
import {
  demoStories,
  isUnderWay,
  lineReplaced,
  suddenFault,
  wetOnly,
} from '../../../server/demo/stories.ts';
import { knownPlan } from '../../core/bands/known-plan.ts';

const club = demoClub();

function uploadsOf(antennaKey: string, analyzerKey?: string): readonly DemoUpload[] {
  const own = club.uploads.filter(
    (upload) =>
      upload.antennaKey === antennaKey &&
      (analyzerKey === undefined || upload.analyzerKey === analyzerKey),
  );
  expect(own.length).toBeGreaterThan(1);
  return own;
}

/** Analysed once: several stories look at the same sweep. */
const curves = new Map<DemoUpload, SwrCurve>();

function curveOf(upload: DemoUpload): SwrCurve {
  const known = curves.get(upload);
  if (known !== undefined) return known;
  const curve = swrCurve(sweepOf(upload));
  curves.set(upload, curve);
  return curve;
}

function sweepOf({ bytes, columns, port, fileName }: DemoUpload) {
  const told = {
    ...(columns === undefined ? {} : { columns }),
    ...(port === undefined ? {} : { port }),
  };
  const read = readSweep(bytes, { fileName, ...told });
  if (!read.ok) throw new Error(read.error.detail);
  return read.value.sweep;
}

function summaryOf(upload: DemoUpload): Summary {
  return summarise(sweepOf(upload), { swrLimits: [2] });
}

function swrAt(upload: DemoUpload, frequencyHz: number): number {
  return curveOf(upload).extremes(frequencyHz, frequencyHz)?.worstSwr ?? Number.NaN;
}

function bandOf(upload: DemoUpload, band: string): BandUse | undefined {
  const { bands } = usableBands(curveOf(upload), knownPlan('iaru-r1'), { maxSwr: 2 });
  return bands.find((use) => use.band === band);
}

function minimumHz(upload: DemoUpload): number {
  return summaryOf(upload).minimumSwr?.frequencyHz ?? Number.NaN;
}

function mean(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}

describe('the stories of the demo club', () => {
  it('are each told of an antenna or an analyzer that exists', () => {
    const keys = [...club.antennas, ...club.analyzers].map(({ key }) => key);
    for (const { antennaKey, analyzerKey } of demoStories) {
      expect(keys).toContain(antennaKey ?? analyzerKey);
    }
    expect(demoStories.length).toBeGreaterThanOrEqual(5);
  });

  it('begin and end when they say', () => {
    expect(isUnderWay(suddenFault, '2026-01-16T23:59:59Z')).toBe(false);
    expect(isUnderWay(suddenFault, '2026-01-17T00:00:00Z')).toBe(true);
    expect(isUnderWay(suddenFault, '2026-04-11T00:00:00Z')).toBe(false);
  });
});

describe('the loaded dipole for 20 m', () => {
  it('has its lowest SWR about 100 kHz from the nearest zero of reactance, by the bench', () => {
    for (const upload of uploadsOf('hilltop-20m', 'bench')) {
      const { minimumSwr, resonances, resonanceOffsetHz } = summaryOf(upload);
      expect(Math.abs(resonanceOffsetHz ?? 0)).toBeGreaterThan(80_000);
      expect(Math.abs(resonanceOffsetHz ?? 0)).toBeLessThan(120_000);
      expect(minimumSwr?.swr).toBeLessThan(1.35);
      for (const { swr } of resonances) expect(Math.abs((swr ?? 0) - 2)).toBeLessThan(0.15);
    }
  });

  it('claims no resonance where the handheld did not know the sign of the reactance', () => {
    const [first, later] = uploadsOf('hilltop-20m', 'handheld').map(summaryOf);
    expect(first).toMatchObject({ phase: 'unsigned', resonances: [], resonanceOffsetHz: null });
    expect(later.phase).toBe('signed');
    expect(later.resonances).toHaveLength(2);
  });
});

describe('the wire dipole for 40 m', () => {
  it('falls by 0.5 to 0.7 % in two years', () => {
    const resonanceHz = uploadsOf('hilltop-40m', 'bench').map(
      (upload) => summaryOf(upload).resonances[0].frequencyHz,
    );
    const change = resonanceHz[resonanceHz.length - 1] / resonanceHz[0] - 1;
    expect(change).toBeLessThan(-0.005);
    expect(change).toBeGreaterThan(-0.007);
  });
});

describe('the beam', () => {
  it('moves by more than 300 kHz in the fault and comes back with the repair', () => {
    const uploads = uploadsOf('boathouse-beam');
    const faulty = uploads.filter(({ measuredAt }) => isUnderWay(suddenFault, measuredAt));
    const sound = uploads.filter((upload) => !faulty.includes(upload));
    expect(faulty).toHaveLength(2);
    expect(sound).toHaveLength(7);
    const soundHz = mean(sound.map(minimumHz));
    for (const upload of sound) expect(Math.abs(minimumHz(upload) - soundHz)).toBeLessThan(30_000);
    for (const upload of faulty) expect(minimumHz(upload) - soundHz).toBeGreaterThan(300_000);
  });

  it('is usable on its whole band when sound and on a part when not', () => {
    const verdicts = uploadsOf('boathouse-beam').map((upload) => bandOf(upload, '15m')?.verdict);
    expect(verdicts.filter((verdict) => verdict === 'usable')).toHaveLength(7);
    expect(verdicts.filter((verdict) => verdict === 'partly_usable')).toHaveLength(2);
  });
});

describe('the off-centre-fed wire', () => {
  it('changes only in wet weather since its box leaks', () => {
    const at20m = (upload: DemoUpload) => swrAt(upload, 14_200_000);
    const [first, ...others] = uploadsOf('hilltop-ocf');
    let changed = 0;
    for (const upload of others) {
      const leaks = upload.conditions.startsWith('wet') && isUnderWay(wetOnly, upload.measuredAt);
      if (leaks) changed++;
      expect(Math.abs(at20m(upload) - at20m(first)) > 0.3, upload.measuredAt).toBe(leaks);
    }
    expect(changed).toBe(3);
  }, 60_000);
});

describe('the vertical', () => {
  it('has a higher SWR on wet ground, which loses less', () => {
    const uploads = uploadsOf('hilltop-vertical', 'bench');
    const least = (isWet: boolean) =>
      uploads
        .filter(({ conditions }) => conditions.startsWith('wet') === isWet)
        .map((upload) => summaryOf(upload).minimumSwr?.swr ?? Number.NaN);
    expect(Math.min(...least(true))).toBeGreaterThan(Math.max(...least(false)) + 0.1);
  });
});

describe('the ground plane for 2 m', () => {
  it('shows a higher SWR with the new line than with the old', () => {
    for (const upload of uploadsOf('boathouse-2m')) {
      const swr = summaryOf(upload).minimumSwr?.swr ?? Number.NaN;
      expect(swr > 1.28, upload.measuredAt).toBe(isUnderWay(lineReplaced, upload.measuredAt));
    }
  });
});

describe('the dipole for 10 m', () => {
  it('was trimmed by more than half a megahertz', () => {
    const [before, after] = uploadsOf('boathouse-10m', 'handheld').map(minimumHz);
    expect(after - before).toBeGreaterThan(450_000);
    expect(after - before).toBeLessThan(700_000);
  });

  it('is swept in part only', () => {
    for (const upload of uploadsOf('boathouse-10m')) {
      expect(bandOf(upload, '10m')?.sweptFraction).toBeCloseTo(12 / 17, 6);
    }
  });
});

describe('the field handheld', () => {
  it('reads about 0.3 % higher than the bench on the comparison day', () => {
    for (const key of ['hilltop-40m', 'hilltop-vertical', 'boathouse-10m']) {
      const onDay = (analyzer: string) =>
        uploadsOf(key, analyzer).filter(({ measuredAt }) => measuredAt.startsWith('2026-05-16'));
      const crossing = (upload: DemoUpload) => summaryOf(upload).resonances[0].frequencyHz;
      const handheldHz = mean(onDay('handheld').map(crossing));
      const benchHz = mean(onDay('bench').map(crossing));
      expect(handheldHz / benchHz - 1, key).toBeGreaterThan(0.002);
      expect(handheldHz / benchHz - 1, key).toBeLessThan(0.004);
    }
  });
});

describe('the small loop', () => {
  it('is usable on a part of its band, elsewhere each time', () => {
    const uploads = uploadsOf('boathouse-loop');
    for (const upload of uploads) expect(bandOf(upload, '20m')?.verdict).toBe('partly_usable');
    const tunedHz = uploads.map(minimumHz);
    expect(Math.max(...tunedHz) - Math.min(...tunedHz)).toBeGreaterThan(50_000);
  });
});

describe('the trap dipole', () => {
  it('serves a part of each of its two bands', () => {
    for (const upload of uploadsOf('boathouse-trap')) {
      for (const band of ['40m', '20m']) {
        const use = bandOf(upload, band);
        expect(use?.sweptFraction).toBe(1);
        expect(use?.usableFraction).toBeGreaterThan(0.4);
      }
    }
  }, 60_000);
});
