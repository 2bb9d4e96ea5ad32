import type { MoneyLineView } from '@kerfyard/common/payments';

export type MoneyPartKind = 'released' | 'held' | 'objected' | 'retainage' | 'open';

export interface MoneyPart {
  kind: MoneyPartKind;
  cents: number;
}

/**
 * The parts of a money line, in the order they are drawn; parts of nothing are left out and the rest sum to the total.
 * `setAsideCents` is everything set aside so far, what has been released from it included; what is held is the rest.
 * Should more be set aside than the contract says, the line is as long as what was set aside.
 */
export function moneyParts(money: MoneyLineView): { parts: MoneyPart[]; totalCents: number } {
  const { contractCents, setAsideCents, releasedCents, retainageCents, objectedCents } = money;
  const held = Math.max(0, setAsideCents - releasedCents - retainageCents - objectedCents);
  const inside = releasedCents + held + objectedCents + retainageCents;
  const parts: MoneyPart[] = [
    { kind: 'released', cents: releasedCents },
    { kind: 'held', cents: held },
    { kind: 'objected', cents: objectedCents },
    { kind: 'retainage', cents: retainageCents },
    { kind: 'open', cents: Math.max(0, contractCents - inside) },
  ];
  return { parts: parts.filter((part) => part.cents > 0), totalCents: Math.max(contractCents, inside) };
}
