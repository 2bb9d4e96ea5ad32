import type { ErrorBody } from '@kerfyard/common/errors';
import { permissions, type PermissionName } from '@kerfyard/common/people';
import { accessCases, foreignIds, missingIds, type AccessCase, type Ids } from './access-cases.ts';
import {
  addPerson,
  addStaff,
  makeCuttingContractor,
  makeGeneralContractor,
  type Person,
} from './builders/people.ts';
import { inDays } from './builders/scopes.ts';
import { buildWorld, type World } from './builders/world.ts';
import { Client } from './client.ts';
import { closeDatabase } from './database.ts';
import { openLine } from './live.ts';
import { readRouteTable, routeName, type Route, type SocketMessage } from './route-table.ts';

let routes: Route[];
let messages: SocketMessage[];
let world: World;
/** People of companies that have nothing to do with the world's. */
let strangers: Record<string, Person>;

beforeAll(async () => {
  ({ routes, messages } = await readRouteTable());
  world = await buildWorld();
  const [gc, crew, bareCrew] = await Promise.all([
    makeGeneralContractor(),
    makeCuttingContractor({ yard: { zip: '96801', lat: 21.3, lon: -157.85 }, serviceRadiusMi: 50 }),
    makeCuttingContractor(),
  ]);
  strangers = {
    'another general contractor': gc.owner,
    'another crew': crew.owner,
    'another crew next door': bareCrew.owner,
    'another crew’s field hand': await addPerson(crew, 'field'),
    staff: await addStaff(gc),
  };
}, 60_000);
afterAll(closeDatabase);

const ask = (client: Client, { route, path, body }: AccessCase, ids: Ids) => {
  const method = route.split(' ', 1)[0]?.toLowerCase() as 'get' | 'post' | 'put' | 'delete';
  return client.send(method, path(ids), body?.(ids));
};

/** Whether a request says this id anywhere. */
const names = ({ path, body }: AccessCase, id: keyof Ids): boolean => {
  const ids = missingIds();
  return JSON.stringify([path(ids), body?.(ids) ?? null]).includes(ids[id]);
};

const withoutRequestId = (body: unknown) => {
  const { error } = body as ErrorBody;
  return { ...error, requestId: '' };
};

const isPublic = (route: Route) => route.access?.kind === 'public';

describe('D-04 every way in declares who may use it', () => {
  it('each route and each socket handler, by a permission that exists', () => {
    expect(routes.length).toBeGreaterThan(40);
    expect(messages.map(({ message }) => message).sort()).toEqual(['unwatch', 'watch']);
    for (const { handler, access } of [...routes, ...messages]) {
      expect([handler, access?.kind]).toEqual([
        handler,
        expect.stringMatching(/^(public|signed_in|permission)$/),
      ]);
      if (access?.kind === 'permission') expect(Object.keys(permissions)).toContain(access.name);
    }
    expect(messages.filter(({ access }) => access?.kind === 'public')).toEqual([]);
  });

  it('what is public is this and nothing more', () => {
    expect(routes.filter(isPublic).map(routeName).sort()).toEqual([
      'GET /api/demo/people',
      'GET /api/health',
      'POST /api/auth/email/confirm',
      'POST /api/auth/invitation',
      'POST /api/auth/invitation/accept',
      'POST /api/auth/refresh',
      'POST /api/auth/reset',
      'POST /api/auth/reset/use',
      'POST /api/auth/sign-in',
      'POST /api/auth/sign-out',
      'POST /api/auth/sign-up',
      'POST /api/auth/verify',
      'POST /api/demo/sign-in',
      'POST /api/payments/webhooks/account',
      'POST /api/payments/webhooks/connect',
    ]);
  });

  it('anonymous: every other route asks to sign in, before it looks at anything', async () => {
    for (const route of routes.filter((one) => !isPublic(one))) {
      const client = new Client();
      const answer = await client.send(
        route.method,
        route.path.replace(/:\w+/g, 'x'),
        route.method === 'get' ? undefined : {},
      );
      expect([routeName(route), answer.status, answer.body.error.code]).toEqual([
        routeName(route),
        401,
        'unauthenticated',
      ]);
    }
  });
});

