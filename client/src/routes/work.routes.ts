import type { FeatureRoute } from '../lib/feature-route.ts';

export const routes: readonly FeatureRoute[] = [
  { path: '/work', audience: 'company', words: ['work', 'visits'], page: () => import('./work-page.tsx') },
  {
    path: '/work/:subcontractId',
    audience: 'company',
    words: ['work', 'visits', 'completions', 'money', 'talk'],
    page: () => import('./work-item-page.tsx'),
  },
];
