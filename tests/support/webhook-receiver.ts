import { createServer, type IncomingHttpHeaders, type ServerResponse } from 'node:http';
import type { AddressInfo } from 'node:net';

export interface Received {
  readonly headers: IncomingHttpHeaders;
  readonly body: string;
  readonly path: string;
}

/** A real server on this machine that keeps what it is sent. */
export interface Receiver {
  readonly url: string;
  readonly port: number;
  readonly received: Received[];
  /** How it answers; 204 at first. */
  answer: (response: ServerResponse) => void;
  close(): Promise<void>;
}

export async function startReceiver(): Promise<Receiver> {
  const received: Received[] = [];
  const server = createServer((request, response) => {
    let body = '';
    request.setEncoding('utf8');
    request.on('data', (part: string) => {
      body += part;
    });
    request.on('end', () => {
      received.push({ headers: request.headers, body, path: request.url ?? '' });
      receiver.answer(response);
    });
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const { port } = server.address() as AddressInfo;
  const receiver: Receiver = {
    url: `http://127.0.0.1:${port}/hook?x=1`,
    port,
    received,
    answer: (response) => response.writeHead(204).end(),
    close: () =>
      new Promise((resolve) => {
        server.closeAllConnections();
        server.close(() => resolve());
      }),
  };
  return receiver;
}
