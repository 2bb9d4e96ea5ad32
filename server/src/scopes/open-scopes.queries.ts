import type { OpenScopesQuery } from '@kerfyard/common/scopes';
import { SCOPE_COLUMNS } from './scope-core.queries.ts';

type Sort = OpenScopesQuery['sort'];

/*
 * A page of open scopes. $1 the yard as a point or null, $2 a method, $3 miles as a chord, $4 due before, $5 and $6
 * inch-feet from and to, $7 how many, $8 and $9 what the last row seen was sorted by and its id, $10 the squares that
 * the miles reach; each null where it does not narrow.
 */

const FILTERS = `
  s.status = 'open' AND s.due_at > (SELECT app_now())
  AND ($2::text IS NULL OR s.methods @> ARRAY[$2::text])
  AND ($10::integer[] IS NULL OR s.cell = ANY ($10))
  AND ($3::double precision IS NULL OR s.place <-> $1::cube <= $3)
  AND ($4::timestamptz IS NULL OR s.due_at < $4)
  AND ($5::double precision IS NULL OR s.inch_feet >= $5)
  AND ($6::double precision IS NULL OR s.inch_feet <= $6)`;

const CARD_COLUMNS = `${SCOPE_COLUMNS}, c.name AS company_name, s.place <-> $1::cube AS chord`;

/** Orders that an index of their own answers, id included. */
const orders: Record<Exclude<Sort, 'nearest'>, { after: string; by: string }> = {
  newest: {
    after: '(s.published_at, s.id) < ($8::timestamptz, $9::uuid)',
    by: 's.published_at DESC, s.id DESC',
  },
  due: { after: '(s.due_at, s.id) > ($8::timestamptz, $9::uuid)', by: 's.due_at, s.id' },
  largest: {
    after: '(s.inch_feet, s.id) < ($8::double precision, $9::uuid)',
    by: 's.inch_feet DESC, s.id DESC',
  },
};

function openScopes(sort: Exclude<Sort, 'nearest'>): string {
  const { after, by } = orders[sort];
  return `
    SELECT ${CARD_COLUMNS}
    FROM scope s JOIN company c ON c.id = s.company_id
    WHERE ${FILTERS} AND ($9::uuid IS NULL OR ${after})
    ORDER BY ${by} LIMIT $7`;
}

/**
 * Nearest first. The index gives rows by distance alone, and scopes of one site are equally far: it first says how far
 * the page reaches, then every row up to there is put in order by distance and id, so that no page skips one.
 */
const NEAREST = `
  WITH reach AS MATERIALIZED (
    SELECT max(near.chord) AS chord FROM (
      SELECT s.place <-> $1::cube AS chord FROM scope s
      WHERE ${FILTERS} AND ($9::uuid IS NULL OR (s.place <-> $1::cube, s.id) > ($8::double precision, $9::uuid))
      ORDER BY s.place <-> $1::cube LIMIT $7
    ) near
  )
  SELECT ${CARD_COLUMNS}
  FROM scope s JOIN company c ON c.id = s.company_id
  WHERE ${FILTERS} AND ($9::uuid IS NULL OR (s.place <-> $1::cube, s.id) > ($8::double precision, $9::uuid))
    AND s.place <@ cube_enlarge($1::cube, (SELECT chord FROM reach) + 1e-9, 3)
    AND s.place <-> $1::cube <= (SELECT chord FROM reach)
  ORDER BY s.place <-> $1::cube, s.id LIMIT $7`;

export const OPEN_SCOPES: Record<Sort, string> = {
  newest: openScopes('newest'),
  due: openScopes('due'),
  largest: openScopes('largest'),
  nearest: NEAREST,
};
