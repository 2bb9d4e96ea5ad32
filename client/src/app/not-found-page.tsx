import { useTranslation } from 'react-i18next';
import { Page } from '../components/page.tsx';
import { ButtonLink } from '../components/link.tsx';
import { ErrorState } from '../components/states.tsx';
import { paths } from '../lib/paths.ts';
import { PublicFrame } from './layouts/public-layout.tsx';

/** An address that leads nowhere. */
export function NotFoundPage() {
  const { t } = useTranslation();
  return (
    <PublicFrame>
      <Page title={t('notFound.title')}>
        <ErrorState
          what={t('notFound.what')}
          next={t('notFound.next')}
          action={<ButtonLink to={paths.home}>{t('notFound.home')}</ButtonLink>}
        />
      </Page>
    </PublicFrame>
  );
}
