import { useQuery } from '@tanstack/react-query';
import { useTranslation } from 'react-i18next';
import { Page } from '../components/page.tsx';
import { Loading, QueryErrorState } from '../components/states.tsx';
import { accountQuery, sessionsQuery } from '../features/account/api/account.queries.ts';
import styles from '../features/account/components/account.module.css';
import { EmailForm } from '../features/account/components/email-form.tsx';
import { PasswordForm } from '../features/account/components/password-form.tsx';
import { SecondFactor } from '../features/account/components/second-factor.tsx';
import { Sessions } from '../features/account/components/sessions.tsx';
import { queryClient } from '../lib/query-client.ts';

export function loader() {
  void queryClient.prefetchQuery(accountQuery);
  void queryClient.prefetchQuery(sessionsQuery);
  return null;
}

/** One's own account: how one signs in, and where one is signed in. */
export default function AccountPage() {
  const { t } = useTranslation('account');
  const account = useQuery(accountQuery);
  return (
    <Page title={t('title')} lead={account.data?.email}>
      {account.isPending && <Loading />}
      {account.isError && <QueryErrorState error={account.error} onRetry={() => void account.refetch()} />}
      {account.isSuccess && (
        <div className={styles.columns}>
          <div className={styles.column}>
            <SecondFactor factor={account.data.secondFactor} />
            <Sessions />
          </div>
          <div className={styles.column}>
            <PasswordForm email={account.data.email} />
            <EmailForm account={account.data} />
          </div>
        </div>
      )}
    </Page>
  );
}
