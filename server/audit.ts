import { runCommand } from './command.ts';
import { auditHead } from './store/sqlite/audit-head.ts';

// `npm run audit -- FILE`: follows the audit trail of a ledger or backup, and prints where it ends.
await runCommand('audit', async (file) => {
  const { entries, hash } = auditHead(file);
  return `The audit trail holds: ${entries} entries, head ${hash}.`;
});
