import { Inject, Injectable, type OnApplicationBootstrap } from '@nestjs/common';
import { createTransport } from 'nodemailer';
import { may, type CompanyKind, type PermissionName, type Role } from '@kerfyard/common/people';
import { CONFIG, type Config } from '../config/config.ts';
import { UnitOfWork, type Tx } from '../database/unit-of-work.ts';
import { newId } from '../ids/ids.ts';
import { JobQueue } from '../jobs/job-queue.ts';
import type { Jobs } from '../jobs/queues.ts';
import { frameMail } from './frame-mail.ts';
import type { FindAddressee, MailBuilder } from './mail-content.ts';
import { PEOPLE_OF_COMPANY, PERSON } from './mail.queries.ts';

export type { MailBuilder, MailContent } from './mail-content.ts';

interface PersonRow {
  id: string;
  email: string;
  name: string;
  is_staff: boolean;
  role: Role | null;
  company_id: string | null;
  company_kind: CompanyKind | null;
  company_name: string | null;
}

/** Names of e-mails' data that the mailer sets itself. */
type OwnData = 'kind' | 'to' | 'mailId' | 'userId';
export type MailData = Record<string, unknown> & { [name in OwnData]?: never };

/**
 * E-mail by jobs: `to…` puts one job per person into the caller's transaction, carrying ids only; the words are built
 * from rows when the job runs, so that nothing is sent that no longer holds. A mail tried twice has one Message-ID.
 */
@Injectable()
export class Mailer implements OnApplicationBootstrap {
  private readonly builders = new Map<string, MailBuilder>();
  private readonly addressees = new Map<string, FindAddressee>();
  private readonly transport;

  constructor(
    @Inject(CONFIG) private readonly config: Config,
    private readonly uow: UnitOfWork,
    private readonly jobs: JobQueue,
  ) {
    this.transport = createTransport({
      url: config.mail.smtpUrl,
      connectionTimeout: 10_000,
      greetingTimeout: 10_000,
      socketTimeout: 20_000,
      disableFileAccess: true,
      disableUrlAccess: true,
    });
  }

  async onApplicationBootstrap(): Promise<void> {
    await this.jobs.work('send_mail', (job) => this.send(job), 2);
  }

  /**
   * Say what a kind of e-mail reads like. Once per kind, when the feature's module starts. With `addressee` the ids
   * given to `toUsers` are not people's but things that know a name and address (a sign-up before its account).
   */
  register(kind: string, build: MailBuilder, addressee?: FindAddressee): void {
    if (this.builders.has(kind)) throw new Error(`two builders for the e-mail ${kind}`);
    this.builders.set(kind, build);
    if (addressee !== undefined) this.addressees.set(kind, addressee);
  }

  /**
   * One e-mail to each of these people, not before `startAfter` (wall time). What goes to many at once takes a priority
   * below 0, so that nobody waits for an award behind hundreds of announcements.
   */
  async toUsers(
    tx: Tx,
    kind: string,
    userIds: readonly string[],
    data: MailData,
    options: { startAfter?: Date; priority?: number } = {},
  ): Promise<void> {
    if (!this.builders.has(kind)) throw new Error(`no builder for the e-mail ${kind}`);
    for (const userId of new Set(userIds)) {
      await this.jobs.send(tx, 'send_mail', { ...data, kind, to: userId, mailId: newId() }, options);
    }
  }

  /** One e-mail to each person of a company whose role carries the permission. */
  async toCompany(
    tx: Tx,
    kind: string,
    companyId: string,
    permission: PermissionName,
    data: MailData,
    options: { priority?: number } = {},
  ): Promise<void> {
    const people = await this.uow.rows<PersonRow>(tx, PEOPLE_OF_COMPANY, [companyId]);
    const ids = people.filter((person) => mayPerson(person, permission)).map((person) => person.id);
    await this.toUsers(tx, kind, ids, data, options);
  }

  private async send({ kind, to: userId, mailId, ...data }: Jobs['send_mail']): Promise<void> {
    const build = this.builders.get(kind);
    if (build === undefined) throw new Error(`no builder for the e-mail ${kind}`);
    const find = this.addressees.get(kind) ?? ((id) => this.uow.row<PersonRow>(null, PERSON, [id]));
    const person = await find(userId);
    if (person === null) return;
    const content = await build({ ...data, userId, mailId });
    if (content === null) return;
    const framed = frameMail(content, { name: person.name, appUrl: this.config.appUrl });
    await this.transport.sendMail({
      ...framed,
      from: this.config.mail.from,
      to: { name: person.name, address: person.email },
      messageId: `<${String(mailId)}@${new URL(this.config.appUrl).hostname}>`,
      headers: { 'Auto-Submitted': 'auto-generated' },
    });
  }
}

function mayPerson(person: PersonRow, permission: PermissionName): boolean {
  const { company_id: id, company_kind: kind, company_name: name } = person;
  const company = id === null || kind === null || name === null ? null : { id, kind, name };
  return may({ isStaff: person.is_staff, company, role: person.role }, permission);
}
