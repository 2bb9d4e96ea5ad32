import type { FeatureRoute } from '../lib/feature-route.ts';

export const routes: readonly FeatureRoute[] = [
  { path: '/money', audience: 'company', words: ['money'], page: () => import('./statement-page.tsx') },
  {
    path: '/work/:subcontractId/money',
    audience: 'company',
    words: ['money'],
    page: () => import('./work-money-page.tsx'),
  },
  { path: '/books', audience: 'staff', words: ['money'], page: () => import('./books-page.tsx') },
];
