import type { BidInput, BidTabulationView } from '@kerfyard/common/bids';
import type { FundingView } from '@kerfyard/common/payments';
import type { OwnCompanyView } from '@kerfyard/common/people';
import type { ScopeDetailView } from '@kerfyard/common/scopes';
import type { SubcontractView } from '@kerfyard/common/subcontracts';
import type { ThreadView } from '@kerfyard/common/talk';
import type { VisitView } from '@kerfyard/common/visits';
import { newId } from '../../platform/ids/ids.ts';
import { drawPhoto, type DemoPhotoName } from '../photos/index.ts';
import { draftOf, type DemoScope, type DraftOptions } from './demo-scopes.ts';
import type { DemoWorld } from './demo-world.ts';

const CHECKOUT_SESSION = /\/pay\/(cs_[A-Za-z0-9_]+)/;

/** The steps people take, each through the API as that person. */
export class DemoSteps {
  private readonly photos = new Map<DemoPhotoName, Promise<Buffer>>();

  constructor(private readonly world: DemoWorld) {}

  /** A draft with its drawing and photos. */
  async draft(gc: string, scope: DemoScope, options: DraftOptions): Promise<ScopeDetailView> {
    const browser = this.world.as(gc);
    const id = newId();
    const created = await browser.post<ScopeDetailView>('/api/scopes', {
      id,
      draft: draftOf(scope, options),
    });
    const drawing = { name: scope.drawing.name, type: 'application/pdf', bytes: await scope.drawing.draw() };
    await browser.post(`/api/scopes/${id}/files`, {
      fileId: await browser.upload('drawing', drawing),
      caption: scope.drawing.name.replace('.pdf', ''),
    });
    for (const [name, caption] of scope.photos) {
      await browser.post(`/api/scopes/${id}/files`, { fileId: await this.photo(gc, name), caption });
    }
    return created;
  }

  async publish(gc: string, scope: DemoScope, options: DraftOptions): Promise<ScopeDetailView> {
    const { id, draft } = await this.draft(gc, scope, options);
    return this.world
      .as(gc)
      .post<ScopeDetailView>(`/api/scopes/${id}/publish`, { version: draft?.version ?? 1 });
  }

  /** A lump-sum bid in dollars. */
  lump(crew: string, scopeId: string, dollars: number, more: Partial<BidInput> = {}): Promise<unknown> {
    return this.world.as(crew).put(`/api/scopes/${scopeId}/own-bid`, {
      revision: 1,
      price: { form: 'lump', lumpCents: dollars * 100 },
      answers: [
        { item: 'cut', answer: 'included' },
        { item: 'slurry', answer: 'included' },
      ],
      inclusions: ['Blades, bits and 100 ft of hose'],
      exclusions: ['Work outside the hours stated'],
      note: '',
      validDays: 30,
      startFrom: null,
      ...more,
    });
  }

  /** A bid by lines: dollars per inch-foot sawn and per core, with a minimum. */
  lines(
    crew: string,
    scope: ScopeDetailView,
    rates: { inchFoot: number; core: number; minimum: number },
  ): Promise<unknown> {
    const price = {
      form: 'lines',
      lines: (scope.body?.cuts ?? []).map((line) => ({
        cutId: line.id,
        unit: line.cut.kind === 'core' ? 'each' : 'in_ft',
        rate: Math.round((line.cut.kind === 'core' ? rates.core : rates.inchFoot) * 10_000),
      })),
      minimumCents: rates.minimum * 100,
      mobilizationCents: 0,
      minimumIncludesMobilization: true,
    };
    return this.lump(crew, scope.id, 1, { price } as Partial<BidInput>);
  }

  /** Read the bids, which opens sealed ones that are due, and award the lowest adjusted one, or this crew's. */
  async award(gc: string, scopeId: string, crewName?: string): Promise<string> {
    const browser = this.world.as(gc);
    const tabulation = await browser.get<BidTabulationView>(`/api/scopes/${scopeId}/bids`);
    const named = tabulation.bids.find((bid) => bid.crew.name === crewName)?.id;
    const bidId = named ?? tabulation.tabulated[0]?.bidId;
    const { subcontractId } = await browser.post<{ subcontractId: string }>(`/api/scopes/${scopeId}/award`, {
      bidId,
      reason: 'price',
      note: 'Thank you for bidding.',
    });
    return subcontractId;
  }

  async sign(person: string, typedName: string, subcontractId: string): Promise<void> {
    const { document } = await this.read(person, subcontractId);
    await this.world
      .as(person)
      .post(`/api/subcontracts/${subcontractId}/sign`, { name: typedName, documentSha256: document.sha256 });
  }

