import type { MailContent } from './mail-content.ts';
import { mailFrameWords } from './words.en.ts';

export interface FramedMail {
  subject: string;
  text: string;
  html: string;
}

/**
 * The text and HTML of an e-mail from one content. Everything a person typed is escaped; a subject is one line.
 * @param appUrl without a slash at its end
 */
export function frameMail(
  content: MailContent,
  { name, appUrl }: { name: string; appUrl: string },
): FramedMail {
  const url = content.action === undefined ? null : absolute(content.action.path, appUrl);
  const greeting = mailFrameWords.greeting(oneLine(name));
  return {
    subject: oneLine(content.subject),
    text: textOf({ ...content, greeting, url }),
    html: htmlOf({ ...content, greeting, url }),
  };
}

interface Parts extends MailContent {
  greeting: string;
  url: string | null;
}

function textOf({ greeting, lines, action, url }: Parts): string {
  const link = action === undefined || url === null ? [] : [`${action.label}:\n${url}`];
  return [greeting, ...lines, ...link, `-- \n${mailFrameWords.footer}`].join('\n\n') + '\n';
}

function htmlOf({ subject, greeting, lines, action, url }: Parts): string {
  const paragraph = (text: string) =>
    `<p style="margin:0 0 16px">${escapeHtml(text).replaceAll('\n', '<br>')}</p>`;
  const link =
    action === undefined || url === null
      ? ''
      : `<p style="margin:24px 0"><a href="${escapeHtml(url)}" style="display:inline-block;background:#1d7a63;color:#ffffff;padding:12px 20px;border-radius:6px;text-decoration:none;font-weight:600">${escapeHtml(action.label)}</a></p>
<p style="margin:0 0 16px;font-size:13px;color:#555555">${mailFrameWords.openHint}<br><a href="${escapeHtml(url)}" style="color:#1d7a63">${escapeHtml(url)}</a></p>`;
  return `<!doctype html>
<html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width"><title>${escapeHtml(oneLine(subject))}</title></head>
<body style="margin:0;background:#f3f4f2;color:#1c2024;font-family:'Work Sans',Helvetica,Arial,sans-serif;font-size:16px;line-height:1.5">
<div style="max-width:560px;margin:0 auto;padding:24px 16px">
<p style="margin:0 0 16px;font-weight:700;letter-spacing:0.02em">Kerfyard</p>
<div style="background:#ffffff;border:1px solid #dddfdc;border-radius:8px;padding:24px">
${[greeting, ...lines].map(paragraph).join('\n')}
${link}
</div>
<p style="margin:16px 0 0;font-size:13px;color:#555555">${mailFrameWords.footer}</p>
</div></body></html>
`;
}

/** An address of this app and of nothing else: a path that names another host stays a path here. */
function absolute(path: string, appUrl: string): string {
  if (!/^\/(?![/\\])/.test(path)) throw new Error('a mail links to a path of this app');
  return `${appUrl}${path}`;
}

const escapes: Record<string, string> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};
const escapeHtml = (text: string): string => text.replace(/[&<>"']/g, (letter) => escapes[letter] ?? letter);

/** Line breaks in a header start a new header. */
const oneLine = (text: string): string => text.replace(/[\s\u0000-\u001f\u007f\u2028\u2029]+/g, ' ').trim();
