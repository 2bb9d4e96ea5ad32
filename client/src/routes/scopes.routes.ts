import type { FeatureRoute } from '../lib/feature-route.ts';

export const routes: readonly FeatureRoute[] = [
  {
    path: '/scopes',
    audience: 'general_contractor',
    words: ['scopes', 'scope'],
    page: () => import('./scopes-page.tsx'),
  },
  {
    path: '/scopes/new',
    audience: 'general_contractor',
    words: ['scopes', 'scope'],
    page: () => import('./new-scope-page.tsx'),
  },
  {
    path: '/scopes/:scopeId',
    audience: 'general_contractor',
    words: ['scopes', 'scope', 'talk'],
    page: () => import('./scope-page.tsx'),
  },
  {
    path: '/scopes/:scopeId/bids',
    audience: 'general_contractor',
    words: ['tabulation', 'scopes', 'scope', 'bid'],
    page: () => import('./scope-bids-page.tsx'),
  },
];
