/** How many messages one socket may send: a page watches a handful of things, a flood is cut. */
export class MessageBudget {
  private windowStart = 0;
  private count = 0;

  constructor(
    private readonly messages = 120,
    private readonly windowMs = 10_000,
  ) {}

  /** Count one message at this instant; false when it is one too many. */
  take(nowMs: number): boolean {
    if (nowMs - this.windowStart >= this.windowMs) {
      this.windowStart = nowMs;
      this.count = 0;
    }
    this.count += 1;
    return this.count <= this.messages;
  }
}
