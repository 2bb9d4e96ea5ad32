import { signInSchema, type MeView } from '@kerfyard/common/people';
import { Button } from '@radix-ui/themes';
import type { ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import { TextField } from '../../../components/form/fields.tsx';
import { Form } from '../../../components/form/form.tsx';
import { useAppForm } from '../../../lib/app-form.ts';
import { postSignIn } from '../api/session.queries.ts';
import styles from './sign-in-form.module.css';

/** E-mail and password; used by the sign-in page and over a page whose session ran out. */
export function SignInForm(props: { email?: string; onSignedIn: (me: MeView) => void; aside?: ReactNode }) {
  const { t } = useTranslation();
  const form = useAppForm({
    schema: signInSchema,
    defaultValues: { email: props.email ?? '', password: '' },
  });
  return (
    <Form
      form={form}
      label={t('signIn')}
      onSubmit={async (values) => props.onSignedIn(await postSignIn(values))}
    >
      <TextField
        control={form.control}
        name="email"
        label={t('fields.email')}
        type="email"
        autoComplete="username"
        inputMode="email"
      />
      <TextField
        control={form.control}
        name="password"
        label={t('fields.password')}
        type="password"
        autoComplete="current-password"
      />
      <div className={styles.buttons}>
        <Button type="submit" size="3" loading={form.formState.isSubmitting}>
          {t('signIn')}
        </Button>
        {props.aside}
      </div>
    </Form>
  );
}
