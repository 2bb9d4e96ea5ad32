import { randomBytes, randomUUID } from 'node:crypto';
import type { World } from './builders/world.ts';
import { completeDraft, inDays, lumpBid } from './builders/scopes.ts';

/** Ids that a route takes, by what they name. */
export interface Ids {
  company: string;
  scope: string;
  file: string;
  bid: string;
  subcontract: string;
  sovLine: string;
  thread: string;
  visit: string;
  completion: string;
  crew: string;
  truck: string;
  member: string;
  invitation: string;
  session: string;
}

/** One request with ids in it: valid in every other way, so that only access can refuse it. */
export interface AccessCase {
  /** As the route table names it. */
  route: string;
  path: (ids: Ids) => string;
  body?: (ids: Ids) => object;
  /** 422 for some kind of company, the same for every id. */
  mayBeInvalid?: boolean;
}

const get = (route: string, path: AccessCase['path']): AccessCase => ({ route: `GET ${route}`, path });
const post = (route: string, path: AccessCase['path'], body?: AccessCase['body']): AccessCase =>
  body === undefined ? { route: `POST ${route}`, path } : { route: `POST ${route}`, path, body };
const put = (route: string, path: AccessCase['path'], body: AccessCase['body']): AccessCase => ({
  route: `PUT ${route}`,
  path,
  body: body as (ids: Ids) => object,
});
const remove = (route: string, path: AccessCase['path']): AccessCase => ({ route: `DELETE ${route}`, path });

const limits = { signCents: null, setAsideCents: null, changeCents: null };
const window = () => ({ startsAt: inDays(3), endsAt: inDays(3.3) });
const ofScope =
  (rest = '') =>
  (ids: Ids) =>
    `/api/scopes/${ids.scope}${rest}`;

