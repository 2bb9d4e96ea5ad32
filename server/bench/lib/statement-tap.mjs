// Stands between a server and PostgreSQL and writes down what the server says: each statement with its parameters, so
// that a bare driver can say exactly the same (PostgreSQL protocol 3.0, section 55.7: Query, Parse and Bind).
import { connect, createServer } from 'node:net';
import { once } from 'node:events';

const QUERY = 0x51;
const PARSE = 0x50;
const BIND = 0x42;

/** Resolves to `{ url, statements, close }`; `statements` grows by `{ text, values }` of that application. */
export async function startTap(databaseUrl, application) {
  const target = new URL(databaseUrl);
  const statements = [];
  const sockets = new Set();
  const server = createServer((client) => {
    const upstream = connect(Number(target.port), target.hostname);
    for (const socket of [client, upstream]) {
      sockets.add(socket);
      socket.on('error', () => socket.destroy());
      socket.on('close', () => [client, upstream].forEach((one) => one.destroy()));
    }
    client.on('data', createReader(application, statements));
    client.pipe(upstream);
    upstream.pipe(client);
  });
  server.listen(0, '127.0.0.1');
  await once(server, 'listening');
  const url = new URL(databaseUrl);
  url.hostname = '127.0.0.1';
  url.port = String(server.address().port);
  const close = async () => {
    for (const socket of sockets) socket.destroy();
    server.close();
    await once(server, 'close');
  };
  return { url: url.href, statements, close };
}

/** Cuts one connection's bytes into messages; the first has no type and names the application. */
function createReader(application, statements) {
  let waiting = Buffer.alloc(0);
  let isOurs = null;
  let parsed = '';
  return (chunk) => {
    waiting = Buffer.concat([waiting, chunk]);
    for (;;) {
      const head = isOurs === null ? 0 : 1;
      if (waiting.length < head + 4) return;
      const length = head + waiting.readInt32BE(head);
      if (waiting.length < length) return;
      const body = waiting.subarray(head + 4, length);
      const type = waiting[0];
      waiting = waiting.subarray(length);
      if (isOurs === null) isOurs = body.toString('utf8').split('\0').includes(application);
      else if (!isOurs) continue;
      else if (type === QUERY) statements.push({ text: readText(body, 0), values: [] });
      else if (type === PARSE) parsed = readText(body, body.indexOf(0) + 1);
      else if (type === BIND) statements.push({ text: parsed, values: readValues(body) });
    }
  };
}

const readText = (body, from) => body.toString('utf8', from, body.indexOf(0, from));

/** Parameters as the driver takes them again: text as string, binary as Buffer. */
function readValues(body) {
  let at = body.indexOf(0, body.indexOf(0) + 1) + 1;
  const next16 = () => body.readInt16BE((at += 2) - 2);
  const formats = Array.from({ length: next16() }, next16);
  return Array.from({ length: next16() }, (_, index) => {
    const length = body.readInt32BE(at);
    at += 4;
    if (length < 0) return null;
    const value = Buffer.from(body.subarray(at, (at += length)));
    return (formats[index] ?? formats[0] ?? 0) === 1 ? value : value.toString('utf8');
  });
}
