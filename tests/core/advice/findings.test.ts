import { describe, expect, it } from 'vitest';
import type { FindingFacts } from '../../../core/advice/finding.ts';
import { findings } from '../../../core/advice/findings.ts';
import type { Resonance, Summary, SwrMinimum } from '../../../core/analysis/summary.ts';
import type { BandUse, UsableReport, UsableVerdict } from '../../../core/bands/usable-report.ts';
import { evenly, impedanceSweep, resonator } from '../line/builders.ts';
import { plainSummary } from '../line/plain-summary.ts';

const facts: FindingFacts = {
  kind: 'dipole',
  maxSwr: 2,
  designBands: ['40m'],
  aims: [],
  lineFlags: [],
};
const moved = [{ code: 'line_moves_resonance', detail: 'The line is long.' }];

/** A summary of a resonator, as it stands at the feed point. */
function antenna(resistanceOhm: number, resonanceHz: number, q = 15): Summary {
  const sweep = impedanceSweep(evenly(6.6e6, 7.8e6, 601), resonator(resistanceOhm, resonanceHz, q));
  return { ...plainSummary(sweep), plane: 'feed_point' };
}

function band(verdict: UsableVerdict, name = '40m'): BandUse {
  return {
    band: name as BandUse['band'],
    lowHz: 7e6,
    highHz: 7.2e6,
    ranges: [{ lowHz: 7e6, highHz: 7.2e6 }],
    permission: 'general',
    verdict,
    marginal: false,
    detail: '',
    sweptFraction: 1,
    usableFraction: 0.4,
    worstSwr: 3,
    worstSwrHz: 7.2e6,
    worstSwrU95: null,
    minimumSwr: 1.2,
    minimumSwrHz: 7e6,
    spans: [],
    segments: [],
  };
}

function usable(...bands: readonly BandUse[]): UsableReport {
  return { plan: 'itu-r1', licence: null, maxSwr: 2, bands, cautions: [] };
}

const told = (
  summary: Summary,
  verdict: UsableVerdict = 'partly_usable',
  change: Partial<FindingFacts> = {},
) => findings(summary, usable(band(verdict)), { ...facts, ...change });
const codes = (list: readonly { code: string }[]) => list.map((each) => each.code);

describe('an antenna that is right', () => {
  it('is left alone', () => {
    const [only, ...rest] = told(antenna(50, 7.1e6), 'usable');
    expect(only).toMatchObject({ code: 'band_usable', next: 'leave', band: '40m' });
    expect(rest).toEqual([]);
  });

  it('but narrower than its band can be widened by a match', () => {
    const [only] = told(antenna(50, 7.1e6));
    expect(only).toMatchObject({ code: 'band_wider_than_antenna', next: 'match' });
    expect(only.detail).toContain('40 %');
  });
});

