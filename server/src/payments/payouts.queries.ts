export const COMPANY_BY_ID = `SELECT id, name, kind, payout_account_id FROM company WHERE id = $1`;

export const LOCK_COMPANY = `SELECT id FROM company WHERE id = $1 FOR UPDATE`;

export const SET_PAYOUT_ACCOUNT = `
  UPDATE company SET payout_account_id = $2, updated_at = app_now() WHERE id = $1 AND payout_account_id IS NULL`;

export const COMPANY_BY_ACCOUNT = `SELECT id, payouts_ready FROM company WHERE payout_account_id = $1`;

export const SET_PAYOUT_STATE = `
  UPDATE company SET payouts_ready = $2, payout_requirements = $3, updated_at = app_now() WHERE payout_account_id = $1`;
