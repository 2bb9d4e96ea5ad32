/** What the e-mails about one's own account say. */
export const accountMailWords = {
  reset: {
    subject: 'Set a new password',
    lines: [
      'Someone asked for a new password for this address.',
      'If that was you, press the button and choose one. The link works once, for one hour, and signs out every browser that is signed in now.',
      'If it was not you, do nothing: your password stays as it is.',
    ],
    action: 'Choose a new password',
  },
  confirmEmail: {
    subject: 'Confirm your new e-mail address',
    lines: (oldEmail: string) => [
      `The account that signs in with ${oldEmail} is to sign in with this address instead.`,
      'If you asked for that, confirm the address. The link works once, for one hour.',
      'If you did not, do nothing: nothing changes without the link.',
    ],
    action: 'Confirm the new address',
  },
  emailTaken: {
    subject: 'This address has an account already',
    lines: [
      'Someone wanted to use this address for their account, but it has an account of its own. Nothing was changed.',
      'If that was you, sign in with this address, or choose another one there.',
    ],
    action: 'Sign in',
  },
  emailAsked: {
    subject: 'Your e-mail address is about to change',
    lines: (newEmail: string) => [
      `Someone signed in to your account asked to change its address to ${newEmail}. Until that address is confirmed, yours stays.`,
      'If it was not you, set a new password now: that ends every session and stops the change.',
    ],
    action: 'Set a new password',
  },
  emailChanged: {
    subject: 'Your e-mail address was changed',
    lines: (newEmail: string) => [
      `Your account signs in with ${newEmail} from now on; this address gets no more mail.`,
      'If it was not you, tell an owner of your company at once: they can stop the account.',
    ],
  },
  notices: {
    password_changed: {
      subject: 'Your password was changed',
      line: 'Your password was changed, and every other browser was signed out.',
    },
    second_factor_set: {
      subject: 'A second factor was set up',
      line: 'From now on signing in to your account asks for a code from an authenticator app as well.',
    },
    second_factor_removed: {
      subject: 'Your second factor was taken away',
      line: 'Signing in to your account asks for the password alone again.',
    },
    recovery_codes_renewed: {
      subject: 'New recovery codes were made',
      line: 'New recovery codes were made for your account; the ones before do not work any more.',
    },
    recovery_code_used: {
      subject: 'A recovery code was used',
      line: 'A recovery code was used in place of your authenticator app. It does not work a second time.',
    },
  },
  noticeAdvice: 'If it was not you, set a new password and tell an owner of your company.',
  noticeAction: 'Open your account',
} as const;

export type AccountNotice = keyof typeof accountMailWords.notices;
