import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { answerRequests, problem } from '../test/answers.ts';
import { api } from './api-client.ts';
import { sessionGate } from './session-gate.ts';

const ok = () => ({ status: 200, body: { value: 7 } });
const signedOut = () => problem(401, 'unauthenticated');

beforeEach(() => localStorage.clear());
afterEach(() => {
  vi.unstubAllGlobals();
  sessionGate.know(null);
});

describe('api client', () => {
  it('marks every state-changing request as coming from this app, and no reading one', async () => {
    const seen = answerRequests({
      'GET /api/a': ok,
      'POST /api/a': ok,
      'PUT /api/a': ok,
      'DELETE /api/a': ok,
    });
    await api.get('/api/a');
    await api.post('/api/a', { x: 1 }, { idempotencyKey: 'key-1' });
    await api.put('/api/a', {});
    await api.delete('/api/a');
    expect(seen.map((request) => request.headers.get('X-Kerfyard'))).toEqual([null, '1', '1', '1']);
    expect(seen[1]?.headers.get('Idempotency-Key')).toBe('key-1');
    expect(seen[1]?.body).toEqual({ x: 1 });
  });

  it('leaves empty parts out of the query and repeats lists', async () => {
    const seen = answerRequests({ 'GET /api/a': ok });
    await api.get('/api/a', {
      query: { cursor: undefined, q: '', limit: 25, method: ['flat_saw', 'core_drill'] },
    });
    expect(seen[0]?.url).toBe('/api/a?limit=25&method=flat_saw&method=core_drill');
  });

  it('refreshes once for many requests that met a 401 at the same time, then runs them again', async () => {
    const seen = answerRequests({
      'GET /api/a': [signedOut, ok],
      'GET /api/b': [signedOut, ok],
      'POST /api/auth/refresh': () => ({ status: 204 }),
    });
    const answers = await Promise.all([api.get('/api/a'), api.get('/api/b')]);
    expect(answers).toEqual([{ value: 7 }, { value: 7 }]);
    expect(seen.filter((request) => request.url === '/api/auth/refresh')).toHaveLength(1);
  });

  it('asks to sign in again in place and goes on with the same request', async () => {
    sessionGate.know({ userId: 'u', email: 'a@b.example' });
    const seen = answerRequests({
      'POST /api/bids': [signedOut, ok],
      'POST /api/auth/refresh': signedOut,
    });
    const waiting = api.post('/api/bids', { cents: 5 }, { idempotencyKey: 'same' });
    await vi.waitFor(() => expect(seen).toHaveLength(2));
    sessionGate.answer(true);
    await expect(waiting).resolves.toEqual({ value: 7 });
    const bids = seen.filter((request) => request.url === '/api/bids');
    expect(bids.map((request) => request.headers.get('Idempotency-Key'))).toEqual(['same', 'same']);
    expect(bids.map((request) => request.body)).toEqual([{ cents: 5 }, { cents: 5 }]);
  });

  it('hands the 401 on when the person turns the question down', async () => {
    sessionGate.know({ userId: 'u', email: 'a@b.example' });
    const seen = answerRequests({ 'GET /api/a': signedOut, 'POST /api/auth/refresh': signedOut });
    const waiting = api.get('/api/a');
    const outcome = expect(waiting).rejects.toMatchObject({ code: 'unauthenticated' });
    await vi.waitFor(() => expect(seen).toHaveLength(2));
    sessionGate.answer(false);
    await outcome;
  });

  it('does not ask someone who never signed in on this page', async () => {
    answerRequests({ 'GET /api/a': signedOut, 'POST /api/auth/refresh': signedOut });
    await expect(api.get('/api/a')).rejects.toMatchObject({ code: 'unauthenticated', status: 401 });
  });

  it('takes a wrong password for what it is, without refreshing', async () => {
    const seen = answerRequests({ 'POST /api/auth/sign-in': () => problem(401, 'wrong_credentials') });
    await expect(api.post('/api/auth/sign-in', {})).rejects.toMatchObject({ code: 'wrong_credentials' });
    expect(seen).toHaveLength(1);
  });

  it('does not end a session because the line dropped during the refresh', async () => {
    sessionGate.know({ userId: 'u', email: 'a@b.example' });
    answerRequests({
      'GET /api/a': signedOut,
      'POST /api/auth/refresh': () => Promise.reject(new TypeError('network')),
    });
    await expect(api.get('/api/a')).rejects.toMatchObject({ code: 'unauthenticated' });
  });

  it('keeps code, field issues and request id of an error, and survives a body that is not ours', async () => {
    answerRequests({
      'PUT /api/a': () =>
        problem(422, 'invalid_input', [{ path: 'yard.zip', message: 'A five-digit ZIP code' }]),
      'GET /api/b': () => ({ status: 502, body: 'gateway' }),
      'GET /api/c': () => Promise.reject(new TypeError('network')),
    });
    await expect(api.put('/api/a', {})).rejects.toMatchObject({
      code: 'invalid_input',
      status: 422,
      requestId: 'r-1',
      fields: [{ path: 'yard.zip', message: 'A five-digit ZIP code' }],
    });
    await expect(api.get('/api/b')).rejects.toMatchObject({ code: 'internal', status: 502 });
    await expect(api.get('/api/c')).rejects.toMatchObject({ code: 'offline', status: 0 });
  });
});
