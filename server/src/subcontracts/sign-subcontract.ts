import { Injectable } from '@nestjs/common';
import { createHash } from 'node:crypto';
import type { Actor } from '@kerfyard/common/people';
import type { Sign, SubcontractView } from '@kerfyard/common/subcontracts';
import { FilesService } from '../files/files.service.ts';
import { Audit } from '../platform/audit/audit.ts';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { Clock } from '../platform/clock/clock.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { Mailer } from '../platform/mail/mailer.ts';
import { Storage } from '../platform/storage/storage.ts';
import { appendSignaturePage } from './paper/signature-page.ts';
import { Signatures, type SignatureRow } from './signatures.ts';
import { SubcontractEvents, type SubcontractChange } from './subcontract-events.ts';
import { SubcontractReader, type OwnSubcontract } from './subcontract-reader.ts';
import { ACTIVATE, INSERT_SIGNATURE } from './subcontract.queries.ts';
import { ViewSubcontract } from './view-subcontract.ts';

/** The paper with its signature page, stored but not yet anyone's file. */
interface SignedPaper {
  sha256: string;
  bytes: number;
}

// The second try already sees the other side's signature, which never goes away again.
const MAX_TRIES = 2;

/** One side signs the stored paper; with the second signature the subcontract is active. */
@Injectable()
export class SignSubcontract {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly subcontracts: SubcontractReader,
    private readonly signatures: Signatures,
    private readonly events: SubcontractEvents,
    private readonly views: ViewSubcontract,
    private readonly storage: Storage,
    private readonly files: FilesService,
    private readonly clock: Clock,
    private readonly audit: Audit,
    private readonly mailer: Mailer,
  ) {}

  /**
   * @throws AppError `document_changed` when the hash is not that of the stored bytes, `over_limit` above the person's
   *   limit, `illegal_move` when this side has signed already, the days to sign are over or the award lapsed
   */
  async sign(actor: Actor, origin: Origin, id: string, input: Sign): Promise<SubcontractView> {
    const subcontract = await this.subcontracts.forActor(null, actor, id);
    const paper = await this.storage.read(subcontract.document.sha256);
    if (createHash('sha256').update(paper).digest('hex') !== input.documentSha256) {
      throw new AppError('document_changed');
    }
    if (actor.limits.signCents !== null && subcontract.totalCents > actor.limits.signCents) {
      throw new AppError('over_limit');
    }
    for (let attempt = 1; ; attempt += 1) {
      const change = await this.attempt({ actor, origin, input, paper }, subcontract);
      if (change !== null) {
        this.events.tell(change);
        return this.views.view(actor, id);
      }
      if (attempt === MAX_TRIES) throw new Error('the other signature came and went');
    }
  }

  /**
   * No file is written inside a transaction, so the signature page is made before it, from the signatures there then.
   * @returns null when the other side signed in between: the page must be made after all
   */
  private async attempt(
    by: { actor: Actor; origin: Origin; input: Sign; paper: Buffer },
    { id, side }: OwnSubcontract,
  ): Promise<SubcontractChange | null> {
    const { actor, origin, input, paper } = by;
    const earlier = await this.signatures.of(null, id);
    const own: SignatureRow = {
      side,
      user_id: actor.userId,
      person_name: actor.name,
      typed_name: input.name,
      document_sha256: input.documentSha256,
      ip: origin.ip,
      signed_at: await this.clock.now(),
    };
    const other = earlier.find((row) => row.side !== side);
    const signed = other === undefined ? null : await this.makeSignedPaper(id, paper, [other, own]);
    return this.uow.run(async (tx) => {
      const subcontract = await this.subcontracts.lockForActor(tx, actor, id);
      const standing = await this.signatures.of(tx, id);
      await this.requireOpen(tx, subcontract, standing);
      if (standing.length > 0 !== (signed !== null)) return null;
      await this.uow.rows(tx, INSERT_SIGNATURE, [
        id,
        side,
        own.user_id,
        own.typed_name,
        own.document_sha256,
        own.ip,
        own.signed_at,
      ]);
      if (signed !== null) await this.activate(tx, actor, subcontract, signed);
      await this.audit.write(tx, {
        actor,
        origin,
        action: 'subcontract.signed',
        subject: { type: 'subcontract', id },
        detail: {
          side,
          documentSha256: own.document_sha256,
          typedName: own.typed_name,
          complete: signed !== null,
        },
      });
      return this.events.bump(tx, id);
    });
  }

  /** Still waiting for this side's signature, by the database's clock, read after the lock. */
  private async requireOpen(
    tx: Tx,
    subcontract: OwnSubcontract,
    standing: readonly SignatureRow[],
  ): Promise<void> {
    const isSigned = standing.some((row) => row.side === subcontract.side);
    if (subcontract.status !== 'awaiting_signatures' || isSigned) throw new AppError('illegal_move');
    if ((await this.clock.now(tx)) > subcontract.signBy) throw new AppError('illegal_move');
  }

  private async makeSignedPaper(id: string, paper: Buffer, signatures: SignatureRow[]): Promise<SignedPaper> {
    const subcontract = await this.subcontracts.find(id);
    if (subcontract === null) throw new AppError('not_found');
    const bytes = await appendSignaturePage(paper, {
      number: subcontract.number,
      title: subcontract.title,
      timeZone: subcontract.timeZone,
      documentSha256: subcontract.document.sha256,
      signatures: signatures.map((row) => ({
        company: row.side === 'gc' ? subcontract.gc.name : subcontract.crew.name,
        side: row.side,
        personName: row.person_name,
        typedName: row.typed_name,
        signedAt: row.signed_at,
        ip: row.ip,
      })),
    });
    const { sha256 } = await this.storage.put(bytes);
    return { sha256, bytes: bytes.length };
  }

  private async activate(
    tx: Tx,
    actor: Actor,
    subcontract: OwnSubcontract,
    signed: SignedPaper,
  ): Promise<void> {
    const fileId = await this.files.register(tx, {
      companyId: subcontract.gc.id,
      userId: actor.userId,
      kind: 'document',
      name: `Subcontract ${subcontract.number}, signed.pdf`,
      type: 'application/pdf',
      bytes: signed.bytes,
      sha256: signed.sha256,
      originalSha256: signed.sha256,
    });
    if ((await this.uow.row(tx, ACTIVATE, [subcontract.id, fileId])) === null)
      throw new AppError('illegal_move');
    for (const { id } of [subcontract.gc, subcontract.crew]) {
      await this.mailer.toCompany(tx, 'signed', id, 'subcontract.sign', { subcontractId: subcontract.id });
    }
  }
}
