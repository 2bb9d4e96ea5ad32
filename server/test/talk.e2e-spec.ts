import { randomUUID } from 'node:crypto';
import type { Page } from '@kerfyard/common/api';
import type { MeView } from '@kerfyard/common/people';
import type { Hint } from '@kerfyard/common/realtime';
import type { MessageView, ThreadView } from '@kerfyard/common/talk';
import { jpegPhoto, uploadFiles } from './builders/files.ts';
import {
  addPerson,
  addStaff,
  expectStatus,
  makeCuttingContractor,
  makeGeneralContractor,
  type Company,
  type Person,
} from './builders/people.ts';
import { comeDue, lumpBid, makeDraft, placeBid, publishScope } from './builders/scopes.ts';
import { closeDatabase, sql } from './database.ts';
import { openLine } from './live.ts';
import { mailsTo, mailTo } from './mail.ts';

let gc: Company;
let crew: Company;
let other: Company;
let scopeId: string;
let threadId: string;

beforeAll(async () => {
  [gc, crew, other] = await Promise.all([
    makeGeneralContractor(),
    makeCuttingContractor(),
    makeCuttingContractor(),
  ]);
  scopeId = (await publishScope(gc, { title: 'Stair opening, level 2' })).id;
  threadId = (await open(crew.owner, scopeId)).id;
}, 60_000);
afterAll(closeDatabase);

const open = async (person: Person, id: string, body: object = {}) =>
  (await expectStatus(person.client.post(`/api/scopes/${id}/threads`, body), 200)).body as ThreadView;
const post = (person: Person, body: string, more: object = {}, thread = threadId) =>
  person.client.post(`/api/threads/${thread}/messages`, { id: randomUUID(), body, ...more });
const say = async (person: Person, body: string, more: object = {}, thread = threadId) =>
  (await expectStatus(post(person, body, more, thread), 201)).body as MessageView;
const unread = async (person: Person) =>
  ((await expectStatus(person.client.get('/api/threads/unread'), 200)).body as { messages: number }).messages;
const messages = async (person: Person, query = '', thread = threadId) =>
  (await expectStatus(person.client.get(`/api/threads/${thread}/messages${query}`), 200))
    .body as Page<MessageView>;

/** A scope and a thread of its own, for what must not meet the other tests' messages. */
async function freshThread(): Promise<string> {
  const scope = await publishScope(gc);
  return (await open(crew.owner, scope.id)).id;
}

describe('opening a thread', () => {
  it('gives a crew one thread per scope with the scope’s company, however often and at once it asks', async () => {
    const scope = await publishScope(gc, { title: 'Trench for a drain' });
    const threads = await Promise.all(Array.from({ length: 8 }, () => open(crew.owner, scope.id)));
    expect(new Set(threads.map((thread) => thread.id)).size).toBe(1);
    expect(threads[0]).toMatchObject({
      scopeId: scope.id,
      subcontractId: null,
      title: 'Trench for a drain',
      otherSide: { id: gc.id, name: gc.name },
      lastMessage: null,
      unread: 0,
    });
    const second = await open(other.owner, scope.id);
    expect(second.id).not.toBe(threads[0]!.id);
  });

  it('keeps drafts unknown, and a crew from opening another’s thread', async () => {
    const draft = await makeDraft(gc);
    await expectStatus(crew.owner.client.post(`/api/scopes/${draft.id}/threads`, {}), 404);
    await expectStatus(crew.owner.client.post(`/api/scopes/${randomUUID()}/threads`, {}), 404);
    await expectStatus(
      crew.owner.client.post(`/api/scopes/${scopeId}/threads`, { crewCompanyId: other.id }),
      422,
    );
  });

  it('lets a general contractor open one only with a crew it knows has bid or talked, and a sealed bid stays unknown', async () => {
    const scope = await publishScope(gc);
    const ask = (person: Person, crewCompanyId?: string) =>
      person.client.post(
        `/api/scopes/${scope.id}/threads`,
        crewCompanyId === undefined ? {} : { crewCompanyId },
      );
    await placeBid(crew, scope.id, lumpBid(900_000));
    await expectStatus(ask(gc.owner), 422);
    const beforeDue = await expectStatus(ask(gc.owner, crew.id), 404);
    const neverBid = await expectStatus(ask(gc.owner, other.id), 404);
    const stripped = (body: { error: object }) => ({ ...body.error, requestId: '' });
    expect(stripped(beforeDue.body)).toEqual(stripped(neverBid.body));
    await comeDue(gc, scope.id);
    const opened = (await expectStatus(ask(gc.owner, crew.id), 200)).body as ThreadView;
    expect(opened.otherSide).toEqual({ id: crew.id, name: crew.name });
    await expectStatus(ask(gc.owner, other.id), 404);
    const foreign = await makeGeneralContractor();
    await expectStatus(ask(foreign.owner, crew.id), 404);
  });
});

