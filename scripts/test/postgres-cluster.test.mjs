import assert from 'node:assert/strict';
import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { existsSync, mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { after, before, describe, it } from 'node:test';
import { setTimeout as sleep } from 'node:timers/promises';
import { run } from '../lib/commands.mjs';
import { placesIn } from '../lib/paths.mjs';
import { freePorts, isPortFree } from '../lib/ports.mjs';
import { openCluster } from '../lib/postgres-cluster.mjs';
import { postgresPrograms } from '../lib/postgres-programs.mjs';
import { openSecrets } from '../lib/secrets.mjs';

let home;
let secrets;
let port;

async function query(url, sql) {
  const { folder } = await postgresPrograms(join(home, 'cluster'));
  const { output } = await run(join(folder, 'psql'), ['-X', '-At', url, '-c', sql], { cwd: '/' });
  return output.trim();
}

async function isGone(wanted, withinMs = 30_000) {
  for (let waited = 0; waited < withinMs; waited += 50) {
    if (await wanted()) return true;
    await sleep(50);
  }
  return false;
}

const serverPid = () => Number(readFileSync(join(home, 'cluster', 'postmaster.pid'), 'utf8').split('\n')[0]);

/** Opens the cluster in a process of its own, to be killed. */
async function openInChild({ folder = home, throwaway = false } = {}) {
  const program = `
    import { openCluster } from ${JSON.stringify(new URL('../lib/postgres-cluster.mjs', import.meta.url).href)};
    const [home, port, secrets, throwaway] = JSON.parse(process.argv[1]);
    await openCluster({ home, port, secrets, throwaway });
    console.log('open');
    setInterval(() => undefined, 1000);`;
  const child = spawn(
    process.execPath,
    ['--input-type=module', '-e', program, JSON.stringify([folder, port, secrets, throwaway])],
    { stdio: ['ignore', 'pipe', 'inherit'] },
  );
  await once(child.stdout, 'data');
  return child;
}

before(async () => {
  home = mkdtempSync(join(tmpdir(), 'kerfyard-cluster-test-'));
  secrets = openSecrets(placesIn(mkdtempSync(join(home, 'keys-'))));
  [port] = await freePorts(1);
});

after(() => rmSync(home, { recursive: true, force: true }));

describe('a database cluster that is kept', () => {
  it('is made with an owner and an app role that cannot change the schema, and keeps its rows', async () => {
    const first = await openCluster({ home, port, secrets });
    await query(
      first.urls.owner,
      'CREATE TABLE kept (note text); GRANT SELECT, INSERT ON kept TO kerfyard_app',
    );
    await query(first.urls.app, "INSERT INTO kept VALUES ('still here')");
    await assert.rejects(query(first.urls.app, 'CREATE TABLE sneaky (note text)'), /permission denied/);
    await first.stop();
    assert.ok(await isPortFree(port));

    const second = await openCluster({ home, port, secrets });
    assert.equal(await query(second.urls.app, 'SELECT note FROM kept'), 'still here');
    assert.equal(await query(second.urls.app, 'SHOW fsync'), 'on');
    await second.stop();
  });

  it('wants the role’s password', async () => {
    const cluster = await openCluster({ home, port, secrets });
    const guessed = new URL(cluster.urls.app);
    guessed.password = 'guessed';
    await assert.rejects(query(guessed.href, 'SELECT 1'), /password authentication failed/);
    await cluster.stop();
  });

  it('has the extensions the schema needs', async () => {
    const cluster = await openCluster({ home, port, secrets });
    const names = await query(cluster.urls.app, 'SELECT extname FROM pg_extension ORDER BY 1');
    assert.deepEqual(names.split('\n'), [
      'btree_gist',
      'citext',
      'cube',
      'earthdistance',
      'pgcrypto',
      'plpgsql',
    ]);
    await cluster.stop();
  });

  it('is stopped when the process that opened it is killed', async () => {
    const child = await openInChild();
    const pid = serverPid();
    child.kill('SIGKILL');
    assert.ok(await isGone(() => !existsSync(`/proc/${pid}`)), 'the server ended');
    const again = await openCluster({ home, port, secrets });
    assert.equal(await query(again.urls.app, 'SELECT note FROM kept'), 'still here');
    await again.stop();
  });

  it('recovers when server and opener are killed together', async () => {
    const child = await openInChild();
    process.kill(serverPid(), 'SIGKILL');
    child.kill('SIGKILL');
    const again = await openCluster({ home, port, secrets });
    assert.equal(await query(again.urls.app, 'SELECT note FROM kept'), 'still here');
    await again.stop();
  });

  it('starts over a pid file whose number now belongs to another program', async () => {
    writeFileSync(
      join(home, 'cluster', 'postmaster.pid'),
      `${process.pid}\n${join(home, 'cluster')}\n1\n${port}\n`,
    );
    const again = await openCluster({ home, port, secrets });
    assert.equal(await query(again.urls.app, 'SELECT note FROM kept'), 'still here');
    await again.stop();
  });

  it('takes over a server that is still running from an earlier run', async () => {
    const earlier = await openCluster({ home, port, secrets });
    const [otherPort] = await freePorts(1);
    const later = await openCluster({ home, port: otherPort, secrets });
    assert.equal(await query(later.urls.app, 'SELECT note FROM kept'), 'still here');
    assert.ok(await isPortFree(port));
    await later.stop();
    await earlier.stop();
  });

  it('is made anew when an earlier run was killed while making it', async () => {
    rmSync(join(home, 'cluster-complete'));
    rmSync(join(home, 'cluster', 'global'), { recursive: true });
    const again = await openCluster({ home, port, secrets });
    assert.equal(await query(again.urls.app, "SELECT to_regclass('kept') IS NULL"), 't');
    await again.stop();
  });
});

describe('a throwaway cluster', () => {
  it('leaves no folder behind when its opener is killed', async () => {
    const folder = join(home, 'throwaway');
    mkdirSync(folder);
    const child = await openInChild({ folder, throwaway: true });
    assert.ok(existsSync(join(folder, 'cluster', 'postmaster.pid')));
    child.kill('SIGKILL');
    assert.ok(await isGone(() => !existsSync(folder)), 'the folder is gone');
    assert.ok(await isGone(() => isPortFree(port)), 'the port is free');
  });
});

describe('the keys of a data folder', () => {
  it('are never replaced for a database that needs the old ones', () => {
    const places = placesIn(mkdtempSync(join(home, 'data-')));
    openSecrets(places);
    rmSync(places.masterKeyFile);
    assert.throws(() => openSecrets(places, { clusterExists: true }), /master\.key/);
    assert.ok(!existsSync(places.masterKeyFile));
  });
});
