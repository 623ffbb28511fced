import { describe, expect, it } from 'vitest';
import { summarise } from '../../../core/analysis/summarise.ts';
import { findCable } from '../../../core/line/cables.ts';
import { feedPointSummary } from '../../../core/line/feed-point-summary.ts';
import { growHalfWidths } from '../../../core/line/grown-half-widths.ts';
import { fromFeedPoint } from '../../../core/line/line.ts';
import {
  accepted,
  evenly,
  exactCable,
  impedanceSweep,
  lineOf,
  refusalOf,
  resonator,
  section,
} from './builders.ts';
import { plainSummary } from './plain-summary.ts';

const coax = findCable('m17-74-rg213') ?? exactCable();
const antenna = impedanceSweep(evenly(6.6e6, 7.6e6, 1001), resonator(38, 7.1e6, 12));

describe('a summary at the feed point', () => {
  const line = {
    ...lineOf(section(coax, 17.3, { lengthU95M: 0.2 })),
    assumptions: [{ code: 'choke_transparent', detail: 'A choke is there.' }],
  };
  const measured = accepted(fromFeedPoint(antenna, line));
  const { summary, conditioning } = accepted(feedPointSummary(measured, line, 0.002, plainSummary));

  it('finds the resonance of the antenna, which is not the one at the shack', () => {
    expect(summary.plane).toBe('feed_point');
    expect(summary.resonances).toHaveLength(1);
    expect(summary.resonances[0].frequencyHz).toBeCloseTo(7.1e6, -1);
    const shack = plainSummary(measured).resonances.map((each) => each.frequencyHz);
    for (const hz of shack) expect(Math.abs(hz - 7.1e6)).toBeGreaterThan(20e3);
  });

  it('has half-widths that grew by what is uncertain of the line', () => {
    expect(summary.resonances[0].frequencyU95Hz).toBeGreaterThan(1e3);
    expect(summary.resonances[0].resistanceU95Ohm).toBeGreaterThan(0.1);
    expect(summary.minimumSwr?.swrU95).toBeGreaterThan(0.005);
    expect(summary.spans[0].lowU95Hz).toBeGreaterThan(100);
    expect(summary.spans[0].highU95Hz).toBeGreaterThan(100);
  });

  it('has half-widths that cover the truth when the line is off within its own', () => {
    const off = lineOf(section({ ...coax, velocityFactor: 0.655 }, 17.2, { lengthU95M: 0.2 }));
    const wrong = accepted(fromFeedPoint(antenna, off));
    const seen = accepted(feedPointSummary(wrong, line, 0.002, plainSummary)).summary.resonances[0];
    expect(Math.abs(seen.frequencyHz - 7.1e6)).toBeGreaterThan(1e3);
    expect(Math.abs(seen.frequencyHz - 7.1e6)).toBeLessThan(seen.frequencyU95Hz ?? 0);
  });

  it('leaves unknown half-widths unknown and carries what was assumed', () => {
    expect(summary.resonances[0].qU95).toBeNull();
    expect(summary.assumptions.map((each) => each.code)).toEqual([
      'choke_transparent',
      'cable_loss_extrapolated',
    ]);
    expect(conditioning.impedance).toBe('good');
    expect(summary.cautions).toEqual([]);
  });

  it("assumes a half-width of the analyzer's where none is stated, and says so", () => {
    const answer = accepted(feedPointSummary(measured, line, null, plainSummary)).summary;
    expect(answer.assumptions.map((each) => each.code)).toEqual([
      'choke_transparent',
      'cable_loss_extrapolated',
      'reflection_half_width_assumed',
    ]);
  });

  it('by the summary of the service finds the antenna behind the line within its half-widths', () => {
    const few = impedanceSweep(evenly(6.6e6, 7.6e6, 201), resonator(38, 7.1e6, 12));
    const off = lineOf(section({ ...coax, velocityFactor: 0.663 }, 17.2, { lengthU95M: 0.2 }));
    const there = accepted(fromFeedPoint(few, off));
    const answer = accepted(feedPointSummary(there, line, null, summarise)).summary;
    const [resonance] = answer.resonances;
    expect(answer.resonances).toHaveLength(1);
    expect(resonance.frequencyU95Hz).toBeGreaterThan(1e3);
    expect(Math.abs(resonance.frequencyHz - 7.1e6)).toBeLessThan(resonance.frequencyU95Hz ?? 0);
    expect(Math.abs((resonance.resistanceOhm ?? 0) - 38)).toBeLessThan(
      resonance.resistanceU95Ohm ?? 0,
    );
    const exact = accepted(
      feedPointSummary(accepted(fromFeedPoint(few, line)), line, null, summarise),
    );
    expect(exact.summary.resonances[0].frequencyHz).toBeCloseTo(7.1e6, 0);
  });

  it('is that of the antenna exactly where the line is known exactly', () => {
    const exact = lineOf(section(exactCable({ k1: 0.6 }), 17.3));
    const there = accepted(fromFeedPoint(antenna, exact));
    const answer = accepted(feedPointSummary(there, exact, 0, plainSummary)).summary;
    expect(answer.resonances[0].frequencyU95Hz).toBe(100);
    expect(answer.resonances[0].frequencyHz).toBeCloseTo(
      plainSummary(antenna).resonances[0].frequencyHz,
      3,
    );
  });

  it('of a long sweep has the half-widths of a thinner one', () => {
    const many = impedanceSweep(evenly(6.6e6, 7.6e6, 4001), resonator(38, 7.1e6, 12));
    const there = accepted(fromFeedPoint(many, line));
    const answer = accepted(feedPointSummary(there, line, 0.002, plainSummary)).summary;
    const ratio =
      (answer.resonances[0].frequencyU95Hz ?? 0) / (summary.resonances[0].frequencyU95Hz ?? 1);
    expect(ratio).toBeCloseTo(1, 3);
    expect(answer.span.points).toBe(4001);
  });

  it('says first of all what makes it worthless', () => {
    const long = lineOf(section(exactCable({ k1: 6 }), 70));
    const far = accepted(fromFeedPoint(antenna, long));
    const answer = accepted(feedPointSummary(far, long, 0.01, plainSummary)).summary;
    expect(answer.cautions[0].code).toBe('line_hides_antenna');
  });

  it('does not exist without phase, or where an end of an interval cannot be removed', () => {
    const unsigned = { ...measured, phase: 'unsigned' } as const;
    expect(refusalOf(feedPointSummary(unsigned, line, 0, plainSummary))).toBe('phase_needed');
    for (const loss of [57, 50]) {
      const lossy = exactCable({ k1: loss, lossU95Fraction: 0.3 });
      const far = lineOf(section(lossy, 38), section(lossy, 0.05));
      const refused = feedPointSummary(measured, far, 0, plainSummary);
      expect(refusalOf(refused)).toBe('line_loss_too_great');
    }
  });
});