describe('access', () => {
  it('D-01 answers 404 to everyone outside the two companies, on every route', async () => {
    const staff = await addStaff(gc);
    const foreign = await makeGeneralContractor();
    for (const person of [other.owner, foreign.owner]) {
      const { client } = person;
      await expectStatus(client.get(`/api/threads/${threadId}`), 404);
      await expectStatus(client.get(`/api/threads/${threadId}/messages`), 404);
      await expectStatus(post(person, 'hello'), 404);
      await expectStatus(client.post(`/api/threads/${threadId}/read`, { seq: 1 }), 404);
      const list = (await expectStatus(client.get('/api/threads'), 200)).body as Page<ThreadView>;
      expect(list.items.map((thread) => thread.id)).not.toContain(threadId);
      const line = await openLine(client);
      expect(await line.watch({ topic: 'thread', id: threadId })).toBe(false);
      line.close();
    }
    await expectStatus(staff.client.get(`/api/threads/${threadId}`), 403);
    const signedOut = gc.owner.client.tab();
    signedOut.cookies.clear();
    await expectStatus(signedOut.get('/api/threads'), 401);
  });

  it('refuses what is no message', async () => {
    await expectStatus(post(crew.owner, ''), 422);
    await expectStatus(post(crew.owner, '   '), 422);
    await expectStatus(post(crew.owner, 'x'.repeat(4001)), 422);
    await expectStatus(post(crew.owner, 'a\u0000b'), 422);
    await expectStatus(post(crew.owner, 'hello', { seq: 5 }), 422);
    await expectStatus(crew.owner.client.post(`/api/threads/${threadId}/messages`, { body: 'no id' }), 422);
    await expectStatus(crew.owner.client.get('/api/threads?cursor=nonsense'), 422);
    await expectStatus(crew.owner.client.get(`/api/threads/${threadId}/messages?limit=101`), 422);
  });
});

describe('messages', () => {
  it('gives parallel posts distinct numbers without gaps, and pages backwards by them', async () => {
    const thread = await freshThread();
    const people = [crew.owner, gc.owner];
    const posted = await Promise.all(
      Array.from({ length: 24 }, (_, n) => say(people[n % 2]!, `message ${n}`, {}, thread)),
    );
    expect(posted.map((message) => message.seq).sort((a, b) => a - b)).toEqual(
      Array.from({ length: 24 }, (_, n) => n + 1),
    );

    const seen: number[] = [];
    let query = '?limit=10';
    for (
      let page = await messages(gc.owner, query, thread);
      ;
      page = await messages(gc.owner, query, thread)
    ) {
      seen.push(...page.items.map((message) => message.seq));
      if (page.nextCursor === null) break;
      query = `?limit=10&before=${page.nextCursor}`;
    }
    expect(seen).toEqual(Array.from({ length: 24 }, (_, n) => 24 - n));
  });

  it('takes the same message twice as one, and another one under its id not at all', async () => {
    const id = randomUUID();
    const tries = await Promise.all(
      Array.from({ length: 6 }, () => post(crew.owner, 'Gate 4 at 6:30', { id })),
    );
    expect(tries.map((answer) => answer.status)).toEqual(Array(6).fill(201));
    expect(new Set(tries.map((answer) => (answer.body as MessageView).seq)).size).toBe(1);
    await expectStatus(post(crew.owner, 'Gate 5', { id }), 409);
    await expectStatus(post(gc.owner, 'Gate 4 at 6:30', { id }), 409);
    const thread = await freshThread();
    await expectStatus(post(crew.owner, 'Gate 4 at 6:30', { id }, thread), 409);
  });

  it('shows who wrote, as each side sees it, in the order of the list by what is newest', async () => {
    const older = await freshThread();
    await say(crew.owner, 'first here', {}, older);
    const message = await say(crew.owner, 'Is there a lift?');
    expect(message).toMatchObject({
      author: { name: crew.owner.name },
      company: { id: crew.id },
      isOwn: true,
      files: [],
    });
    const [seen] = (await messages(gc.owner)).items;
    expect(seen).toMatchObject({ id: message.id, isOwn: false, body: 'Is there a lift?' });
    const list = (await expectStatus(gc.owner.client.get('/api/threads?limit=2'), 200))
      .body as Page<ThreadView>;
    expect(list.items.map((thread) => thread.id)).toEqual([threadId, older]);
    expect(list.items[0]?.lastMessage).toMatchObject({
      body: 'Is there a lift?',
      authorName: crew.owner.name,
    });
    const next = await gc.owner.client.get(`/api/threads?limit=2&cursor=${list.nextCursor}`);
    const ids = (next.body as Page<ThreadView>).items.map((thread) => thread.id);
    expect(ids).not.toContain(threadId);
    expect(ids).not.toContain(older);
  });
});

