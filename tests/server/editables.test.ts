import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { makeTestApp, type TestApp, testUrl } from '../support/test-app.ts';

interface Kind {
  readonly path: string;
  readonly fresh: Record<string, unknown>;
  readonly edit: Record<string, unknown>;
  readonly wrong: Record<string, unknown>;
}

const kinds: readonly Kind[] = [
  {
    path: '/v1/sites',
    fresh: { key: 'ridge', name: 'Ridge', latitude_deg: 51.5, elevation_m: 210 },
    edit: { elevation_m: null, note: 'fence repaired' },
    wrong: { latitude_deg: 91 },
  },
  {
    path: '/v1/analyzers',
    fresh: { key: 'bench', name: 'Bench analyzer' },
    edit: { note: 'calibrated in May' },
    wrong: { name: '' },
  },
  {
    path: '/v1/antennas',
    fresh: {
      key: 'ridge-40m',
      site: 'base',
      name: 'Ridge dipole',
      kind: 'dipole',
      plan: 'iaru-r1',
      design_bands: ['40m'],
      feed_line: [
        { cable: 'rg-58', length_m: 20, length_u95_m: 0.1, extra_loss_db: 0, choke: false },
      ],
    },
    edit: { max_swr: 1.5, feed_line: null },
    wrong: { max_swr: 1 },
  },
];

describe.each(kinds)('$path', ({ path, fresh, edit, wrong }) => {
  let club: TestApp;
  const one = `${path}/${fresh['key']}`;

  beforeAll(async () => {
    club = await makeTestApp();
    await club.call({ method: 'POST', url: '/v1/sites', payload: { key: 'base', name: 'Base' } });
  });
  afterAll(() => club.close());

  it('adds a record with its place, its tag and what was told', async () => {
    const answer = await club.call({ method: 'POST', url: path, payload: fresh });
    expect(answer.statusCode).toBe(201);
    const { site: _, ...told } = fresh;
    expect(answer.json()).toMatchObject({ ...told, revision: 1, invented: false });
    const { id } = answer.json();
    expect(answer.headers.location).toBe(`${testUrl}${path}/${id}`);
    expect(answer.headers.etag).toBe(`"${id}.1"`);
  });

  it('refuses the key a second time', async () => {
    const answer = await club.call({ method: 'POST', url: path, payload: fresh });
    expect(answer.statusCode).toBe(409);
    expect(answer.json()).toMatchObject({
      type: `${testUrl}/problems/key-in-use`,
      errors: [{ pointer: '#/key' }],
    });
  });

  it('finds it by key and by id', async () => {
    const byKey = await club.call({ url: one });
    const byId = await club.call({ url: `${path}/${byKey.json().id}` });
    expect(byKey.statusCode).toBe(200);
    expect(byId.json()).toEqual(byKey.json());
  });

  it('answers 304 to a client that has it', async () => {
    const { headers } = await club.call({ url: one });
    const again = await club.call({ url: one, headers: { 'if-none-match': String(headers.etag) } });
    expect(again.statusCode).toBe(304);
    expect(again.body).toBe('');
    expect(again.headers.etag).toBe(headers.etag);
  });

  it('does not know another key', async () => {
    expect((await club.call({ url: `${path}/nowhere` })).statusCode).toBe(404);
    const edited = await club.call({
      method: 'PATCH',
      url: `${path}/nowhere`,
      payload: edit,
      headers: { 'if-match': '*' },
    });
    expect(edited.statusCode).toBe(404);
  });

  it('wants an edit to name the revision it is based on', async () => {
    const answer = await club.call({ method: 'PATCH', url: one, payload: edit });
    expect(answer.statusCode).toBe(428);
  });

  it('edits what is given and leaves the rest', async () => {
    const before = await club.call({ url: one });
    const ifMatch = { 'if-match': String(before.headers.etag) };
    club.clock.ms += 60_000;
    const answer = await club.call({ method: 'PATCH', url: one, payload: edit, headers: ifMatch });
    expect(answer.statusCode).toBe(200);
    expect(answer.json()).toEqual({
      ...before.json(),
      ...edit,
      revision: 2,
      updated_at: answer.json().updated_at,
    });
    expect(answer.json().updated_at > before.json().updated_at).toBe(true);
    expect(answer.headers.etag).toBe(`"${before.json().id}.2"`);

    const stale = await club.call({ method: 'PATCH', url: one, payload: edit, headers: ifMatch });
    expect(stale.statusCode).toBe(412);
    expect((await club.call({ url: one })).json()).toEqual(answer.json());
  });

  it('can be given another key', async () => {
    const headers = { 'if-match': '*' };
    const renamed = await club.call({
      method: 'PATCH',
      url: one,
      payload: { key: 'moved' },
      headers,
    });
    expect(renamed.json().key).toBe('moved');
    expect((await club.call({ url: one })).statusCode).toBe(404);
    const url = `${path}/moved`;
    const back = await club.call({ method: 'PATCH', url, payload: { key: fresh['key'] }, headers });
    expect(back.statusCode).toBe(200);
  });

  it('refuses a value out of range, and says where', async () => {
    const payload = { ...fresh, key: 'other', ...wrong };
    const answer = await club.call({ method: 'POST', url: path, payload });
    expect(answer.statusCode).toBe(400);
    expect(answer.json().errors).toEqual([
      { detail: expect.any(String), pointer: `#/${Object.keys(wrong)[0]}` },
    ]);
    const headers = { 'if-match': '*' };
    const edited = await club.call({ method: 'PATCH', url: one, payload: wrong, headers });
    expect(edited.statusCode).toBe(400);
  });

  it('refuses a field that it does not know, rather than drop it', async () => {
    const payload = { ...fresh, key: 'other', colour: 'red' };
    const answer = await club.call({ method: 'POST', url: path, payload });
    expect(answer.statusCode).toBe(400);
    expect(answer.json().errors).toEqual([
      { detail: 'There is no such field here.', pointer: '#/colour' },
    ]);
    const query = await club.call({ url: `${one}?colour=red` });
    expect(query.json().errors).toEqual([
      { detail: 'There is no such field here.', parameter: 'colour' },
    ]);
  });

  it('takes JSON only', async () => {
    const answer = await club.call({
      method: 'POST',
      url: path,
      payload: 'key=x',
      headers: { 'content-type': 'application/x-www-form-urlencoded' },
    });
    expect(answer.statusCode).toBe(415);
  });

  it('refuses a body that is not there, not JSON, or too large', async () => {
    const json = { 'content-type': 'application/json' };
    const post = (payload: string) =>
      club.call({ method: 'POST', url: path, payload, headers: json });
    expect((await post('{')).statusCode).toBe(400);
    expect((await post('')).statusCode).toBe(400);
    expect((await post('{"__proto__":{}}')).statusCode).toBe(400);
    expect((await post(`{"note":"${'x'.repeat(70_000)}"}`)).statusCode).toBe(413);
    expect((await club.call({ method: 'POST', url: path })).statusCode).toBe(400);
  });

  it('lists by pages, ascending by key, each record once', async () => {
    for (const key of ['aa', 'bb', 'cc', 'dd']) {
      await club.call({ method: 'POST', url: path, payload: { ...fresh, key } });
    }
    const whole = (await club.call({ url: path })).json();
    const keys: string[] = whole.items.map((item: { key: string }) => item.key);
    expect(keys).toEqual([...keys].sort());
    expect(keys.length).toBeGreaterThanOrEqual(5);
    expect(whole.page).toEqual({ next: null, limit: 50 });

    const seen: string[] = [];
    let next: string | undefined = `${path}?limit=2`;
    while (next !== undefined) {
      const page = await club.call({ url: next });
      expect(page.json().items.length).toBeLessThanOrEqual(2);
      seen.push(...page.json().items.map((item: { key: string }) => item.key));
      const link = /^<([^>]*)>; rel="next"$/.exec(String(page.headers.link ?? ''));
      next = link?.[1].slice(testUrl.length);
      expect(page.json().page.next === null).toBe(next === undefined);
    }
    expect(seen).toEqual(keys);
  });

  it('refuses a limit out of range and a cursor of another list', async () => {
    for (const limit of ['0', '501', 'x', '1.5']) {
      expect((await club.call({ url: `${path}?limit=${limit}` })).statusCode).toBe(400);
    }
    const other = path === '/v1/sites' ? '/v1/analyzers' : '/v1/sites';
    const page = await club.call({ url: `${path}?limit=1` });
    const foreign = await club.call({ url: `${other}?cursor=${page.json().page.next}` });
    expect(foreign.statusCode).toBe(400);
    expect(foreign.json().type).toBe(`${testUrl}/problems/invalid-cursor`);
  });
});

