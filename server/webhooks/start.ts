import type { App } from '../http/app-type.ts';
import type { Service } from '../service.ts';
import { WebhookDeliveries } from './deliveries.ts';
import { makeSend } from './send.ts';

/** Sends events to webhooks from when the app listens until it closes. */
export function sendWebhooks(app: App, service: Service): void {
  const { store, now, publicUrl, privateWebhooks = false } = service;
  const deliveries = new WebhookDeliveries({
    store,
    now,
    publicUrl,
    send: makeSend({ allowPrivate: privateWebhooks }),
    onFailure: (error) => app.log.error({ err: error }, 'webhooks could not be sent'),
  });
  app.addHook('onListen', async () => deliveries.start());
  app.addHook('preClose', () => deliveries.stop());
}
