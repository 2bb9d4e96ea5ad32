import pg from 'pg';

export const openPool = (role = 'TEST_PG_URL', max = 4) =>
  new pg.Pool({ connectionString: process.env[role], max });

const CLONE = `
  WITH template AS (
    SELECT s.* FROM scope s JOIN scope_key k ON k.scope_id = s.id
    WHERE s.status = 'open' AND s.mode = 'sealed' AND s.extensions = 0 ORDER BY s.number LIMIT 1
  ), made AS (
    INSERT INTO scope (id, company_id, number, status, created_by, revision, title, mode, due_at, time_zone, city, state,
      lat, lon, methods, indoors, inch_feet, totals, sketch, cut_count, plugs, published_at)
    SELECT gen_random_uuid(), t.company_id, (SELECT max(number) FROM scope) + n, 'open', t.created_by, t.revision, t.title, $2,
      app_now() + interval '20 days', t.time_zone, t.city, t.state, t.lat, t.lon, t.methods, t.indoors, t.inch_feet,
      t.totals, t.sketch, t.cut_count, t.plugs, app_now()
    FROM template t, generate_series(1, $1::int) n
    RETURNING id, company_id, revision
  ), revisions AS (
    INSERT INTO scope_revision (scope_id, revision, body, totals, published_by)
    SELECT m.id, r.revision, r.body, r.totals, r.published_by
    FROM made m, template t JOIN scope_revision r ON r.scope_id = t.id AND r.revision = t.revision
  ), keys AS (
    INSERT INTO scope_key (scope_id, public_key, wrapped_private_key)
    SELECT m.id, k.public_key, k.wrapped_private_key FROM made m, template t JOIN scope_key k ON k.scope_id = t.id
  )
  SELECT id, company_id, revision FROM made`;

/** Published scopes with a whole revision, as many as wanted, copied from one that the demo's people published. */
export async function cloneScopes(count, mode) {
  const pool = openPool('TEST_PG_OWNER_URL', 1);
  try {
    const { rows } = await pool.query(CLONE, [count, mode]);
    if (rows.length !== count) throw new Error('the demo has no open sealed scope to copy');
    return rows.map((row) => ({ id: row.id, companyId: row.company_id, revision: row.revision }));
  } finally {
    await pool.end();
  }
}

/** Take the copies back out of the lists. */
export async function withdrawScopes(scopes) {
  const pool = openPool('TEST_PG_OWNER_URL', 1);
  await pool.query(`UPDATE scope SET status = 'withdrawn' WHERE id = ANY ($1::uuid[])`, [
    scopes.map(({ id }) => id),
  ]);
  await pool.end();
}

/** A lump-sum bid as the form sends it. */
export const lumpBid = (revision, lumpCents) => ({
  revision,
  price: { form: 'lump', lumpCents },
  answers: [],
  inclusions: ['Blades and water hoses'],
  exclusions: [],
  note: '',
  validDays: 30,
  startFrom: null,
});

/** A bid by lines: every cut by the piece. */
export const linesBid = (revision, cuts, centsEach) => ({
  ...lumpBid(revision, 100),
  price: {
    form: 'lines',
    lines: cuts.map(({ id }) => ({ cutId: id, unit: 'each', rate: centsEach * 100, factors: [] })),
    minimumCents: 0,
    mobilizationCents: 0,
    minimumIncludesMobilization: true,
  },
});
