import type { ComponentType } from 'react';
import type { LoaderFunction } from 'react-router-dom';

/** Who may open a page: a kind of company, any company, staff, whoever is signed in, or anyone at all (signed out too). */
export type Audience =
  'general_contractor' | 'cutting_contractor' | 'company' | 'staff' | 'signed_in' | 'anyone';

/** What the file of a page exports: the page as default, and what it wants loaded before it shows. */
export interface PageModule {
  default: ComponentType;
  loader?: LoaderFunction;
}

/** One page as a feature declares it in `routes/<feature>.routes.ts`; app/router.tsx collects them all. */
export interface FeatureRoute {
  path: string;
  audience: Audience;
  /** Catalogues (`locales/en/<name>.json`) loaded together with the page's code. */
  words: readonly string[];
  page: () => Promise<PageModule>;
  /** Pages shown in this page's `<Outlet />`, with paths relative to it. */
  children?: readonly FeatureRoute[];
}
