import { Injectable, type OnModuleInit } from '@nestjs/common';
import { toNumber } from '../platform/database/codecs.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import type { MailContent } from '../platform/mail/mail-content.ts';
import { Mailer } from '../platform/mail/mailer.ts';
import { dollars, instantWords } from '../subcontracts/format.ts';
import { SubcontractReader } from '../subcontracts/subcontract-reader.ts';
import type { Subcontract } from '../subcontracts/subcontract-row.ts';
import { workPath } from '../subcontracts/work-path.ts';
import { COMPLETION_BY_ID } from './completion.queries.ts';
import type { CompletionRow } from './completion.presenter.ts';
import { completionMailWords as words } from './completions.words.en.ts';

type Write = (completion: CompletionRow, subcontract: Subcontract, amount: string) => MailContent;

/** Letters about completions; each says nothing when the completion has moved on meanwhile. */
@Injectable()
export class CompletionMails implements OnModuleInit {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly mailer: Mailer,
    private readonly subcontracts: SubcontractReader,
  ) {}

  onModuleInit(): void {
    this.mailer.register('payment_asked', ({ completionId }) =>
      this.build(completionId, ['submitted'], paymentAsked),
    );
    this.mailer.register('completion_accepted', ({ completionId }) =>
      this.build(completionId, ['accepted', 'released'], accepted),
    );
    this.mailer.register('release_due', ({ completionId }) =>
      this.build(completionId, ['accepted'], releaseDue),
    );
  }

  private async build(
    completionId: unknown,
    states: readonly CompletionRow['status'][],
    write: Write,
  ): Promise<MailContent | null> {
    const completion = await this.uow.row<CompletionRow>(null, COMPLETION_BY_ID, [completionId]);
    if (completion === null || !states.includes(completion.status)) return null;
    const subcontract = await this.subcontracts.find(completion.subcontract_id);
    if (subcontract === null) return null;
    return write(completion, subcontract, dollars(toNumber(completion.amount_cents)));
  }
}

function paymentAsked(
  completion: CompletionRow,
  { id, number, crew, title, timeZone }: Subcontract,
  amount: string,
) {
  return {
    subject: words.paymentAsked.subject(number, amount),
    lines: words.paymentAsked.lines(crew.name, title, amount, instantWords(completion.answer_by, timeZone)),
    action: { label: words.paymentAsked.action, path: workPath(id) },
  };
}

function accepted(_: CompletionRow, { id, number, gc, title }: Subcontract, amount: string) {
  return {
    subject: words.accepted.subject(number, amount),
    lines: words.accepted.lines(gc.name, title, amount),
    action: { label: words.accepted.action, path: workPath(id) },
  };
}

function releaseDue(_: CompletionRow, { id, number, crew, title }: Subcontract, amount: string) {
  return {
    subject: words.releaseDue.subject(number, amount),
    lines: words.releaseDue.lines(crew.name, title, amount),
    action: { label: words.releaseDue.action, path: workPath(id, 'money') },
  };
}
