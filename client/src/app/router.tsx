import { createBrowserRouter, redirect, type LoaderFunctionArgs, type RouteObject } from 'react-router-dom';
import { meQuery } from '../features/session/api/session.queries.ts';
import type { FeatureRoute } from '../lib/feature-route.ts';
import { loadWords } from '../lib/i18n.ts';
import { paths } from '../lib/paths.ts';
import { queryClient } from '../lib/query-client.ts';
import { guarded, mayOpen } from './guard.tsx';
import { PublicLayout } from './layouts/public-layout.tsx';
import { RootLayout } from './layouts/root-layout.tsx';
import { SignedInLayout } from './layouts/signed-in-layout.tsx';
import { FirstPaint } from './first-paint.tsx';
import { NotFoundPage } from './not-found-page.tsx';
import { RouteError } from './route-error.tsx';

/*
 * How a feature adds its pages
 *
 * 1. `src/routes/<feature>.routes.ts` exports `routes: FeatureRoute[]` (lib/feature-route.ts). It is found by its name;
 *    nothing here changes. Paths are written in `lib/paths.ts`, the pattern (`/scopes/:scopeId`) in the routes file.
 * 2. Each entry names its `audience`, its `words` (namespaces: `locales/en/<name>.json`, `es` beside it for field
 *    screens) and its `page: () => import('./<name>-page.tsx')`. Code, words and data load together.
 * 3. The page's file has a default export, built on `components/page.tsx` (title and h1), and may export `loader`:
 *    start queries there (`void queryClient.prefetchQuery(...)`), without waiting, and read them by `useQuery`.
 *    A loader runs only for a signed-in person of the right audience.
 * 4. A list that keeps its place beside a detail gives the detail as `children` and renders `<Outlet />`.
 * 5. Loading, empty, failed, offline: `components/states.tsx`. Forbidden and unknown pages come from here.
 */
const modules = import.meta.glob<readonly FeatureRoute[]>('../routes/*.routes.ts', {
  eager: true,
  import: 'routes',
});

function toRoute(route: FeatureRoute): RouteObject {
  const common = {
    path: route.path,
    lazy: async () => {
      const [module] = await Promise.all([route.page(), loadWords(route.words)]);
      const load = module.loader;
      const loader =
        load &&
        (async (args: LoaderFunctionArgs) => {
          if (route.audience === 'anyone') return load(args);
          const me = await queryClient.ensureQueryData(meQuery);
          return mayOpen(me, route.audience) ? load(args) : null;
        });
      return { Component: guarded(module.default, route.audience), ...(loader ? { loader } : {}) };
    },
    errorElement: <RouteError />,
  };
  return route.children === undefined ? common : { ...common, children: route.children.map(toRoute) };
}

/** Nobody signed in: off to the sign-in page, and back here afterwards. */
async function requireSession({ request }: LoaderFunctionArgs) {
  const me = await queryClient.ensureQueryData(meQuery);
  if (me !== null) return null;
  const url = new URL(request.url);
  return redirect(paths.signIn(url.pathname + url.search));
}

export function createRouter() {
  const all = Object.values(modules).flat();
  return createBrowserRouter([
    {
      element: <RootLayout />,
      errorElement: <RouteError bare />,
      HydrateFallback: FirstPaint,
      children: [
        {
          element: <PublicLayout />,
          children: all.filter((route) => route.audience === 'anyone').map(toRoute),
        },
        {
          element: <SignedInLayout />,
          loader: requireSession,
          // Who is signed in stays known between pages: no need to ask on every step.
          shouldRevalidate: () => false,
          errorElement: <RouteError bare />,
          children: all.filter((route) => route.audience !== 'anyone').map(toRoute),
        },
        { path: '*', element: <NotFoundPage /> },
      ],
    },
  ]);
}
