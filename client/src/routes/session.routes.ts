import type { FeatureRoute } from '../lib/feature-route.ts';

export const routes: readonly FeatureRoute[] = [
  { path: '/', audience: 'anyone', words: ['first-look'], page: () => import('./first-look-page.tsx') },
  { path: '/sign-in', audience: 'anyone', words: ['session'], page: () => import('./sign-in-page.tsx') },
  { path: '/sign-up', audience: 'anyone', words: ['session'], page: () => import('./sign-up-page.tsx') },
  { path: '/verify', audience: 'anyone', words: ['session'], page: () => import('./verify-page.tsx') },
];
