import type { OpenScopesFilter } from './api/open-scopes.queries.ts';

export const filterNames = [
  'method',
  'withinMiles',
  'dueBefore',
  'minInchFeet',
  'maxInchFeet',
  'sort',
] as const;
export type FilterName = (typeof filterNames)[number];

/** The filter an address carries; unknown names are left alone. */
export function readFilter(search: URLSearchParams): OpenScopesFilter {
  const filter: OpenScopesFilter = {};
  for (const name of filterNames) {
    const value = search.get(name);
    if (value !== null && value !== '') filter[name] = value;
  }
  return filter;
}
