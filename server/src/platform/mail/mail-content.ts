/** What one e-mail says; the frame, the greeting and the addresses are the mailer's. */
export interface MailContent {
  subject: string;
  /** Paragraphs as plain text. */
  lines: string[];
  /** One button. `path` starts with `/` and becomes an address of this app. */
  action?: { label: string; path: string };
}

/**
 * Builds one kind of e-mail when its job runs. `data` is what was given at sending, with `userId` (the recipient) and
 * `mailId` (the same for every try of one mail). Null: there is nothing to send any more.
 */
export type MailBuilder = (data: Record<string, unknown>) => Promise<MailContent | null>;

/** Whom to write to, by the id given at sending; null when there is nobody any more. */
export type FindAddressee = (id: string) => Promise<{ name: string; email: string } | null>;