describe('a resonance beside its band', () => {
  it('below it asks for shortening, with the distance', () => {
    const [only] = told(antenna(50, 6.93e6));
    expect(only).toMatchObject({ code: 'resonance_below', next: 'trim' });
    expect(only.detail).toBe('Resonance is 70 kHz below 40m: shorten it.');
  });

  it('above it asks for lengthening', () => {
    const [only] = told(antenna(50, 7.3e6));
    expect(only.detail).toBe('Resonance is 100 kHz above 40m: lengthen it.');
  });

  it('of a loaded antenna asks for a trial, and of a small loop for its capacitor', () => {
    const low = antenna(50, 6.93e6);
    expect(told(low, 'partly_usable', { kind: 'trap_dipole' })[0].detail).toContain('small trial');
    expect(told(low, 'partly_usable', { kind: 'small_loop' })[0].detail).toContain('capacitor up');
    const high = antenna(50, 7.3e6);
    expect(told(high, 'not_usable', { kind: 'small_loop' })[0].detail).toContain('capacitor down');
  });

  it('by less than its half-width is taken as inside', () => {
    const summary = antenna(50, 6.999e6);
    const unsure: Resonance = { ...summary.resonances[0], frequencyU95Hz: 2000 };
    expect(codes(told({ ...summary, resonances: [unsure] }))).toEqual(['band_wider_than_antenna']);
    const unknown: Resonance = { ...unsure, frequencyU95Hz: null };
    expect(codes(told({ ...summary, resonances: [unknown] }))).toEqual(['resonance_below']);
  });

  it('is the nearest of several', () => {
    const summary = antenna(50, 7.25e6);
    const [own] = summary.resonances;
    const resonances = [{ ...own, frequencyHz: 6.7e6 }, own, { ...own, frequencyHz: 7.5e6 }];
    expect(told({ ...summary, resonances })[0].detail).toContain('50 kHz above');
  });

  it('of a dipole is a series one, of an end-fed wire it may be a parallel one', () => {
    const summary = antenna(50, 6.93e6);
    const parallel: Resonance = { ...summary.resonances[0], kind: 'parallel' };
    const turned = { ...summary, resonances: [parallel] };
    expect(codes(told(turned))).toEqual(['no_resonance_near']);
    expect(codes(told(turned, 'partly_usable', { kind: 'end_fed' }))).toEqual(['resonance_below']);
  });

  it('too far away is none of that band', () => {
    const summary = antenna(50, 7.1e6);
    const far = { ...summary.resonances[0], frequencyHz: 5e6 };
    const [only] = told({ ...summary, resonances: [far] });
    expect(only).toMatchObject({ code: 'no_resonance_near', next: 'match' });
  });
});

describe('the resistance at resonance', () => {
  it('far below the reference is a match, not a trim', () => {
    const [only] = told(antenna(22, 7.1e6));
    expect(only).toMatchObject({ code: 'resistance_low', next: 'match' });
    expect(only.detail).toBe('R at resonance is 22 ohm: a match, not a trim, brings it to 50 ohm.');
  });

  it('far above it is one as well, beside a trim where both are wrong', () => {
    expect(codes(told(antenna(180, 7.3e6)))).toEqual(['resonance_above', 'resistance_high']);
  });

  it('that is unknown gives no finding', () => {
    const summary = antenna(22, 7.1e6);
    const bare = { ...summary.resonances[0], resistanceOhm: null };
    expect(codes(told({ ...summary, resonances: [bare] }))).toEqual(['band_wider_than_antenna']);
  });
});

describe('a sweep through a line', () => {
  const shack = (summary: Summary): Summary => ({ ...summary, plane: 'measured' });

  it('is judged by its least SWR, not by the resonance that the line moved', () => {
    const list = told(shack(antenna(40, 6.93e6)), 'partly_usable', { lineFlags: moved });
    expect(codes(list)).toEqual(['swr_minimum_below']);
    expect(list[0].detail).toContain('The least SWR is 70 kHz below 40m');
  });

  it('whose least SWR is above the limit needs a match', () => {
    const list = told(shack(antenna(18, 7.1e6)), 'not_usable', { lineFlags: moved });
    expect(list[0]).toMatchObject({ code: 'minimum_above_limit', next: 'match' });
  });

  it('that hides the mismatch asks for a measurement at the feed point', () => {
    const lineFlags = [...moved, { code: 'loss_hides_mismatch', detail: 'It is hidden.' }];
    const [first] = told(shack(antenna(40, 7.1e6)), 'usable', { lineFlags });
    expect(first).toMatchObject({ code: 'loss_hides_mismatch', next: 'measure_at_feed_point' });
  });

  it('without a minimum near the band has nothing to say of the place', () => {
    const summary = shack(antenna(40, 7.1e6));
    const list = told({ ...summary, swrMinima: [] }, 'partly_usable', { lineFlags: moved });
    expect(codes(list)).toEqual(['no_minimum_near']);
  });

  it('takes the nearest of several minima', () => {
    const summary = shack(antenna(40, 7.25e6));
    const [own] = summary.swrMinima;
    const swrMinima: SwrMinimum[] = [
      { ...own, frequencyHz: 6.7e6 },
      own,
      { ...own, frequencyHz: 7.6e6 },
    ];
    const list = told({ ...summary, swrMinima }, 'partly_usable', { lineFlags: moved });
    expect(list[0].detail).toContain('50 kHz above');
  });
});

