import { writeFileSync } from 'node:fs';
import type { Server } from 'node:http';
import { Client } from 'pg';
import { bootstrap } from './bootstrap.ts';
import { DEMO_PASSWORD, demoCompanies, demoStaff, emailOf } from './demo/seed/cast.ts';
import { tellDemoStory } from './demo/seed/demo-story.ts';
import { DemoWorld } from './demo/seed/demo-world.ts';
import { IS_EMPTY } from './demo/seed/demo-world.queries.ts';
import { readConfig, readOwnerUrl, readSignInsFile } from './platform/config/config.ts';

const shownRoles = ['owner', 'accounts', 'manager', 'field'] as const;

/** The sign-ins that the start command prints: one person for each role of one company of each kind, and staff. */
function writeSignIns(file: string): void {
  const shown = ['halden', 'quillback'].flatMap((key) => {
    const company = demoCompanies.find((one) => one.key === key);
    return (company?.people ?? [])
      .filter((person) => shownRoles.includes(person.role))
      .map((person) => ({
        role: person.role,
        name: person.name,
        email: emailOf(person.key),
        password: DEMO_PASSWORD,
        note: company?.name ?? '',
      }));
  });
  const staff = {
    role: 'staff',
    name: demoStaff.name,
    email: emailOf(demoStaff.key),
    password: DEMO_PASSWORD,
    note: 'Kerfyard',
  };
  writeFileSync(file, JSON.stringify([...shown, staff], null, 2));
}

async function isEmpty(ownerUrl: string): Promise<boolean> {
  const client = new Client({ connectionString: ownerUrl });
  await client.connect();
  try {
    const { rows } = await client.query<{ is_empty: boolean }>(IS_EMPTY);
    return rows[0]?.is_empty === true;
  } finally {
    await client.end();
  }
}

/** Fills an empty database with the demo: the app itself listens, and the demo's people use it. */
async function seed(): Promise<void> {
  const ownerUrl = readOwnerUrl();
  // A few people do in a minute what takes others weeks, so the limits on tries are lifted for them.
  const config = { ...readConfig(), rateLimitFactor: 10_000, logLevel: 'error' as const };
  if (config.mode === 'production') throw new Error('The demo is not made in production');
  const file = readSignInsFile();
  if (file !== null) writeSignIns(file);
  if (!(await isEmpty(ownerUrl))) return console.log('The database is not empty; nothing was changed.');
  const app = await bootstrap(config);
  await app.listen(config.port, config.host);
  // Drawing pictures holds this process up for seconds; a connection closed for idleness meanwhile would fail the next
  // request, which the demo's people, being in the same process, could not know.
  (app.getHttpServer() as Server).keepAliveTimeout = 0;
  const world = await DemoWorld.open(config, ownerUrl);
  try {
    await tellDemoStory(world, (line) => console.log(line));
  } finally {
    await world.close();
    await app.close();
  }
}

try {
  await seed();
} catch (error) {
  console.error(error); // with its cause, which a failed request hides behind "fetch failed"
  process.exitCode = 1;
}
