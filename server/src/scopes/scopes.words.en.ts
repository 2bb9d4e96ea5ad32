/** What e-mails about scopes and bids say. None of them carries an amount. */
export const scopeMailWords = {
  published: {
    subject: (title: string, city: string) => `New scope near you: ${title}, ${city}`,
    line: (gc: string, title: string) => `${gc} asks for bids on “${title}”.`,
    where: (city: string, state: string, cuts: number) =>
      `${city}, ${state}. ${cuts === 1 ? 'One cut' : `${cuts} cuts`} on the list.`,
    due: (when: string) => `Bids are due ${when}.`,
    sealed: 'Bids are sealed: nobody reads them before due.',
    ranked: 'Bids are ranked: you see your own rank while they are open.',
    action: 'Look at the scope',
  },
  bidIn: {
    subject: (title: string) => `A bid came in: ${title}`,
    line: (title: string) => `A cutting crew has handed in a bid on “${title}”.`,
    sealed: (when: string) => `It is sealed and opens with all the others ${when}.`,
    ranked: 'You can read it now.',
    action: 'Open the scope',
  },
  bidsDue: {
    subject: (title: string) => `Bids are due: ${title}`,
    some: (count: number, title: string) =>
      `${count === 1 ? 'One bid' : `${count} bids`} on “${title}” can be compared now.`,
    none: (title: string) => `No bid came in on “${title}”.`,
    action: 'Compare the bids',
  },
} as const;
