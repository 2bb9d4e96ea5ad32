import { randomUUID } from 'node:crypto';
import sharp from 'sharp';
import type { CompletionView } from '@kerfyard/common/completions';
import type { UploadResult } from '@kerfyard/common/files';
import type { ScopeDetailView } from '@kerfyard/common/scopes';
import type { SubcontractView } from '@kerfyard/common/subcontracts';
import type { ThreadView } from '@kerfyard/common/talk';
import { sql } from '../database.ts';
import { readWork, workToRelease, type Work } from './paid-work.ts';
import { expectStatus, invite, makeCuttingContractor, uniqueEmail, type Person } from './people.ts';
import { lumpBid, makeDraft, placeBid, publishScope } from './scopes.ts';

/** One of everything that two companies can have together or alone, and the ids a stranger might come by. */
export interface World {
  work: Work;
  subcontract: SubcontractView;
  completion: CompletionView;
  draft: ScopeDetailView;
  open: ScopeDetailView;
  awardedScopeId: string;
  bidId: string;
  visitId: string;
  threadId: string;
  gcFileId: string;
  crewFileId: string;
  invitationId: string;
}

/** A photograph with nothing in it, uploaded by this person. */
export async function uploadPhoto(person: Person, kind = 'photo'): Promise<string> {
  const photo = await sharp({ create: { width: 64, height: 48, channels: 3, background: '#789' } })
    .jpeg()
    .toBuffer();
  const answer = await person.client
    .prepare('post', '/api/files')
    .field('kind', kind)
    .attach('files', photo, { filename: 'wall.jpg', contentType: 'image/jpeg' });
  const file = (answer.body as UploadResult).files?.[0];
  if (file === undefined) throw new Error(`upload gave ${answer.status}: ${answer.text}`);
  return file.id;
}

async function openThread(work: Work, scopeId: string): Promise<string> {
  const { client } = work.crew.owner;
  const thread = (await client.post(`/api/scopes/${scopeId}/threads`, {})).body as ThreadView;
  await expectStatus(
    client.post(`/api/threads/${thread.id}/messages`, {
      id: randomUUID(),
      body: 'Gate 2 or gate 3?',
      fileIds: [],
    }),
    201,
  );
  return thread.id;
}

export async function buildWorld(): Promise<World> {
  const { work, completion } = await workToRelease(1_234_567);
  const draft = await makeDraft(work.gc);
  const open = await publishScope(work.gc);
  await placeBid(work.crew, open.id, lumpBid(7_654_321));
  const other = await makeCuttingContractor();
  await placeBid(other, open.id, lumpBid(8_654_321));
  const [row] = await sql<{ scope_id: string; bid_id: string }>(
    'SELECT scope_id, bid_id FROM subcontract WHERE id = $1',
    [work.subcontractId],
  );
  if (row === undefined) throw new Error('there is no subcontract');
  return {
    work,
    subcontract: await readWork(work),
    completion,
    draft,
    open,
    awardedScopeId: row.scope_id,
    bidId: row.bid_id,
    visitId: completion.visitId,
    threadId: await openThread(work, row.scope_id),
    gcFileId: await uploadPhoto(work.gc.owner),
    crewFileId: await uploadPhoto(work.crew.owner),
    invitationId: await invite(work.crew, uniqueEmail(), 'manager'),
  };
}
