import { setTimeout as sleep } from 'node:timers/promises';
import { Browser } from './browser.mjs';
import { startServer } from './listening.mjs';
import { startTap } from './statement-tap.mjs';

const FRAME = /^(START TRANSACTION|BEGIN|COMMIT|ROLLBACK|SET |SHOW )/i;

/**
 * Runs `work(browser, record)` at a server whose words to the database are heard. `record(request)` resolves to the
 * request's answer and the statements it cost, those that only frame a transaction left out.
 */
export async function capture(personKey, work) {
  const tap = await startTap(process.env.TEST_PG_URL, 'kerfyard-app');
  const server = await startServer({ DATABASE_URL: tap.url });
  try {
    const browser = await Browser.of(personKey, server.url);
    const record = async (request) => {
      // Whatever timed work was under way is over by then.
      await sleep(300);
      const from = tap.statements.length;
      const answer = await request();
      const statements = tap.statements.slice(from).filter(({ text }) => !FRAME.test(text.trim()));
      return { answer, statements };
    };
    return await work(browser, record);
  } finally {
    await server.stop();
    await tap.close();
  }
}

const UUID = /[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}/g;

/** When a UUID of version 7 was made (RFC 9562, section 5.7), or 0. */
const madeAt = (id) => (id[14] === '7' ? Number.parseInt(id.slice(0, 8) + id.slice(9, 13), 16) : 0);

/**
 * The same statements for another subject: `known` ids become their partners, ids made at or after `since` become new
 * ones of `newId`, each the same everywhere.
 */
export function retell(statements, { known, since, newId }) {
  const partners = new Map(Object.entries(known));
  const partner = (id) => {
    if (!partners.has(id)) partners.set(id, madeAt(id) >= since ? newId() : id);
    return partners.get(id);
  };
  return statements.map(({ text, values }) => ({
    text,
    values: values.map((value) => (typeof value === 'string' ? value.replace(UUID, partner) : value)),
  }));
}
