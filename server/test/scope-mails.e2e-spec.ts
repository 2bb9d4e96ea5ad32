import { closeDatabase } from './database.ts';
import { mailTo, mailsTo } from './mail.ts';
import { makeCuttingContractor, makeGeneralContractor } from './builders/people.ts';
import { comeDue, inDays, lumpBid, placeBid, publishScope } from './builders/scopes.ts';

afterAll(closeDatabase);

const atSite = (instant: string) =>
  new Date(instant).toLocaleTimeString('en-US', {
    timeZone: 'America/Denver',
    hour: 'numeric',
    minute: '2-digit',
    timeZoneName: 'short',
  });

describe('e-mails about scopes and bids', () => {
  it('tell a matching crew of a new scope, and its company of the first bid and of due, never an amount', async () => {
    const [gc, crew] = await Promise.all([makeGeneralContractor(), makeCuttingContractor()]);
    const title = `Ramp slots ${crew.id.slice(-6)}`;
    const dueAt = inDays(30);
    const scope = await publishScope(gc, { title, dueAt });
    const published = await mailTo(crew.owner.email, new RegExp(`New scope near you: ${title}, Denver`));
    expect(published.text).toContain(`/open-scopes/${scope.id}`);
    expect(published.text).toContain(`at ${atSite(dueAt)}`);
    expect(published.text).toContain('sealed');

    await placeBid(crew, scope.id, lumpBid(739_184_627));
    await placeBid(crew, scope.id, lumpBid(739_184_000));
    await mailTo(gc.owner.email, new RegExp(`A bid came in: ${title}`));
    await comeDue(gc, scope.id);
    const due = await mailTo(gc.owner.email, new RegExp(`Bids are due: ${title}`));
    expect(due.text).toContain('One bid');
    expect(due.text).toContain(`/scopes/${scope.id}/bids`);

    const all = [...(await mailsTo(gc.owner.email)), ...(await mailsTo(crew.owner.email))];
    const about = all.filter((mail) => mail.subject.includes(title));
    // The revision sent none.
    expect(about.map((mail) => mail.subject.split(':')[0]).sort()).toEqual([
      'A bid came in',
      'Bids are due',
      'New scope near you',
    ]);
    for (const mail of about) expect(mail.text).not.toMatch(/7,?391,?84|739184/);
  });
});