describe('findings of the whole sweep', () => {
  it('suspect loss where SWR is flat and low over a wide sweep', () => {
    const sweep = impedanceSweep(evenly(6e6, 8e6, 101), () => ({ re: 60, im: 5 }));
    const list = told(plainSummary(sweep), 'usable');
    expect(list[0]).toMatchObject({ code: 'swr_flat_and_low', next: 'line_check' });
    const narrow = impedanceSweep(evenly(7e6, 7.2e6, 101), () => ({ re: 60, im: 5 }));
    expect(codes(told(plainSummary(narrow), 'usable'))).not.toContain('swr_flat_and_low');
  });

  it('see no antenna where everything comes back, and then say nothing else', () => {
    const open = antenna(5000, 7.1e6, 0.01);
    expect(codes(told(open, 'not_usable'))).toEqual(['no_antenna_seen']);
    expect(codes(told({ ...open, minimumSwr: null }, 'not_usable'))).toEqual(['no_antenna_seen']);
  });

  it('ask for a wider sweep where SWR still falls at its end', () => {
    const list = told(antenna(50, 8.2e6), 'not_usable');
    expect(list[0]).toMatchObject({ code: 'minimum_outside_sweep', next: 'sweep_again' });
  });

  it('ask for phase where it was not measured, and judge by the least SWR', () => {
    const summary: Summary = { ...antenna(40, 6.93e6), phase: 'none', resonances: [] };
    expect(codes(told(summary))).toEqual(['phase_not_measured', 'swr_minimum_below']);
  });

  it('tell least SWR and resonance apart where they differ', () => {
    const summary = { ...antenna(50, 7.1e6), resonanceOffsetHz: -60e3 };
    const [first] = told(summary, 'usable');
    expect(first.code).toBe('minimum_is_not_resonance');
    expect(first.detail).toContain('60 kHz below');
    expect(told({ ...summary, resonanceOffsetHz: 40e3 }, 'usable')[0].detail).toContain('above');
    expect(codes(told({ ...summary, resonanceOffsetHz: 5e3 }, 'usable'))).toEqual(['band_usable']);
  });
});

describe('a segment that the antenna is meant for', () => {
  const aims = [{ name: 'the lower 40 kHz', lowHz: 7e6, highHz: 7.04e6 }];

  it('is judged beside its band', () => {
    const list = told(antenna(50, 7.11e6), 'usable', { aims });
    expect(codes(list)).toEqual(['band_usable', 'resonance_above']);
    expect(list[1]).toMatchObject({ band: 'the lower 40 kHz', next: 'trim' });
    expect(list[1].detail).toBe('Resonance is 70 kHz above the lower 40 kHz: lengthen it.');
  });

  it('is not spoken of where the antenna stands right for it', () => {
    expect(codes(told(antenna(50, 7.02e6), 'usable', { aims }))).toEqual(['band_usable']);
  });
});

describe('a band that was swept in part', () => {
  it('is to be swept as a whole before anything else is said', () => {
    const [only] = told(antenna(50, 7.1e6), 'partly_swept');
    expect(only).toMatchObject({ code: 'band_partly_swept', next: 'sweep_again' });
  });
});

describe('the bands that are judged', () => {
  it('are those the antenna is meant for, or all where none is named', () => {
    const report = usable(band('usable'), band('not_swept', '20m'));
    const summary = antenna(50, 7.1e6);
    expect(codes(findings(summary, report, facts))).toEqual(['band_usable']);
    const all = findings(summary, report, { ...facts, designBands: [] });
    expect(codes(all)).toEqual(['band_usable', 'band_not_swept']);
    expect(all[1].next).toBe('sweep_again');
  });

  it('are none without a report', () => {
    expect(findings(antenna(50, 7.1e6), null, facts)).toEqual([]);
  });
});
