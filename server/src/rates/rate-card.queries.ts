export interface RateCardRow {
  ciphertext: Buffer;
  version: number;
  updated_at: Date;
}

export const RATE_CARD = `SELECT ciphertext, version, updated_at FROM rate_card WHERE company_id = $1`;

/** No row when the company has a card already: the other one was first. */
export const INSERT_RATE_CARD = `
  INSERT INTO rate_card (company_id, ciphertext, version, updated_by) VALUES ($1, $2, 1, $3)
  ON CONFLICT (company_id) DO NOTHING RETURNING ciphertext, version, updated_at`;

/** No row when the version is another than `$4`. */
export const UPDATE_RATE_CARD = `
  UPDATE rate_card SET ciphertext = $2, version = version + 1, updated_by = $3, updated_at = app_now()
  WHERE company_id = $1 AND version = $4 RETURNING ciphertext, version, updated_at`;

export const COMPANY_KEY = `SELECT wrapped_key FROM company WHERE id = $1`;
