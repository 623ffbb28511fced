import { describe, expect, it } from 'vitest';
import { negotiate } from '../../../server/http/accept.ts';

const offered = ['application/json', 'text/csv', 'text/plain'] as const;

describe('Accept', () => {
  it.each([
    [undefined, 'application/json'],
    ['', 'application/json'],
    ['*/*', 'application/json'],
    ['text/csv', 'text/csv'],
    ['TEXT/CSV', 'text/csv'],
    ['text/*', 'text/csv'],
    ['text/plain;q=0.5, text/csv;q=0.4', 'text/plain'],
    ['application/json;q=0, */*', 'text/csv'],
    // RFC 9110, section 12.5.1: the most specific range that takes the type counts.
    ['text/*;q=0.9, text/csv;q=0.1, application/json;q=0.5', 'text/plain'],
    ['text/csv; charset=utf-8; q=1', 'text/csv'],
  ] as const)('%s gets %s', (accept, type) => {
    expect(negotiate(accept, offered)).toBe(type);
  });

  it.each(['image/png', 'text/csv;q=0', 'application/json;q=2'])('%s gets nothing', (accept) => {
    expect(() => negotiate(accept, offered)).toThrow(
      expect.objectContaining({ slug: 'not-acceptable' }),
    );
  });
});
