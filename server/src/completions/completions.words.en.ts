/** What the e-mails about completions say. */
export const completionMailWords = {
  paymentAsked: {
    subject: (number: string, amount: string) => `${number}: the crew asks for ${amount}`,
    lines: (crew: string, title: string, amount: string, answerBy: string) => [
      `${crew} says that work on "${title}" is done and asks for ${amount}.`,
      `Look at what was cut and at the photos, and answer by ${answerBy}.`,
    ],
    action: 'Look at what was cut',
  },
  accepted: {
    subject: (number: string, amount: string) => `${number}: ${amount} of work accepted`,
    lines: (gc: string, title: string, amount: string) => [
      `${gc} accepted your work on "${title}" for ${amount}.`,
      'The release of the money is the next step on their side.',
    ],
    action: 'Look at the completion',
  },
  releaseDue: {
    subject: (number: string, amount: string) => `${number}: ${amount} is ready to be released`,
    lines: (crew: string, title: string, amount: string) => [
      `Work by ${crew} on "${title}" was accepted for ${amount}.`,
      'Release the money that is held for it.',
    ],
    action: 'Release the money',
  },
} as const;
