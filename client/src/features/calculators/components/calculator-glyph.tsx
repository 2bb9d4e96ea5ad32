import type { ReactNode } from 'react';
import type { CalculatorSlug } from '../calculators.ts';
import styles from './calculators.module.css';

/** A small drawing of the work, 64 × 48; an ornament beside the name. */
export function CalculatorGlyph({ slug }: { slug: CalculatorSlug }) {
  return (
    <svg className={styles.glyph} viewBox="0 0 64 48" aria-hidden="true" focusable="false">
      {pictures[slug]}
    </svg>
  );
}

const second = styles.second;
const solid = styles.solid;

const pictures: Readonly<Record<CalculatorSlug, ReactNode>> = {
  trench: (
    <>
      <path className={solid} d="M4 10h16v7H4zM44 10h16v7H44z" />
      <path d="M20 10v28h24V10" />
      <circle className={second} cx="32" cy="32" r="4" />
    </>
  ),
  opening: (
    <>
      <path d="M16 12h32M16 36h32M18 10v28M46 10v28" />
      <path className={second} d="M11 12h5M48 12h5M11 36h5M48 36h5M18 6v4M46 6v4M18 38v4M46 38v4" />
    </>
  ),
  cores: (
    <>
      <circle cx="20" cy="24" r="9" />
      <circle className={second} cx="44" cy="18" r="6" />
      <circle cx="46" cy="35" r="4" />
    </>
  ),
  joints: (
    <>
      <rect x="8" y="8" width="48" height="32" />
      <path className={second} d="M20 8v32M32 8v32M44 8v32M8 18.7h48M8 29.3h48" />
    </>
  ),
  passes: (
    <>
      <path className={solid} d="M6 14h52v22H6z" />
      <path d="M14 14v5h9v5h9v5h9v5h9V14" />
      <path className={second} d="M6 36h52" />
    </>
  ),
  lifting: (
    <>
      <path d="M32 6v4M32 10 14 32M32 10l18 22" />
      <path className={solid} d="M8 32h48v8H8z" />
      <path className={second} d="M19 26a9 9 0 0 1 3 6" />
    </>
  ),
  dust: (
    <>
      <path d="M6 38h52M14 38V26h20v12" />
      <path className={second} d="M38 22c6-8 12 2 18-6M40 30c6-6 10 2 16-4" />
    </>
  ),
  'noise-and-vibration': (
    <>
      <circle cx="14" cy="24" r="5" />
      <path d="M24 14a14 14 0 0 1 0 20M32 9a21 21 0 0 1 0 30" />
      <path className={second} d="m40 24 4-7 4 14 4-14 4 7" />
    </>
  ),
  slurry: (
    <>
      <path d="M20 10h24v30H20zM20 18h24M20 32h24" />
      <path className={second} d="M50 12c4 6 6 8 6 11a5 5 0 0 1-10 0c0-3 1-5 4-11z" />
    </>
  ),
  price: (
    <>
      <path d="M8 38h48M14 38V24h9v14M29 38V16h9v22" />
      <path className={second} d="M8 20h48" strokeDasharray="4 3" />
      <path d="M44 38V28h9v10" />
    </>
  ),
};
