import { randomInt } from 'node:crypto';
import { createServer } from 'node:net';
import { Failure } from './failure.mjs';

// Below Linux's range for outgoing connections (32768 and up), so that no client socket takes one between our look
// and the service's listen.
const lowest = 20_000;
const highest = 32_000;
const nextTries = 50;

/** Whether a server could listen on this port, on both loopback addresses that exist here. */
export async function isPortFree(port) {
  for (const host of ['127.0.0.1', '::1']) {
    if (!(await canListen(port, host))) return false;
  }
  return true;
}

function canListen(port, host) {
  return new Promise((resolve) => {
    const server = createServer();
    // EADDRNOTAVAIL and EAFNOSUPPORT: this machine has no such address, so it is no obstacle.
    server.once('error', (error) => resolve(['EADDRNOTAVAIL', 'EAFNOSUPPORT'].includes(error.code)));
    server.listen({ port, host, exclusive: true }, () => server.close(() => resolve(true)));
  });
}

/** `count` different free ports for something short-lived. */
export async function freePorts(count) {
  const found = new Set();
  while (found.size < count) {
    const port = randomInt(lowest, highest);
    if (!found.has(port) && (await isPortFree(port))) found.add(port);
  }
  return [...found];
}

/**
 * The port for a service of `npm start`. One set by the person is taken or refused, never swapped. So is the app's own,
 * since its address is what people bookmark; for the others the next free one does.
 */
export async function choosePort({ name, variable, fallback, fixed = false }) {
  const wanted = process.env[variable];
  const port = wanted ? Number(wanted) : fallback;
  if (!Number.isInteger(port) || port < 1 || port > 65_535) {
    throw new Failure(`${variable}=${wanted} is not a port. Give a number from 1 to 65535.`);
  }
  if (await isPortFree(port)) return port;
  if (fixed || wanted) {
    const other = await nextFree(port + 100);
    throw new Failure(
      `Port ${port}, wanted for ${name}, is used by another program.\n` +
        `Stop that program or choose another port, for example: ${variable}=${other} npm start`,
    );
  }
  return nextFree(port + 1);
}

async function nextFree(from) {
  for (let port = from; port < from + nextTries; port += 1) {
    if (await isPortFree(port)) return port;
  }
  throw new Failure(`No free port between ${from} and ${from + nextTries}.`);
}
