/** The kind of e-mail that tells a person that something about their account's safety has changed. */
export const ACCOUNT_NOTICE = 'account_notice';
