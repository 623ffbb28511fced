import { describe, expect, it } from 'vitest';
import { makeTestApp } from '../../support/test-app.ts';
import { fuzz } from './fuzz.ts';
import { operations } from './requests.ts';

describe('requests made from the document, right ones and wrong ones', () => {
  it('are all answered as the document says, and none by a fault of the service', async () => {
    const outcome = await fuzz(makeTestApp, 690, 20_261_201);
    expect(outcome.faults).toEqual([]);
    expect(outcome.requests).toBeGreaterThanOrEqual(690);
    // Else they would try the refusals alone.
    expect(operations.length).toBeGreaterThanOrEqual(68);
    expect(outcome.succeeded.size).toBeGreaterThanOrEqual(50);
  });

  it('find out a route that throws', async () => {
    const failingSites = () =>
      makeTestApp({
        around: (store) =>
          new Proxy(store, {
            get: (target, name) => {
              if (name === 'listEditables') throw new Error('sabotaged');
              const method = Reflect.get(target, name);
              return typeof method === 'function' ? method.bind(target) : method;
            },
          }),
      });
    const { faults } = await fuzz(failingSites, 69, 1);
    expect(faults.join('\n')).toMatch(/answers 500.*\n {2}GET \/v1\/due:/);
  });
});
