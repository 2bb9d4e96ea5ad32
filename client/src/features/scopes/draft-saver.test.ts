import type { ScopeDraft } from '@kerfyard/common/scopes';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { ApiError } from '../../lib/api-error.ts';
import { readTail } from '../../lib/draft-tail.ts';
import { DraftSaver, tailKey } from './draft-saver.ts';
import { emptyScope, toDraft } from './scope-form-values.ts';

const empty = toDraft(emptyScope, []);
const titled = (title: string): ScopeDraft => ({ ...empty, title });

interface Flight {
  version: number;
  draft: ScopeDraft;
  land: (version: number) => Promise<void>;
  fail: (error: unknown) => Promise<void>;
}

/** A server that answers when the test says so. */
function makeSaver() {
  const flights: Flight[] = [];
  const saver = new DraftSaver({
    scopeId: 's1',
    version: 1,
    draft: empty,
    onSaved: () => undefined,
    send: (version, draft) =>
      new Promise((resolve, reject) => {
        const settle = () => vi.advanceTimersByTimeAsync(0).then(() => undefined);
        flights.push({
          version,
          draft,
          land: (next) => {
            resolve({ version: next });
            return settle();
          },
          fail: (error) => {
            reject(error as Error);
            return settle();
          },
        });
      }),
  });
  return { saver, flights };
}

const problem = (code: 'offline' | 'stale_version') =>
  new ApiError({ code, status: code === 'offline' ? 0 : 409, message: '' });

beforeEach(() => {
  vi.useFakeTimers();
  sessionStorage.clear();
});
afterEach(() => vi.useRealTimers());

describe('DraftSaver', () => {
  it('sends once, a moment after the last key, and goes on from the new version', async () => {
    const { saver, flights } = makeSaver();
    saver.change(titled('D'));
    await vi.advanceTimersByTimeAsync(600);
    saver.change(titled('Do'));
    await vi.advanceTimersByTimeAsync(600);
    expect(flights).toHaveLength(0);
    expect(saver.current().kind).toBe('unsaved');
    await vi.advanceTimersByTimeAsync(500);
    expect(flights).toHaveLength(1);
    expect(flights[0]).toMatchObject({ version: 1, draft: { title: 'Do' } });
    await flights[0]?.land(2);
    expect(saver.current().kind).toBe('saved');
    saver.change(titled('Door'));
    await vi.advanceTimersByTimeAsync(1100);
    expect(flights[1]).toMatchObject({ version: 2, draft: { title: 'Door' } });
  });

  it('sends nothing when nothing differs from what the server has', async () => {
    const { saver, flights } = makeSaver();
    saver.change(titled('A'));
    saver.change(titled(''));
    await vi.advanceTimersByTimeAsync(3000);
    expect(flights).toHaveLength(0);
  });

  it('never has two requests on their way; what came meanwhile follows', async () => {
    const { saver, flights } = makeSaver();
    saver.change(titled('A'));
    await vi.advanceTimersByTimeAsync(1100);
    saver.change(titled('AB'));
    await vi.advanceTimersByTimeAsync(5000);
    expect(flights).toHaveLength(1);
    await flights[0]?.land(2);
    await vi.advanceTimersByTimeAsync(1100);
    expect(flights).toHaveLength(2);
    expect(flights[1]).toMatchObject({ version: 2, draft: { title: 'AB' } });
  });

  it('keeps what is unsaved in this tab and drops it once saved', async () => {
    const { saver, flights } = makeSaver();
    saver.change(titled('A'));
    expect(readTail(tailKey('s1'))).toMatchObject({ version: 1, draft: { title: 'A' } });
    await vi.advanceTimersByTimeAsync(1100);
    await flights[0]?.land(2);
    expect(readTail(tailKey('s1'))).toBeUndefined();
  });

  it('tries again by itself after a lost line', async () => {
    const { saver, flights } = makeSaver();
    saver.change(titled('A'));
    await vi.advanceTimersByTimeAsync(1100);
    await flights[0]?.fail(problem('offline'));
    expect(saver.current().kind).toBe('failed');
    await vi.advanceTimersByTimeAsync(5100);
    expect(flights[1]).toMatchObject({ version: 1, draft: { title: 'A' } });
    await flights[1]?.land(2);
    expect(saver.current().kind).toBe('saved');
  });

  it('overwrites nobody: a newer version stops it until a person decides', async () => {
    const { saver, flights } = makeSaver();
    saver.change(titled('Mine'));
    await vi.advanceTimersByTimeAsync(1100);
    await flights[0]?.fail(problem('stale_version'));
    expect(saver.current().kind).toBe('conflict');
    saver.change(titled('Mine too'));
    await vi.advanceTimersByTimeAsync(20_000);
    expect(flights).toHaveLength(1);
    const kept = saver.keepMine(5);
    expect(flights[1]).toMatchObject({ version: 5, draft: { title: 'Mine too' } });
    await flights[1]?.land(6);
    await kept;
    expect(saver.current().kind).toBe('saved');
  });

  it('flushes before publishing and fails when it cannot', async () => {
    const { saver, flights } = makeSaver();
    saver.change(titled('A'));
    const flushed = saver.flush();
    await flights[0]?.land(2);
    await expect(flushed).resolves.toBe(2);
    saver.change(titled('B'));
    const failed = expect(saver.flush()).rejects.toMatchObject({ code: 'offline' });
    await flights[1]?.fail(problem('offline'));
    await failed;
  });
});
