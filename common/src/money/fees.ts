import { shareFloor, type BasisPoints, type Cents } from './cents.ts';

/** What the crew pays the platform on each release, unless a settings row says otherwise. */
export const CREW_FEE_BASIS_POINTS: BasisPoints = 500;

export type PaymentMethod = 'card' | 'bank_debit';

/**
 * The charge added when money is set aside, chosen so that what the provider keeps never comes out of held money:
 * card ⌈(n + 30) / 0.971⌉ − n cents, bank debit min(500, ⌈n / 0.992⌉ − n) cents. Exact integer arithmetic.
 * @param netCents what is to be held, one cent or more
 */
export function platformChargeCents(netCents: Cents, method: PaymentMethod): Cents {
  const net = BigInt(netCents);
  if (method === 'card') return Number(ceilDivide((net + 30n) * 1000n, 971n) - net);
  return Math.min(500, Number(ceilDivide(net * 1000n, 992n) - net));
}

/** How one released amount is divided: retainage first, then the fee on what is released now. All shares sum to the gross. */
export interface ReleaseSplit {
  grossCents: Cents;
  retainageCents: Cents;
  feeCents: Cents;
  crewCents: Cents;
}

/** Split a release (money events E07 and E09): `retainageCents` stays held, `feeCents` is the platform's, the rest the crew's. */
export function splitRelease(
  grossCents: Cents,
  rates: { retainageBasisPoints: BasisPoints; feeBasisPoints: BasisPoints },
): ReleaseSplit {
  const retainageCents = shareFloor(grossCents, rates.retainageBasisPoints);
  const feeCents = shareFloor(grossCents - retainageCents, rates.feeBasisPoints);
  return { grossCents, retainageCents, feeCents, crewCents: grossCents - retainageCents - feeCents };
}

function ceilDivide(a: bigint, b: bigint): bigint {
  return (a + b - 1n) / b;
}
