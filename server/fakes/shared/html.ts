/** A piece of HTML that is already safe to print. */
export class SafeHtml {
  constructor(readonly text: string) {}

  toString(): string {
    return this.text;
  }
}

type Printable = SafeHtml | string | number | null | undefined | false | readonly Printable[];

const ENTITIES: Record<string, string> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};

/** Escapes text for use between tags and inside quoted attributes. */
export function escapeHtml(text: string): string {
  return text.replace(/[&<>"']/g, (char) => ENTITIES[char] ?? char);
}

function print(value: Printable): string {
  if (value === null || value === undefined || value === false) return '';
  if (value instanceof SafeHtml) return value.text;
  if (Array.isArray(value)) return value.map(print).join('');
  return escapeHtml(String(value));
}

/** Tagged template that escapes every value that is not already SafeHtml. */
export function html(parts: TemplateStringsArray, ...values: Printable[]): SafeHtml {
  let text = parts[0] ?? '';
  values.forEach((value, index) => {
    text += print(value) + (parts[index + 1] ?? '');
  });
  return new SafeHtml(text);
}
