import type { FeatureRoute } from '../lib/feature-route.ts';

export const routes: readonly FeatureRoute[] = [
  { path: '/company', audience: 'company', words: ['company'], page: () => import('./company-page.tsx') },
  {
    path: '/company/rate-card',
    audience: 'cutting_contractor',
    words: ['rate-card'],
    page: () => import('./rate-card-page.tsx'),
  },
];
