import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { parseArgs } from 'node:util';
import { addTestAntenna, end, freePort, startService, tokenOf } from '../built-service.ts';
import { type Gauges, readGauges } from './gauges.ts';
import { bounds, judge } from './judge.ts';
import { startLoad } from './load.ts';

// `npm run soak -- --minutes 60`: the built service under mixed load. The first fifth is warm-up.
const { values } = parseArgs({ options: { minutes: { type: 'string', default: '60' } } });
const minutes = Number(values.minutes);
const readings = 100;
const say = (line: string) => process.stdout.write(`${line}\n`);

const folder = mkdtempSync(join(tmpdir(), 'sweep-ledger-soak-'));
const service = startService(folder, await freePort(), {
  LOG_LEVEL: 'warn',
  // As `npm start` runs it.
  NODE_OPTIONS: '--max-semi-space-size=4',
});
await service.listening;
const { pid } = service.child;
if (pid === undefined) throw new Error('The service has no process.');
const token = tokenOf(service);
await addTestAntenna(service.url, token);
const load = startLoad(service.url, token);
const gauges: Gauges[] = [];
for (let i = 1; i <= readings; i++) {
  await pause((minutes * 60_000) / readings);
  gauges.push(readGauges(pid, folder, (i * minutes) / readings));
}
await load.stop();
await end(service, 'SIGTERM');
rmSync(folder, { recursive: true, force: true });

const kept = gauges.slice(readings / 5);
const verdict = judge(kept);
const failed = Object.keys(load.byStatus).filter((status) => Number(status) >= 500);
const faults = [...verdict.faults, ...failed.map((status) => `answers ${status}`)];
for (const [status, count] of Object.entries(load.byStatus)) say(`${status}: ${count}`);
const mib = (value: number) => value.toFixed(1);
// Every tenth reading, so that a climb that ends can be told from one that goes on.
const series = gauges.filter((_, i) => i % 10 === 9);
say(`memory, MiB: ${series.map(({ residentMib }) => mib(residentMib)).join(', ')}`);
say(
  `slope ${mib(verdict.slope)} MiB/h, 95 % interval ${mib(verdict.slopeLow)} to ${mib(verdict.slopeHigh)}, may reach ${bounds.growthMibPerHour}`,
);
say(`at most ${verdict.mostHandles} handles and ${mib(verdict.mostLogMib)} MiB of write-ahead log`);
for (const fault of faults) say(`FAULT: ${fault}`);
process.exitCode = faults.length === 0 ? 0 : 1;
