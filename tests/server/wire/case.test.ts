import { describe, expect, it } from 'vitest';
import { toCamelCase, toSnakeCase } from '../../../server/wire/case.ts';

const inCode = {
  frequencyU95Hz: 1,
  atEdge: false,
  feedLine: [{ lengthU95M: null, extraLossDb: 0.2 }],
  designBands: ['20m'],
  q: 1,
};
const onWire = {
  frequency_u95_hz: 1,
  at_edge: false,
  feed_line: [{ length_u95_m: null, extra_loss_db: 0.2 }],
  design_bands: ['20m'],
  q: 1,
};

describe('the names of fields', () => {
  it('are in snake_case on the wire, units kept', () => {
    expect(toSnakeCase(inCode)).toEqual(onWire);
  });

  it('come back as they were', () => {
    expect(toCamelCase(onWire)).toEqual(inCode);
  });
});
