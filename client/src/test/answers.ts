import type { ErrorBody, ErrorCode, FieldIssue } from '@kerfyard/common/errors';
import { vi } from 'vitest';

export interface SeenRequest {
  method: string;
  url: string;
  headers: Headers;
  body: unknown;
}

export type Answer = (
  request: SeenRequest,
) => { status: number; body?: unknown } | Promise<{ status: number; body?: unknown }>;

/** Answers requests by `METHOD path`, in the given order for lists; an unexpected one is an error of the test. */
export function answerRequests(routes: Record<string, Answer | Answer[]>): SeenRequest[] {
  const seen: SeenRequest[] = [];
  const used = new Map<string, number>();
  vi.stubGlobal('fetch', async (url: string, init: RequestInit = {}) => {
    const request: SeenRequest = {
      method: init.method ?? 'GET',
      url,
      headers: new Headers(init.headers),
      body: typeof init.body === 'string' ? (JSON.parse(init.body) as unknown) : undefined,
    };
    seen.push(request);
    const key = `${request.method} ${url.split('?')[0] ?? ''}`;
    const route = routes[key];
    if (route === undefined) throw new Error(`no answer for ${key}`);
    const turn = used.get(key) ?? 0;
    used.set(key, turn + 1);
    const answer = Array.isArray(route) ? (route[Math.min(turn, route.length - 1)] as Answer) : route;
    const { status, body } = await answer(request);
    return new Response(body === undefined ? null : JSON.stringify(body), { status });
  });
  return seen;
}

export function problem(
  status: number,
  code: ErrorCode,
  fields?: FieldIssue[],
): { status: number; body: ErrorBody } {
  return {
    status,
    body: {
      error: {
        code,
        message: `the server's words for ${code}`,
        requestId: 'r-1',
        ...(fields ? { fields } : {}),
      },
    },
  };
}
