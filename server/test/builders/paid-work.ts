import { randomUUID } from 'node:crypto';
import type { CompletionView } from '@kerfyard/common/completions';
import type { FundingView } from '@kerfyard/common/payments';
import type { SubcontractView } from '@kerfyard/common/subcontracts';
import type { VisitView } from '@kerfyard/common/visits';
import { onboardCrew, payCheckout, until } from '../provider.ts';
import { sql } from '../database.ts';
import { expectStatus, makeCuttingContractor, makeGeneralContractor, type Company } from './people.ts';
import { comeDue, inDays, lumpBid, placeBid, publishScope, type DraftOptions } from './scopes.ts';

export type Crew = Awaited<ReturnType<typeof makeCuttingContractor>>;

/** Both companies and their subcontract, each step taken through the API. */
export interface Work {
  gc: Company;
  crew: Crew;
  subcontractId: string;
}

/** A subcontract awarded at this price, not signed yet. */
export async function awardWork(lumpCents: number, options: DraftOptions = {}): Promise<Work> {
  const [gc, crew] = await Promise.all([makeGeneralContractor(), makeCuttingContractor()]);
  const scope = await publishScope(gc, options);
  await placeBid(crew, scope.id, lumpBid(lumpCents));
  const { bids } = await comeDue(gc, scope.id);
  const award = { bidId: bids[0]?.id, reason: 'price', note: '' };
  const answer = await expectStatus(gc.owner.client.post(`/api/scopes/${scope.id}/award`, award), 201);
  return { gc, crew, subcontractId: (answer.body as { subcontractId: string }).subcontractId };
}

/** The subcontract as one side reads it. */
export async function readWork(work: Work, side: 'gc' | 'crew' = 'gc'): Promise<SubcontractView> {
  const { client } = work[side].owner;
  return (await expectStatus(client.get(`/api/subcontracts/${work.subcontractId}`), 200))
    .body as SubcontractView;
}

export async function signWork(work: Work): Promise<void> {
  const { document } = await readWork(work);
  for (const side of ['gc', 'crew'] as const) {
    const { client, name } = work[side].owner;
    const body = { name, documentSha256: document.sha256 };
    const answer = await client.post(`/api/subcontracts/${work.subcontractId}/sign`, body);
    if (answer.status >= 300) throw new Error(`signing gave ${answer.status}: ${answer.text}`);
  }
}

/** Awarded and signed by both. */
export async function signedWork(lumpCents: number, options: DraftOptions = {}): Promise<Work> {
  const work = await awardWork(lumpCents, options);
  await signWork(work);
  return work;
}

/** Ask for the money of these lines (all, unless told) and wait for the payment page. */
export async function askForMoney(
  work: Work,
  sovLineIds?: string[],
): Promise<{ fundingId: string; sessionId: string }> {
  const lines = sovLineIds ?? (await readWork(work)).sov.map((line) => line.id);
  const id = randomUUID();
  const path = `/api/subcontracts/${work.subcontractId}/set-aside`;
  await expectStatus(work.gc.owner.client.post(path, { id, sovLineIds: lines, method: 'card' }), 201);
  const sessionId = await until('the payment page', async () => {
    const [row] = await sql<{ checkout_session_id: string | null }>(
      'SELECT checkout_session_id FROM funding WHERE id = $1',
      [id],
    );
    return row?.checkout_session_id ?? null;
  });
  return { fundingId: id, sessionId };
}

/** Set aside and paid by card. */
export async function setAside(work: Work, sovLineIds?: string[]): Promise<FundingView> {
  const { fundingId, sessionId } = await askForMoney(work, sovLineIds);
  await payCheckout(sessionId);
  return until('the money', async () => {
    const funding = (await readWork(work)).fundings.find((one) => one.id === fundingId);
    return funding?.status === 'succeeded' ? funding : null;
  });
}

let hour = 0;

/** A visit for these lines (all, unless told), confirmed and started. */
export async function startVisit(work: Work, sovLineIds?: string[]): Promise<VisitView> {
  const lines = sovLineIds ?? (await readWork(work)).sov.map((line) => line.id);
  hour += 1;
  const window = { startsAt: inDays(1 + hour), endsAt: inDays(1 + hour + 0.2) };
  const { client } = work.crew.owner;
  const proposal = {
    id: randomUUID(),
    subcontractId: work.subcontractId,
    crewId: work.crew.crewId,
    truckId: work.crew.truckId,
    sovLineIds: lines,
    windows: [window],
    note: '',
  };
  const { id } = (await expectStatus(client.post('/api/visits', proposal), 201)).body as VisitView;
  const confirmed = await work.gc.owner.client.post(`/api/visits/${id}/confirm`, { window });
  if (confirmed.status >= 300) throw new Error(`confirming gave ${confirmed.status}: ${confirmed.text}`);
  const started = await client.post(`/api/visits/${id}/start`);
  if (started.status >= 300) throw new Error(`starting gave ${started.status}: ${started.text}`);
  return started.body as VisitView;
}

/** A completion of these lines (all of the visit's, unless told), all as listed, and accepted. */
export async function acceptedCompletion(
  work: Work,
  visit: VisitView,
  sovLineIds = visit.sovLineIds,
): Promise<CompletionView> {
  const { sov } = await readWork(work);
  const cutIds = sov.filter((line) => sovLineIds.includes(line.id)).flatMap((line) => line.cutIds);
  const body = {
    id: randomUUID(),
    visitId: visit.id,
    sovLineIds,
    asCut: cutIds.map((cutId) => ({ cutId, asListed: true, note: '' })),
    photoIds: [],
    note: '',
  };
  await expectStatus(work.crew.owner.client.post('/api/completions', body), 201);
  const accepted = await work.gc.owner.client.post(`/api/completions/${body.id}/accept`);
  if (accepted.status >= 300) throw new Error(`accepting gave ${accepted.status}: ${accepted.text}`);
  return accepted.body as CompletionView;
}

/** Signed, set aside, visited, completed and accepted: only the release is left. */
export async function workToRelease(lumpCents: number, options: DraftOptions = {}) {
  const work = await signedWork(lumpCents, options);
  await onboardCrew(work.crew);
  await setAside(work);
  const completion = await acceptedCompletion(work, await startVisit(work));
  return { work, completion };
}
