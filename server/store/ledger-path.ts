import { join } from 'node:path';

/** The database file in the service's data folder. */
export function ledgerPath(dataDir: string): string {
  return join(dataDir, 'ledger.sqlite');
}
