import { randomUUID } from 'node:crypto';
import fc from 'fast-check';
import { AppError } from '../src/platform/http/app-error.ts';
import { acceptLines, type MoneyWork } from './builders/money-work.ts';
import type { MoneyLab } from './money-lab.ts';
import type { MoneyServices } from './money-services.ts';

/** What a payment will have come to once everybody has heard of it. */
type Fate = 'open' | 'paid' | 'ended';

export interface ModelFunding {
  id: string;
  fate: Fate;
}

export interface ModelLine {
  id: string;
  cents: number;
  funding: ModelFunding | null;
  completionId: string | null;
  released: boolean;
}

export interface Model {
  lines: ModelLine[];
  fundings: ModelFunding[];
  completions: { id: string; lines: ModelLine[]; released: boolean }[];
  account: 'none' | 'made' | 'ready';
}

export interface Real {
  lab: MoneyLab;
  money: MoneyServices;
  work: MoneyWork;
  /** Throws when an invariant of the books does not hold. */
  requireBooks: () => Promise<void>;
}

const origin = { ip: '127.0.0.1', requestId: 'history', userAgent: 'history' };
const DECLINED_CARD = '4000000000000002';

export const releaseOnce = ({ money, work }: Real, completionId: string) =>
  money.releases.release(work.gc, origin, { id: randomUUID(), completionId });

const codeOf = (error: unknown): string => {
  if (error instanceof AppError) return error.code;
  throw error;
};

/** The code a call is refused with, or null. */
const refusal = (call: Promise<unknown>): Promise<string | null> => call.then(() => null, codeOf);

function require(holds: boolean, what: string): void {
  if (!holds) throw new Error(what);
}

const sessionOf = async ({ lab }: Real, funding: ModelFunding): Promise<string | null> => {
  const [row] = await lab.sql<{ checkout_session_id: string | null }>(
    'SELECT checkout_session_id FROM funding WHERE id = $1',
    [funding.id],
  );
  return row?.checkout_session_id ?? null;
};

/** One step of a history: what it is called, when it makes sense, what it does to the model and to the real thing. */
abstract class Step implements fc.AsyncCommand<Model, Real> {
  abstract readonly name: string;
  abstract check(model: Readonly<Model>): boolean;
  abstract act(model: Model, real: Real): Promise<void>;

  async run(model: Model, real: Real): Promise<void> {
    await this.act(model, real);
    await real.requireBooks();
  }

  toString(): string {
    return this.name;
  }
}

export class SetAside extends Step {
  readonly name = `set aside ${this.mask.toString(2)}`;
  constructor(private readonly mask: number) {
    super();
  }

  private chosen = (model: Readonly<Model>) => model.lines.filter((_, index) => this.mask & (1 << index));

  check(model: Readonly<Model>): boolean {
    return this.chosen(model).length > 0;
  }

  async act(model: Model, { money, work }: Real): Promise<void> {
    const lines = this.chosen(model);
    const id = randomUUID();
    const input = { id, sovLineIds: lines.map((line) => line.id), method: 'card' as const };
    const code = await refusal(money.setAside.request(work.gc, origin, work.subcontractId, input));
    const isFree = lines.every((line) => line.funding === null);
    const isBound = lines.some((line) => line.funding !== null && line.funding.fate !== 'ended');
    require(!(isBound && code === null), 'money was asked for twice for one line');
    require(!(isFree && code !== null), `free lines were refused: ${code}`);
    if (code !== null) return;
    const funding: ModelFunding = { id, fate: 'open' };
    model.fundings.push(funding);
    for (const line of lines) line.funding = funding;
  }
}

const openOnes = (model: Readonly<Model>) => model.fundings.filter(({ fate }) => fate === 'open');
const pick = <T>(list: readonly T[], number: number): T => list[number % list.length]!;

export class Pay extends Step {
  readonly name = `pay ${this.number} ${this.isGood ? 'well' : 'badly'}`;
  constructor(
    private readonly number: number,
    private readonly isGood: boolean,
  ) {
    super();
  }

  check(model: Readonly<Model>): boolean {
    return openOnes(model).length > 0;
  }

