import type { FeatureRoute } from '../lib/feature-route.ts';

export const routes: readonly FeatureRoute[] = [
  {
    path: '/work/:subcontractId/job-sheet',
    audience: 'company',
    words: ['calculators', 'drawings', 'scope'],
    page: () => import('./job-sheet-page.tsx'),
  },
];
