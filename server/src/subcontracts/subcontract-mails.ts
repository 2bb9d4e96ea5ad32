import { Injectable, type OnModuleInit } from '@nestjs/common';
import type { MailContent } from '../platform/mail/mail-content.ts';
import { Mailer } from '../platform/mail/mailer.ts';
import { SubcontractReader } from './subcontract-reader.ts';
import { subcontractMailWords as words } from './subcontracts.words.en.ts';
import { workPath } from './work-path.ts';

/** Letters about a subcontract's paper. */
@Injectable()
export class SubcontractMails implements OnModuleInit {
  constructor(
    private readonly mailer: Mailer,
    private readonly subcontracts: SubcontractReader,
  ) {}

  onModuleInit(): void {
    this.mailer.register('signed', ({ subcontractId }) => this.signed(String(subcontractId)));
  }

  private async signed(id: string): Promise<MailContent | null> {
    const subcontract = await this.subcontracts.find(id);
    if (subcontract === null) return null;
    const { number, gc, crew, title } = subcontract;
    return {
      subject: words.signed.subject(number),
      lines: words.signed.lines(gc.name, crew.name, title),
      action: { label: words.signed.action, path: workPath(id) },
    };
  }
}
