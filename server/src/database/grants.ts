import { Sequelize } from 'sequelize';

/** Tables the app may only add to: history, papers, the ledger. Accounts' balances are written by a trigger alone. */
const appendOnly = [
  'audit_event',
  'scope_revision',
  'signature',
  'ledger_account',
  'ledger_entry',
  'ledger_posting',
  'ledger_seal',
];
const readOnly = ['app_clock', 'schema_migration', 'demo_person'];

/** What the app's role may do; run after every migration. Nothing in a list here comes from outside. */
export async function grantAppRole(ownerUrl: string): Promise<void> {
  const sequelize = new Sequelize(ownerUrl, { logging: false, pool: { max: 1 } });
  try {
    await sequelize.query(`
      GRANT USAGE ON SCHEMA public TO kerfyard_app;
      GRANT SELECT, INSERT, UPDATE, DELETE ON ALL TABLES IN SCHEMA public TO kerfyard_app;
      GRANT USAGE ON ALL SEQUENCES IN SCHEMA public TO kerfyard_app;
      REVOKE UPDATE, DELETE ON ${appendOnly.join(', ')} FROM kerfyard_app;
      REVOKE INSERT, UPDATE, DELETE ON ${readOnly.join(', ')} FROM kerfyard_app;
      GRANT USAGE ON SCHEMA pgboss TO kerfyard_app;
      GRANT SELECT, INSERT, UPDATE, DELETE ON ALL TABLES IN SCHEMA pgboss TO kerfyard_app;
      GRANT EXECUTE ON ALL FUNCTIONS IN SCHEMA pgboss TO kerfyard_app;
    `);
  } finally {
    await sequelize.close();
  }
}
