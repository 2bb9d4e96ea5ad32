import { Inject, Injectable, type OnModuleInit } from '@nestjs/common';
import type { Role } from '@kerfyard/common/people';
import { linkToken } from '../people/link-token.ts';
import { CONFIG, type Config } from '../platform/config/config.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import type { MailContent } from '../platform/mail/mail-content.ts';
import { Mailer } from '../platform/mail/mailer.ts';
import { SELECT_INVITATION, SELECT_MEMBER, type InvitationRow, type MemberRow } from './members.queries.ts';
import { memberMailWords } from './members.words.en.ts';

/** The e-mails about belonging to a company. */
@Injectable()
export class MembersMail implements OnModuleInit {
  constructor(
    @Inject(CONFIG) private readonly config: Config,
    private readonly uow: UnitOfWork,
    private readonly mailer: Mailer,
  ) {}

  onModuleInit(): void {
    this.mailer.register(
      'invitation',
      ({ userId }) => this.invite(String(userId)),
      // Nobody has an account yet: the greeting uses the address.
      async (invitationId) => {
        const invitation = await this.invitation(invitationId);
        return invitation && { name: invitation.email, email: invitation.email };
      },
    );
    this.mailer.register('invitation_accepted', ({ companyId, memberId }) =>
      this.accepted(String(companyId), String(memberId)),
    );
    this.mailer.register('role_changed', ({ role }) => Promise.resolve(roleChanged(role as Role)));
  }

  sendInvitation = (tx: Tx, invitationId: string) =>
    this.mailer.toUsers(tx, 'invitation', [invitationId], {});

  sendAccepted = (tx: Tx, to: string, data: { companyId: string; memberId: string }) =>
    this.mailer.toUsers(tx, 'invitation_accepted', [to], data);

  sendRoleChanged = (tx: Tx, userId: string, role: Role) =>
    this.mailer.toUsers(tx, 'role_changed', [userId], { role });

  private invitation(id: string): Promise<InvitationRow | null> {
    return this.uow.row<InvitationRow>(null, SELECT_INVITATION, [id]);
  }

  private async invite(id: string): Promise<MailContent | null> {
    const row = await this.invitation(id);
    if (row === null || row.is_used || row.is_withdrawn || row.is_expired) return null;
    const words = memberMailWords.invitation;
    const offer = { invitedBy: row.invited_by, company: row.company_name, role: row.role };
    const subject = words.subject(row.company_name);
    if (row.has_account) {
      const { lines, action } = memberMailWords.hasAccount;
      return { subject, lines: lines(offer), action: { label: action, path: '/sign-in' } };
    }
    const token = linkToken(this.config.signingSecret, 'invitation', id);
    const action = { label: words.action, path: `/invitation?token=${token}` };
    return { subject, lines: words.lines(offer), action };
  }

  private async accepted(companyId: string, memberId: string): Promise<MailContent | null> {
    const member = await this.uow.row<MemberRow>(null, SELECT_MEMBER, [companyId, memberId]);
    if (member === null) return null;
    const { subject, lines, action } = memberMailWords.accepted;
    return {
      subject: subject(member.name),
      lines: lines(member.name, member.email),
      action: { label: action, path: '/company/people' },
    };
  }
}

function roleChanged(role: Role): MailContent {
  const { subject, lines, action } = memberMailWords.roleChanged;
  return { subject, lines: lines(role), action: { label: action, path: '/' } };
}