/** Every route that takes an id of someone's thing, in its path or its body. */
export const accessCases: AccessCase[] = [
  get('/api/scopes/:id', ofScope()),
  put('/api/scopes/:id/draft', ofScope('/draft'), () => ({ version: 1, draft: completeDraft() })),
  remove('/api/scopes/:id', ofScope()),
  post('/api/scopes/:id/publish', ofScope('/publish'), () => ({ version: 1 })),
  post('/api/scopes/:id/files', ofScope('/files'), ({ file }) => ({ fileId: file, caption: '' })),
  remove('/api/scopes/:id/files/:fileId', (ids) => `/api/scopes/${ids.scope}/files/${ids.file}`),
  post('/api/scopes/:id/withdraw', ofScope('/withdraw')),
  post('/api/scopes/:id/close', ofScope('/close'), () => ({ reason: 'Not needed any more' })),
  post('/api/scopes/:id/bid-price', ofScope('/bid-price'), () => ({
    revision: 1,
    price: lumpBid(100_000).price,
  })),
  put('/api/scopes/:id/own-bid', ofScope('/own-bid'), () => lumpBid(100_000)),
  get('/api/scopes/:id/own-bid', ofScope('/own-bid')),
  post('/api/scopes/:id/own-bid/withdraw', ofScope('/own-bid/withdraw')),
  get('/api/scopes/:id/bid-draft', ofScope('/bid-draft')),
  put('/api/scopes/:id/bid-draft', ofScope('/bid-draft'), () => ({ draft: { note: 'x' } })),
  get('/api/scopes/:id/bids', ofScope('/bids')),
  put('/api/scopes/:id/plugs', ofScope('/plugs'), () => ({ plugs: [] })),
  post('/api/scopes/:id/award', ofScope('/award'), ({ bid }) => ({ bidId: bid, reason: 'price', note: '' })),
  // A crew opens its own thread; a general contractor must say with whom, or is told so whatever the scope.
  { ...post('/api/scopes/:id/threads', ofScope('/threads'), () => ({})), mayBeInvalid: true },
  {
    ...post('/api/scopes/:id/threads', ofScope('/threads'), ({ company }) => ({ crewCompanyId: company })),
    mayBeInvalid: true,
  },
  get('/api/files/:id', ({ file }) => `/api/files/${file}`),
  get('/api/threads/:id', ({ thread }) => `/api/threads/${thread}`),
  get('/api/threads/:id/messages', ({ thread }) => `/api/threads/${thread}/messages`),
  post(
    '/api/threads/:id/messages',
    ({ thread }) => `/api/threads/${thread}/messages`,
    () => ({ id: randomUUID(), body: 'Hello', fileIds: [] }),
  ),
  post(
    '/api/threads/:id/read',
    ({ thread }) => `/api/threads/${thread}/read`,
    () => ({ seq: 1 }),
  ),
  get('/api/subcontracts/:id', ({ subcontract }) => `/api/subcontracts/${subcontract}`),
  post(
    '/api/subcontracts/:id/sign',
    ({ subcontract }) => `/api/subcontracts/${subcontract}/sign`,
    () => ({ name: 'Ada Quill', documentSha256: randomBytes(32).toString('hex') }),
  ),
  post(
    '/api/subcontracts/:id/set-aside-quote',
    ({ subcontract }) => `/api/subcontracts/${subcontract}/set-aside-quote`,
    ({ sovLine }) => ({ sovLineIds: [sovLine], method: 'card' }),
  ),
  post(
    '/api/subcontracts/:id/set-aside',
    ({ subcontract }) => `/api/subcontracts/${subcontract}/set-aside`,
    ({ sovLine }) => ({ id: randomUUID(), sovLineIds: [sovLine], method: 'card' }),
  ),
  post(
    '/api/visits',
    () => '/api/visits',
    ({ subcontract, sovLine, crew, truck }) => ({
      id: randomUUID(),
      subcontractId: subcontract,
      crewId: crew,
      truckId: truck,
      sovLineIds: [sovLine],
      windows: [window()],
      note: '',
    }),
  ),
  post(
    '/api/visits/:id/confirm',
    ({ visit }) => `/api/visits/${visit}/confirm`,
    () => ({ window: window() }),
  ),
  post('/api/visits/:id/start', ({ visit }) => `/api/visits/${visit}/start`),
  post('/api/visits/:id/finish', ({ visit }) => `/api/visits/${visit}/finish`),
  post(
    '/api/visits/:id/cancel',
    ({ visit }) => `/api/visits/${visit}/cancel`,
    () => ({ reason: 'Rain' }),
  ),
  post(
    '/api/completions',
    () => '/api/completions',
    ({ visit, sovLine }) => ({
      id: randomUUID(),
      visitId: visit,
      sovLineIds: [sovLine],
      asCut: [],
      photoIds: [],
      note: '',
    }),
  ),
  post('/api/completions/:id/accept', ({ completion }) => `/api/completions/${completion}/accept`),
  post('/api/completions/:id/withdraw', ({ completion }) => `/api/completions/${completion}/withdraw`),
  put(
    '/api/company/people/:id',
    ({ member }) => `/api/company/people/${member}`,
    () => ({ role: 'field', limits }),
  ),
  post('/api/company/people/:id/deactivate', ({ member }) => `/api/company/people/${member}/deactivate`),
  post('/api/company/people/:id/reactivate', ({ member }) => `/api/company/people/${member}/reactivate`),
  remove(
    '/api/company/people/:id/second-factor',
    ({ member }) => `/api/company/people/${member}/second-factor`,
  ),
  remove('/api/company/invitations/:id', ({ invitation }) => `/api/company/invitations/${invitation}`),
  remove('/api/account/sessions/:id', ({ session }) => `/api/account/sessions/${session}`),
  post(
    '/api/releases',
    () => '/api/releases',
    ({ completion }) => ({ id: randomUUID(), completionId: completion }),
  ),
];

/** Ids of nothing. */
export const missingIds = (): Ids => ({
  scope: randomUUID(),
  file: randomUUID(),
  bid: randomUUID(),
  subcontract: randomUUID(),
  sovLine: randomUUID(),
  thread: randomUUID(),
  visit: randomUUID(),
  completion: randomUUID(),
  crew: randomUUID(),
  truck: randomUUID(),
  member: randomUUID(),
  invitation: randomUUID(),
  session: randomUUID(),
  company: randomUUID(),
});

/** Ids of real things of two companies that have nothing to do with the asker. */
export const foreignIds = (world: World, scope: string, file: string): Ids => ({
  scope,
  file,
  bid: world.bidId,
  subcontract: world.work.subcontractId,
  sovLine: world.subcontract.sov[0]?.id ?? '',
  thread: world.threadId,
  visit: world.visitId,
  completion: world.completion.id,
  crew: world.work.crew.crewId,
  truck: world.work.crew.truckId,
  member: world.work.crew.owner.userId,
  invitation: world.invitationId,
  session: world.work.crew.owner.client.cookie('refresh')?.split('.')[0] ?? '',
  company: world.work.crew.id,
});