describe('an antenna', () => {
  let club: TestApp;
  const antenna = { key: 'a', site: 'base', name: 'A', kind: 'vertical', plan: 'us-fcc' };

  beforeAll(async () => {
    club = await makeTestApp();
    for (const key of ['base', 'shore']) {
      await club.call({ method: 'POST', url: '/v1/sites', payload: { key, name: key } });
    }
  });
  afterAll(() => club.close());

  it('is judged at SWR 2 against 50 ohm by all classes, unless told otherwise', async () => {
    const answer = await club.call({ method: 'POST', url: '/v1/antennas', payload: antenna });
    expect(answer.json()).toMatchObject({
      max_swr: 2,
      reference_ohm: 50,
      licence: null,
      design_bands: [],
      feed_line: null,
      note: '',
    });
  });

  it.each([
    [{ site: 'atlantis' }, '#/site'],
    [{ plan: 'no-such-plan' }, '#/plan'],
    [{ licence: 'no-such-class' }, '#/licence'],
    [{ plan: 'national-4m', design_bands: ['4m', '20m'] }, '#/design_bands/1'],
  ])('that names %j is refused at %s', async (facts, pointer) => {
    const payload = { ...antenna, key: 'b', ...facts };
    const answer = await club.call({ method: 'POST', url: '/v1/antennas', payload });
    expect(answer.statusCode).toBe(422);
    expect(answer.json().errors).toEqual([{ detail: expect.any(String), pointer }]);
  });

  it('can be moved to another site, which must exist', async () => {
    const move = (site: string) =>
      club.call({
        method: 'PATCH',
        url: '/v1/antennas/a',
        payload: { site },
        headers: { 'if-match': '*' },
      });
    const shore = await club.call({ url: '/v1/sites/shore' });
    expect((await move('shore')).json().site_id).toBe(shore.json().id);
    expect((await move('atlantis')).statusCode).toBe(422);
  });

  it('is listed with its site', async () => {
    const keysAt = async (site: string) => {
      const answer = await club.call({ url: `/v1/antennas?site=${site}` });
      return answer.json().items.map((item: { key: string }) => item.key);
    };
    expect(await keysAt('shore')).toEqual(['a']);
    expect(await keysAt('base')).toEqual([]);
    expect((await club.call({ url: '/v1/antennas?site=atlantis' })).statusCode).toBe(422);
  });

  it('cannot take the place of another by a key that looks like an id', async () => {
    const { id } = (await club.call({ url: '/v1/antennas/a' })).json();
    const payload = { ...antenna, key: id };
    const answer = await club.call({ method: 'POST', url: '/v1/antennas', payload });
    expect(answer.statusCode).toBe(400);
  });
});
