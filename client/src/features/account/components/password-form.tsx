import { changePasswordSchema, type ChangePassword } from '@kerfyard/common/people';
import { Button, Text } from '@radix-ui/themes';
import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import { useAnnounce } from '../../../components/announcer.tsx';
import { TextField } from '../../../components/form/fields.tsx';
import { Form } from '../../../components/form/form.tsx';
import { useAppForm } from '../../../lib/app-form.ts';
import { useChangePassword } from '../api/account.queries.ts';
import styles from './account.module.css';
import { Section } from './section.tsx';

const empty: ChangePassword = { current: '', password: '' };

/** The present password and a new one; every other browser is signed out by it. */
export function PasswordForm({ email }: { email: string }) {
  const { t } = useTranslation('account');
  const announce = useAnnounce();
  const change = useChangePassword();
  const [isDone, setIsDone] = useState(false);
  const form = useAppForm({ schema: changePasswordSchema, defaultValues: empty });
  const save = async (values: ChangePassword) => {
    setIsDone(false);
    await change.mutateAsync(values);
    form.reset(empty);
    setIsDone(true);
    announce(t('password.done'));
  };
  return (
    <Section title={t('password.title')} text={t('password.text')}>
      <Form form={form} onSubmit={save} label={t('password.title')}>
        {/* Password managers want to know whose password this is. */}
        <input
          type="text"
          name="username"
          className="k-hidden"
          autoComplete="username"
          value={email}
          readOnly
          tabIndex={-1}
          aria-hidden="true"
        />
        <TextField
          control={form.control}
          name="current"
          label={t('password.current')}
          type="password"
          autoComplete="current-password"
        />
        <TextField
          control={form.control}
          name="password"
          label={t('password.new')}
          hint={t('password.newHint')}
          type="password"
          autoComplete="new-password"
        />
        <div className={styles.buttons}>
          <Button type="submit" size="3" loading={form.formState.isSubmitting}>
            {t('password.save')}
          </Button>
          {isDone && !form.formState.isDirty && (
            <Text size="2" color="gray">
              {t('password.done')}
            </Text>
          )}
        </div>
      </Form>
    </Section>
  );
}
