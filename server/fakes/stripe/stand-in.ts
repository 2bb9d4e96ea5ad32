import { Clock } from './clock.ts';
import type { StandInConfig } from './config.ts';
import { StripeError } from './errors.ts';
import { Journal } from './journal.ts';
import { PLATFORM } from './records.ts';
import type { Settings, Timer } from './records.ts';
import { createPlatformAccount } from './resources/accounts.ts';
import { seedEndpoints } from './resources/webhook-endpoints.ts';
import { Store } from './store.ts';
import { scheduleDaily, TIMER_ACTIONS } from './timers.ts';
import { WebhookDispatcher } from './webhooks.ts';
import type { Cause } from './work.ts';
import { Work } from './work.ts';

const LONGEST_SLEEP_MS = 3_600_000;
const LOG_LENGTH = 1000;

/** One API request as the request log shows it. */
export interface LoggedRequest {
  at: string;
  requestId: string;
  method: string;
  path: string;
  account: string;
  idempotencyKey: string | null;
  status: number | null;
  isReplay: boolean;
  fault: string | null;
  params: unknown;
}

/** The provider's stand-in without its HTTP side: state, time, timers and webhooks. */
export class StandIn {
  readonly clock = new Clock();
  readonly requestLog: LoggedRequest[] = [];
  readonly dispatcher: WebhookDispatcher;
  /** Address of the hosted pages, known once the server listens. */
  origin = '';
  private readonly store: Store;
  private readonly journal: Journal;
  private nextTimer: NodeJS.Timeout | null = null;
  private isClosed = false;

  constructor(readonly config: StandInConfig) {
    this.journal = new Journal(config.dataDir);
    this.store = new Store(this.journal);
    this.store.load();
    this.dispatcher = new WebhookDispatcher(this.clock, (work) => this.transact(work));
  }

  /** Takes up work: first settings, seeded endpoints, timers that came due meanwhile, webhooks left over. */
  start(origin: string): void {
    this.origin = origin;
    this.clock.offsetMs = this.store.begin().get('settings', 'settings')?.clockOffsetMs ?? 0;
    this.transact((work) => {
      if (!work.get('settings', 'settings')) createSettings(work);
      seedEndpoints(work, this.config.webhooks);
      if (!work.get('timer', 'daily:all')) scheduleDaily(work);
    });
    this.dispatcher.resume();
    this.runDueTimers();
  }

  close(): void {
    this.isClosed = true;
    if (this.nextTimer) clearTimeout(this.nextTimer);
    this.dispatcher.close();
    this.journal.close();
  }

  /**
   * Runs `job` and saves what it changed, all or nothing. When it throws, nothing is saved, unless the error says
   * that its effects stay.
   */
  transact<T>(job: (work: Work) => T, cause?: Cause): T {
    const work = new Work(this.store, this.clock, this.origin, cause);
    try {
      const result = job(work);
      this.commit(work);
      return result;
    } catch (error) {
      if (error instanceof StripeError && error.keepsEffects) this.commit(work);
      throw error;
    }
  }

  /** A view to read from. */
  read(): Work {
    return new Work(this.store, this.clock, this.origin);
  }

  /** Moves the clock forward; what comes due on the way happens in order, each at its own time. */
  advance(ms: number): void {
    this.clock.offsetMs += ms;
    this.transact((work) => {
      work.edit('settings', 'settings').clockOffsetMs = this.clock.offsetMs;
    });
    this.runDueTimers();
    this.dispatcher.pump();
  }

  /** Forgets all objects, faults and the moved clock; the seeded endpoints are made anew. */
  reset(): void {
    this.store.clear();
    this.dispatcher.clear();
    this.requestLog.length = 0;
    this.clock.offsetMs = 0;
    this.start(this.origin);
  }

  logRequest(entry: LoggedRequest): void {
    this.requestLog.push(entry);
    if (this.requestLog.length > LOG_LENGTH) this.requestLog.shift();
  }

  /** Runs what has come due and sleeps until the next. */
  runDueTimers(): void {
    if (this.isClosed) return;
    for (
      let timer = this.earliestTimer();
      timer && timer.dueAt <= this.clock.now();
      timer = this.earliestTimer()
    ) {
      this.fire(timer);
    }
    this.planNextTimer();
  }

  private commit(work: Work): void {
    work.commit();
    if (work.newDeliveries.length > 0) this.dispatcher.enqueue(work.newDeliveries);
    if (work.hasChanged('timer')) this.planNextTimer();
  }

  private fire(timer: Timer): void {
    this.clock.at(timer.dueAt, () => {
      try {
        this.transact((work) => {
          work.remove('timer', timer.id);
          TIMER_ACTIONS[timer.action]?.(work, timer.subject);
        });
      } catch (error) {
        console.error(`payment stand-in: ${timer.id} failed:`, error);
        this.transact((work) => work.remove('timer', timer.id));
      }
    });
  }

  private earliestTimer(): Timer | null {
    const oldestFirst = this.store.begin().list('timer', PLATFORM).reverse();
    return oldestFirst.reduce<Timer | null>(
      (best, timer) => (best && best.dueAt <= timer.dueAt ? best : timer),
      null,
    );
  }

  private planNextTimer(): void {
    if (this.nextTimer) clearTimeout(this.nextTimer);
    const timer = this.earliestTimer();
    if (!timer || this.isClosed) return;
    const waitMs = Math.min(Math.max(timer.dueAt - this.clock.now(), 0), LONGEST_SLEEP_MS);
    this.nextTimer = setTimeout(() => this.runDueTimers(), waitMs);
  }
}

function createSettings(work: Work): Settings {
  const settings: Settings = {
    id: 'settings',
    owner: PLATFORM,
    platformAccountId: '',
    clockOffsetMs: 0,
    cardSettlement: 'live',
    bankDebits: 'live',
    verificationSeconds: 1,
    partialBankRefunds: 'allow',
    isDisputeFeeReturned: false,
    requestsPerSecond: 0,
    chaos: {
      duplicates: 0,
      reorderWithinMs: 0,
      delayMs: 0,
      isHolding: false,
      badSignatures: 0,
      withholdPercent: 0,
    },
  };
  work.put('settings', settings);
  settings.platformAccountId = createPlatformAccount(work).id;
  return settings;
}
