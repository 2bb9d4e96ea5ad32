export const INSERT_FILE = `
  INSERT INTO file (id, company_id, uploaded_by, kind, name, type, bytes, sha256, original_sha256, thumbnail_sha256,
                    width, height, pages, taken_at)
  VALUES ($1, $2, $3, $4, $5, $6, $7, $8, $9, $10, $11, $12, $13, $14)`;

export const FILES_BY_ID = `
  SELECT id, company_id, kind, name, type, bytes, sha256, thumbnail_sha256, width, height, pages, taken_at, created_at
  FROM file WHERE id = ANY ($1::uuid[])`;

/** Uploads of one company take turns here, so that two at once cannot both fit into the last room. */
export const LOCK_COMPANY_SPACE = `SELECT pg_advisory_xact_lock(hashtextextended('file space ' || $1, 0))`;

export const COMPANY_BYTES = `SELECT coalesce(sum(bytes), 0) AS bytes FROM file WHERE company_id = $1`;
