/** What the e-mails about a subcontract's paper say. */
export const subcontractMailWords = {
  signed: {
    subject: (number: string) => `${number} is signed by both sides`,
    lines: (gc: string, crew: string, title: string) => [
      `${gc} and ${crew} have both signed the subcontract for "${title}".`,
      'Next: the cutting contractor offers windows for a visit, and the general contractor sets the money aside.',
    ],
    action: 'Look at the subcontract',
  },
} as const;
