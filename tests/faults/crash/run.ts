import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { parseArgs } from 'node:util';
import { killAgainAndAgain } from './kill-again-and-again.ts';

// `npm run crash -- --kills 500 --seed 1`: the long form of the crash test.
const { values } = parseArgs({
  options: {
    kills: { type: 'string', default: '500' },
    seed: { type: 'string', default: '1' },
  },
});
const folder = mkdtempSync(join(tmpdir(), 'sweep-ledger-crash-'));
const say = (line: string) => process.stdout.write(`${line}\n`);
const outcome = await killAgainAndAgain(folder, Number(values.kills), Number(values.seed), say);
for (const fault of outcome.faults) say(fault);
const { kills, acknowledged, sweeps, faults } = outcome;
say(`${kills} kills, ${acknowledged} acknowledged, ${sweeps} sweeps, ${faults.length} faults`);
if (faults.length === 0) rmSync(folder, { recursive: true, force: true });
else say(`The folder is kept: ${folder}`);
process.exitCode = faults.length === 0 ? 0 : 1;
