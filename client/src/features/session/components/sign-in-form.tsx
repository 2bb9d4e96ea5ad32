import { signInSchema, type MeView, type SignIn } from '@kerfyard/common/people';
import { Button } from '@radix-ui/themes';
import { useEffect, useState, type ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import { useAnnounce } from '../../../components/announcer.tsx';
import { TextField } from '../../../components/form/fields.tsx';
import { Form } from '../../../components/form/form.tsx';
import { isApiError } from '../../../lib/api-error.ts';
import { useAppForm } from '../../../lib/app-form.ts';
import { postSignIn } from '../api/session.queries.ts';
import { CodeField } from './code-field.tsx';
import styles from './sign-in-form.module.css';

/**
 * E-mail and password, then a code where the account has a second factor; used by the sign-in page and over a page whose
 * session ran out.
 */
export function SignInForm(props: { email?: string; onSignedIn: (me: MeView) => void; aside?: ReactNode }) {
  const { t } = useTranslation();
  const announce = useAnnounce();
  const [asksCode, setAsksCode] = useState(false);
  const form = useAppForm({
    schema: signInSchema,
    defaultValues: { email: props.email ?? '', password: '' },
  });
  const { setFocus } = form;
  useEffect(() => {
    if (asksCode) setFocus('code');
  }, [asksCode, setFocus]);

  const signIn = async (values: SignIn) => {
    try {
      props.onSignedIn(await postSignIn(values));
    } catch (error) {
      if (!isApiError(error, 'second_factor_needed')) throw error;
      setAsksCode(true);
      announce(t('fields.code'));
    }
  };
  return (
    <Form form={form} label={t('signIn')} onSubmit={signIn}>
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
      {asksCode && <CodeField control={form.control} name="code" />}
      <div className={styles.buttons}>
        <Button type="submit" size="3" loading={form.formState.isSubmitting}>
          {t('signIn')}
        </Button>
        {props.aside}
      </div>
    </Form>
  );
}
