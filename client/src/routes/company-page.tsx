import { useTranslation } from 'react-i18next';
import { Page } from '../components/page.tsx';

/** Own company. */
export default function CompanyPage() {
  const { t } = useTranslation('company');
  return <Page title={t('title')}>{null}</Page>;
}
