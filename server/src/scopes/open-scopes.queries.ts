import type { OpenScopesQuery } from '@kerfyard/common/scopes';
import { SCOPE_COLUMNS } from './scope-core.queries.ts';

type Sort = OpenScopesQuery['sort'];

/** Order and the rows after the last one seen ($8 its key, $9 its id), each answered by an index of its own. */
const orders: Record<Sort, { after: string; by: string }> = {
  newest: {
    after: '(s.published_at, s.id) < ($8::timestamptz, $9::uuid)',
    by: 's.published_at DESC, s.id DESC',
  },
  due: { after: '(s.due_at, s.id) > ($8::timestamptz, $9::uuid)', by: 's.due_at, s.id' },
  nearest: {
    after: '(s.place <-> $1::cube, s.id) > ($8::double precision, $9::uuid)',
    by: 's.place <-> $1::cube, s.id',
  },
  largest: {
    after: '(s.inch_feet, s.id) < ($8::double precision, $9::uuid)',
    by: 's.inch_feet DESC, s.id DESC',
  },
};

/**
 * A page of open scopes. $1 the yard as a point or null, $2 a method, $3 miles as a chord, $4 due before, $5 and $6
 * inch-feet from and to, $7 how many, $8 and $9 the last row seen; each null where it does not narrow. The box round
 * the yard ("<@ cube_enlarge") is what the index answers; the chord then cuts off its corners.
 */
function openScopes(sort: Sort): string {
  const { after, by } = orders[sort];
  return `
    SELECT ${SCOPE_COLUMNS}, c.name AS company_name, s.place <-> $1::cube AS chord
    FROM scope s JOIN company c ON c.id = s.company_id
    WHERE s.status = 'open' AND s.due_at > (SELECT app_now())
      AND ($2::text IS NULL OR s.methods @> ARRAY[$2::text])
      AND ($3::double precision IS NULL
        OR (s.place <@ cube_enlarge($1::cube, $3, 3) AND s.place <-> $1::cube <= $3))
      AND ($4::timestamptz IS NULL OR s.due_at < $4)
      AND ($5::double precision IS NULL OR s.inch_feet >= $5)
      AND ($6::double precision IS NULL OR s.inch_feet <= $6)
      AND ($9::uuid IS NULL OR ${after})
    ORDER BY ${by}
    LIMIT $7`;
}

export const OPEN_SCOPES: Record<Sort, string> = {
  newest: openScopes('newest'),
  due: openScopes('due'),
  nearest: openScopes('nearest'),
  largest: openScopes('largest'),
};
