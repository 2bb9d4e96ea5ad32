/** What the e-mails about belonging to a company say. */
export const memberMailWords = {
  invitation: {
    subject: (company: string) => `${company} invites you to Kerfyard`,
    lines: (offer: { invitedBy: string; company: string; role: string }) => [
      `${offer.invitedBy} invites you to work for ${offer.company} on Kerfyard as ${offer.role}.`,
      'Press the button, choose a password, and you are in. The link works once, for three days.',
      'If you do not know them, do nothing.',
    ],
    action: 'Accept the invitation',
  },
  hasAccount: {
    lines: (offer: { invitedBy: string; company: string }) => [
      `${offer.invitedBy} invites you to work for ${offer.company} on Kerfyard, but this address has an account already, and an account belongs to one company. Nothing was changed.`,
      'To work for both, ask to be invited at another address.',
    ],
    action: 'Sign in',
  },
  accepted: {
    subject: (name: string) => `${name} has joined your company`,
    lines: (name: string, email: string) => [`${name} (${email}) accepted your invitation.`],
    action: 'See the people of your company',
  },
  roleChanged: {
    subject: 'Your role was changed',
    lines: (role: string) => [`In your company you are ${role} now. What you may do follows from it.`],
    action: 'Open Kerfyard',
  },
} as const;
