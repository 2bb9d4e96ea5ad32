import type { FeatureRoute } from '../lib/feature-route.ts';

export const routes: readonly FeatureRoute[] = [
  {
    path: '/talk',
    audience: 'company',
    words: ['talk'],
    page: () => import('./talk-page.tsx'),
    children: [
      { path: ':threadId', audience: 'company', words: ['talk'], page: () => import('./thread-page.tsx') },
    ],
  },
];
