import { describe, expect, it } from 'vitest';

type Words = { [key: string]: string | Words };
const all = import.meta.glob<Words>('./*/*.json', { eager: true, import: 'default' });

function flat(words: Words, prefix = ''): Map<string, string> {
  const result = new Map<string, string>();
  for (const [key, value] of Object.entries(words)) {
    if (typeof value === 'string') result.set(prefix + key, value);
    else for (const [inner, text] of flat(value, `${prefix}${key}.`)) result.set(inner, text);
  }
  return result;
}

const placeholders = (text: string) => [...text.matchAll(/\{\{(\w+)\}\}/g)].map((match) => match[1]).sort();

describe.each(Object.keys(all))('%s', (path) => {
  const words = flat(all[path] as Words);
  it('has no empty word', () => {
    expect([...words].filter(([, text]) => text.trim() === '')).toEqual([]);
  });
  it('translates only what English has, with the same placeholders', () => {
    const english = flat(all[path.replace(/^\.\/\w+\//, './en/')] ?? {});
    for (const [key, text] of words) {
      expect(english.has(key), `${key} in English`).toBe(true);
      expect(placeholders(text), key).toEqual(placeholders(english.get(key) ?? ''));
    }
  });
});
