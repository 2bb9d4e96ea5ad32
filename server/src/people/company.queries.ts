import type { CompanyKind, Method } from '@kerfyard/common/people';

export interface CompanyRow {
  id: string;
  kind: CompanyKind;
  name: string;
  phone: string;
  yard_zip: string | null;
  yard_city: string | null;
  yard_state: string | null;
  yard_lat: number | null;
  yard_lon: number | null;
  service_radius_mi: number | null;
  methods: Method[];
  payout_account_id: string | null;
  payouts_ready: boolean;
  payout_requirements: string[];
}

export const SELECT_COMPANY = `
  SELECT id, kind, name, phone, yard_zip, yard_city, yard_state, yard_lat, yard_lon, service_radius_mi, methods,
    payout_account_id, payouts_ready, payout_requirements
  FROM company WHERE id = $1`;

export const LOCK_COMPANY = `${SELECT_COMPANY} FOR UPDATE`;

export const UPDATE_COMPANY = `
  UPDATE company SET name = $2, phone = $3, yard_zip = $4, yard_city = $5, yard_state = $6, yard_lat = $7,
    yard_lon = $8, service_radius_mi = $9, methods = $10::text[], version = version + 1, updated_at = app_now()
  WHERE id = $1`;

export interface UnitRow {
  id: string;
  name: string;
}
export const SELECT_CREWS = `SELECT id, name FROM crew WHERE company_id = $1 ORDER BY name, id`;
export const SELECT_TRUCKS = `SELECT id, name FROM truck WHERE company_id = $1 ORDER BY name, id`;
/** No row when the id or the name is taken. */
export const INSERT_CREW = `
  INSERT INTO crew (id, company_id, name) VALUES ($1, $2, $3) ON CONFLICT DO NOTHING RETURNING id`;
export const INSERT_TRUCK = `
  INSERT INTO truck (id, company_id, name) VALUES ($1, $2, $3) ON CONFLICT DO NOTHING RETURNING id`;
