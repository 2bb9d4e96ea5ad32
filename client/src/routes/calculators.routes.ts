import type { FeatureRoute } from '../lib/feature-route.ts';

export const routes: readonly FeatureRoute[] = [
  {
    path: '/calculators',
    audience: 'anyone',
    words: ['calculators'],
    page: () => import('./calculators-page.tsx'),
  },
  {
    path: '/calculators/:calculator',
    audience: 'anyone',
    words: ['calculators', 'drawings'],
    page: () => import('./calculator-page.tsx'),
  },
];
