import { inviteSchema, type CompanyKind, type Invite } from '@kerfyard/common/people';
import { Button, Heading, Text } from '@radix-ui/themes';
import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import { useAnnounce } from '../../../components/announcer.tsx';
import { TextField } from '../../../components/form/fields.tsx';
import { Form } from '../../../components/form/form.tsx';
import { useAppForm } from '../../../lib/app-form.ts';
import { newId } from '../../../lib/ids.ts';
import { useInvite } from '../api/people.queries.ts';
import styles from './people.module.css';
import { RoleAndLimits } from './role-and-limits.tsx';

const fresh = (): Invite => ({
  id: newId(),
  email: '',
  role: 'manager',
  limits: { signCents: null, setAsideCents: null, changeCents: null },
});

/** Invite one person by e-mail, with the role and limits they will have. */
export function InviteForm({ kind }: { kind: CompanyKind }) {
  const { t } = useTranslation('people');
  const announce = useAnnounce();
  const invite = useInvite();
  const [sentTo, setSentTo] = useState<string | null>(null);
  const form = useAppForm({ schema: inviteSchema, defaultValues: fresh() });
  const send = async (values: Invite) => {
    setSentTo(null);
    await invite.mutateAsync(values);
    form.reset(fresh());
    setSentTo(values.email);
    announce(t('invite.sent', { email: values.email }));
  };
  return (
    <section className="k-panel" aria-labelledby="invite">
      <Heading as="h2" size="4" weight="medium" mb="1" id="invite">
        {t('invite.title')}
      </Heading>
      <Text as="p" size="2" color="gray" mb="3">
        {t('invite.text')}
      </Text>
      <Form form={form} onSubmit={send} label={t('invite.title')}>
        <TextField
          control={form.control}
          name="email"
          label={t('fields.email')}
          type="email"
          inputMode="email"
          autoComplete="off"
        />
        <RoleAndLimits control={form.control} kind={kind} />
        <div className={styles.formButtons}>
          <Button type="submit" size="3" loading={form.formState.isSubmitting}>
            {t('invite.send')}
          </Button>
          {sentTo !== null && !form.formState.isDirty && (
            <Text size="2" color="gray">
              {t('invite.sent', { email: sentTo })}
            </Text>
          )}
        </div>
      </Form>
    </section>
  );
}
