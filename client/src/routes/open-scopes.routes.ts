import type { FeatureRoute } from '../lib/feature-route.ts';

export const routes: readonly FeatureRoute[] = [
  {
    path: '/open-scopes',
    audience: 'cutting_contractor',
    words: ['open-scopes'],
    page: () => import('./open-scopes-page.tsx'),
  },
  {
    path: '/open-scopes/:scopeId',
    audience: 'cutting_contractor',
    words: ['scope', 'bid', 'talk', 'rate-card', 'estimate'],
    page: () => import('./open-scope-page.tsx'),
  },
  {
    path: '/bids',
    audience: 'cutting_contractor',
    words: ['bid', 'scope'],
    page: () => import('./bids-page.tsx'),
  },
];
