import { setTimeout as sleep } from 'node:timers/promises';

/** Looks, a tenth of a second apart. */
const WAITS = 400;

export interface Mail {
  subject: string;
  text: string;
  to: string[];
}

/** Mails to an address in the local mail stand-in, once at least `count` have come (within forty seconds: announcements wait behind what people wait for). */
export async function mailsTo(address: string, count = 1): Promise<Mail[]> {
  const url = `${process.env.MAIL_URL}/api/messages?to=${encodeURIComponent(address)}`;
  for (let tries = 0; tries < WAITS; tries += 1) {
    const { messages } = (await (await fetch(url)).json()) as { messages: Mail[] };
    if (messages.length >= count) return messages;
    await sleep(100);
  }
  throw new Error(`fewer than ${count} mails came to ${address}`);
}

/** The first mail to an address whose subject fits, once it has come (within forty seconds: announcements wait behind what people wait for). */
export async function mailTo(address: string, subject: RegExp): Promise<Mail> {
  for (let tries = 0; tries < WAITS; tries += 1) {
    const found = (await mailsTo(address, 0)).find((mail) => subject.test(mail.subject));
    if (found !== undefined) return found;
    await sleep(100);
  }
  throw new Error(`no mail like ${subject.source} came to ${address}`);
}
