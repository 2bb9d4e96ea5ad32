import { Injectable, type OnModuleInit } from '@nestjs/common';
import { DateTime } from 'luxon';
import type { BiddingMode, ScopeStatus } from '@kerfyard/common/scopes';
import { toNumber } from '../platform/database/codecs.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import type { MailContent } from '../platform/mail/mail-content.ts';
import { Mailer } from '../platform/mail/mailer.ts';
import { MAIL_FACTS } from './scope-mails.queries.ts';
import { scopeMailWords as words } from './scopes.words.en.ts';

interface Facts {
  title: string;
  city: string;
  state: string;
  status: ScopeStatus;
  mode: BiddingMode;
  due_at: Date;
  time_zone: string;
  cut_count: number;
  company_name: string;
  opened: string;
}

/** What e-mails about scopes and their bids say, read from the row when each is sent. */
@Injectable()
export class ScopeMails implements OnModuleInit {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly mailer: Mailer,
  ) {}

  onModuleInit(): void {
    this.mailer.register('scope_published', (data) => this.build(data, published));
    this.mailer.register('bid_in', (data) => this.build(data, bidIn));
    this.mailer.register('bids_due', (data) => this.build(data, bidsDue));
  }

  private async build(
    data: Record<string, unknown>,
    write: (facts: Facts, scopeId: string) => MailContent | null,
  ): Promise<MailContent | null> {
    const scopeId = String(data.scopeId);
    const facts = await this.uow.row<Facts>(null, MAIL_FACTS, [scopeId]);
    return facts === null ? null : write(facts, scopeId);
  }
}

function published(facts: Facts, scopeId: string): MailContent | null {
  if (facts.status !== 'open') return null;
  const say = words.published;
  return {
    subject: say.subject(facts.title, facts.city),
    lines: [
      say.line(facts.company_name, facts.title),
      say.where(facts.city, facts.state, facts.cut_count),
      say.due(atSite(facts)),
      facts.mode === 'sealed' ? say.sealed : say.ranked,
    ],
    action: { label: say.action, path: `/open-scopes/${scopeId}` },
  };
}

function bidIn(facts: Facts, scopeId: string): MailContent | null {
  if (facts.status !== 'open') return null;
  const say = words.bidIn;
  return {
    subject: say.subject(facts.title),
    lines: [say.line(facts.title), facts.mode === 'sealed' ? say.sealed(atSite(facts)) : say.ranked],
    action: { label: say.action, path: `/scopes/${scopeId}/bids` },
  };
}

function bidsDue(facts: Facts, scopeId: string): MailContent | null {
  if (facts.status !== 'due') return null;
  const say = words.bidsDue;
  const count = toNumber(facts.opened);
  return {
    subject: say.subject(facts.title),
    lines: [count === 0 ? say.none(facts.title) : say.some(count, facts.title)],
    action: { label: say.action, path: `/scopes/${scopeId}/bids` },
  };
}

/** The due time as the site's clock reads, with the zone's short name. */
function atSite({ due_at: dueAt, time_zone: zone }: Facts): string {
  return DateTime.fromJSDate(dueAt, { zone })
    .setLocale('en-US')
    .toFormat("cccc d LLLL yyyy 'at' h:mm a ZZZZ");
}
