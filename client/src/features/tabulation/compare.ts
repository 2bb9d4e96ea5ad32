import type { BidTabulationView, OpenedBidView } from '@kerfyard/common/bids';

export interface ComparedBid {
  bid: OpenedBidView;
  row: BidTabulationView['tabulated'][number];
}

/** Bids with their row of the tabulation, by adjusted price as the server sorted them. */
export function comparedBids(view: BidTabulationView): ComparedBid[] {
  const bids = new Map(view.bids.map((bid) => [bid.id, bid]));
  return view.tabulated.flatMap((row) => {
    const bid = bids.get(row.bidId);
    return bid === undefined ? [] : [{ bid, row }];
  });
}

export interface PriceScale {
  /** Place of an amount from left to right, 0 to 1. */
  at: (cents: number) => number;
  ticks: number[];
}

const WANTED_TICKS = 3;

/**
 * A scale around a set of amounts with round ticks. It does not begin at zero: what counts is how far bids stand
 * apart, and the amounts are written beside their marks.
 */
export function priceScale(amounts: readonly number[]): PriceScale {
  const low = Math.min(...amounts);
  const high = Math.max(...amounts);
  const span = Math.max(high - low, high * 0.1, 100);
  const step = roundStep(span / WANTED_TICKS);
  const from = Math.max(0, Math.floor((low - span * 0.1) / step) * step);
  const to = Math.ceil((high + span * 0.1) / step) * step;
  const ticks = [];
  for (let tick = from; tick <= to; tick += step) ticks.push(tick);
  return { at: (cents) => (cents - from) / (to - from), ticks };
}

/** The next of 1, 2, 5 × a power of ten at or above. */
function roundStep(wanted: number): number {
  const power = 10 ** Math.floor(Math.log10(wanted));
  const factor = [1, 2, 5, 10].find((one) => one * power >= wanted) ?? 10;
  return factor * power;
}
