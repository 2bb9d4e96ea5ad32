/** What the e-mails after a sign-up say. */
export const signUpMailWords = {
  confirm: {
    subject: 'Confirm your e-mail address',
    lines: (person: string, company: string) => [
      `Someone signed up with this address as ${person} of ${company}.`,
      'If that was you, confirm the address and then sign in with the password you chose. The link works once, for one hour.',
      'If it was not you, do nothing: without the link no account is made.',
    ],
    action: 'Confirm the address',
  },
  hasAccount: {
    subject: 'You already have an account',
    lines: [
      'Someone signed up with this address, which already has an account. Nothing was changed.',
      'If that was you, sign in with the password you have. If it was not you, there is nothing to do.',
    ],
    action: 'Sign in',
  },
} as const;
