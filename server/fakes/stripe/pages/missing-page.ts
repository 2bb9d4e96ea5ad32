import { html } from '../../shared/html.ts';
import type { SafeHtml } from '../../shared/html.ts';
import { layout } from './layout.ts';

/** An address that leads nowhere. */
export function missingPage(): SafeHtml {
  return layout(
    'Not here',
    html`<h1>Not here</h1>
      <p>There is nothing at this address. <a href="/">All objects</a></p>`,
  );
}
