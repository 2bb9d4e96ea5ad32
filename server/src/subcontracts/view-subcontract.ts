import { Injectable } from '@nestjs/common';
import type { FileView } from '@kerfyard/common/files';
import { may, type Actor } from '@kerfyard/common/people';
import type { ScopeBody, ScopeTotals } from '@kerfyard/common/scopes';
import type { SignatureView, SovLineView, SubcontractView } from '@kerfyard/common/subcontracts';
import { CompletionReader } from '../completions/completion-reader.ts';
import { FilesService } from '../files/files.service.ts';
import { MoneyReader } from '../payments/money-reader.ts';
import { toInstant } from '../platform/database/codecs.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { VisitReader } from '../visits/visit-reader.ts';
import { PUBLISHED_BODY, SCOPE_FILES_OF, THREAD_OF } from './subcontract.queries.ts';
import { SubcontractReader, type OwnSubcontract } from './subcontract-reader.ts';
import { Signatures } from './signatures.ts';
import { sovLineState } from './sov-state.ts';

interface BodyRow {
  body: ScopeBody;
  totals: ScopeTotals;
}

/** One subcontract with everything that hangs on it, for either side. */
@Injectable()
export class ViewSubcontract {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly subcontracts: SubcontractReader,
    private readonly signatures: Signatures,
    private readonly money: MoneyReader,
    private readonly visits: VisitReader,
    private readonly completions: CompletionReader,
    private readonly files: FilesService,
  ) {}

  /** @throws AppError 404 when the actor's company is neither side */
  async view(actor: Actor, id: string): Promise<SubcontractView> {
    const subcontract = await this.subcontracts.forActor(null, actor, id);
    const [published, threadId, sov, signatures, files] = await Promise.all([
      this.published(subcontract),
      this.threadId(subcontract),
      this.sov(subcontract),
      this.signatures.of(null, id),
      this.scopeFiles(subcontract),
    ]);
    const [money, visits, completions] = await Promise.all([
      this.moneyParts(actor, subcontract),
      this.visits.ofSubcontract(id),
      this.completions.ofSubcontract(id),
    ]);
    return {
      id,
      number: subcontract.number,
      scopeId: subcontract.scopeId,
      threadId,
      title: subcontract.title,
      status: subcontract.status,
      side: subcontract.side,
      gc: subcontract.gc,
      crew: subcontract.crew,
      site: published.body.site,
      conditions: published.body.conditions,
      cuts: published.body.cuts,
      totals: published.totals,
      sov,
      totalCents: subcontract.totalCents,
      retainageBasisPoints: subcontract.retainageBasisPoints,
      document: subcontract.document,
      signedDocument: subcontract.signedDocument,
      signatures: signatures.map((row): SignatureView => ({
        side: row.side,
        personName: row.person_name,
        typedName: row.typed_name,
        signedAt: toInstant(row.signed_at),
        ip: row.ip,
        documentSha256: row.document_sha256,
      })),
      signBy: toInstant(subcontract.signBy),
      ...money,
      visits,
      completions,
      files,
      payoutsReady: subcontract.payoutsReady,
    };
  }

  private async published({ scopeId, revision }: OwnSubcontract): Promise<BodyRow> {
    const row = await this.uow.row<BodyRow>(null, PUBLISHED_BODY, [scopeId, revision]);
    if (row === null) throw new Error('a subcontract without its revision');
    return row;
  }

  private async threadId({ scopeId, crew }: OwnSubcontract): Promise<string> {
    const row = await this.uow.row<{ id: string }>(null, THREAD_OF, [scopeId, crew.id]);
    if (row === null) throw new Error('a subcontract without its thread');
    return row.id;
  }

  private async sov({ id, sov }: OwnSubcontract): Promise<SovLineView[]> {
    const [setAside, underWay, released, completions] = await Promise.all([
      this.money.setAsideLineIds(id),
      this.money.underWayLineIds(id),
      this.money.releasedLineIds(id),
      this.completions.standingLines(id),
    ]);
    return sov.map((line) => ({
      ...line,
      state: sovLineState(line.id, { setAside, underWay, released, completions }),
    }));
  }

  /** The bar is for everyone on either side; single payments are for those who may see money. */
  private async moneyParts(
    actor: Actor,
    { id, side }: OwnSubcontract,
  ): Promise<Pick<SubcontractView, 'money' | 'fundings' | 'releases'>> {
    const mayReadMoney = may(actor, 'money.read');
    const [lines, fundings, releases] = await Promise.all([
      this.money.moneyLine([id]),
      mayReadMoney ? this.money.fundings(id, side) : [],
      mayReadMoney ? this.money.releases(id) : [],
    ]);
    const money = lines.get(id);
    if (money === undefined) throw new Error('a subcontract without its money line');
    return { money, fundings, releases };
  }

  private async scopeFiles({ scopeId, revision }: OwnSubcontract): Promise<FileView[]> {
    const hung = await this.uow.rows<{ file_id: string; caption: string }>(null, SCOPE_FILES_OF, [
      scopeId,
      revision,
    ]);
    const views = await this.files.views(hung.map((row) => row.file_id));
    return hung.flatMap(({ file_id, caption }) => {
      const view = views.get(file_id);
      return view === undefined ? [] : [{ ...view, caption }];
    });
  }
}
