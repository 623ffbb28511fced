import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { assign, forbidden } from '../../../core/record/assignment.ts';

describe('pairing at the least cost', () => {
  it('gives up the cheapest pair where the sum is less without it', () => {
    // By hand: 1 + 100 on the diagonal, 2 + 3 across.
    expect(
      assign(
        [
          [1, 2],
          [3, 100],
        ],
        2,
        1000,
      ),
    ).toEqual([1, 0]);
  });

  it('leaves a row alone where a partner would cost more than two that stay alone', () => {
    expect(assign([[9]], 1, 4)).toEqual([null]);
    expect(assign([[7]], 1, 4)).toEqual([0]);
  });

  it('never makes a pair that must not be', () => {
    expect(assign([[forbidden, forbidden]], 2, 5)).toEqual([null]);
  });

  it('has nothing to pair without rows or without columns', () => {
    expect(assign([], 3, 1)).toEqual([]);
    expect(assign([[], []], 0, 1)).toEqual([null, null]);
  });

  it('is as cheap as the cheapest of all pairings', () => {
    const cost = fc.oneof(fc.integer({ min: 0, max: 20 }), fc.constant(forbidden));
    const alone = 6;
    fc.assert(
      fc.property(
        fc
          .tuple(fc.integer({ min: 1, max: 4 }), fc.integer({ min: 1, max: 4 }))
          .chain(([rows, columns]) =>
            fc.array(fc.array(cost, { minLength: columns, maxLength: columns }), {
              minLength: rows,
              maxLength: rows,
            }),
          ),
        (costs) => {
          const columns = costs[0].length;
          const found = assign(costs, columns, alone);
          const used = found.filter((column) => column !== null);
          expect(new Set(used).size).toBe(used.length);
          expect(total(costs, found, columns, alone)).toBe(cheapest(costs, columns, alone));
        },
      ),
    );
  });
});

function total(
  costs: readonly (readonly number[])[],
  columnOf: readonly (number | null)[],
  columns: number,
  alone: number,
): number {
  let sum = 0;
  let pairs = 0;
  columnOf.forEach((column, row) => {
    if (column === null) return;
    sum += costs[row][column];
    pairs += 1;
  });
  return sum + alone * (costs.length + columns - 2 * pairs);
}

/** By trying them all. */
function cheapest(costs: readonly (readonly number[])[], columns: number, alone: number): number {
  let least = Number.POSITIVE_INFINITY;
  const tryFrom = (chosen: readonly (number | null)[]): void => {
    if (chosen.length === costs.length) {
      least = Math.min(least, total(costs, chosen, columns, alone));
      return;
    }
    tryFrom([...chosen, null]);
    for (let column = 0; column < columns; column++) {
      if (!chosen.includes(column)) tryFrom([...chosen, column]);
    }
  };
  tryFrom([]);
  return least;
}
