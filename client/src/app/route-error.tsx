import { Button } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { useRouteError } from 'react-router-dom';
import { Page } from '../components/page.tsx';
import { ErrorState, QueryErrorState } from '../components/states.tsx';
import { isApiError } from '../lib/api-error.ts';
import { PublicFrame } from './layouts/public-layout.tsx';

/** What is shown when a page could not be loaded or broke; `bare` outside the app's own frame. */
export function RouteError({ bare = false }: { bare?: boolean }) {
  const error = useRouteError();
  const { t } = useTranslation();
  const reload = () => window.location.reload();
  const content = isApiError(error) ? (
    <Page title={t('broken.title')}>
      <QueryErrorState error={error} onRetry={reload} />
    </Page>
  ) : (
    <Page title={t('broken.title')}>
      <ErrorState
        what={t('broken.what')}
        next={t('broken.next')}
        action={<Button onClick={reload}>{t('broken.reload')}</Button>}
      />
    </Page>
  );
  return bare ? <PublicFrame>{content}</PublicFrame> : content;
}
