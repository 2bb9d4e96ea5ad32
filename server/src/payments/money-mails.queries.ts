export const FUNDING_FOR_MAIL = `
  SELECT s.id AS subcontract_id, s.number, sc.title, f.amount_cents AS cents
  FROM funding f JOIN subcontract s ON s.id = f.subcontract_id JOIN scope sc ON sc.id = s.scope_id WHERE f.id = $1`;

export const RELEASE_FOR_MAIL = `
  SELECT s.id AS subcontract_id, s.number, sc.title, r.crew_cents AS cents
  FROM release r JOIN subcontract s ON s.id = r.subcontract_id JOIN scope sc ON sc.id = s.scope_id WHERE r.id = $1`;
