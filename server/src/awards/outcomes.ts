import { bidBand, MIN_BIDS_FOR_BAND, type Award, type BidBand } from '@kerfyard/common/bids';

/** What of a bid decides how it came out. */
export interface RankedBid {
  id: string;
  companyId: string;
  totalCents: number;
  submittedAt: Date;
}

/** How one bid came out, as its bidder will read it: never the winner's price. */
export interface Outcome {
  bidId: string;
  companyId: string;
  won: boolean;
  rank: number | null;
  outOf: number | null;
  band: BidBand | null;
  reason: Award['reason'] | null;
  note: string;
}

/**
 * How each bid came out. Rank counts by total, the earlier first among equals; with fewer than three bids rank and
 * band would give a price away, so only the reason is told.
 * @throws RangeError when the awarded bid is not among the bids
 */
export function outcomesOf(
  bids: readonly RankedBid[],
  award: { bidId: string; reason: Award['reason']; note: string },
): Outcome[] {
  const winner = bids.find((bid) => bid.id === award.bidId);
  if (winner === undefined) throw new RangeError('the awarded bid is not among the bids');
  const order = [...bids].sort(byTotal);
  const mayRank = bids.length >= MIN_BIDS_FOR_BAND;
  return bids.map((bid) => {
    const won = bid.id === winner.id;
    return {
      bidId: bid.id,
      companyId: bid.companyId,
      won,
      rank: mayRank ? order.indexOf(bid) + 1 : null,
      outOf: mayRank ? bids.length : null,
      band: mayRank && !won ? bidBand(bid.totalCents, winner.totalCents) : null,
      reason: won ? null : award.reason,
      note: won ? '' : award.note,
    };
  });
}

function byTotal(a: RankedBid, b: RankedBid): number {
  if (a.totalCents !== b.totalCents) return a.totalCents - b.totalCents;
  const earlier = a.submittedAt.getTime() - b.submittedAt.getTime();
  if (earlier !== 0) return earlier;
  return a.id < b.id ? -1 : 1;
}