describe('D-03, D-32 every input is checked whole', () => {
  it('each body, query and path parameter has a schema that lets no unknown field through', () => {
    const faults = routes.flatMap((route) =>
      route.arguments
        .filter(({ hasSchema, loose }) => !hasSchema || loose.length > 0)
        .map(({ kind, name, loose }) => `${routeName(route)} ${kind} ${name ?? ''} ${loose.join(' ')}`),
    );
    expect(faults).toEqual([]);
  });

  it('each route that takes a body refuses fields that decide ownership, role, state or money', async () => {
    const extra = {
      role: 'owner',
      companyId: world.work.gc.id,
      status: 'open',
      feeBps: 0,
      balance: 1,
      ownerId: 'x',
      totalCents: 1,
    };
    const people = [world.work.gc.owner, world.work.crew.owner];
    for (const route of routes.filter((one) => one.arguments.some(({ kind }) => kind === 'body'))) {
      const answers = await Promise.all(
        people.map(({ client }) =>
          client.send(
            route.method,
            route.path.replace(/:\w+/g, () => missingIds().scope),
            extra,
          ),
        ),
      );
      // Whoever's company kind may not use the route at all is told that instead.
      const answer = answers.find(({ status }) => status !== 403);
      expect([routeName(route), answer?.status]).toEqual([routeName(route), 422]);
      // Where an owner decides on a role, the role is a field.
      const isOfRoles = /^(PUT \/api\/company\/people|POST \/api\/company\/invitations)/.test(
        routeName(route),
      );
      const named = (answer?.body as ErrorBody).error.fields?.map(({ path }) => path) ?? [];
      expect([routeName(route), named]).toEqual([
        routeName(route),
        expect.arrayContaining(['companyId', 'balance', ...(isOfRoles ? [] : ['role'])]),
      ]);
    }
  });
});

