/** Ranked bids leak prices by search, so a bid may only go down, by a real step, a few times. */
export const rankedRules = {
  minStepBasisPoints: 100,
  minStepCents: 1000,
  maxRevisions: 5,
  /** Rank is shown from this many bids on. */
  minBidsForRank: 3,
  /** A bid this close to due moves due to this long after it. */
  extensionMs: 2 * 60_000,
  maxExtensions: 10,
} as const;

/** Whether a revised ranked bid goes down far enough: by at least 1 % and by at least $10. */
export function isAllowedStepDown(fromCents: number, toCents: number): boolean {
  const step = fromCents - toCents;
  return step >= rankedRules.minStepCents && step * 10_000 >= fromCents * rankedRules.minStepBasisPoints;
}

export const bidBands = ['within_5', 'within_15', 'within_30', 'over_30', 'below'] as const;
export type BidBand = (typeof bidBands)[number];

/** How far a losing bid stood above the award, as a band: the loser learns where it stands, not the winner's price. */
export function bidBand(bidCents: number, awardCents: number): BidBand {
  if (bidCents < awardCents) return 'below';
  const overBasisPoints = ((bidCents - awardCents) * 10_000) / Math.max(1, awardCents);
  if (overBasisPoints <= 500) return 'within_5';
  if (overBasisPoints <= 1500) return 'within_15';
  return overBasisPoints <= 3000 ? 'within_30' : 'over_30';
}

/** Under this many bids a loser hears the reason only: rank and band would give the price away. */
export const MIN_BIDS_FOR_BAND = 3;
