import { Button, Text } from '@radix-ui/themes';
import { useMutation } from '@tanstack/react-query';
import { useTranslation } from 'react-i18next';
import { useSearchParams } from 'react-router-dom';
import { ButtonLink } from '../components/link.tsx';
import { Page } from '../components/page.tsx';
import { ErrorState, QueryErrorState } from '../components/states.tsx';
import { postVerify } from '../features/session/api/session.queries.ts';
import { isApiError } from '../lib/api-error.ts';
import { paths } from '../lib/paths.ts';

/** The link of the mail leads here. The press confirms, not the opening: mail scanners open links too. */
export default function VerifyPage() {
  const { t } = useTranslation('session');
  const token = useSearchParams()[0].get('token') ?? '';
  const confirm = useMutation({ mutationFn: () => postVerify(token) });
  if (confirm.isSuccess) {
    return (
      <Page title={t('verify.doneTitle')} width="narrow">
        <div className="k-panel" role="status">
          <Text as="p" mb="4">
            {t('verify.doneText')}
          </Text>
          <ButtonLink to={paths.signIn()} size="3">
            {t('verify.toSignIn')}
          </ButtonLink>
        </div>
      </Page>
    );
  }
  const refused = isApiError(confirm.error) && confirm.error.status >= 400 && confirm.error.status < 500;
  return (
    <Page title={t('verify.title')} width="narrow">
      {token === '' || refused ? (
        <ErrorState
          what={t('verify.badWhat')}
          next={t('verify.badNext')}
          action={<ButtonLink to={paths.signUp()}>{t('verify.again')}</ButtonLink>}
        />
      ) : (
        <div className="k-panel">
          <Text as="p" mb="4">
            {t('verify.text')}
          </Text>
          <Button size="3" loading={confirm.isPending} onClick={() => confirm.mutate()}>
            {t('verify.press')}
          </Button>
        </div>
      )}
      {confirm.isError && !refused && <QueryErrorState error={confirm.error} />}
    </Page>
  );
}
