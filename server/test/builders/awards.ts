import { randomUUID } from 'node:crypto';
import type { ScopeDetailView } from '@kerfyard/common/scopes';
import type { SubcontractView } from '@kerfyard/common/subcontracts';
import type { ProposeVisit, VisitView, VisitWindow } from '@kerfyard/common/visits';
import {
  expectStatus,
  makeCuttingContractor,
  makeGeneralContractor,
  type Company,
  type Person,
} from './people.ts';
import { comeDue, lumpBid, placeBid, publishScope, type DraftOptions } from './scopes.ts';
import { signWork, type Crew, type Work } from './paid-work.ts';

export interface DueScope {
  gc: Company;
  crews: Crew[];
  scope: ScopeDetailView;
  /** In the order of `crews`. */
  bidIds: string[];
}

/** A due scope with one lump-sum bid per amount, each of a crew of its own unless crews are given. */
export async function dueScope(
  lumpCents: readonly number[],
  given: { gc?: Company; crews?: Crew[]; options?: DraftOptions } = {},
): Promise<DueScope> {
  const [gc, crews] = await Promise.all([
    given.gc ?? makeGeneralContractor(),
    given.crews ?? Promise.all(lumpCents.map(() => makeCuttingContractor())),
  ]);
  const scope = await publishScope(gc, given.options);
  const bidIds: string[] = [];
  for (const [index, cents] of lumpCents.entries()) {
    bidIds.push((await placeBid(crews[index]!, scope.id, lumpBid(cents))).id);
  }
  await comeDue(gc, scope.id);
  return { gc, crews, scope, bidIds };
}

export function award(gc: Company, scopeId: string, bidId: string) {
  const body = { bidId, reason: 'price', note: 'Thank you for the careful bid.' };
  return gc.owner.client.post(`/api/scopes/${scopeId}/award`, body);
}

/** A scope awarded to its only bidder, not signed yet; the companies are made unless given. */
export async function awardedWork(
  lumpCents = 900_000,
  given: { gc?: Company; crew?: Crew; options?: DraftOptions } = {},
): Promise<Work> {
  const crews = given.crew === undefined ? {} : { crews: [given.crew] };
  const due = await dueScope([lumpCents], { ...given, ...crews });
  const answer = await expectStatus(award(due.gc, due.scope.id, due.bidIds[0]!), 201);
  const { subcontractId } = answer.body as { subcontractId: string };
  return { gc: due.gc, crew: due.crews[0]!, subcontractId };
}

/** Signed by both, between companies that may be given: several subcontracts of one crew. */
export async function activeWork(...given: Parameters<typeof awardedWork>): Promise<Work> {
  const work = await awardedWork(...given);
  await signWork(work);
  return work;
}

export async function viewWork(person: Person, subcontractId: string): Promise<SubcontractView> {
  const answer = await expectStatus(person.client.get(`/api/subcontracts/${subcontractId}`), 200);
  return answer.body as SubcontractView;
}

/** Sign as this person, with the hash of the stored paper. */
export async function sign(person: Person, subcontractId: string) {
  const { document } = await viewWork(person, subcontractId);
  const body = { name: person.name, documentSha256: document.sha256 };
  return person.client.post(`/api/subcontracts/${subcontractId}/sign`, body);
}

/** A window that begins this many hours from now. */
export function windowIn(hours: number, lengthHours = 8): VisitWindow {
  const start = Date.now() + hours * 3_600_000;
  return {
    startsAt: new Date(start).toISOString(),
    endsAt: new Date(start + lengthHours * 3_600_000).toISOString(),
  };
}

/** A proposal for all lines of a subcontract by the crew's own crew and truck. */
export async function visitBody(work: Work, change: Partial<ProposeVisit> = {}): Promise<ProposeVisit> {
  const { sov } = await viewWork(work.crew.owner, work.subcontractId);
  return {
    id: randomUUID(),
    subcontractId: work.subcontractId,
    crewId: work.crew.crewId,
    truckId: work.crew.truckId,
    sovLineIds: sov.map((line) => line.id),
    windows: [windowIn(48)],
    note: '',
    ...change,
  };
}

export async function proposeVisit(work: Work, change: Partial<ProposeVisit> = {}): Promise<VisitView> {
  const body = await visitBody(work, change);
  return (await expectStatus(work.crew.owner.client.post('/api/visits', body), 201)).body as VisitView;
}
