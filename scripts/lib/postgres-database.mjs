import { run } from './commands.mjs';

const extensions = ['btree_gist', 'citext', 'pgcrypto', 'cube', 'earthdistance'];

/**
 * Makes the roles, the database and its extensions in a new cluster. (Killed half-way, the cluster is made anew.)
 * kerfyard_owner owns the schema and is used by migrations only; kerfyard_app is what the server connects as.
 */
export async function prepareDatabase({ psql, port, major, secrets }) {
  const execute = (database, sql) =>
    run(
      psql,
      ['-X', '-q', '-v', 'ON_ERROR_STOP=1', '-h', '127.0.0.1', '-p', port, '-U', 'postgres', '-d', database],
      {
        cwd: '/',
        env: { ...process.env, PGPASSWORD: secrets.superPassword, PGOPTIONS: '' },
        input: sql,
      },
    );
  // Copying the template's files takes a third of the time of logging each page; PostgreSQL 15 made it a choice.
  const strategy = major >= 15 ? 'STRATEGY file_copy' : '';
  await execute(
    'postgres',
    `CREATE ROLE kerfyard_owner LOGIN PASSWORD '${secrets.ownerPassword}';
     CREATE ROLE kerfyard_app LOGIN PASSWORD '${secrets.appPassword}';
     CREATE DATABASE kerfyard OWNER kerfyard_owner TEMPLATE template0 ENCODING 'UTF8' LOCALE 'C.UTF-8' ${strategy};
     REVOKE ALL ON DATABASE kerfyard FROM PUBLIC;
     GRANT CONNECT ON DATABASE kerfyard TO kerfyard_app;`,
  );
  await execute(
    'kerfyard',
    `${extensions.map((name) => `CREATE EXTENSION ${name};`).join('\n')}
     ALTER SCHEMA public OWNER TO kerfyard_owner;
     REVOKE CREATE ON SCHEMA public FROM PUBLIC;
     GRANT USAGE ON SCHEMA public TO kerfyard_app;`,
  );
}