  async act(model: Model, real: Real): Promise<void> {
    const funding = pick(openOnes(model), this.number);
    const session = await sessionOf(real, funding);
    if (session === null) return;
    if (this.isGood) {
      await real.lab.control('pay', { session });
      funding.fate = 'paid';
    } else {
      // Declined: the page stays open for another try.
      await real.lab.control('pay', { session, cardNumber: DECLINED_CARD }).catch(() => undefined);
    }
  }
}

class Expire extends Step {
  readonly name = `expire ${this.number}`;
  constructor(private readonly number: number) {
    super();
  }

  check(model: Readonly<Model>): boolean {
    return openOnes(model).length > 0;
  }

  async act(model: Model, real: Real): Promise<void> {
    const funding = pick(openOnes(model), this.number);
    const session = await sessionOf(real, funding);
    if (session === null) return;
    await real.lab.provider.checkout.sessions.expire(session);
    funding.fate = 'ended';
  }
}

/** Jobs in any order, some of them twice. */
class RunJobs extends Step {
  readonly name = `run jobs ${this.picks.join()}${this.isTwice ? ' twice' : ''}`;
  constructor(
    private readonly picks: number[],
    private readonly isTwice: boolean,
  ) {
    super();
  }

  check(): boolean {
    return true;
  }

  async act(_: Model, { money }: Real): Promise<void> {
    for (const number of this.picks) {
      const { waiting } = money.jobs;
      if (waiting.length === 0) return;
      const [job] = waiting.splice(number % waiting.length, 1);
      const runs = this.isTwice ? [money.run(job!), money.run(job!)] : [money.run(job!)];
      await Promise.all(runs);
    }
  }
}

/** The general contractor accepts lines of work that are set aside. */
export class Accept extends Step {
  readonly name = `accept ${this.mask.toString(2)}`;
  constructor(private readonly mask: number) {
    super();
  }

  check(model: Readonly<Model>): boolean {
    return model.lines.some((line, index) => this.mask & (1 << index) && line.completionId === null);
  }

  async act(model: Model, { lab, work }: Real): Promise<void> {
    const rows = await lab.sql<{ sov_line_id: string }>(
      `SELECT sov_line_id FROM ledger_account WHERE code LIKE 'held:%' AND balance_cents < 0`,
    );
    const held = new Set(rows.map((row) => row.sov_line_id));
    const lines = model.lines.filter(
      (line, index) => this.mask & (1 << index) && line.completionId === null && held.has(line.id),
    );
    if (lines.length === 0) return;
    for (const line of lines) require(line.funding?.fate === 'paid', 'a line is held that nobody paid for');
    const ids = lines.map((line) => line.id);
    const id = await acceptLines(lab, work, ids);
    for (const line of lines) line.completionId = id;
    model.completions.push({ id, lines, released: false });
  }
}

/** Released by two people at once, which is once; or again, which is refused. */
class Release extends Step {
  readonly name = `release ${this.number}`;
  constructor(private readonly number: number) {
    super();
  }

  check(model: Readonly<Model>): boolean {
    return model.completions.length > 0;
  }

  async act(model: Model, real: Real): Promise<void> {
    const completion = pick(model.completions, this.number);
    const codes = await Promise.all([1, 2].map(() => refusal(releaseOnce(real, completion.id))));
    const successes = codes.filter((code) => code === null).length;
    require(successes === (completion.released ? 0 : 1), `released with ${codes.join()}`);
    markReleased(completion);
  }
}

export function markReleased(completion: Model['completions'][number]): void {
  completion.released = true;
  for (const line of completion.lines) line.released = true;
}

export async function makeAccountReady(model: Model, { lab, money, work }: Real): Promise<void> {
  await money.payouts.onboardingUrl(work.crew);
  const [row] = await lab.sql<{ payout_account_id: string }>(
    'SELECT payout_account_id FROM company WHERE id = $1',
    [work.crew.company?.id],
  );
  await lab.control('onboard', { account: row?.payout_account_id });
  await money.payouts.refresh(work.crew);
  model.account = 'ready';
}

/** A step that takes no choice. */
class Plain extends Step {
  constructor(
    readonly name: string,
    private readonly when: (model: Readonly<Model>) => boolean,
    private readonly deed: (model: Model, real: Real) => Promise<unknown>,
  ) {
    super();
  }

