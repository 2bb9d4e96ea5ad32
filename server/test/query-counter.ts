import { connect, createServer, type AddressInfo, type Socket } from 'node:net';

export interface QueryCounter {
  /** The database's address through the counter. */
  url: string;
  /** Statements that connections of this application have sent so far. */
  count: (application: string) => number;
  close: () => Promise<void>;
}

/** Types of frontend messages that carry a statement (PostgreSQL protocol 3.0, section 55.7: Query and Parse). */
const STATEMENTS = new Set([0x51, 0x50]);

/** Stands between a server and PostgreSQL and counts statements, by reading the wire as it passes. */
export async function startQueryCounter(databaseUrl: string): Promise<QueryCounter> {
  const target = new URL(databaseUrl);
  const counts = new Map<string, number>();
  const sockets = new Set<Socket>();
  const server = createServer((client) => {
    const upstream = connect(Number(target.port), target.hostname);
    for (const socket of [client, upstream]) {
      sockets.add(socket);
      socket.on('error', () => socket.destroy());
      socket.on('close', () => {
        sockets.delete(socket);
        client.destroy();
        upstream.destroy();
      });
    }
    const read = createReader((application) => counts.set(application, (counts.get(application) ?? 0) + 1));
    client.on('data', read);
    client.pipe(upstream);
    upstream.pipe(client);
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const url = new URL(databaseUrl);
  url.hostname = '127.0.0.1';
  url.port = String((server.address() as AddressInfo).port);
  return {
    url: url.href,
    count: (application) => counts.get(application) ?? 0,
    close: async () => {
      for (const socket of sockets) socket.destroy();
      await new Promise((resolve) => server.close(resolve));
    },
  };
}

/** Cuts one connection's bytes into messages; the first, without a type, names the application. */
function createReader(onStatement: (application: string) => void): (chunk: Buffer) => void {
  let waiting = Buffer.alloc(0);
  let application: string | null = null;
  return (chunk) => {
    waiting = Buffer.concat([waiting, chunk]);
    for (;;) {
      const head = application === null ? 0 : 1;
      if (waiting.length < head + 4) return;
      const length = head + waiting.readInt32BE(head);
      if (waiting.length < length) return;
      if (application === null) application = readApplication(waiting.subarray(8, length));
      else if (STATEMENTS.has(waiting[0] ?? 0)) onStatement(application);
      waiting = waiting.subarray(length);
    }
  };
}

function readApplication(startup: Buffer): string {
  const words = startup.toString('utf8').split('\0');
  return words[words.indexOf('application_name') + 1] ?? '';
}
