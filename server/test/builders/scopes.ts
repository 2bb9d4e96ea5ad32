import { randomUUID } from 'node:crypto';
import type { BidInput, BidTabulationView, OwnBidView } from '@kerfyard/common/bids';
import {
  prefillResponsibilities,
  type BiddingMode,
  type CutInput,
  type ScopeDetailView,
  type ScopeDraft,
} from '@kerfyard/common/scopes';
import { sql } from '../database.ts';
import { expectStatus, HOME, type Company, type Person } from './people.ts';

const DAY_MS = 86_400_000;

export const inDays = (days: number): string => new Date(Date.now() + days * DAY_MS).toISOString();

/** A line of a cut list, as the form sends it. */
export function cutLine(mark: string, cut: CutInput, id: string = randomUUID()): ScopeDraft['cuts'][number] {
  return { id, mark, note: '', cut: { ...cut } };
}

export interface DraftOptions {
  title?: string;
  mode?: BiddingMode;
  dueAt?: string;
  cuts?: ScopeDraft['cuts'];
  site?: ScopeDraft['site'];
  conditions?: ScopeDraft['conditions'];
  terms?: ScopeDraft['terms'];
}

/**
 * A draft with nothing missing: a trench (84 LF, 504 in-ft) and six cores near the crews' yard, sealed, due in a week; cutting
 * and slurry are the crew's, the rest is the general contractor's or not needed.
 */
export function completeDraft(options: DraftOptions = {}): ScopeDraft {
  return {
    title: options.title ?? 'Slab trench for a drain',
    summary: 'One trench and six sleeves in the ground floor.',
    site: {
      name: 'Ninth Street Annex',
      address: '914 Ninth Street',
      city: 'Denver',
      state: 'CO',
      ...HOME,
      timeZone: 'America/Denver',
      contact: 'Gate 2, ask for Imani',
      ...options.site,
    },
    cuts: options.cuts ?? [
      cutLine('A1', { kind: 'trench', lengthFt: 40, widthFt: 2, thicknessIn: 6, count: 1 }),
      cutLine('B1', { kind: 'core', diameterIn: 4, depthIn: 8, count: 6 }),
    ],
    conditions: {
      element: 'slab_on_grade',
      face: 'floor',
      indoors: false,
      floor: 'Ground',
      steel: 'mesh',
      postTension: 'proved_none',
      below: 'soil',
      enginesAllowed: true,
      overcutsAllowed: true,
      workHours: '7:00 to 15:30',
      access: 'Roller door, 10 ft',
      ...options.conditions,
    },
    responsibilities: prefillResponsibilities({
      kinds: ['trench', 'core'],
      indoors: false,
      face: 'floor',
      below: 'soil',
    }).map((row) => ({ ...row })),
    terms: {
      priceForm: 'either',
      retainageBasisPoints: 0,
      standbyFreeMinutes: 30,
      answerDays: 7,
      bidValidDays: 30,
      workFrom: inDays(20).slice(0, 10),
      workTo: inDays(40).slice(0, 10),
      wages: 'open_shop',
      notes: '',
      ...options.terms,
    },
    bidding: { mode: options.mode ?? 'sealed', dueAt: options.dueAt ?? inDays(7) },
  };
}

/** A draft on the server. */
export async function makeDraft(gc: Company, draft: ScopeDraft = completeDraft()): Promise<ScopeDetailView> {
  const response = await expectStatus(gc.owner.client.post('/api/scopes', { id: randomUUID(), draft }), 201);
  return response.body as ScopeDetailView;
}

/** A published scope as its own company sees it. */
export async function publishScope(gc: Company, options: DraftOptions = {}): Promise<ScopeDetailView> {
  const draft = await makeDraft(gc, completeDraft(options));
  const response = await expectStatus(
    gc.owner.client.post(`/api/scopes/${draft.id}/publish`, { version: draft.draft?.version }),
    200,
  );
  return response.body as ScopeDetailView;
}

/** A lump-sum bid on revision 1. */
export function lumpBid(lumpCents: number, more: Partial<BidInput> = {}): BidInput {
  return {
    revision: 1,
    price: { form: 'lump', lumpCents },
    answers: [],
    inclusions: ['Blades and water hoses'],
    exclusions: [],
    note: '',
    validDays: 30,
    startFrom: null,
    ...more,
  };
}

/** A bid by lines on revision 1: one line per cut, by the piece, at this many cents each. */
export function linesBid(scope: ScopeDetailView, centsEach: number, more: Partial<BidInput> = {}): BidInput {
  const lines = (scope.body?.cuts ?? []).map((line) => ({
    cutId: line.id,
    unit: 'each' as const,
    rate: centsEach * 100,
    factors: [],
  }));
  const price = {
    form: 'lines' as const,
    lines,
    minimumCents: 0,
    mobilizationCents: 0,
    minimumIncludesMobilization: true,
  };
  return { ...lumpBid(100), price, ...more };
}

/** Hand in a bid or revise it; throws on any refusal. */
export async function placeBid(
  crew: Pick<Company, 'owner'>,
  scopeId: string,
  input: BidInput,
): Promise<OwnBidView> {
  const response = await expectStatus(crew.owner.client.put(`/api/scopes/${scopeId}/own-bid`, input), 200);
  return response.body as OwnBidView;
}

/** Set when one scope's bids are due, from now; the clock of all the others stays. */
export async function moveDue(scopeId: string, fromNowMs: number): Promise<void> {
  await sql(
    `UPDATE scope SET due_at = app_now() + $2 * interval '1 millisecond' WHERE id = $1`,
    [scopeId, fromNowMs],
    'owner',
  );
}

/** Let a scope's bids come due now, and read them as its general contractor. */
export async function comeDue(gc: { owner: Person }, scopeId: string): Promise<BidTabulationView> {
  await moveDue(scopeId, -1);
  const response = await expectStatus(gc.owner.client.get(`/api/scopes/${scopeId}/bids`), 200);
  return response.body as BidTabulationView;
}
