import type { CompanyKind, MemberView } from '@kerfyard/common/people';
import { Button, Heading, Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { ConfirmDialog } from '../../../components/confirm-dialog.tsx';
import { StatusWord } from '../../../components/status-word.tsx';
import { useDeactivate, useReactivate, useRemoveTheirSecondFactor } from '../api/people.queries.ts';
import { EditMemberButton } from './edit-member.tsx';
import { LimitsLine } from './limits-line.tsx';
import styles from './people.module.css';

/** Who works here: everyone sees names and roles, an owner also addresses, limits and the buttons. */
export function Members({ members, kind }: { members: readonly MemberView[]; kind: CompanyKind }) {
  const { t } = useTranslation('people');
  return (
    <section className="k-panel" aria-labelledby="members">
      <Heading as="h2" size="4" weight="medium" id="members">
        {t('members.title')}
      </Heading>
      <ul className={styles.list}>
        {members.map((member) => (
          <li key={member.id} className={styles.row}>
            <div>
              <Text as="p" size="3" weight="medium">
                {member.isSelf ? t('members.you', { name: member.name }) : member.name}
              </Text>
              {member.details !== null && (
                <Text as="p" size="2" color="gray">
                  {member.details.email}
                </Text>
              )}
              {!member.isActive && <StatusWord tone="closed">{t('members.left')}</StatusWord>}
              {member.details?.hasSecondFactor === true && (
                <StatusWord tone="good">{t('members.secondFactor')}</StatusWord>
              )}
            </div>
            <LimitsLine role={member.role} limits={member.details?.limits ?? null} kind={kind} />
            {member.details !== null && <MemberButtons member={member} kind={kind} />}
          </li>
        ))}
      </ul>
    </section>
  );
}

function MemberButtons({ member, kind }: { member: MemberView; kind: CompanyKind }) {
  const { t } = useTranslation('people');
  const deactivate = useDeactivate();
  const reactivate = useReactivate();
  const words = member.isActive ? 'deactivate' : 'reactivate';
  const run = member.isActive ? deactivate : reactivate;
  return (
    <div className={styles.buttons}>
      {member.isActive && <EditMemberButton member={member} kind={kind} />}
      {member.details?.hasSecondFactor === true && !member.isSelf && <LostPhoneButton member={member} />}
      <ConfirmDialog
        trigger={
          <Button
            variant="soft"
            color={member.isActive ? 'red' : 'gray'}
            size="2"
            aria-label={t(`${words}.named`, { name: member.name })}
          >
            {t(`${words}.press`)}
          </Button>
        }
        title={t(`${words}.title`, { name: member.name })}
        text={t(`${words}.text`)}
        confirm={t(`${words}.confirm`)}
        destructive={member.isActive}
        onConfirm={() => run.mutateAsync(member.id)}
      />
    </div>
  );
}

/** Only an owner can help a colleague who lost phone and recovery codes. */
function LostPhoneButton({ member }: { member: MemberView }) {
  const { t } = useTranslation('people');
  const remove = useRemoveTheirSecondFactor();
  return (
    <ConfirmDialog
      trigger={
        <Button variant="soft" color="gray" size="2" aria-label={t('lostPhone.named', { name: member.name })}>
          {t('lostPhone.press')}
        </Button>
      }
      title={t('lostPhone.title', { name: member.name })}
      text={t('lostPhone.text')}
      confirm={t('lostPhone.confirm')}
      destructive
      onConfirm={() => remove.mutateAsync(member.id)}
    />
  );
}
