import type { OwnCompanyView } from '@kerfyard/common/people';
import type { Company } from './company.model.ts';

/** A company, read with its crews and trucks, as its own people see it. Missing things by keys the client has words for. */
export function presentOwnCompany(company: Company): OwnCompanyView {
  return {
    id: company.id,
    kind: company.kind,
    name: company.name,
    phone: company.phone,
    yard: presentYard(company),
    serviceRadiusMi: company.serviceRadiusMi,
    methods: company.methods,
    crews: (company.crews ?? []).map(({ id, name }) => ({ id, name })),
    trucks: (company.trucks ?? []).map(({ id, name }) => ({ id, name })),
    payouts: { state: payoutState(company), missing: company.payoutRequirements },
    ladder: presentLadder(company),
  };
}

function presentYard(company: Company): OwnCompanyView['yard'] {
  const { yardZip: zip, yardCity: city, yardState: state, yardLat: lat, yardLon: lon } = company;
  if (zip === null || city === null || state === null || lat === null || lon === null) return null;
  return { zip, city, state, lat, lon };
}

function payoutState(company: Company): OwnCompanyView['payouts']['state'] {
  if (company.payoutAccountId === null) return 'not_started';
  return company.payoutsReady ? 'ready' : 'under_way';
}

/** Each step asks only for what it needs; a general contractor sees and pays by its roles alone. */
function presentLadder(company: Company): OwnCompanyView['ladder'] {
  if (company.kind === 'general_contractor') return { look: [], bid: [], be_paid: [] };
  const place = [
    ...(company.yardZip === null ? ['yard'] : []),
    ...(company.serviceRadiusMi === null ? ['service_radius'] : []),
  ];
  return {
    look: place,
    bid: [...place, ...(company.methods.length === 0 ? ['methods'] : [])],
    be_paid: company.payoutsReady ? [] : ['payouts'],
  };
}
