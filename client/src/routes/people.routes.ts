import type { FeatureRoute } from '../lib/feature-route.ts';

export const routes: readonly FeatureRoute[] = [
  {
    path: '/company/people',
    audience: 'company',
    words: ['people'],
    page: () => import('./people-page.tsx'),
  },
  { path: '/invitation', audience: 'anyone', words: ['people'], page: () => import('./invitation-page.tsx') },
];
