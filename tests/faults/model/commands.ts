import fc from 'fast-check';
import { expect } from 'vitest';
import { resonatorFile } from '../../support/club-records.ts';
import { antennas, type LedgerUnderTest } from './ledger-under-test.ts';
import { copyOf, listed, type Model, measuredAt } from './model.ts';

type Act = (model: Model, ledger: LedgerUnderTest) => Promise<void>;
type Command = fc.AsyncCommand<Model, LedgerUnderTest>;

function commandOf(name: string, run: Act): Command {
  return { check: () => true, run, toString: () => name };
}

/** A new file makes a record; one sent again does not, and does not move to another antenna. */
async function upload(model: Model, { app }: LedgerUnderTest, file: number, antenna: string) {
  const answer = await app.call({
    method: 'POST',
    url: `/v1/antennas/${antenna}/sweeps?measured_at=${measuredAt(file)}`,
    headers: { 'content-type': 'application/octet-stream' },
    payload: resonatorFile({ comment: `file ${file}`, points: 21 }),
  });
  const before = model.sweeps.find((sweep) => sweep.file === file);
  if (before === undefined) {
    expect(answer.statusCode).toBe(201);
    model.sweeps.push({ file, antenna, id: answer.json().id });
    return;
  }
  expect(answer.statusCode).toBe(before.antenna === antenna ? 200 : 409);
  if (before.antenna === antenna) expect(answer.json().id).toBe(before.id);
}

/** Page by page, with a new file between the first page and the next. */
async function list(model: Model, ledger: LedgerUnderTest, antenna: string, between: number) {
  const atStart = listed(model, antenna);
  const seen: string[] = [];
  let cursor: string | null = null;
  do {
    const after: string = cursor === null ? '' : `&cursor=${encodeURIComponent(cursor)}`;
    const answer = (
      await ledger.app.call({ url: `/v1/antennas/${antenna}/sweeps?limit=2${after}` })
    ).json();
    seen.push(...answer.items.map(({ id }: { id: string }) => id));
    if (cursor === null) await upload(model, ledger, between, antenna);
    cursor = answer.page.next;
  } while (cursor !== null);
  // What came meanwhile may be there or not; what was there is, once, in its order.
  expect(new Set(seen).size).toBe(seen.length);
  expect(seen.filter((id) => atStart.includes(id))).toEqual(atStart);
}

/** With the tag of now the note changes; with an earlier one nothing does. */
async function edit(model: Model, { app }: LedgerUnderTest, note: string, back: number) {
  const url = `/v1/antennas/${antennas[0]}`;
  const { tags } = model.edited;
  const tag = tags[Math.max(0, tags.length - 1 - back)];
  const isCurrent = tag === tags[tags.length - 1];
  const headers = { 'if-match': tag };
  const answer = await app.call({ method: 'PATCH', url, headers, payload: { note } });
  expect(answer.statusCode).toBe(isCurrent ? 200 : 412);
  if (isCurrent) model.edited.note = note;
  const now = await app.call({ url });
  expect(now.json().note).toBe(model.edited.note);
  const tagNow = String(now.headers.etag);
  if (!isCurrent) expect(tagNow).toBe(tags[tags.length - 1]);
  else if (tagNow !== tag) tags.push(tagNow);
}

const addToken: Act = async (model, { app }) => {
  const payload = { label: 'spare' };
  const { id, token } = (await app.call({ method: 'POST', url: '/v1/tokens', payload })).json();
  model.tokens.push({ id, token, isRevoked: false });
};

async function revoke(model: Model, { app }: LedgerUnderTest, which: number) {
  if (model.tokens.length === 0) return;
  const token = model.tokens[which % model.tokens.length];
  await app.call({ method: 'DELETE', url: `/v1/tokens/${token.id}` });
  token.isRevoked = true;
}

/** Every token of the model opens the door, unless it was revoked. */
const useTokens: Act = async ({ tokens }, { app }) => {
  for (const { token, isRevoked } of tokens) {
    const headers = { authorization: `Bearer ${token}` };
    const answer = await app.call({ url: '/v1/club', headers });
    expect(answer.statusCode).toBe(isRevoked ? 401 : 200);
  }
};

const restart: Act = (_, ledger) => ledger.restart();

const backup: Act = async (model, ledger) => {
  await ledger.backup();
  model.backup = copyOf(model);
};

/** All is as it was at the backup. */
const restore: Act = async (model, ledger) => {
  if (model.backup === null) return;
  await ledger.restore();
  Object.assign(model, copyOf(model.backup), { backup: model.backup });
};

/** All that the model holds is there, and nothing else. */
export const compareAll: Act = async (model, ledger) => {
  for (const antenna of antennas) {
    const { items } = (
      await ledger.app.call({ url: `/v1/antennas/${antenna}/sweeps?limit=100` })
    ).json();
    expect(items.map(({ id }: { id: string }) => id)).toEqual(listed(model, antenna));
  }
  const { note } = (await ledger.app.call({ url: `/v1/antennas/${antennas[0]}` })).json();
  expect(note).toBe(model.edited.note);
  await useTokens(model, ledger);
};

const file = fc.nat(15);
const antenna = fc.constantFrom(...antennas);

export const commands = fc.commands(
  [
    fc
      .tuple(file, antenna)
      .map(([number, key]) =>
        commandOf(`upload ${number} to ${key}`, (m, l) => upload(m, l, number, key)),
      ),
    fc.tuple(file, antenna).map(([number, key]) =>
      commandOf(`send ${number} twice`, async (m, l) => {
        await upload(m, l, number, key);
        await upload(m, l, number, key);
      }),
    ),
    fc.tuple(file, antenna).map(([number, key]) =>
      commandOf(`list ${key}, ${number} between`, async (m, l) => {
        if (!m.sweeps.some((sweep) => sweep.file === number)) await list(m, l, key, number);
      }),
    ),
    fc
      .tuple(fc.string({ maxLength: 20 }), fc.nat(2))
      .map(([note, back]) =>
        commandOf(`edit, ${back} tags back`, (m, l) => edit(m, l, note, back)),
      ),
    fc.constant(commandOf('add a token', addToken)),
    fc.nat(5).map((which) => commandOf(`revoke ${which}`, (m, l) => revoke(m, l, which))),
    fc.constant(commandOf('use the tokens', useTokens)),
    fc.constant(commandOf('restart', restart)),
    fc.constant(commandOf('backup', backup)),
    fc.constant(commandOf('restore', restore)),
    fc.constant(commandOf('compare all', compareAll)),
  ],
  { maxCommands: 60, size: 'max' },
);
