import type { FastifyInstance } from 'fastify';

declare module 'fastify' {
  interface FastifyInstance {
    /** The methods that the path of this URL takes, sorted; none for an unknown path. */
    methodsOf(url: string): readonly string[];
  }
}

/** Keeps the methods of every route registered from now on, for 405 answers with `Allow`. */
export function keepKnownMethods(app: FastifyInstance): void {
  const methodsByPattern = new Map<string, Set<string>>();
  app.addHook('onRoute', ({ url, method }) => {
    const methods = methodsByPattern.get(url) ?? new Set();
    for (const name of [method].flat()) methods.add(name);
    methodsByPattern.set(url, methods);
  });
  app.decorate('methodsOf', (url) => {
    const path = url.split('?', 1)[0];
    for (const [pattern, methods] of methodsByPattern) {
      if (matches(pattern, path)) return [...methods].sort();
    }
    return [];
  });
}

function matches(pattern: string, path: string): boolean {
  const wanted = pattern.split('/');
  const given = path.split('/');
  if (wanted.at(-1) === '*') return given.length >= wanted.length && prefixMatches(wanted, given);
  return wanted.length === given.length && prefixMatches(wanted, given);
}

function prefixMatches(wanted: readonly string[], given: readonly string[]): boolean {
  return wanted.every((part, i) =>
    part === '*' ? true : part.startsWith(':') ? given[i] !== '' : part === given[i],
  );
}
