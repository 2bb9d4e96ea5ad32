import { outcomesOf, type RankedBid } from './outcomes.ts';

const at = (minute: number): Date => new Date(Date.UTC(2026, 11, 1, 12, minute));
const bid = (id: string, totalCents: number, minute = 0): RankedBid => ({
  id,
  companyId: `company of ${id}`,
  totalCents,
  submittedAt: at(minute),
});
const award = { bidId: 'a', reason: 'start_date', note: 'They can start on Monday.' } as const;

describe('outcomes of an award', () => {
  it('tells losers rank, band and reason, and the winner no reason', () => {
    const outcomes = outcomesOf([bid('a', 100_000), bid('b', 104_000), bid('c', 128_000)], award);
    expect(
      outcomes.map(({ bidId, won, rank, outOf, band, reason }) => [bidId, won, rank, outOf, band, reason]),
    ).toEqual([
      ['a', true, 1, 3, null, null],
      ['b', false, 2, 3, 'within_5', 'start_date'],
      ['c', false, 3, 3, 'within_30', 'start_date'],
    ]);
  });

  it('says "below" of a bid under the award, and ranks equals by who was first', () => {
    const outcomes = outcomesOf([bid('a', 100_000, 5), bid('b', 90_000), bid('c', 100_000, 1)], award);
    expect(outcomes.map(({ bidId, rank, band }) => [bidId, rank, band])).toEqual([
      ['a', 3, null],
      ['b', 1, 'below'],
      ['c', 2, 'within_5'],
    ]);
  });

  it('gives the reason only with fewer than three bids', () => {
    const [winner, loser] = outcomesOf([bid('a', 100_000), bid('b', 104_000)], award);
    expect(winner).toMatchObject({ won: true, rank: null, outOf: null, band: null });
    expect(loser).toMatchObject({ won: false, rank: null, outOf: null, band: null, reason: 'start_date' });
    expect(loser?.note).toBe('They can start on Monday.');
  });

  it('never carries an amount', () => {
    const outcomes = outcomesOf([bid('a', 123_457), bid('b', 234_561), bid('c', 345_673)], award);
    expect(JSON.stringify(outcomes)).not.toMatch(/123457|234561|345673/);
  });

  it('refuses an award to a bid that is not there', () => {
    expect(() => outcomesOf([bid('b', 1)], award)).toThrow(RangeError);
  });
});
