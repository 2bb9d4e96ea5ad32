import { createServer } from 'node:http';
import { once } from 'node:events';

/**
 * Lets tests break the running app: `commands` by name, reached as messages `{ cmd }` from the parent process and as
 * `POST /NAME` on a loopback address. Both answer when the command is done.
 *
 * Returns `{ url, close }`.
 */
export async function startControl(commands) {
  process.on('message', async (message) => {
    if (!Object.hasOwn(commands, message?.cmd)) return;
    const error = await attempt(commands[message.cmd]);
    if (process.connected) process.send({ done: message.cmd, error });
  });
  const server = createServer(async (request, response) => {
    const name = request.url.slice(1);
    const isKnown = request.method === 'POST' && Object.hasOwn(commands, name);
    const error = isKnown
      ? await attempt(commands[name])
      : `POST one of: ${Object.keys(commands).join(', ')}`;
    response.writeHead(error ? (isKnown ? 500 : 404) : 200, { 'content-type': 'application/json' });
    response.end(JSON.stringify({ error }));
  });
  server.listen(0, '127.0.0.1');
  await once(server, 'listening');
  const close = () => {
    server.close();
    server.closeAllConnections();
  };
  return { url: `http://127.0.0.1:${server.address().port}`, close };
}

async function attempt(command) {
  try {
    await command();
    return null;
  } catch (error) {
    return error.message;
  }
}
