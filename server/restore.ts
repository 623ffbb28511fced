import { mkdirSync } from 'node:fs';
import { runCommand } from './command.ts';
import { ledgerPath } from './store/ledger-path.ts';
import { restoreLedger } from './store/sqlite/restore-ledger.ts';

// `npm run restore -- FILE`: a backup as the ledger of a folder that has none.
await runCommand('restore', async (file, { dataDir }) => {
  mkdirSync(dataDir, { recursive: true, mode: 0o700 });
  restoreLedger(file, ledgerPath(dataDir));
  return `Restored into ${dataDir}. Start the service to use it.`;
});