describe('half-widths grown by pairs of summaries', () => {
  const summary = plainSummary(antenna);

  it('become unknown where a pair has no counterpart', () => {
    const bare = { ...summary, minimumSwr: null, swrMinima: [], resonances: [], spans: [] };
    const grown = growHalfWidths(summary, summary, [{ plus: bare, minus: bare }]);
    expect(grown.minimumSwr?.frequencyU95Hz).toBeNull();
    expect(grown.resonances[0].frequencyU95Hz).toBeNull();
    expect(grown.spans[0].lowU95Hz).toBeNull();
    const noBase = growHalfWidths(summary, bare, []);
    expect(noBase.resonances[0].frequencyU95Hz).toBeNull();
    expect(
      growHalfWidths(bare, summary, [{ plus: summary, minus: summary }]).minimumSwr,
    ).toBeNull();
  });

  it('add up as a root sum of squares', () => {
    const moved = (by: number) => ({
      ...summary,
      resonances: summary.resonances.map((each) => ({
        ...each,
        frequencyHz: each.frequencyHz + by,
      })),
    });
    const pair = { plus: moved(300), minus: moved(-200) };
    const grown = growHalfWidths(summary, summary, [pair, { plus: moved(-400), minus: moved(0) }]);
    expect(grown.resonances[0].frequencyU95Hz).toBeCloseTo(Math.hypot(100, 300, 400), 6);
  });

  it('take the nearest counterpart of the same kind, and spans of the same limit', () => {
    const [own] = summary.resonances;
    const others = [
      { ...own, frequencyHz: own.frequencyHz + 10, kind: 'parallel' as const },
      { ...own, frequencyHz: own.frequencyHz + 900 },
      { ...own, frequencyHz: own.frequencyHz + 30 },
    ];
    const [span] = summary.spans;
    const spans = [
      { ...span, maxSwr: 3, lowHz: span.lowHz - 9000 },
      { ...span, lowHz: span.lowHz - 400 },
      { ...span, lowHz: span.lowHz - 500, highHz: span.lowHz - 450 },
    ];
    const other = { ...summary, resonances: others, spans };
    const grown = growHalfWidths(summary, summary, [{ plus: other, minus: other }]);
    expect(grown.resonances[0].frequencyU95Hz).toBeCloseTo(Math.hypot(100, 30), 6);
    expect(grown.spans[0].lowU95Hz).toBeCloseTo(Math.hypot(100, 400), 6);
  });

  it('leave the open ends of a span alone', () => {
    const open = {
      ...summary,
      spans: [
        { ...summary.spans[0], lowOpen: true, lowU95Hz: null, highOpen: true, highU95Hz: null },
      ],
    };
    const grown = growHalfWidths(open, open, [{ plus: summary, minus: summary }]);
    expect(grown.spans[0]).toMatchObject({ lowU95Hz: null, highU95Hz: null });
  });
});
