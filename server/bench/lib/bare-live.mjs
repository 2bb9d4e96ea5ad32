// The same bid by nothing but node:http, pg and socket.io: a PUT says the statements it is told in one transaction,
// emits a hint of the same bytes to every socket and answers the same JSON.
import { createServer } from 'node:http';
import pg from 'pg';
import { Server } from 'socket.io';

async function readBody(request) {
  const parts = [];
  for await (const part of request) parts.push(part);
  return JSON.parse(Buffer.concat(parts).toString('utf8'));
}

async function sayAll(pool, statements) {
  const client = await pool.connect();
  try {
    await client.query('BEGIN');
    for (const { text, values } of statements) await client.query(text, values);
    await client.query('COMMIT');
  } finally {
    client.release();
  }
}

process.once('message', ({ databaseUrl, bids, answer, hint }) => {
  const pool = new pg.Pool({ connectionString: databaseUrl, max: 10 });
  const server = createServer(async (request, response) => {
    await readBody(request);
    await sayAll(pool, bids[Number(request.url.slice(1))]);
    live.emit('hint', hint);
    response.setHeader('Content-Type', 'application/json');
    response.end(JSON.stringify(answer));
  });
  const live = new Server(server, { serveClient: false });
  server.listen(0, '127.0.0.1', () => process.send({ url: `http://127.0.0.1:${server.address().port}` }));
});
