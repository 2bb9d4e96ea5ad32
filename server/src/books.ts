import 'reflect-metadata';
import { Sequelize } from 'sequelize';
import { Books } from './ledger/books.ts';
import { LedgerSeals } from './ledger/seals.ts';
import { Incidents } from './payments/incidents.ts';
import { Reconciliation } from './payments/reconcile.ts';
import { readConfig, type Config } from './platform/config/config.ts';
import { UnitOfWork } from './platform/database/unit-of-work.ts';
import { createStripeClient } from './platform/stripe/stripe-client.ts';

const dollars = new Intl.NumberFormat('en-US', { style: 'currency', currency: 'USD' });
const show = (holds: boolean, id: string, what: string) =>
  console.log(`${holds ? 'ok    ' : 'BROKEN'}  ${id.padEnd(5)}  ${what}`);

/** Prints the trial balance, every rule of the books and the comparison with the provider. Gives whether all hold. */
async function checkBooks(config: Config): Promise<boolean> {
  const sequelize = new Sequelize(config.databaseUrl, { logging: false, pool: { max: 4 } });
  try {
    const uow = new UnitOfWork(sequelize);
    const seals = new LedgerSeals(uow);
    const books = new Books(uow, seals);
    await seals.sealAll();
    for (const { book, accounts, sumCents } of await books.trialBalance()) {
      console.log(`Book "${book}": ${accounts.length} accounts, sum ${dollars.format(sumCents / 100)}`);
    }
    const checks = await books.checks(true);
    for (const { id, name, failures } of checks)
      show(failures === 0, id, failures === 0 ? name : `${name}: ${failures}`);
    const reconciliation = new Reconciliation(uow, new Incidents(uow), createStripeClient(config));
    const differences = await reconciliation.run();
    show(differences.length === 0, 'B-I7', 'the books say what the provider says');
    for (const { kind, subject, detail } of differences)
      console.log(`        ${kind}  ${subject}: ${detail}`);
    return checks.every(({ failures }) => failures === 0) && differences.length === 0;
  } finally {
    await sequelize.close();
  }
}

try {
  process.exitCode = (await checkBooks(readConfig())) ? 0 : 1;
} catch (error) {
  console.error(error instanceof Error ? error.message : 'The books could not be read');
  process.exitCode = 2;
}
