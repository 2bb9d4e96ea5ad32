import type { OwnCompanyView } from '@kerfyard/common/people';
import type { CompanyRow, UnitRow } from './company.queries.ts';

/** A company as its own people see it. What is missing is named by keys that the client has words for. */
export function presentOwnCompany(row: CompanyRow, crews: UnitRow[], trucks: UnitRow[]): OwnCompanyView {
  return {
    id: row.id,
    kind: row.kind,
    name: row.name,
    phone: row.phone,
    yard: presentYard(row),
    serviceRadiusMi: row.service_radius_mi,
    methods: row.methods,
    crews: crews.map(({ id, name }) => ({ id, name })),
    trucks: trucks.map(({ id, name }) => ({ id, name })),
    payouts: { state: payoutState(row), missing: row.payout_requirements },
    ladder: presentLadder(row),
  };
}

function presentYard(row: CompanyRow): OwnCompanyView['yard'] {
  const { yard_zip: zip, yard_city: city, yard_state: state, yard_lat: lat, yard_lon: lon } = row;
  if (zip === null || city === null || state === null || lat === null || lon === null) return null;
  return { zip, city, state, lat, lon };
}

function payoutState(row: CompanyRow): OwnCompanyView['payouts']['state'] {
  if (row.payout_account_id === null) return 'not_started';
  return row.payouts_ready ? 'ready' : 'under_way';
}

/** Each step asks only for what it needs; a general contractor sees and pays by its roles alone. */
function presentLadder(row: CompanyRow): OwnCompanyView['ladder'] {
  if (row.kind === 'general_contractor') return { look: [], bid: [], be_paid: [] };
  const place = [
    ...(row.yard_zip === null ? ['yard'] : []),
    ...(row.service_radius_mi === null ? ['service_radius'] : []),
  ];
  return {
    look: place,
    bid: [...place, ...(row.methods.length === 0 ? ['methods'] : [])],
    be_paid: row.payouts_ready ? [] : ['payouts'],
  };
}
