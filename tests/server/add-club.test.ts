import { spawnSync } from 'node:child_process';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { isWellFormedToken, secretSha256 } from '../../server/auth/token.ts';
import { openSqliteStore } from '../../server/store/sqlite/open.ts';
import { temporaryFolders } from '../support/temporary-folders.ts';

const { newFolder, removeAll } = temporaryFolders();
afterAll(removeAll);

const program = new URL('../../dist/server/add-club.js', import.meta.url).pathname;

/** Runs the built command as an operator would. */
function addClub(folder: string, ...options: readonly string[]) {
  const env = { PATH: process.env['PATH'], DATA_DIR: folder };
  return spawnSync(process.execPath, [program, ...options], { env, encoding: 'utf8' });
}

describe('the command that adds a club', () => {
  it('makes it while the service has the file open, and prints the token of its steward', async () => {
    const folder = newFolder();
    const store = await openSqliteStore({ path: join(folder, 'ledger.sqlite') });
    const { status, stdout } = addClub(folder, '--name', 'Über the Hill 3');
    expect(status).toBe(0);
    expect(stdout).toContain('`uber-the-hill-3`');
    const [token] = stdout.match(/sl_\w+/) ?? [];
    expect(isWellFormedToken(token ?? '')).toBe(true);
    const [club] = await store.listClubs();
    expect(club).toMatchObject({
      key: 'uber-the-hill-3',
      name: 'Über the Hill 3',
      invented: false,
    });
    expect(await store.findToken(secretSha256(token ?? ''))).toMatchObject({
      clubId: club.id,
      role: 'steward',
      scopes: null,
    });
    await store.close();
  });

  it('adds no second one of a key, and says what to do', () => {
    const folder = newFolder();
    expect(addClub(folder, '--name', 'One', '--key', 'same').status).toBe(0);
    const { status, stdout, stderr } = addClub(folder, '--name', 'Two', '--key', 'same');
    expect([status, stdout]).toEqual([1, '']);
    expect(stderr).toMatch(/`same` already.*--key/);
  });

  it.each([
    [[], /Usage/],
    [['--name', ''], /1 to 100 characters/],
    [['--name', '日本'], /--key/],
    [['--name', 'A', '--key', 'Not A Key'], /--key/],
    [['--nam', 'A'], /--nam/],
  ])('refuses %j and makes nothing', (options, reason) => {
    const folder = newFolder();
    const { status, stderr } = addClub(folder, ...options);
    expect(status).toBe(1);
    expect(stderr).toMatch(reason);
  });
});
