import { SCOPE_COLUMNS } from './scope-core.queries.ts';

/** Standing bids of a scope, whatever their form: sealed until the opening, readable from then on. */
const BID_COUNT = `
  (SELECT count(*) FROM sealed_bid sb WHERE sb.scope_id = s.id AND sb.status = 'in')
  + (SELECT count(*) FROM bid b WHERE b.scope_id = s.id AND b.status IN ('in', 'opened'))`;

/** The subcontract that stands (a lapsed one made room for another award), for its two sides only. */
const subcontractOf = (companyParameter: string) => `
  (SELECT w.id FROM subcontract w
   WHERE w.scope_id = s.id AND w.status <> 'lapsed' AND ${companyParameter}::uuid IN (w.gc_company_id, w.crew_company_id)
   ORDER BY w.created_at DESC LIMIT 1)`;

/** $2 the reading crew's yard as a point, or null; $3 the reading company. */
export const SCOPE_DETAIL = `
  SELECT ${SCOPE_COLUMNS}, s.draft, c.name AS company_name, r.body,
    s.place <-> $2::cube AS chord, ${BID_COUNT} AS bid_count, ${subcontractOf('$3')} AS subcontract_id
  FROM scope s
  JOIN company c ON c.id = s.company_id
  LEFT JOIN scope_revision r ON r.scope_id = s.id AND r.revision = s.revision
  WHERE s.id = $1`;

/** $1 company, $2 status or null, $3 and $4 the key of the last row seen, $5 how many. */
export const OWN_SCOPES = `
  SELECT ${SCOPE_COLUMNS}, ${BID_COUNT} AS bid_count, ${subcontractOf('$1')} AS subcontract_id
  FROM scope s
  WHERE s.company_id = $1 AND s.status <> 'discarded' AND ($2::text IS NULL OR s.status = $2)
    AND ($3::timestamptz IS NULL OR (s.updated_at, s.id) < ($3, $4::uuid))
  ORDER BY s.updated_at DESC, s.id DESC
  LIMIT $5`;