describe('threads about one scope', () => {
  it('are those of its bidders to the general contractor, and its own to a crew', async () => {
    const scope = await publishScope(gc);
    const [mine, theirs] = [await open(crew.owner, scope.id), await open(other.owner, scope.id)];
    const about = async (person: Person, id: string) => {
      const { body } = await expectStatus(person.client.get(`/api/threads?scopeId=${id}`), 200);
      return (body as Page<ThreadView>).items.map((thread) => thread.id).sort();
    };
    expect(await about(gc.owner, scope.id)).toEqual([mine.id, theirs.id].sort());
    expect(await about(crew.owner, scope.id)).toEqual([mine.id]);
    expect(await about(gc.owner, randomUUID())).toEqual([]);
    await expectStatus(gc.owner.client.get('/api/threads?scopeId=1'), 422);
  });
});

describe('what is unread', () => {
  it('counts the other side’s messages per person until they are seen, never backwards', async () => {
    const thread = await freshThread();
    const colleague = await addPerson(gc, 'manager');
    const [start, startOther] = [await unread(gc.owner), await unread(colleague)];
    await say(crew.owner, 'one', {}, thread);
    const two = await say(crew.owner, 'two', {}, thread);
    await say(colleague, 'own side', {}, thread);
    expect(await unread(gc.owner)).toBe(start + 2);
    expect(await unread(colleague)).toBe(startOther);
    const me = (await gc.owner.client.get('/api/auth/me')).body as MeView;
    expect(me.unread.messages).toBe(start + 2);

    const read = (seq: number) => gc.owner.client.post(`/api/threads/${thread}/read`, { seq });
    expect((await expectStatus(read(two.seq), 200)).body).toEqual({ messages: start });
    await expectStatus(read(0), 200);
    expect(await unread(gc.owner)).toBe(start);
    // Reading ahead of what is written must not hide what comes.
    await expectStatus(read(1_000), 200);
    await say(crew.owner, 'three', {}, thread);
    expect(await unread(gc.owner)).toBe(start + 1);
    const view = (await gc.owner.client.get(`/api/threads/${thread}`)).body as ThreadView;
    expect(view.unread).toBe(1);
  });
});

describe('photos', () => {
  it('go to the other side with the message and to nobody else', async () => {
    const [photo] = (await uploadFiles(crew.owner, 'photo', [await jpegPhoto('bibb.jpg', 31)])) as [string];
    await expectStatus(gc.owner.client.get(`/api/files/${photo}`), 404);
    const message = await say(crew.owner, '', { fileIds: [photo, photo] });
    expect(message.files.map((file) => file.name)).toEqual(['bibb.jpg']);
    for (const size of ['thumb', 'full']) {
      await expectStatus(gc.owner.client.get(`/api/files/${photo}?size=${size}`), 200);
      await expectStatus(other.owner.client.get(`/api/files/${photo}?size=${size}`), 404);
    }
  });

  it('must be the writer’s company’s own', async () => {
    const [foreign] = (await uploadFiles(other.owner, 'photo', [await jpegPhoto('theirs.jpg', 32)])) as [
      string,
    ];
    const [own] = (await uploadFiles(crew.owner, 'photo', [await jpegPhoto('ours.jpg', 33)])) as [string];
    const answer = await expectStatus(
      post(crew.owner, 'look', { fileIds: [own, foreign, randomUUID()] }),
      422,
    );
    const paths = (answer.body as { error: { fields: { path: string }[] } }).error.fields.map(
      (field) => field.path,
    );
    expect(paths).toEqual(['fileIds.1', 'fileIds.2']);
  });
});

describe('live', () => {
  it('tells both companies of a message, with ids and numbers only, and nobody else', async () => {
    const lines = await Promise.all([gc, crew, other].map((company) => openLine(company.owner.client)));
    const [gcLine, crewLine, otherLine] = lines as [(typeof lines)[0], (typeof lines)[0], (typeof lines)[0]];
    expect(await gcLine.watch({ topic: 'thread', id: threadId })).toBe(true);
    const message = await say(crew.owner, 'the secret word');
    const fits = (hint: Hint) => hint.topic === 'thread' && hint.seq === message.seq;
    for (const line of [gcLine, crewLine]) {
      expect(await line.hint(fits)).toEqual({ topic: 'thread', threadId, seq: message.seq });
      // Both rooms of one socket get it once.
      expect(line.hints.filter(fits)).toHaveLength(1);
    }
    expect(otherLine.hints.filter((hint) => hint.topic === 'thread')).toEqual([]);
    lines.forEach((line) => line.close());
  });

  it('tells a person’s other windows what was read', async () => {
    const line = await openLine(gc.owner.client);
    const before = line.hints.length;
    await expectStatus(gc.owner.client.post(`/api/threads/${threadId}/read`, { seq: 1 }), 200);
    await line.hint((hint) => hint.topic === 'thread' && hint.threadId === threadId);
    expect(line.hints.length).toBeGreaterThan(before);
    line.close();
  });
});

