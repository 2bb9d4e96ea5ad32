import type { FeatureRoute } from '../lib/feature-route.ts';

export const routes: readonly FeatureRoute[] = [
  { path: '/account', audience: 'signed_in', words: ['account'], page: () => import('./account-page.tsx') },
  { path: '/reset', audience: 'anyone', words: ['account'], page: () => import('./reset-page.tsx') },
  {
    path: '/confirm-email',
    audience: 'anyone',
    words: ['account'],
    page: () => import('./confirm-email-page.tsx'),
  },
];
