import type { Award, BidBand } from '@kerfyard/common/bids';

const bands: Record<BidBand, string> = {
  within_5: 'at most 5 % above the award',
  within_15: 'more than 5 and at most 15 % above the award',
  within_30: 'more than 15 and at most 30 % above the award',
  over_30: 'more than 30 % above the award',
  below: 'below the award',
};

const reasons: Record<Award['reason'], string> = {
  price: 'the price',
  scope_of_price: 'what was in the price',
  start_date: 'the start date',
  cover_or_papers: 'insurance cover or papers',
  experience: 'experience with this kind of work',
  other: 'another reason',
};

/** What the e-mails about an award say; never the price of anyone. */
export const awardMailWords = {
  won: {
    subject: (number: string) => `Yours: subcontract ${number}`,
    lines: (gc: string, title: string, signBy: string) => [
      `${gc} awarded "${title}" to you.`,
      `Read the subcontract and sign it by ${signBy}; unless both sides have signed by then, the award lapses.`,
    ],
    action: 'Read and sign',
  },
  notWon: {
    subject: (scope: string) => `${scope} was awarded to another crew`,
    lines: (gc: string, title: string) => [`${gc} awarded "${title}" to another crew.`],
    standing: (rank: number, of: number, band: BidBand | null) =>
      `Your bid ranked ${rank} of ${of}${band === null ? '' : `, ${bands[band]}`}.`,
    reason: (reason: Award['reason']) => `What decided: ${reasons[reason]}.`,
    action: 'Look at your bid',
  },
  lapsed: {
    subject: (number: string) => `${number} was not signed in time`,
    lines: (title: string) => [
      `The subcontract for "${title}" was not signed by both sides in its days, so the award has lapsed.`,
      'The scope is due again, with the bids that were in.',
    ],
    action: 'Look at the scope',
  },
} as const;
