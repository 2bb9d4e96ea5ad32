import { once } from 'node:events';
import { connect, createServer, type AddressInfo, type Socket } from 'node:net';

/** A line to the database that a test can cut: `url` leads through it until `close`. */
export async function openProxy(databaseUrl: string): Promise<{ url: string; close: () => void }> {
  const target = new URL(databaseUrl);
  const open = new Set<Socket>();
  const keep = (socket: Socket) => {
    open.add(socket);
    socket.on('error', () => socket.destroy());
    socket.on('close', () => open.delete(socket));
    return socket;
  };
  const server = createServer((near) => {
    const far = keep(connect(Number(target.port), target.hostname));
    keep(near).pipe(far).pipe(near);
  });
  server.listen(0, '127.0.0.1');
  await once(server, 'listening');
  const url = new URL(databaseUrl);
  url.hostname = '127.0.0.1';
  url.port = String((server.address() as AddressInfo).port);
  return {
    url: url.href,
    close: () => {
      server.close();
      for (const socket of open) socket.destroy();
    },
  };
}
