/** The stand-in's own time: the machine's clock plus an offset that can be moved forward. Milliseconds inside. */
export class Clock {
  private frozenAt: number | null = null;
  offsetMs = 0;

  /** Milliseconds since 1970. */
  now(): number {
    return this.frozenAt ?? Date.now() + this.offsetMs;
  }

  /** Whole seconds since 1970, as in every `created`. */
  seconds(): number {
    return Math.floor(this.now() / 1000);
  }

  /** Runs `work` as if it were `instantMs`: timers that come due together each see their own hour. */
  at<T>(instantMs: number, work: () => T): T {
    const before = this.frozenAt;
    this.frozenAt = instantMs;
    try {
      return work();
    } finally {
      this.frozenAt = before;
    }
  }
}

const DAY_MS = 86_400_000;

function isWeekend(date: Date): boolean {
  const day = date.getUTCDay();
  return day === 0 || day === 6;
}

/**
 * Midnight UTC, `days` business days after the day of `fromSeconds`. Weekends are skipped; bank holidays are not
 * known here. Returns seconds.
 */
export function addBusinessDays(fromSeconds: number, days: number): number {
  const date = new Date(Math.floor((fromSeconds * 1000) / DAY_MS) * DAY_MS);
  let left = days;
  while (left > 0) {
    date.setTime(date.getTime() + DAY_MS);
    if (!isWeekend(date)) left -= 1;
  }
  return date.getTime() / 1000;
}
