/** What the e-mails about visits say. `window` is a window in words, in the site's zone. */
export const visitMailWords = {
  proposed: {
    subject: (number: string) => `Windows on offer for ${number}`,
    lines: (crew: string, title: string, windows: string[]) => [
      `${crew} offers these windows for "${title}":`,
      ...windows,
      'Confirm one of them, and the crew and its truck are booked.',
    ],
    action: 'Choose a window',
  },
  confirmed: {
    subject: (number: string, window: string) => `Confirmed for ${number}: ${window}`,
    lines: (gc: string, title: string, window: string, crew: string, truck: string) => [
      `${gc} confirmed a visit for "${title}": ${window}.`,
      `Booked: ${crew}, ${truck}. The visit starts when the money for its lines is set aside.`,
    ],
    action: 'Look at the visit',
  },
  cancelled: {
    subject: (number: string) => `A visit for ${number} was cancelled`,
    lines: (title: string, reason: string, window: string | null) => [
      window === null
        ? `The visit proposed for "${title}" was cancelled.`
        : `The visit for "${title}" was cancelled: ${window}.`,
      `Reason: ${reason}`,
    ],
    action: 'Look at the work',
  },
} as const;
