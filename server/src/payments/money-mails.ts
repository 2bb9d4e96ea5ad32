import { Injectable, type OnModuleInit } from '@nestjs/common';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import type { MailContent } from '../platform/mail/mail-content.ts';
import { Mailer } from '../platform/mail/mailer.ts';
import { FUNDING_FOR_MAIL, RELEASE_FOR_MAIL } from './money-mails.queries.ts';

interface MoneyRow {
  subcontract_id: string;
  number: string;
  title: string;
  cents: string;
}

const dollars = new Intl.NumberFormat('en-US', { style: 'currency', currency: 'USD' });

/** Letters about money: set aside, released, transferred. */
@Injectable()
export class MoneyMails implements OnModuleInit {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly mailer: Mailer,
  ) {}

  onModuleInit(): void {
    this.mailer.register('set_aside', ({ fundingId }) =>
      this.letter(FUNDING_FOR_MAIL, fundingId, (amount, row) => ({
        subject: `${amount} set aside for S-${row.number}`,
        lines: [
          `${amount} is set aside for "${row.title}".`,
          'It is held until the work is accepted. Visits for these lines may start.',
        ],
      })),
    );
    this.mailer.register('released', ({ releaseId }) =>
      this.letter(RELEASE_FOR_MAIL, releaseId, (amount, row) => ({
        subject: `${amount} released on S-${row.number}`,
        lines: [
          `The general contractor released ${amount} to you for "${row.title}".`,
          'The transfer to your account follows.',
        ],
      })),
    );
    this.mailer.register('transferred', ({ releaseId }) =>
      this.letter(RELEASE_FOR_MAIL, releaseId, (amount, row) => ({
        subject: `${amount} transferred for S-${row.number}`,
        lines: [`${amount} for "${row.title}" is now in your account at the payment provider.`],
      })),
    );
  }

  private async letter(
    sql: string,
    id: unknown,
    write: (amount: string, row: MoneyRow) => Pick<MailContent, 'subject' | 'lines'>,
  ): Promise<MailContent | null> {
    const row = await this.uow.row<MoneyRow>(null, sql, [id]);
    if (row === null) return null;
    const text = write(dollars.format(Number(row.cents) / 100), row);
    return { ...text, action: { label: 'Look at the money', path: `/work/${row.subcontract_id}/money` } };
  }
}
