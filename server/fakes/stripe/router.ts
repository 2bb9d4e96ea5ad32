import type { z } from 'zod';
import type { Work } from './work.ts';

export interface Call<Params> {
  work: Work;
  /** The account the call is about: PLATFORM, or the one of the `Stripe-Account` header. */
  owner: string;
  params: Params;
  /** Values of `:name` in the path. */
  path: Record<string, string>;
}

export interface Route {
  method: 'DELETE' | 'GET' | 'POST';
  path: string;
  /** SDK type of the parameters, by which a test compares them. */
  paramsType: string | null;
  schema: z.ZodType;
  run(call: Call<never>): object;
}

/** Ties a path to its parameters and what it does, so that `run` sees the checked parameters with their types. */
export function route<Schema extends z.ZodType>(
  address: `${Route['method']} ${string}`,
  paramsType: string | null,
  schema: Schema,
  run: (call: Call<z.output<Schema>>) => object,
): Route {
  const [method, path] = address.split(' ') as [Route['method'], string];
  return { method, path, paramsType, schema, run: run as unknown as Route['run'] };
}

export interface Match {
  route: Route;
  path: Record<string, string>;
}

function matchPath(pattern: string, pathname: string): Record<string, string> | null {
  const wanted = pattern.split('/');
  const given = pathname.split('/');
  if (wanted.length !== given.length) return null;
  const values: Record<string, string> = {};
  for (const [index, part] of wanted.entries()) {
    const actual = given[index] ?? '';
    if (part.startsWith(':') && actual !== '') values[part.slice(1)] = decodeURIComponent(actual);
    else if (part !== actual) return null;
  }
  return values;
}

/** The first route for a method and path; fixed paths stand before those with ids in the table. */
export function findRoute(routes: readonly Route[], method: string, pathname: string): Match | null {
  for (const candidate of routes) {
    if (candidate.method !== method) continue;
    const path = matchPath(candidate.path, pathname);
    if (path) return { route: candidate, path };
  }
  return null;
}
