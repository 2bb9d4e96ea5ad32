import { acceptedFileTypes, fileLimits, type FileKind, type FileView } from '@kerfyard/common/files';
import { useCallback, useEffect, useReducer, useRef } from 'react';
import { isApiError } from '../lib/api-error.ts';
import { newId } from '../lib/ids.ts';
import { shrinkPhoto } from '../lib/shrink-photo.ts';
import { uploadFile } from '../lib/upload.ts';

/** Why a file is not there: the server's or our own refusal (final), or a failure that may be tried again. */
export type UploadProblem =
  | { kind: 'refused'; code: 'too_large' | 'wrong_type' | 'unreadable' | 'too_many'; message: string }
  | { kind: 'failed'; error: unknown };

export interface UploadItem {
  id: string;
  file: File;
  /** Share sent, 0 to 1. */
  share: number;
  problem: UploadProblem | null;
}

type Change =
  | { type: 'add'; items: UploadItem[] }
  | { type: 'share'; id: string; share: number }
  | { type: 'problem'; id: string; problem: UploadProblem | null }
  | { type: 'remove'; id: string };

function reduce(items: UploadItem[], change: Change): UploadItem[] {
  switch (change.type) {
    case 'add':
      return [...items, ...change.items];
    case 'remove':
      return items.filter((item) => item.id !== change.id);
    case 'share':
      return items.map((item) => (item.id === change.id ? { ...item, share: change.share } : item));
    case 'problem':
      return items.map((item) =>
        item.id === change.id ? { ...item, share: 0, problem: change.problem } : item,
      );
  }
}

/** What is refused without sending it: the wrong kind of file, or one that is too large. */
export function refusalOf(file: File): UploadProblem | null {
  if (!(file.type in acceptedFileTypes)) return { kind: 'refused', code: 'wrong_type', message: '' };
  // A photo that is too large may still become small enough; anything else cannot.
  if (file.size > fileLimits.maxBytes && file.type === 'application/pdf') {
    return { kind: 'refused', code: 'too_large', message: '' };
  }
  return null;
}

/** At most this many files on their way at once: a phone's line is narrow. */
const LANES = 2;

/**
 * Files on their way to the server, several at once; each stands alone, so one bad file does not lose the good ones.
 * Finished files leave the list and are handed to `onUploaded`.
 */
export function useUploads(kind: FileKind, onUploaded: (file: FileView) => void) {
  const [items, change] = useReducer(reduce, []);
  const done = useRef(onUploaded);
  const stops = useRef(new Map<string, AbortController>());
  const queue = useRef<UploadItem[]>([]);
  const running = useRef(0);

  useEffect(() => {
    done.current = onUploaded;
  });
  useEffect(() => {
    const open = stops.current;
    return () => {
      for (const stop of open.values()) stop.abort();
    };
  }, []);

  const send = useCallback(
    async (item: UploadItem) => {
      const stop = new AbortController();
      stops.current.set(item.id, stop);
      try {
        const result = await uploadFile(await shrinkPhoto(item.file), {
          kind,
          idempotencyKey: item.id,
          signal: stop.signal,
          onProgress: (share) => change({ type: 'share', id: item.id, share }),
        });
        const refused = result.refused[0];
        if (refused !== undefined) {
          change({ type: 'problem', id: item.id, problem: { kind: 'refused', ...refused } });
          return;
        }
        change({ type: 'remove', id: item.id });
        for (const file of result.files) done.current(file);
      } catch (error) {
        if (error instanceof DOMException && error.name === 'AbortError') return;
        change({ type: 'problem', id: item.id, problem: problemOf(error) });
      } finally {
        stops.current.delete(item.id);
      }
    },
    [kind],
  );

  /** Several lanes at once, each sending one file after the other until nothing waits. */
  const pump = useCallback(() => {
    const lane = async () => {
      for (let next = queue.current.shift(); next !== undefined; next = queue.current.shift())
        await send(next);
      running.current -= 1;
    };
    while (running.current < LANES && queue.current.length > 0) {
      running.current += 1;
      void lane();
    }
  }, [send]);

  const add = useCallback(
    (files: readonly File[]) => {
      const fresh = files.map((file) => ({ id: newId(), file, share: 0, problem: refusalOf(file) }));
      change({ type: 'add', items: fresh });
      queue.current.push(...fresh.filter((item) => item.problem === null));
      pump();
    },
    [pump],
  );
  const retry = useCallback(
    (item: UploadItem) => {
      change({ type: 'problem', id: item.id, problem: null });
      queue.current.push(item);
      pump();
    },
    [pump],
  );
  const remove = useCallback((item: UploadItem) => {
    queue.current = queue.current.filter((queued) => queued.id !== item.id);
    stops.current.get(item.id)?.abort();
    change({ type: 'remove', id: item.id });
  }, []);

  return { items, add, retry, remove };
}

/** A refusal of the whole request counts as one of its only file. */
function problemOf(error: unknown): UploadProblem {
  if (isApiError(error, 'too_large') || isApiError(error, 'wrong_type')) {
    return { kind: 'refused', code: error.code === 'too_large' ? 'too_large' : 'wrong_type', message: '' };
  }
  return { kind: 'failed', error };
}
