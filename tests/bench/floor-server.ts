import Database from 'better-sqlite3';
import Fastify from 'fastify';

// The least that a service can do: keeps the bytes of each request in one flushed transaction, and
// sends a constant. It has the same Node, the same framework and the same SQLite settings as ours.
const [path, constant] = process.argv.slice(2);
const database = new Database(path);
database.pragma('page_size = 8192');
database.pragma('journal_mode = WAL');
database.pragma('synchronous = FULL');
database.exec('CREATE TABLE kept (id INTEGER PRIMARY KEY, body BLOB NOT NULL) STRICT');
const insert = database.prepare('INSERT INTO kept (body) VALUES (?)');
const keep = database.transaction((body: Buffer) => insert.run(body));

const app = Fastify();
app.removeAllContentTypeParsers();
app.addContentTypeParser('*', { parseAs: 'buffer' }, (_request, body, done) => done(null, body));
app.post<{ Body: Buffer }>('/keep', async (request, reply) => {
  const { lastInsertRowid } = keep.immediate(request.body);
  return reply.code(201).send({ id: Number(lastInsertRowid) });
});
app.get('/constant', async (_request, reply) => reply.type('application/json').send(constant));
const address = await app.listen({ host: '127.0.0.1', port: 0 });
process.stdout.write(`${address}\n`);
process.once('SIGTERM', async () => {
  await app.close();
  database.close();
});
