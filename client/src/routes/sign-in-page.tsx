import { Text } from '@radix-ui/themes';
import type { MeView } from '@kerfyard/common/people';
import { useTranslation } from 'react-i18next';
import { useNavigate, useSearchParams } from 'react-router-dom';
import { TextLink } from '../components/link.tsx';
import { Page } from '../components/page.tsx';
import { SignInForm } from '../features/session/components/sign-in-form.tsx';
import { useBecome } from '../features/session/hooks/use-session.ts';
import { homeOf, paths, safeNext } from '../lib/paths.ts';

/** Sign in, then on to where one was going. */
export default function SignInPage() {
  const { t } = useTranslation('session');
  const navigate = useNavigate();
  const become = useBecome();
  const next = safeNext(useSearchParams()[0].get('next'));
  const signedIn = (me: MeView) => {
    become(me);
    void navigate(next ?? homeOf({ isStaff: me.user.isStaff, kind: me.company?.kind ?? null }), {
      replace: true,
    });
  };
  return (
    <Page
      title={t('signInPage.title')}
      width="narrow"
      lead={next === undefined ? undefined : t('signInPage.toGoOn')}
    >
      <div className="k-panel" style={{ maxWidth: '26rem' }}>
        <SignInForm onSignedIn={signedIn} />
      </div>
      <Text as="p" mt="4">
        <TextLink to={paths.reset}>{t('signInPage.forgot')}</TextLink>
      </Text>
      <Text as="p" mt="2" color="gray">
        {t('signInPage.noAccount')} <TextLink to={paths.signUp()}>{t('signInPage.signUp')}</TextLink>
      </Text>
    </Page>
  );
}
