import type { Readable } from 'node:stream';
import type { AddressObject, ParsedMail } from 'mailparser';
import { simpleParser } from 'mailparser';
import { SMTPServer } from 'smtp-server';
import type { MailStore, StoredMessage } from './mail-store.ts';

const LINK = /https?:\/\/[^\s"'<>]+/g;

/** Every http(s) address in the text and HTML of a message, without repeats and trailing punctuation. */
export function linksIn(text: string, html: string | null): string[] {
  const fromHtml = (html ?? '').replaceAll('&amp;', '&');
  const found = `${text}\n${fromHtml}`.match(LINK) ?? [];
  return [...new Set(found.map((link) => link.replace(/[).,;:!?\]]+$/, '')))];
}

function addressText(address: AddressObject | AddressObject[] | undefined): string {
  if (!address) return '';
  return Array.isArray(address) ? address.map((one) => one.text).join(', ') : address.text;
}

function toStored(mail: ParsedMail, recipients: string[]): Omit<StoredMessage, 'id'> {
  const text = mail.text ?? '';
  const html = mail.html || null;
  return {
    receivedAt: new Date().toISOString(),
    from: addressText(mail.from),
    to: recipients.map((recipient) => recipient.toLowerCase()),
    subject: mail.subject ?? '(no subject)',
    text,
    html,
    links: linksIn(text, html),
    attachments: mail.attachments.map((attachment) => ({
      filename: attachment.filename ?? 'attachment',
      contentType: attachment.contentType,
      sizeBytes: attachment.size,
      contentBase64: attachment.content.toString('base64'),
    })),
  };
}

/** SMTP server that accepts all mail and keeps it. The sender hears "accepted" only after it is stored. */
export function createSmtpServer(store: MailStore): SMTPServer {
  return new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS', 'AUTH'],
    size: 25_000_000,
    closeTimeout: 200,
    onData(stream, session, callback) {
      const recipients = session.envelope.rcptTo.map((recipient) => recipient.address);
      simpleParser(stream as unknown as Readable)
        .then((mail) => {
          if (stream.sizeExceeded) {
            return callback(Object.assign(new Error('Message too big'), { responseCode: 552 }));
          }
          store.add(toStored(mail, recipients));
          callback();
        })
        .catch((error: Error) => callback(error));
    },
  });
}
