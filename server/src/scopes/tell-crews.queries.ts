/**
 * A page of the crews a scope is for: the site within their service radius, and a method of theirs that can do one of
 * its cuts. $1 scope, $2 the last company told or null, $3 how many.
 */
export const MATCHING_CREWS = `
  SELECT c.id
  FROM scope s JOIN company c ON c.kind = 'cutting_contractor' AND c.methods && s.methods
  WHERE s.id = $1 AND s.status = 'open' AND ($2::uuid IS NULL OR c.id > $2)
    AND c.yard_lat IS NOT NULL AND c.yard_lon IS NOT NULL
    AND 2 * 3958.8 * asin(least(1, sqrt(
      power(sin(radians(s.lat - c.yard_lat) / 2), 2)
      + cos(radians(s.lat)) * cos(radians(c.yard_lat)) * power(sin(radians(s.lon - c.yard_lon) / 2), 2)
    ))) <= c.service_radius_mi
  ORDER BY c.id
  LIMIT $3`;
