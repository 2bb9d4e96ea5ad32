import { html, SafeHtml, escapeHtml } from '../shared/html.ts';
import type { StoredMessage } from './mail-store.ts';

const TITLE = 'Mail for this machine';

function layout(title: string, main: SafeHtml): SafeHtml {
  return html`<html lang="en">
    <head>
      <meta charset="utf-8" />
      <meta name="viewport" content="width=device-width, initial-scale=1" />
      <title>${title}</title>
      <link rel="icon" href="data:," />
      <link rel="stylesheet" href="/style.css" />
    </head>
    <body>
      <header>
        <a class="brand" href="/">${TITLE}</a>
        <p>Everything the app sends ends here. Nothing leaves this computer.</p>
      </header>
      <main>${main}</main>
    </body>
  </html>`;
}

function timeOf(message: StoredMessage): SafeHtml {
  const shown = message.receivedAt.slice(0, 16).replace('T', ' ');
  return html`<time datetime="${message.receivedAt}">${shown} UTC</time>`;
}

function listItem(message: StoredMessage): SafeHtml {
  return html`<li>
    <a href="/messages/${message.id}">
      <span class="subject">${message.subject}</span>
      <span class="people">to ${message.to.join(', ')}</span>
      ${timeOf(message)}
    </a>
  </li>`;
}

/** All messages, newest first, or those to one address. */
export function listPage(messages: StoredMessage[], to: string): SafeHtml {
  const list =
    messages.length === 0
      ? html`<p class="empty">
          ${to ? `No mail to ${to}.` : 'No mail yet. It appears here as soon as the app sends some.'}
        </p>`
      : html`<ul class="messages">
          ${messages.map(listItem)}
        </ul>`;
  return layout(
    TITLE,
    html`<h1>Messages</h1>
      <div class="bar">
        <form method="get" action="/" role="search">
          <label for="to">Sent to</label>
          <input id="to" name="to" type="text" value="${to}" autocomplete="off" />
          <button>Show</button>
        </form>
        <form method="post" action="/clear"><button class="quiet">Delete all</button></form>
      </div>
      ${list}`,
  );
}

/** Plain text with its addresses as links. */
export function linkified(text: string): SafeHtml {
  const pieces = text.split(/(https?:\/\/[^\s"'<>]*[^\s"'<>).,;:!?\]])/);
  const out = pieces.map((piece, index) => {
    const safe = escapeHtml(piece);
    return index % 2 === 1 ? `<a href="${safe}">${safe}</a>` : safe;
  });
  return new SafeHtml(out.join(''));
}

function attachmentList(message: StoredMessage): SafeHtml | null {
  if (message.attachments.length === 0) return null;
  return html`<h2>Attachments</h2>
    <ul class="attachments">
      ${message.attachments.map(
        (attachment, index) =>
          html`<li>
            <a href="/messages/${message.id}/attachments/${index}">${attachment.filename}</a>
            ${Math.ceil(attachment.sizeBytes / 1024)} kB
          </li>`,
      )}
    </ul>`;
}

/**
 * One message: its HTML in a sandboxed frame and its text with links. The frame may run scripts, but its own policy
 * (see web.ts) allows none: accessibility checkers stop at a frame in which nothing can run at all.
 */
export function messagePage(message: StoredMessage): SafeHtml {
  const frame = message.html
    ? html`<iframe
        title="Message as HTML"
        src="/messages/${message.id}/html"
        sandbox="allow-scripts allow-popups allow-popups-to-escape-sandbox"
      ></iframe>`
    : null;
  return layout(
    message.subject,
    html`<nav aria-label="Back"><a href="/">All messages</a></nav>
      <h1>${message.subject}</h1>
      <dl>
        <dt>From</dt>
        <dd>${message.from}</dd>
        <dt>To</dt>
        <dd>${message.to.join(', ')}</dd>
        <dt>Received</dt>
        <dd>${timeOf(message)}</dd>
      </dl>
      ${frame}
      <h2>Text</h2>
      <div class="text">${linkified(message.text)}</div>
      ${attachmentList(message)}
      <form method="post" action="/messages/${message.id}/delete">
        <button class="quiet">Delete</button>
      </form>`,
  );
}

/** A page for an address that leads nowhere. */
export function missingPage(): SafeHtml {
  return layout(
    'Not here',
    html`<h1>Not here</h1>
      <p>There is no such message. <a href="/">All messages</a></p>`,
  );
}
