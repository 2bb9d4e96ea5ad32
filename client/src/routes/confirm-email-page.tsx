import { Button, Text } from '@radix-ui/themes';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useTranslation } from 'react-i18next';
import { useSearchParams } from 'react-router-dom';
import { ButtonLink } from '../components/link.tsx';
import { Page } from '../components/page.tsx';
import { QueryErrorState } from '../components/states.tsx';
import { postConfirmEmail } from '../features/account/api/account.queries.ts';
import { paths } from '../lib/paths.ts';

/** The link of a new address leads here. The press confirms, not the opening: mail scanners open links too. */
export default function ConfirmEmailPage() {
  const { t } = useTranslation('account');
  const client = useQueryClient();
  const token = useSearchParams()[0].get('token') ?? '';
  const confirm = useMutation({
    mutationFn: () => postConfirmEmail(token),
    // In the same browser the address may stand on a page already.
    onSuccess: () => client.invalidateQueries(),
  });
  return (
    <Page title={t(confirm.isSuccess ? 'confirmEmail.doneTitle' : 'confirmEmail.title')} width="narrow">
      <div className="k-panel" role={confirm.isSuccess ? 'status' : undefined}>
        <Text as="p" mb="4">
          {t(confirm.isSuccess ? 'confirmEmail.doneText' : 'confirmEmail.text')}
        </Text>
        {confirm.isSuccess ? (
          <ButtonLink to={paths.account} size="3">
            {t('confirmEmail.toAccount')}
          </ButtonLink>
        ) : (
          <Button size="3" loading={confirm.isPending} onClick={() => confirm.mutate()}>
            {t('confirmEmail.press')}
          </Button>
        )}
      </div>
      {confirm.isError && <QueryErrorState error={confirm.error} onRetry={() => confirm.mutate()} />}
    </Page>
  );
}