  check(model: Readonly<Model>): boolean {
    return this.when(model);
  }

  async act(model: Model, real: Real): Promise<void> {
    await this.deed(model, real);
  }
}

const always = (_: Readonly<Model>) => true;
const plain = (name: string, deed: (model: Model, real: Real) => Promise<unknown>, when = always) =>
  fc.constant(new Plain(name, when, deed));

const lapse = async (model: Model, { lab, money, work }: Real) => {
  const [row] = await lab.sql<{ payout_account_id: string }>(
    'SELECT payout_account_id FROM company WHERE id = $1',
    [work.crew.company?.id],
  );
  await lab.control('outcomes', { action: 'account_restricted', id: row?.payout_account_id });
  await money.payouts.refresh(work.crew);
  model.account = 'made';
};

/** Pages nobody paid run out by the provider's clock. */
export async function noteExpired(model: Model, { lab }: Real): Promise<void> {
  for await (const session of lab.provider.checkout.sessions.list({ limit: 100, status: 'expired' })) {
    const funding = model.fundings.find(({ id }) => id === session.metadata?.funding_id);
    if (funding !== undefined) funding.fate = 'ended';
  }
}

const letThreeDaysPass = async (model: Model, real: Real) => {
  await real.lab.control('clock/advance', { days: 3 });
  await noteExpired(model, real);
};

/** More than a day here and at the provider: its keys are forgotten, and calls without an answer are looked up. */
export async function letADayPass(lab: MoneyLab): Promise<void> {
  await lab.control('clock/advance', { hours: 25 });
  await lab.sql('UPDATE app_clock SET offset_ms = offset_ms + 90000000');
}

const dayPasses = async (model: Model, real: Real) => {
  await letADayPass(real.lab);
  await noteExpired(model, real);
};

const fault = fc
  .record({
    kind: fc.constantFrom('drop_before', 'drop_after', '500', '409', '429'),
    path: fc.constantFrom('/v1/transfers', '/v1/transfers', '/v1/checkout/sessions'),
    hasEffect: fc.boolean(),
  })
  .map(
    (one) =>
      new Plain(`fault ${one.kind} at ${one.path}`, always, (_, { lab }) =>
        lab.control('faults', {
          kind: one.kind,
          path: one.path,
          method: 'POST',
          count: 1,
          ...(one.kind === '500' ? { hasEffect: one.hasEffect } : {}),
        }),
      ),
  );

const mask = fc.integer({ min: 1, max: 15 });
const number = fc.nat(7);
const picks = fc.array(fc.nat(11), { minLength: 1, maxLength: 6 });

/** Everything that may happen to money, in any order. */
export const steps = [
  mask.map((one) => new SetAside(one)),
  fc
    .record({ number, isGood: fc.constantFrom(true, true, false) })
    .map((one) => new Pay(one.number, one.isGood)),
  number.map((one) => new Expire(one)),
  fc.record({ picks, isTwice: fc.boolean() }).map((one) => new RunJobs(one.picks, one.isTwice)),
  fc.record({ picks, isTwice: fc.boolean() }).map((one) => new RunJobs(one.picks, one.isTwice)),
  fc.record({ picks, isTwice: fc.boolean() }).map((one) => new RunJobs(one.picks, one.isTwice)),
  plain('poll events', (_, { money }) => money.events.poll()),
  mask.map((one) => new Accept(one)),
  number.map((one) => new Release(one)),
  number.map((one) => new Release(one)),
  plain('crew ready', makeAccountReady, (model) => model.account !== 'ready'),
  plain('crew lapses', lapse, (model) => model.account === 'ready'),
  plain(
    'try blocked again',
    (_, { money, work }) => money.transfers.retryForCrew(work.crew.company!.id),
    (model) => model.account === 'ready',
  ),
  plain('three days', letThreeDaysPass),
  plain('a day and an hour', dayPasses),
  plain('settle', (_, { money }) => money.fundings.settleAll()),
  plain('seal', (_, { money }) => money.seals.sealAll()),
  plain('compare', async (_, { money }) => {
    const differences = await money.reconciliation.compare();
    require(differences.length === 0, `the provider differs: ${JSON.stringify(differences)}`);
  }),
  fault,
  fault,
];
