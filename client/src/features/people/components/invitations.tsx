import type { CompanyKind, InvitationView } from '@kerfyard/common/people';
import { Button, Heading, Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { ConfirmDialog } from '../../../components/confirm-dialog.tsx';
import { StatusWord } from '../../../components/status-word.tsx';
import { deviceTimeZone } from '../../../lib/clock.ts';
import { formatDateTime } from '../../../lib/format.ts';
import { newId } from '../../../lib/ids.ts';
import { useErrorWords } from '../../../lib/error-words.ts';
import { useInvite, useWithdrawInvitation } from '../api/people.queries.ts';
import { LimitsLine } from './limits-line.tsx';
import styles from './people.module.css';

/** Invitations on their way: sent anew, which makes a new link, or taken back. */
export function Invitations(props: { invitations: readonly InvitationView[]; kind: CompanyKind }) {
  const { t } = useTranslation('people');
  if (props.invitations.length === 0) return null;
  return (
    <section className="k-panel" aria-labelledby="invitations">
      <Heading as="h2" size="4" weight="medium" id="invitations">
        {t('invitations.title')}
      </Heading>
      <ul className={styles.list}>
        {props.invitations.map((invitation) => (
          <Invitation key={invitation.id} invitation={invitation} kind={props.kind} />
        ))}
      </ul>
    </section>
  );
}

function Invitation({ invitation, kind }: { invitation: InvitationView; kind: CompanyKind }) {
  const { t } = useTranslation('people');
  const words = useErrorWords();
  const invite = useInvite();
  const withdraw = useWithdrawInvitation();
  const { email, role, limits, isExpired } = invitation;
  return (
    <li className={styles.row}>
      <div>
        <Text as="p" size="3">
          {email}
        </Text>
        <StatusWord tone={isExpired ? 'closed' : 'waiting'}>
          {t(isExpired ? 'invitations.expired' : 'invitations.until', {
            at: formatDateTime(invitation.expiresAt, deviceTimeZone()),
          })}
        </StatusWord>
        <div role="alert">
          {invite.isError && (
            <Text as="p" size="2" color="red">
              {words(invite.error).what}
            </Text>
          )}
        </div>
      </div>
      <LimitsLine role={role} limits={limits} kind={kind} />
      <div className={styles.buttons}>
        <Button
          variant="soft"
          color="gray"
          size="2"
          loading={invite.isPending}
          aria-label={t('invitations.againNamed', { email })}
          onClick={() => invite.mutate({ id: newId(), email, role, limits })}
        >
          {t('invitations.again')}
        </Button>
        <ConfirmDialog
          trigger={
            <Button
              variant="soft"
              color="red"
              size="2"
              aria-label={t('invitations.withdrawNamed', { email })}
            >
              {t('invitations.withdraw')}
            </Button>
          }
          title={t('invitations.withdrawTitle', { email })}
          text={t('invitations.withdrawText')}
          confirm={t('invitations.withdraw')}
          destructive
          onConfirm={() => withdraw.mutateAsync(invitation.id)}
        />
      </div>
    </li>
  );
}
