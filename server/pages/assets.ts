import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';

/** A file that pages load: its bytes, and an address that changes when they do. */
export interface Asset {
  readonly url: string;
  readonly type: string;
  readonly bytes: Buffer;
}

function asset(name: string, type: string): Asset {
  const bytes = readFileSync(new URL(`assets/${name}`, import.meta.url));
  const mark = createHash('sha256').update(bytes).digest('hex').slice(0, 12);
  return { url: `/assets/${mark}/${name}`, type, bytes };
}

/** What every page loads; nothing comes from elsewhere. */
export const style = asset('pages.css', 'text/css; charset=utf-8');
export const script = asset('pages.js', 'text/javascript; charset=utf-8');
export const icon = asset('icon.svg', 'image/svg+xml');
