const COMPLETION = `
  SELECT c.id, c.subcontract_id, c.visit_id, c.status, c.as_cut, c.note, c.submitted_at, c.accepted_at, c.answer_by,
    submitter.name AS submitted_by_name, accepter.name AS accepted_by_name,
    (SELECT array_agg(l.sov_line_id ORDER BY v.position) FROM completion_line l JOIN sov_line v ON v.id = l.sov_line_id
      WHERE l.completion_id = c.id) AS sov_line_ids,
    (SELECT coalesce(sum(v.amount_cents), 0) FROM completion_line l JOIN sov_line v ON v.id = l.sov_line_id
      WHERE l.completion_id = c.id) AS amount_cents,
    (SELECT coalesce(array_agg(p.file_id ORDER BY p.position), '{}') FROM completion_photo p
      WHERE p.completion_id = c.id) AS photo_ids
  FROM completion c
    JOIN app_user submitter ON submitter.id = c.submitted_by
    LEFT JOIN app_user accepter ON accepter.id = c.accepted_by`;

export const COMPLETION_BY_ID = `${COMPLETION} WHERE c.id = $1`;
export const COMPLETIONS_OF_SUBCONTRACT = `${COMPLETION} WHERE c.subcontract_id = $1 ORDER BY c.submitted_at, c.id`;

export const SUBCONTRACT_OF_COMPLETION = `SELECT subcontract_id, status FROM completion WHERE id = $1`;

/** Lines of a subcontract that stand in a completion, with how far that one is. */
export const STANDING_COMPLETION_LINES = `
  SELECT l.sov_line_id, c.status FROM completion_line l JOIN completion c ON c.id = l.completion_id
  WHERE c.subcontract_id = $1 AND l.standing`;

export const VISIT_FOR_COMPLETION = `
  SELECT v.subcontract_id, v.status,
    (SELECT coalesce(array_agg(l.sov_line_id), '{}') FROM visit_line l WHERE l.visit_id = v.id) AS sov_line_ids
  FROM visit v WHERE v.id = $1`;

export const INSERT_COMPLETION = `
  INSERT INTO completion (id, subcontract_id, visit_id, status, as_cut, note, submitted_by, submitted_at, answer_by)
  VALUES ($1, $2, $3, 'submitted', $4, $5, $6, $7, $8)
  ON CONFLICT (id) DO NOTHING
  RETURNING id`;

export const INSERT_COMPLETION_LINES = `
  INSERT INTO completion_line (completion_id, sov_line_id) SELECT $1, unnest($2::uuid[])`;

export const INSERT_COMPLETION_PHOTOS = `
  INSERT INTO completion_photo (completion_id, file_id, position)
  SELECT $1, file_id, position FROM unnest($2::uuid[]) WITH ORDINALITY AS x(file_id, position)`;

export const ACCEPT_COMPLETION = `
  UPDATE completion SET status = 'accepted', accepted_by = $2, accepted_at = app_now()
  WHERE id = $1 AND status = 'submitted' RETURNING id`;

export const WITHDRAW_COMPLETION = `
  UPDATE completion SET status = 'withdrawn' WHERE id = $1 AND status = 'submitted' RETURNING id`;

/** A withdrawn completion's lines may be listed again. */
export const FREE_COMPLETION_LINES = `UPDATE completion_line SET standing = false WHERE completion_id = $1`;
