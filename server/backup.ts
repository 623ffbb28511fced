import { existsSync } from 'node:fs';
import { runCommand } from './command.ts';
import { ledgerPath } from './store/ledger-path.ts';
import { copyInThread } from './store/sqlite/copy-in-thread.ts';

// `npm run backup -- FILE`: a verified copy of the ledger, whether the service runs or not.
await runCommand('backup', async (file, { dataDir }) => {
  const from = ledgerPath(dataDir);
  if (!existsSync(from)) throw new Error(`There is no ledger in ${dataDir}.`);
  if (existsSync(file)) throw new Error(`${file} is there already; it stays as it is.`);
  await copyInThread({ from, to: file });
  return `Backed up to ${file}: whole and checked.`;
});
