import { describe, expect, it } from 'vitest';
import { findCable } from '../../../core/line/cables.ts';
import { extrapolatedLoss, resolveFeedLine } from '../../../core/line/feed-line.ts';
import { accepted, refusalOf } from './builders.ts';

const stated = {
  cable: 'm17-74-rg213',
  lengthM: 20,
  lengthU95M: 0.1,
  extraLossDb: 0.2,
  choke: false,
};

describe('a stated feed line', () => {
  it('is joined with its cables in order', () => {
    const line = accepted(
      resolveFeedLine([stated, { ...stated, cable: 'window-450', lengthM: 12 }], findCable),
    );
    expect(line.sections.map((section) => section.cable.id)).toEqual([
      'm17-74-rg213',
      'window-450',
    ]);
    expect(line.sections.map((section) => section.lengthM)).toEqual([20, 12]);
    expect(line.assumptions).toEqual([]);
  });

  it('without a section leaves the analyzer at the feed point', () => {
    expect(accepted(resolveFeedLine([], findCable)).sections).toEqual([]);
  });

  it('that nobody described is an error of its own', () => {
    expect(refusalOf(resolveFeedLine(null, findCable))).toBe('line_unknown');
  });

  it.each([
    ['line_length_unknown', { lengthM: null }],
    ['line_length_invalid', { lengthM: -1 }],
    ['line_length_invalid', { lengthU95M: -0.1 }],
    ['line_length_invalid', { lengthM: Number.POSITIVE_INFINITY }],
    ['line_loss_invalid', { extraLossDb: -0.1 }],
    ['cable_unknown', { cable: 'string-and-tins' }],
  ])('is refused as %s with the section at fault', (code, change) => {
    const result = resolveFeedLine([stated, { ...stated, ...change }], findCable);
    expect(result).toMatchObject({ ok: false, error: { code, section: 1 } });
  });

  it('with a choke says that the choke is taken as transparent', () => {
    const line = accepted(resolveFeedLine([{ ...stated, choke: true }], findCable));
    expect(line.assumptions.map((assumption) => assumption.code)).toEqual(['choke_transparent']);
  });

  it('whose length has no half-width gets 5 % and says so', () => {
    const line = accepted(resolveFeedLine([{ ...stated, lengthU95M: null }], findCable));
    expect(line.sections[0].lengthU95M).toBeCloseTo(1, 12);
    expect(line.assumptions.map((assumption) => assumption.code)).toEqual([
      'line_length_half_width_assumed',
    ]);
  });
});

describe('the loss of a cable outside its data', () => {
  const line = accepted(resolveFeedLine([stated, stated], findCable));

  it('is said to be extrapolated, once for each cable', () => {
    const [only, ...rest] = extrapolatedLoss(line, 7e6, 7.2e6);
    expect(only.code).toBe('cable_loss_extrapolated');
    expect(only.detail).toContain('10 to 850 MHz');
    expect(rest).toEqual([]);
    expect(extrapolatedLoss(line, 14e6, 1.3e9)).toHaveLength(1);
  });

  it('is not spoken of inside them', () => {
    expect(extrapolatedLoss(line, 14e6, 14.35e6)).toEqual([]);
  });
});
