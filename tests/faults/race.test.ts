import { afterEach, describe, expect, it } from 'vitest';
import { sha256 } from '../../server/http/digests.ts';
import type { Store } from '../../server/store/port.ts';
import { addAntenna, resonatorFile, upload } from '../support/club-records.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

let app: TestApp;
let url: string;
afterEach(() => app.close());

async function startedApp(around?: (store: Store) => Store): Promise<TestApp> {
  app = await makeTestApp(around === undefined ? {} : { around });
  await addAntenna(app);
  // Over real connections: requests then come in any order.
  url = await app.app.listen({ host: '127.0.0.1', port: 0 });
  return app;
}

function call(method: string, path: string, headers: Record<string, string>, body: string) {
  return fetch(url + path, {
    method,
    headers: { authorization: `Bearer ${app.token}`, ...headers },
    body,
  });
}

function countOf(answers: readonly Response[]): Record<number, number> {
  const counts: Record<number, number> = {};
  for (const { status } of answers) counts[status] = (counts[status] ?? 0) + 1;
  return counts;
}

/** A store with some of its methods replaced. */
function replaced(store: Store, methods: Partial<Store>): Store {
  return new Proxy(store, {
    get: (target, name) => {
      const method = Reflect.get(name in methods ? methods : target, name);
      return typeof method === 'function' ? method.bind(target) : method;
    },
  });
}

describe('fifty equal uploads at once', () => {
  const uploadAll = async () => {
    const body = resonatorFile();
    const all = Array.from({ length: 50 }, () =>
      call('POST', '/v1/antennas/field-20m/sweeps', {}, body),
    );
    const answers = await Promise.all(all);
    const bodies = (await Promise.all(answers.map((answer) => answer.json()))) as { id: string }[];
    return { counts: countOf(answers), ids: new Set(bodies.map(({ id }) => id)) };
  };

  it('make one record, and one of them is answered as its maker', async () => {
    await startedApp();
    const { counts, ids } = await uploadAll();
    expect(counts).toEqual({ 200: 49, 201: 1 });
    expect(ids.size).toBe(1);
    const list = await app.call({ url: '/v1/antennas/field-20m/sweeps' });
    expect(list.json().items).toHaveLength(1);
    expect((await upload(app, resonatorFile())).json().id).toBe([...ids][0]);
  });

  it('make fifty where the writer does not look at the bytes, which the count finds out', async () => {
    let nonce = 0;
    await startedApp((store) =>
      replaced(store, {
        findSweepByFile: async () => null,
        addSweep: (sweep) => {
          nonce += 1;
          const fileSha256 = sha256(Buffer.from(`${nonce}`)).toString('hex');
          const { record } = sweep;
          const measured = { ...record.measured, fileSha256 };
          return store.addSweep({ ...sweep, record: { ...record, measured } });
        },
      }),
    );
    const { counts, ids } = await uploadAll();
    expect(counts).toEqual({ 201: 50 });
    expect(ids.size).toBe(50);
  });
});

describe('ten edits from one version at once', () => {
  const editAll = async () => {
    const before = await app.call({ url: '/v1/sites/field' });
    const headers = {
      'if-match': String(before.headers.etag),
      'content-type': 'application/json',
    };
    const all = Array.from({ length: 10 }, (_, i) =>
      call('PATCH', '/v1/sites/field', headers, JSON.stringify({ note: `edit ${i}` })),
    );
    const answers = await Promise.all(all);
    await Promise.all(answers.map((answer) => answer.arrayBuffer()));
    return countOf(answers);
  };

  /** Lets all ten pass every check before the writer's, so that it alone decides. */
  const heldUntilAllCame = (store: Store, revisionOf: (call: number, asked: number) => number) => {
    let calls = 0;
    let open = () => {};
    const opened = new Promise<void>((resolve) => {
      open = resolve;
    });
    return replaced(store, {
      editEditable: async (kind, actor, id, asked, next) => {
        calls += 1;
        const revision = revisionOf(calls, asked);
        if (calls === 10) open();
        await opened;
        return store.editEditable(kind, actor, id, revision, next);
      },
    });
  };

  it('end with one that holds and nine that are told', async () => {
    await startedApp((store) => heldUntilAllCame(store, (_call, asked) => asked));
    expect(await editAll()).toEqual({ 200: 1, 412: 9 });
  });

  it('end with ten that hold where the writer does not compare, which the count finds out', async () => {
    await startedApp((store) => heldUntilAllCame(store, (call) => call));
    expect(await editAll()).toEqual({ 200: 10 });
  });
});
