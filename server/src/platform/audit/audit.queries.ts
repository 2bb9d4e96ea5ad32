export const INSERT_AUDIT_EVENT = `
  INSERT INTO audit_event (actor_user_id, actor_company_id, action, subject_type, subject_id, detail, ip, request_id)
  VALUES ($1, $2, $3, $4, $5, $6, $7, $8)`;
