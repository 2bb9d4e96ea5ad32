import type { ScopeDraft } from '@kerfyard/common/scopes';
import { isApiError } from '../../lib/api-error.ts';
import { deviceMs } from '../../lib/clock.ts';
import { dropTail, keepTail } from '../../lib/draft-tail.ts';

export type SaveState =
  | { kind: 'saved'; at: number | null }
  | { kind: 'unsaved' }
  | { kind: 'saving' }
  /** Kept in this tab, tried again by itself. */
  | { kind: 'failed'; error: unknown }
  /** Someone else saved meanwhile: a person decides which of the two stays. */
  | { kind: 'conflict' };

interface DraftSaverOptions {
  scopeId: string;
  version: number;
  /** What the server has. */
  draft: ScopeDraft;
  send: (version: number, draft: ScopeDraft) => Promise<{ version: number }>;
  onSaved: (version: number, draft: ScopeDraft) => void;
}

export const SAVE_AFTER_MS = 1000;
const AGAIN_AFTER_MS = 5000;

export function tailKey(scopeId: string): string {
  return `scope.${scopeId}`;
}

/**
 * Keeps a draft at the server while it is typed: one request at a time, a moment after the last key. What has not
 * reached the server yet is kept in this tab.
 */
export class DraftSaver {
  private state: SaveState = { kind: 'saved', at: null };
  private readonly listeners = new Set<() => void>();
  private version: number;
  private savedText: string;
  private latest: ScopeDraft;
  private flight: Promise<void> | null = null;
  private timer: ReturnType<typeof setTimeout> | undefined;

  constructor(private readonly options: DraftSaverOptions) {
    this.version = options.version;
    this.latest = options.draft;
    this.savedText = JSON.stringify(options.draft);
  }

  readonly current = (): SaveState => this.state;

  readonly subscribe = (listener: () => void): (() => void) => {
    this.listeners.add(listener);
    return () => this.listeners.delete(listener);
  };

  /** Take what is typed now; it is sent a moment after the last change. */
  change(draft: ScopeDraft): void {
    this.latest = draft;
    if (!this.hasUnsaved()) return;
    keepTail(tailKey(this.options.scopeId), { version: this.version, draft });
    if (this.state.kind === 'conflict') return;
    if (this.flight === null) this.show({ kind: 'unsaved' });
    this.schedule(SAVE_AFTER_MS);
  }

  /**
   * Send what is typed now and wait for it.
   * @returns the version that the server has
   * @throws ApiError when it could not be saved
   */
  async flush(): Promise<number> {
    clearTimeout(this.timer);
    while (this.flight !== null || this.hasUnsaved()) await this.send();
    return this.version;
  }

  /** End a conflict by going on from the server's version: the next save replaces what it has. */
  async keepMine(serverVersion: number): Promise<void> {
    this.version = serverVersion;
    this.show({ kind: 'unsaved' });
    await this.flush();
  }

  /** The page is left: what is still unsaved goes out now; if that fails it waits in this tab. */
  leave(): void {
    clearTimeout(this.timer);
    if (this.hasUnsaved() && this.state.kind !== 'conflict') this.send().catch(() => undefined);
  }

  private hasUnsaved(): boolean {
    return JSON.stringify(this.latest) !== this.savedText;
  }

  private schedule(ms: number): void {
    clearTimeout(this.timer);
    this.timer = setTimeout(() => {
      if (this.hasUnsaved()) this.send().catch(() => undefined);
    }, ms);
  }

  private send(): Promise<void> {
    if (this.flight !== null) return this.flight;
    const flight = this.sendLatest().finally(() => {
      this.flight = null;
      if (this.state.kind === 'saved' && this.hasUnsaved()) this.change(this.latest);
    });
    this.flight = flight;
    return flight;
  }

  private async sendLatest(): Promise<void> {
    const draft = this.latest;
    this.show({ kind: 'saving' });
    try {
      const { version } = await this.options.send(this.version, draft);
      this.version = version;
      this.savedText = JSON.stringify(draft);
      if (!this.hasUnsaved()) dropTail(tailKey(this.options.scopeId));
      this.options.onSaved(version, draft);
      this.show({ kind: 'saved', at: deviceMs() });
    } catch (error) {
      if (isApiError(error, 'stale_version')) {
        this.show({ kind: 'conflict' });
      } else {
        this.show({ kind: 'failed', error });
        this.schedule(AGAIN_AFTER_MS);
      }
      throw error;
    }
  }

  private show(state: SaveState): void {
    this.state = state;
    for (const listener of this.listeners) listener();
  }
}
