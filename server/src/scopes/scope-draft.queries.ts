/** Human numbers run on over the whole platform; the counter's row is held until the transaction ends. */
export const NEXT_NUMBER = `
  INSERT INTO counter AS c (name, value) VALUES ('scope', 1001)
  ON CONFLICT (name) DO UPDATE SET value = c.value + 1 RETURNING value`;

export const SCOPE_OWNER = `SELECT company_id, status FROM scope WHERE id = $1`;

export const INSERT_DRAFT = `
  INSERT INTO scope (id, company_id, number, status, created_by, draft, title, mode, due_at, time_zone, city, state, totals, inch_feet, sketch, cut_count)
  VALUES ($1, $2, $3, 'draft', $4, $5, $6, $7, $8, $9, $10, $11, $12, $13, $14, $15)
  ON CONFLICT (id) DO NOTHING RETURNING id`;

export const SAVE_DRAFT = `
  UPDATE scope SET draft = $4, draft_version = draft_version + 1, title = $5, mode = $6, due_at = $7, time_zone = $8,
    city = $9, state = $10, totals = $11, inch_feet = $12, sketch = $13, cut_count = $14, updated_at = app_now()
  WHERE id = $1 AND company_id = $2 AND status = 'draft' AND draft_version = $3
  RETURNING draft_version`;

/** Why a draft was not saved; "same" is a save whose answer was lost and which is sent again. */
export const DRAFT_STATE = `
  SELECT status, draft_version, draft = $2::jsonb AS same FROM scope WHERE id = $1 AND company_id = $3`;

export const DISCARD_DRAFT = `
  UPDATE scope SET status = 'discarded', draft = NULL, sketch = '[]', updated_at = app_now()
  WHERE id = $1 AND company_id = $2 AND status = 'draft' RETURNING id`;

export const LOCK_DRAFT = `
  SELECT status, draft, draft_version FROM scope WHERE id = $1 AND company_id = $2 FOR UPDATE`;

export const INSERT_REVISION = `
  INSERT INTO scope_revision (scope_id, revision, body, totals, published_by, published_at)
  VALUES ($1, 1, $2, $3, $4, $5)`;

export const PUBLISH = `
  UPDATE scope SET status = 'open', draft = NULL, revision = 1, title = $2, mode = $3, due_at = $4, time_zone = $5,
    city = $6, state = $7, lat = $8, lon = $9, methods = $10, inch_feet = $11, totals = $12, sketch = $13,
    cut_count = $14, published_at = $15, indoors = $16, seq = seq + 1, updated_at = app_now()
  WHERE id = $1 RETURNING seq`;

export const INSERT_SCOPE_KEY = `
  INSERT INTO scope_key (scope_id, public_key, wrapped_private_key) VALUES ($1, $2, $3)`;

export const SCOPE_FILES = `SELECT file_id, caption FROM scope_file WHERE scope_id = $1 ORDER BY position, file_id`;
export const COUNT_OTHER_FILES = `
  SELECT count(*) AS files, coalesce(max(position), 0) AS last FROM scope_file WHERE scope_id = $1 AND file_id <> $2`;
export const ATTACH_FILE = `
  INSERT INTO scope_file (scope_id, file_id, caption, position) VALUES ($1, $2, $3, $4)
  ON CONFLICT (scope_id, file_id) DO UPDATE SET caption = excluded.caption`;
export const DETACH_FILE = `DELETE FROM scope_file WHERE scope_id = $1 AND file_id = $2`;
