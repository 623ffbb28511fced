import { writeSync } from 'node:fs';
import { openSqliteStore } from '../../../server/store/sqlite/open.ts';
import { club } from '../../support/open-test-store.ts';
import { idOf, newSweep } from '../../support/store-records.ts';

// Adds sweeps to a store one by one, then ten at once, and writes a mark before and after each wait:
// the marks stand between the system calls in a trace.
const [path, synchronous] = process.argv.slice(2);
const store = await openSqliteStore({
  path,
  ...(synchronous === 'NORMAL' ? { synchronous } : {}),
});

const add = (number: number) =>
  store.addSweep(newSweep(club, idOf(number), idOf(20), `sweep ${number}`));

for (let number = 100; number < 120; number++) {
  writeSync(1, `begin ${number}\n`);
  await add(number);
  writeSync(1, `acknowledged ${number}\n`);
}
writeSync(1, 'begin 200\n');
await Promise.race(Array.from({ length: 10 }, (_, i) => add(200 + i)));
writeSync(1, 'acknowledged 200\n');
await store.close();
