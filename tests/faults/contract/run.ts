import { parseArgs } from 'node:util';
import { makeTestApp } from '../../support/test-app.ts';
import { fuzz } from './fuzz.ts';

// `npm run contract -- --requests 100000 --seed 1`: the long form of the contract test.
const { values } = parseArgs({
  options: {
    requests: { type: 'string', default: '20000' },
    seed: { type: 'string', default: '1' },
  },
});
const say = (line: string) => process.stdout.write(`${line}\n`);
const outcome = await fuzz(makeTestApp, Number(values.requests), Number(values.seed));
for (const fault of outcome.faults) say(fault);
for (const [status, count] of Object.entries(outcome.byStatus)) say(`${status}: ${count}`);
say(`${outcome.requests} requests, ${outcome.faults.length} kinds of fault`);
process.exitCode = outcome.faults.length === 0 ? 0 : 1;
