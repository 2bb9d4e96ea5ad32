import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import type { AcceptedPlugin, Rule } from 'postcss';
import type { Plugin } from 'vite';

/**
 * Components of the theme library whose rules may go when nothing under `src` imports them: name → the classes that
 * are theirs alone. The library ships one sheet for all; what is not used is a third of it.
 */
const ownClasses: Readonly<Record<string, readonly string[]>> = {
  Avatar: ['Avatar'],
  Badge: ['Badge'],
  Blockquote: ['Blockquote'],
  Callout: ['Callout'],
  Card: ['Card'],
  CheckboxCards: ['CheckboxCards'],
  Code: ['Code'],
  DataList: ['DataList'],
  Em: ['Em'],
  HoverCard: ['HoverCard'],
  Inset: ['Inset'],
  Kbd: ['Kbd'],
  Progress: ['Progress'],
  Quote: ['Quote'],
  RadioCards: ['RadioCards'],
  SegmentedControl: ['SegmentedControl'],
  Select: ['Select'],
  Skeleton: ['Skeleton'],
  Slider: ['Slider'],
  Switch: ['Switch'],
  Table: ['Table'],
  TextArea: ['TextArea'],
  TextField: ['TextField'],
};

function sourceFiles(folder: string): string[] {
  return readdirSync(folder, { withFileTypes: true, recursive: true })
    .filter((entry) => entry.isFile() && /\.tsx?$/.test(entry.name))
    .map((entry) => join(entry.parentPath, entry.name));
}

/** Every name imported from the theme library anywhere in the source. */
function importedNames(folder: string): Set<string> {
  const names = new Set<string>();
  for (const file of sourceFiles(folder)) {
    const text = readFileSync(file, 'utf8');
    for (const [, list] of text.matchAll(/import\s*\{([^}]*)\}\s*from\s*'@radix-ui\/themes'/g)) {
      for (const part of (list ?? '').split(',')) names.add(part.trim().split(/\s+as\s+/)[0] ?? '');
    }
  }
  return names;
}

function dropUnusedThemeCss(sourceFolder: string): AcceptedPlugin {
  const used = importedNames(sourceFolder);
  const unused = Object.entries(ownClasses).flatMap(([name, classes]) => (used.has(name) ? [] : classes));
  const isUnused = new RegExp(`\\.rt-(?:${unused.join('|')})(?![a-z])`);
  return {
    postcssPlugin: 'drop-unused-theme-css',
    OnceExit(root) {
      if (unused.length === 0) return;
      root.walkRules((rule: Rule) => {
        const kept = rule.selectors.filter((selector) => !isUnused.test(selector));
        if (kept.length === 0) rule.remove();
        else if (kept.length < rule.selectors.length) rule.selectors = kept;
      });
    },
  };
}

/** For builds only: leaves out the rules of theme components that nothing under `sourceFolder` imports. */
export function leanThemeCss(sourceFolder: string): Plugin {
  return {
    name: 'lean-theme-css',
    apply: 'build',
    config: () => ({ css: { postcss: { plugins: [dropUnusedThemeCss(sourceFolder)] } } }),
  };
}
