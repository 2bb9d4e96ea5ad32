import { createServer } from 'node:http';
import type { IncomingMessage, Server, ServerResponse } from 'node:http';
import { isFromAnotherSite, seeOther, sendJson, sendPage, sendStyle } from '../shared/http.ts';
import type { MailStore, StoredMessage } from './mail-store.ts';
import { listPage, messagePage, missingPage } from './pages.ts';
import { MAIL_STYLE } from './style.ts';

/** What the JSON API shows of a message: all but the bytes of its attachments. */
function presentMessage(message: StoredMessage): object {
  const attachments = message.attachments.map(({ filename, contentType, sizeBytes }) => ({
    filename,
    contentType,
    sizeBytes,
  }));
  return { ...message, attachments };
}

function sendMessageHtml(response: ServerResponse, message: StoredMessage): void {
  response.writeHead(200, {
    'Content-Type': 'text/html; charset=utf-8',
    // The message is foreign text: no script, no forms, no remote loads; its links open in a new tab.
    'Content-Security-Policy':
      "sandbox allow-scripts allow-popups allow-popups-to-escape-sandbox; default-src 'none'; style-src 'unsafe-inline'; img-src data:",
  });
  response.end(`<!doctype html><base target="_blank">${message.html ?? ''}`);
}

function sendAttachment(response: ServerResponse, message: StoredMessage, index: number): void {
  const attachment = message.attachments[index];
  if (!attachment) return sendPage(response, missingPage(), { status: 404 });
  response.writeHead(200, {
    'Content-Type': attachment.contentType,
    'Content-Disposition': `attachment; filename*=UTF-8''${encodeURIComponent(attachment.filename)}`,
    'X-Content-Type-Options': 'nosniff',
  });
  response.end(Buffer.from(attachment.contentBase64, 'base64'));
}

function serveApi(store: MailStore, method: string, url: URL, response: ServerResponse): void {
  const id = url.pathname.match(/^\/api\/messages\/([\w-]+)$/)?.[1];
  if (id === undefined && url.pathname !== '/api/messages') {
    return sendJson(response, 404, { error: 'no such address' });
  }
  if (method === 'DELETE') {
    if (id === undefined) store.clear();
    else if (!store.remove(id)) return sendJson(response, 404, { error: 'no such message' });
    return sendJson(response, 200, { deleted: true });
  }
  if (method !== 'GET') return sendJson(response, 405, { error: 'GET or DELETE' });
  if (id === undefined) {
    return sendJson(response, 200, {
      messages: store.list({ to: url.searchParams.get('to') }).map(presentMessage),
    });
  }
  const message = store.find(id);
  if (!message) return sendJson(response, 404, { error: 'no such message' });
  sendJson(response, 200, presentMessage(message));
}

function serveMessage(store: MailStore, method: string, url: URL, response: ServerResponse): void {
  const [, id = '', part = ''] = url.pathname.match(/^\/messages\/([\w-]+)(?:\/(.+))?$/) ?? [];
  const message = store.find(id);
  if (!message) return sendPage(response, missingPage(), { status: 404 });
  if (method === 'POST' && part === 'delete') {
    store.remove(id);
    return seeOther(response, '/');
  }
  if (part === '') return sendPage(response, messagePage(message));
  if (part === 'html') return sendMessageHtml(response, message);
  const index = part.match(/^attachments\/(\d+)$/)?.[1];
  if (index !== undefined) return sendAttachment(response, message, Number(index));
  sendPage(response, missingPage(), { status: 404 });
}

function serve(store: MailStore, request: IncomingMessage, response: ServerResponse): void {
  const method = request.method ?? 'GET';
  const url = new URL(request.url ?? '/', 'http://localhost');
  request.resume();
  if (isFromAnotherSite(request)) return sendJson(response, 403, { error: 'not from another site' });
  if (url.pathname.startsWith('/api/')) return serveApi(store, method, url, response);
  if (url.pathname === '/style.css') return sendStyle(response, MAIL_STYLE);
  if (url.pathname === '/') {
    const to = url.searchParams.get('to')?.trim() ?? '';
    return sendPage(response, listPage(store.list({ to }), to));
  }
  if (method === 'POST' && url.pathname === '/clear') {
    store.clear();
    return seeOther(response, '/');
  }
  serveMessage(store, method, url, response);
}

/** Web page and JSON API over the stored mail. */
export function createMailWeb(store: MailStore): Server {
  return createServer((request, response) => serve(store, request, response));
}
