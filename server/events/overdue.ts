import { dueTests } from '../history/due-tests.ts';
import type { App } from '../http/app-type.ts';
import { type Service, timestamp } from '../service.ts';

const lookEveryMs = 3600 * 1000;

/** Tells listeners of each antenna whose test has become overdue, each due date once. */
export async function tellOverdue(service: Service): Promise<void> {
  const { store, now } = service;
  for (const { id: clubId } of await store.listClubs()) {
    for (const { antenna, due } of await dueTests(service, clubId)) {
      if (due.state !== 'overdue' || due.dueAtMs === null) continue;
      const dueAt = new Date(due.dueAtMs).toISOString();
      await store.noteOverdue(clubId, antenna.id, dueAt, timestamp(now));
    }
  }
}

/** Looks every hour from when the app listens until it closes. */
export function watchOverdue(app: App, service: Service): void {
  let timer: NodeJS.Timeout | undefined;
  const look = () => {
    tellOverdue(service).catch((error: unknown) => {
      app.log.error({ err: error }, 'overdue tests could not be told');
    });
  };
  app.addHook('onListen', async () => {
    look();
    timer = setInterval(look, lookEveryMs).unref();
  });
  app.addHook('preClose', async () => clearInterval(timer));
}
