import type { App } from './http/app-type.ts';
import { Problem } from './problems.ts';

const idleCheckMs = 50;

/**
 * Lets a closing instance end soon: what is running ends, what comes on open connections is told to
 * come back later, and connections that fall idle are closed at once, not after their timeout.
 */
export function closeSoon(app: App): void {
  let idleCheck: NodeJS.Timeout | undefined;
  app.addHook('preClose', async () => {
    app.server.closeIdleConnections();
    idleCheck = setInterval(() => app.server.closeIdleConnections(), idleCheckMs);
  });
  app.addHook('onClose', async () => clearInterval(idleCheck));
  app.addHook('onRequest', async () => {
    if (idleCheck === undefined) return;
    throw new Problem('unavailable', { headers: { 'retry-after': '5' } });
  });
}
