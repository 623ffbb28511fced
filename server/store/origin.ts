import { AsyncLocalStorage } from 'node:async_hooks';

const present = new AsyncLocalStorage<string | null>();

/** Runs with the network address that whatever is done in it came from; null: the service itself. */
export function withOrigin<Value>(address: string | null, run: () => Value): Value {
  return present.run(address, run);
}

/** The address that what is being done came from; null: the service itself. */
export function presentOrigin(): string | null {
  return present.getStore() ?? null;
}
