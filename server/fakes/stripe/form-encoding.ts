/** Values of a form body before they are checked: text, lists and nested objects. */
export type FormValue = string | FormValue[] | { [key: string]: FormValue };

interface Branch {
  [key: string]: string | Branch;
}

function pathOf(key: string): string[] {
  const open = key.indexOf('[');
  if (open <= 0) return [key];
  const inner = [...key.slice(open).matchAll(/\[([^[\]]*)\]/g)].map((match) => match[1] ?? '');
  return [key.slice(0, open), ...inner];
}

function insert(root: Branch, path: string[], value: string): void {
  let branch = root;
  for (const [depth, part] of path.entries()) {
    const name = part === '' ? String(Object.keys(branch).length) : part;
    if (depth === path.length - 1) {
      branch[name] = value;
      return;
    }
    const next = branch[name];
    branch =
      typeof next === 'object'
        ? next
        : ((branch[name] = Object.create(null) as Branch), branch[name] as Branch);
  }
}

function settle(node: string | Branch): FormValue {
  if (typeof node === 'string') return node;
  const keys = Object.keys(node);
  if (keys.length > 0 && keys.every((key, index) => key === String(index))) {
    return keys.map((key) => settle(node[key]!));
  }
  return Object.fromEntries(keys.map((key) => [key, settle(node[key]!)]));
}

/** Decodes `a=1&b[c]=2&d[0]=3` into nested values, as the SDK encodes them. */
export function decodeForm(text: string): Record<string, FormValue> {
  const root = Object.create(null) as Branch;
  for (const [key, value] of new URLSearchParams(text)) insert(root, pathOf(key), value);
  return Object.fromEntries(Object.keys(root).map((key) => [key, settle(root[key]!)]));
}
