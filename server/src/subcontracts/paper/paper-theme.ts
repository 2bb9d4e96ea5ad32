import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { unpackWoff } from './woff.ts';

const require = createRequire(import.meta.url);
const fontFile = (weight: 400 | 600): Buffer =>
  unpackWoff(
    readFileSync(require.resolve(`@fontsource/work-sans/files/work-sans-latin-${weight}-normal.woff`)),
  );

/** Work Sans as shipped with the app, read and unpacked once. */
export const fonts = { regular: fontFile(400), strong: fontFile(600) } as const;

/** US Letter, in points. */
export const page = { width: 612, height: 792, margin: 54 } as const;
export const contentWidth = page.width - 2 * page.margin;

export const colours = {
  ink: '#21201c',
  quiet: '#63635e',
  hairline: '#cfceca',
  ground: '#f4f3f1',
  accent: '#1d6b52',
} as const;

export const sizes = { title: 20, heading: 12, body: 9.5, small: 8 } as const;
