import { execFileSync } from 'node:child_process';
import { cpSync } from 'node:fs';
import { join } from 'node:path';
import { projectRoot } from '../../server/project-files.ts';

/**
 * Compiles the sources before the tests: threads and processes under test run what is built. Types
 * are checked elsewhere.
 */
export function setup(): void {
  const root = projectRoot();
  const compiler = join(root, 'node_modules/typescript/bin/tsc');
  execFileSync(process.execPath, [compiler, '-p', 'tsconfig.build.json', '--noCheck'], {
    cwd: root,
    stdio: 'inherit',
  });
  const assets = 'server/pages/assets';
  cpSync(join(root, assets), join(root, 'dist', assets), { recursive: true });
}
