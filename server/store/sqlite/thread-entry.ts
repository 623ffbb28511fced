import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { projectRoot } from '../../project-files.ts';

/** The file that a thread starts with: always the compiled one, for a thread cannot run sources. */
export function threadEntry(name: 'writer-thread' | 'copy-thread'): URL {
  return pathToFileURL(join(projectRoot(), `dist/server/store/sqlite/${name}.js`));
}
