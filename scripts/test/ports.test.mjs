import assert from 'node:assert/strict';
import { once } from 'node:events';
import { createServer } from 'node:net';
import { after, before, describe, it } from 'node:test';
import { choosePort, freePorts, isPortFree } from '../lib/ports.mjs';

const variable = 'KERFYARD_PORT_OF_THIS_TEST';
const holder = createServer();
let taken;

before(async () => {
  [taken] = await freePorts(1);
  holder.listen(taken, '127.0.0.1');
  await once(holder, 'listening');
});

after(() => holder.close());

describe('choosing a port', () => {
  it('takes the next free one for a private service', async () => {
    const port = await choosePort({ name: 'the mail page', variable, fallback: taken });
    assert.ok(port > taken);
    assert.ok(await isPortFree(port));
  });

  it('refuses a taken port that people know, or that was asked for', async () => {
    await assert.rejects(
      choosePort({ name: 'the app', variable, fallback: taken, fixed: true }),
      /is used by/,
    );
    process.env[variable] = String(taken);
    await assert.rejects(choosePort({ name: 'the mail page', variable, fallback: 1 }), /is used by/);
    delete process.env[variable];
  });

  it('refuses what is no port', async () => {
    for (const wrong of ['0', '65536', 'eighty', '4600.5']) {
      process.env[variable] = wrong;
      await assert.rejects(choosePort({ name: 'the app', variable, fallback: 4600 }), /is not a port/);
    }
    delete process.env[variable];
  });

  it('finds different free ports', async () => {
    const ports = await freePorts(20);
    assert.equal(new Set(ports).size, 20);
    assert.ok(!ports.includes(taken));
  });
});
