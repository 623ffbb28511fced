import fc from 'fast-check';
import { afterEach, describe, expect, it } from 'vitest';
import type { Store } from '../../../server/store/port.ts';
import { temporaryFolders } from '../../support/temporary-folders.ts';
import { commands, compareAll } from './commands.ts';
import { antennas, openLedger, type Sabotage } from './ledger-under-test.ts';
import { emptyModel } from './model.ts';

const { newFolder, removeAll } = temporaryFolders();
afterEach(removeAll);

/** Acts in any order, against the service and the model at once. */
function checkAgainstModel(sabotage: Sabotage = () => ({})) {
  const property = fc.asyncProperty(commands, async (acts) => {
    const ledger = await openLedger(newFolder(), sabotage);
    try {
      const { headers } = await ledger.app.call({ url: `/v1/antennas/${antennas[0]}` });
      const model = emptyModel(String(headers.etag));
      await fc.asyncModelRun(() => ({ model, real: ledger }), acts);
      await compareAll(model, ledger);
    } finally {
      await ledger.close();
    }
  });
  return fc.check(property, { numRuns: 6, seed: 20_261_201, endOnFailure: true });
}

describe('the ledger through acts in any order, restarts, backups and restores', () => {
  it('holds what a simple model of it holds', async () => {
    const outcome = await checkAgainstModel();
    expect(outcome.failed ? fc.defaultReportMessage(outcome) : null).toBeNull();
    expect(outcome.numRuns).toBe(6);
  });

  const known = new Map<string, Awaited<ReturnType<Store['findToken']>>>();
  it.each<[string, Sabotage]>([
    [
      'pages that skip a record',
      (store) => ({
        listSweeps: async (club, antenna, page) => {
          const { items, next } = await store().listSweeps(club, antenna, page);
          return { items: page.after === null ? items : items.slice(1), next };
        },
      }),
    ],
    [
      'tokens that outlive their revocation',
      (store) => ({
        findToken: async (secret) => {
          const key = String(secret);
          const found = known.get(key) ?? (await store().findToken(secret));
          known.set(key, found);
          return found;
        },
      }),
    ],
  ])('finds out %s', async (_, sabotage) => {
    const { failed } = await checkAgainstModel(sabotage);
    expect(failed).toBe(true);
  });
});
