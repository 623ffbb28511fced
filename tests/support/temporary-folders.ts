import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

/** Folders that a test file makes and removes again. */
export function temporaryFolders() {
  const folders: string[] = [];
  return {
    newFolder(): string {
      const folder = mkdtempSync(join(tmpdir(), 'sweep-ledger-'));
      folders.push(folder);
      return folder;
    },
    removeAll(): void {
      for (const folder of folders.splice(0)) rmSync(folder, { recursive: true, force: true });
    },
  };
}
