import { html } from '../../shared/html.ts';
import type { SafeHtml } from '../../shared/html.ts';

/** Cents as dollars for people. */
export function dollars(amountCents: number): string {
  return (amountCents / 100).toLocaleString('en-US', { style: 'currency', currency: 'USD' });
}

/** Seconds as a time people can read. */
export function timeOf(seconds: number): SafeHtml {
  const iso = new Date(seconds * 1000).toISOString();
  return html`<time datetime="${iso}">${iso.slice(0, 16).replace('T', ' ')} UTC</time>`;
}

/** Every page carries the notice, so nobody takes it for the real thing. */
export function layout(title: string, main: SafeHtml, options: { isWide?: boolean } = {}): SafeHtml {
  return html`<html lang="en">
    <head>
      <meta charset="utf-8" />
      <meta name="viewport" content="width=device-width, initial-scale=1" />
      <title>${title}</title>
      <link rel="icon" href="data:," />
      <link rel="stylesheet" href="/style.css" />
    </head>
    <body>
      <header><p>Local stand-in for the payment provider. No real money moves.</p></header>
      <main class="${options.isWide ? 'wide' : 'narrow'}">${main}</main>
    </body>
  </html>`;
}

export interface Field {
  name: string;
  label: string;
  value: string;
  hint?: string;
  error?: string | undefined;
  autocomplete?: string;
  inputMode?: 'numeric' | 'text';
}

/** A labelled input with its hint and error tied to it. */
export function textField(field: Field): SafeHtml {
  const hintId = field.hint ? `${field.name}-hint` : '';
  const errorId = field.error ? `${field.name}-error` : '';
  const describedBy = [errorId, hintId].filter(Boolean).join(' ');
  return html`<div class="field">
    <label for="${field.name}">${field.label}</label>
    ${field.hint && html`<p class="hint" id="${hintId}">${field.hint}</p>`}
    ${field.error && html`<p class="error" id="${errorId}">${field.error}</p>`}
    <input
      id="${field.name}"
      name="${field.name}"
      type="text"
      value="${field.value}"
      autocomplete="${field.autocomplete ?? 'off'}"
      inputmode="${field.inputMode ?? 'text'}"
      aria-invalid="${field.error ? 'true' : 'false'}"
      aria-describedby="${describedBy}"
    />
  </div>`;
}

/** What went wrong with a form as a whole, read out at once. */
export function alertBox(message: string | undefined): SafeHtml | null {
  return message ? html`<div class="alert" role="alert">${message}</div>` : null;
}
