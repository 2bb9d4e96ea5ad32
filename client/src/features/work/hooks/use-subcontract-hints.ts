import { moneyKeys } from '../../money/api/money.queries.ts';
import { visitKeys } from '../../visits/api/visits.queries.ts';
import { useLiveHints, useWatch } from '../../../lib/live.ts';
import { workKeys } from '../api/work.queries.ts';

/** Keep one subcontract's page as it is at the server: paper, visits, completions and money. */
export function useSubcontractHints(subcontractId: string): void {
  useWatch('subcontract', subcontractId);
  useLiveHints({
    subcontract: () => [workKeys.one(subcontractId)],
    visits: () => [workKeys.one(subcontractId), visitKeys.all],
    money: () => [workKeys.one(subcontractId), moneyKeys.all],
  });
}