describe('D-01, D-05 nobody reaches what is another company’s', () => {
  it('every route that takes an id is walked below', () => {
    const walked = new Set(accessCases.map(({ route }) => route));
    const withId = routes
      .filter((route) => route.path.includes(':') && !route.path.includes(':zip'))
      .map(routeName);
    expect(withId.filter((name) => !walked.has(name))).toEqual([]);
    const known = new Set(routes.map(routeName));
    expect([...walked].filter((name) => !known.has(name))).toEqual([]);
  });

  it('the owners of the things do reach them (so that a refusal below means something)', async () => {
    const sides = [world.work.gc.owner, world.work.crew.owner];
    const reads = accessCases.filter(({ route }) => route.startsWith('GET'));
    for (const oneCase of reads) {
      const statuses: number[] = [];
      for (const scope of [world.awardedScopeId, world.open.id]) {
        for (const { client } of sides) {
          statuses.push((await ask(client, oneCase, foreignIds(world, scope, world.gcFileId))).status);
        }
      }
      expect([oneCase.route, statuses.includes(200)]).toEqual([oneCase.route, true]);
    }
  });

  it('a foreign id answers as a missing one does: 404, or 403 where the role has no business at all', async () => {
    for (const [name, { client }] of Object.entries(strangers)) {
      for (const oneCase of accessCases) {
        const missing = await ask(client, oneCase, missingIds());
        const expected = [name, oneCase.route, missing.status, withoutRequestId(missing.body)];
        expect([
          name,
          oneCase.route,
          (oneCase.mayBeInvalid ? [403, 404, 422] : [403, 404]).includes(missing.status),
        ]).toEqual([name, oneCase.route, true]);
        // A scope that is out is there for every crew to see, so for those only a draft is foreign.
        const isCrew = name.includes('crew');
        const scopes = isCrew ? [world.draft.id] : [world.draft.id, world.open.id, world.awardedScopeId];
        const files = [world.gcFileId, world.crewFileId];
        // Every scope and file only where the request names one.
        for (const scope of names(oneCase, 'scope') ? scopes : scopes.slice(0, 1)) {
          for (const file of names(oneCase, 'file') ? files : files.slice(0, 1)) {
            const foreign = await ask(client, oneCase, foreignIds(world, scope, file));
            expect([name, oneCase.route, foreign.status, withoutRequestId(foreign.body)]).toEqual(expected);
          }
        }
      }
    }
  }, 60_000);

  it('no list of a stranger names a thing of theirs, nor a price', async () => {
    const { gc, crew } = world.work;
    const names = [
      world.draft.id,
      world.work.subcontractId,
      world.threadId,
      world.visitId,
      world.completion.id,
      world.gcFileId,
      crew.id,
    ];
    const lists = routes.filter(
      (route) => route.method === 'get' && !route.path.includes(':') && !isPublic(route),
    );
    for (const [name, { client }] of Object.entries(strangers)) {
      if (name === 'staff') continue;
      for (const { path } of lists) {
        const query: Record<string, string> =
          path === '/api/visits' ? { from: inDays(-1), to: inDays(60) } : {};
        const { text } = await client.get(path, { query });
        for (const secret of [...names, '7654321', '8654321', '1234567']) {
          expect([name, path, text.includes(secret)]).toEqual([name, path, false]);
        }
        if (name.includes('general')) expect([name, path, text.includes(gc.id)]).toEqual([name, path, false]);
      }
    }
  });

  it('no stranger hears what is said about them', async () => {
    for (const { client } of Object.values(strangers)) {
      const line = await openLine(client);
      const answers = [
        await line.watch({ topic: 'subcontract', id: world.work.subcontractId }),
        await line.watch({ topic: 'thread', id: world.threadId }),
        await line.watch({ topic: 'scope', id: world.draft.id }),
      ];
      expect(answers).toEqual([false, false, false]);
      line.close();
    }
    const own = await openLine(world.work.gc.owner.client);
    expect(await own.watch({ topic: 'subcontract', id: world.work.subcontractId })).toBe(true);
    own.close();
  });

  it('D-02 before due nobody but the bidder reads an amount, in any answer', async () => {
    const readers = [world.work.gc.owner, ...Object.values(strangers)];
    const paths = [
      `/api/scopes/${world.open.id}`,
      `/api/scopes/${world.open.id}/bids`,
      '/api/scopes',
      '/api/open-scopes',
      '/api/bids',
    ];
    for (const { client } of readers) {
      for (const path of paths) expect((await client.get(path)).text).not.toMatch(/7654321|8654321/);
    }
    const own = await world.work.crew.owner.client.get(`/api/scopes/${world.open.id}/own-bid`);
    expect(own.text).toContain('7654321');
    expect(own.text).not.toContain('8654321');
  });
});

describe('roles within a company', () => {
  it('each permission is refused with 403 to a role without it, and to the other kind of company', async () => {
    const { gc, crew } = world.work;
    const [gcField, crewField] = [await addPerson(gc, 'field'), await addPerson(crew, 'field')];
    const ids = foreignIds(world, world.awardedScopeId, world.gcFileId);
    for (const oneCase of accessCases) {
      const route = routes.find((one) => routeName(one) === oneCase.route);
      const { access } = route ?? {};
      if (access?.kind !== 'permission') continue;
      const permission = permissions[access.name as PermissionName];
      const refused = [
        ...((permission.roles as readonly string[]).includes('field') ? [] : [gcField, crewField]),
        ...(permission.kind === 'general_contractor' ? [crew.owner] : []),
        ...(permission.kind === 'cutting_contractor' ? [gc.owner] : []),
      ];
      for (const { client, name } of refused) {
        const answer = await ask(client, oneCase, ids);
        expect([oneCase.route, name, answer.status, answer.body.error?.code]).toEqual([
          oneCase.route,
          name,
          403,
          'forbidden',
        ]);
      }
    }
  });
});
