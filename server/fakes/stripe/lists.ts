import { invalidRequest } from './errors.ts';
import { isWithin } from './params.ts';
import type { Range } from './params.ts';
import type { Kind, Kinds } from './records.ts';
import type { Work } from './work.ts';

export interface ListRequest {
  limit: number;
  starting_after?: string | undefined;
  ending_before?: string | undefined;
  created?: Range | undefined;
}

/** A list object of the API. */
export interface ApiListBody<Api> {
  object: 'list';
  data: Api[];
  has_more: boolean;
  url: string;
}

type ApiOf<K extends Kind> = Kinds[K] extends { api: infer Api } ? Api : never;
type WithApi<K extends Kind> = Kinds[K] & { api: ApiOf<K> };

/** One page of things that are already at hand, in their order. */
export function pageOfItems<Item extends { id: string }>(
  items: readonly Item[],
  request: ListRequest,
  url: string,
): ApiListBody<Item> {
  let start = 0;
  let end = items.length;
  if (request.starting_after !== undefined)
    start = indexOfCursor(items, request.starting_after, 'starting_after') + 1;
  if (request.ending_before !== undefined) end = indexOfCursor(items, request.ending_before, 'ending_before');
  const isBackwards = request.ending_before !== undefined;
  const window = items.slice(start, end);
  const page = isBackwards ? window.slice(-request.limit) : window.slice(0, request.limit);
  return { object: 'list', data: page, has_more: window.length > page.length, url };
}

/** A list that is whole: everything in one page. */
export function wholeList<Api>(url: string, data: Api[]): ApiListBody<Api> {
  return { object: 'list', data, has_more: false, url };
}

function indexOfCursor(records: readonly { id: string }[], id: string, param: string): number {
  const index = records.findIndex((record) => record.id === id);
  if (index < 0) throw invalidRequest(`No such object: '${id}'`, { code: 'resource_missing', param });
  return index;
}

/**
 * One page of an owner's records, newest first (docs.stripe.com/api/pagination). `has_more` tells of more in the
 * direction of the request.
 */
export function pageOf<K extends Kind>(
  work: Work,
  kind: K,
  options: { owner: string; url: string; request: ListRequest; matches?: (record: WithApi<K>) => boolean },
): ApiListBody<ApiOf<K>> {
  const { owner, url, request, matches } = options;
  const all = (work.list(kind, owner) as WithApi<K>[]).filter((record) => {
    const { created } = record.api as { created?: number };
    return isWithin(created ?? 0, request.created) && (matches?.(record) ?? true);
  });
  const page = pageOfItems(all, request, url);
  return { ...page, data: page.data.map((record) => record.api) };
}
