// A server of nothing but node:http and pg: each path says its statements and answers its JSON, written anew each time.
import { createServer } from 'node:http';
import pg from 'pg';

process.once('message', ({ databaseUrl, lists }) => {
  const known = new Map(lists);
  const pool = new pg.Pool({ connectionString: databaseUrl, max: 10 });
  const server = createServer(async (request, response) => {
    const { statements, answer } = known.get(request.url);
    for (const { text, values } of statements) await pool.query(text, values);
    response.setHeader('Content-Type', 'application/json');
    response.end(JSON.stringify(answer));
  });
  server.listen(0, '127.0.0.1', () => process.send({ url: `http://127.0.0.1:${server.address().port}` }));
});
