import { Text } from '@radix-ui/themes';
import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import { useSearchParams } from 'react-router-dom';
import { TextLink } from '../components/link.tsx';
import { Page } from '../components/page.tsx';
import { SignUpForm } from '../features/session/components/sign-up-form.tsx';
import { kindFromParameter, paths } from '../lib/paths.ts';

/** Sign up; the answer is always the same, whether or not the address has an account already. */
export default function SignUpPage() {
  const { t } = useTranslation('session');
  const kind = kindFromParameter(useSearchParams()[0].get('as'));
  const [sentTo, setSentTo] = useState<string | null>(null);
  if (sentTo !== null) {
    return (
      <Page title={t('lookInMail.title')} width="narrow">
        <div className="k-panel" role="status">
          <Text as="p" size="3" mb="3">
            {t('lookInMail.text', { email: sentTo })}
          </Text>
          <Text as="p" size="2" color="gray">
            {t('lookInMail.nothing')}
          </Text>
        </div>
      </Page>
    );
  }
  return (
    <Page title={t('signUpPage.title')} width="narrow" lead={t('signUpPage.lead')}>
      <div className="k-panel">
        <SignUpForm kind={kind} onSent={setSentTo} />
      </div>
      <Text as="p" mt="4" color="gray">
        {t('signUpPage.hasAccount')} <TextLink to={paths.signIn()}>{t('signUpPage.signIn')}</TextLink>
      </Text>
    </Page>
  );
}