  read(person: string, subcontractId: string): Promise<SubcontractView> {
    return this.world.as(person).get<SubcontractView>(`/api/subcontracts/${subcontractId}`);
  }

  /** Set lines aside (all, unless told how many) and pay on the provider's page. */
  async setAside(gc: string, subcontractId: string, count?: number): Promise<void> {
    const { sov } = await this.read(gc, subcontractId);
    const sovLineIds = sov
      .filter((line) => line.amountCents > 0)
      .slice(0, count)
      .map((line) => line.id);
    const id = newId();
    await this.world
      .as(gc)
      .post(`/api/subcontracts/${subcontractId}/set-aside`, { id, sovLineIds, method: 'card' });
    const funding = await this.fundingIn(gc, subcontractId, id, 'awaiting_payment');
    await this.world.atProvider('pay', { session: CHECKOUT_SESSION.exec(funding.checkoutUrl ?? '')?.[1] });
    await this.fundingIn(gc, subcontractId, id, 'succeeded');
  }

  private async fundingIn(
    gc: string,
    subcontractId: string,
    id: string,
    status: FundingView['status'],
  ): Promise<FundingView> {
    let found: FundingView | undefined;
    await this.world.until(`a payment to be ${status}`, async () => {
      const { fundings } = await this.read(gc, subcontractId);
      found = fundings.find((funding) => funding.id === id && funding.status === status);
      return found !== undefined;
    });
    if (found === undefined) throw new Error('unreachable');
    return found;
  }

  /** Windows proposed by the crew's person, days from now at 7:00 for 8 hours each. */
  async propose(crew: string, subcontractId: string, days: readonly number[], note = ''): Promise<VisitView> {
    const browser = this.world.as(crew);
    const { crews, trucks } = await browser.get<OwnCompanyView>('/api/company');
    const { sov } = await this.read(crew, subcontractId);
    const windows = await Promise.all(
      days.map(async (day) => {
        const starts = await this.world.inDays(day);
        starts.setUTCHours(12, 0, 0, 0);
        return {
          startsAt: starts.toISOString(),
          endsAt: new Date(starts.getTime() + 8 * 3_600_000).toISOString(),
        };
      }),
    );
    const body = {
      id: newId(),
      subcontractId,
      crewId: crews[0]?.id,
      truckId: trucks[0]?.id,
      sovLineIds: sov.map((line) => line.id),
      windows,
      note,
    };
    return browser.post<VisitView>('/api/visits', body);
  }

  async confirm(gc: string, visit: VisitView): Promise<void> {
    await this.world.as(gc).post(`/api/visits/${visit.id}/confirm`, { window: visit.windows[0] });
  }

  /** All lines of a visit done as listed, with photos. */
  async complete(
    crew: string,
    visit: VisitView,
    photos: readonly DemoPhotoName[],
    note: string,
  ): Promise<string> {
    const { sov } = await this.read(crew, visit.subcontractId);
    const id = newId();
    const asCut = sov.flatMap((line) => line.cutIds).map((cutId) => ({ cutId, asListed: true, note: '' }));
    const photoIds = await Promise.all(photos.map((name) => this.photo(crew, name)));
    await this.world.as(crew).post('/api/completions', {
      id,
      visitId: visit.id,
      sovLineIds: visit.sovLineIds,
      asCut,
      photoIds,
      note,
    });
    return id;
  }

  /** A message to the other side of a scope, from a crew to its general contractor or back. */
  async say(
    person: string,
    scopeId: string,
    body: string,
    to: { crewCompanyId?: string } = {},
  ): Promise<void> {
    const browser = this.world.as(person);
    const thread = await browser.post<ThreadView>(`/api/scopes/${scopeId}/threads`, to);
    await browser.post(`/api/threads/${thread.id}/messages`, { id: newId(), body, fileIds: [] });
  }

  /** Begin drawing all pictures; each takes a core a while, and the story goes on meanwhile. */
  async drawAhead(names: readonly DemoPhotoName[]): Promise<void> {
    const takenAt = (await this.world.now()).toISOString().slice(0, 19);
    for (const name of new Set(names)) this.photos.set(name, drawPhoto(name, { takenAt, offset: '-05:00' }));
  }

  private async photo(person: string, name: DemoPhotoName): Promise<string> {
    const bytes = await this.photos.get(name);
    if (bytes === undefined) throw new Error(`${name} is not being drawn`);
    return this.world.as(person).upload('photo', { name: `${name}.jpg`, type: 'image/jpeg', bytes });
  }
}