describe('the e-mail about messages not seen', () => {
  const pending = (userId: string) =>
    sql<{ id: string; state: string; start_after: Date; created_on: Date }>(
      `SELECT id, state, start_after, created_on FROM pgboss.job
       WHERE name = 'send_mail' AND data->>'kind' = 'message_waiting' AND data->>'to' = $1 ORDER BY created_on`,
      [userId],
    );
  /** As if the quarter of an hour were over: the messages are old, the job is due. */
  const letTimePass = async (userId: string, thread: string) => {
    await sql(
      `UPDATE message SET sent_at = sent_at - interval '16 minutes' WHERE thread_id = $1`,
      [thread],
      'owner',
    );
    await sql(
      `UPDATE pgboss.job SET start_after = now()
       WHERE name = 'send_mail' AND data->>'to' = $1 AND state = 'created'`,
      [userId],
      'owner',
    );
  };
  const settled = async (userId: string) => {
    for (let tries = 0; tries < 100; tries += 1) {
      if ((await pending(userId)).every((job) => job.state === 'completed')) return;
      await new Promise((resolve) => setTimeout(resolve, 100));
    }
    throw new Error('the job did not end');
  };

  it('goes once, a quarter of an hour later, to owners and managers, and not again within the hour', async () => {
    const [buyer, thread] = await quietThread();
    const field = await addPerson(buyer, 'field');
    await say(crew.owner, 'Which gate? The code is 4711.', {}, thread);
    await say(crew.owner, 'And is there water?', {}, thread);
    const [job, ...more] = await pending(buyer.owner.userId);
    expect(more).toEqual([]);
    const waitMs = job!.start_after.getTime() - job!.created_on.getTime();
    expect(waitMs).toBeGreaterThan(14.9 * 60_000);
    expect(waitMs).toBeLessThan(15.1 * 60_000);
    expect(await pending(field.userId)).toEqual([]);

    await letTimePass(buyer.owner.userId, thread);
    const mail = await mailTo(buyer.owner.email, /wrote about/);
    expect(mail.subject).toBe(`${crew.name} wrote about Sleeves, level 3`);
    expect(mail.text).toContain('2 messages not seen yet');
    expect(mail.text).toContain(`/talk/${thread}`);
    expect(mail.text).not.toContain('4711');

    await settled(buyer.owner.userId);
    await say(crew.owner, 'Hello?', {}, thread);
    const [, next] = await pending(buyer.owner.userId);
    expect(next!.start_after.getTime() - next!.created_on.getTime()).toBeGreaterThan(59 * 60_000);
  });

  it('does not go when the message was seen or answered meanwhile', async () => {
    const [buyer, thread] = await quietThread();
    const manager = await addPerson(buyer, 'manager');
    const message = await say(crew.owner, 'Which gate?', {}, thread);
    await expectStatus(buyer.owner.client.post(`/api/threads/${thread}/read`, { seq: message.seq }), 200);
    await letTimePass(buyer.owner.userId, thread);
    await settled(buyer.owner.userId);
    await say(buyer.owner, 'Gate 2', {}, thread);
    await letTimePass(manager.userId, thread);
    await settled(manager.userId);
    for (const { email } of [buyer.owner, manager]) {
      expect((await mailsTo(email, 0)).filter((mail) => /wrote about/.test(mail.subject))).toEqual([]);
    }
  });

  it('waits on when what is unseen is younger than that', async () => {
    const [buyer, thread] = await quietThread();
    await say(crew.owner, 'Which gate?', {}, thread);
    await sql(
      `UPDATE pgboss.job SET start_after = now() WHERE name = 'send_mail' AND data->>'to' = $1`,
      [buyer.owner.userId],
      'owner',
    );
    for (let tries = 0; (await pending(buyer.owner.userId)).length < 2; tries += 1) {
      expect(tries).toBeLessThan(100);
      await new Promise((resolve) => setTimeout(resolve, 100));
    }
    const states = (await pending(buyer.owner.userId)).map((job) => job.state);
    expect(states).toEqual(['completed', 'created']);
    expect((await mailsTo(buyer.owner.email, 0)).filter((mail) => /wrote about/.test(mail.subject))).toEqual(
      [],
    );
  });

  async function quietThread(): Promise<[Company, string]> {
    const buyer = await makeGeneralContractor();
    const scope = await publishScope(buyer, { title: 'Sleeves, level 3' });
    return [buyer, (await open(crew.owner, scope.id)).id];
  }
});
