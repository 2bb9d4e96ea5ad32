import type { VisitStatus } from '@kerfyard/common/visits';
import { useTranslation } from 'react-i18next';
import { StatusWord, type StatusTone } from '../../../components/status-word.tsx';

const tones: Record<VisitStatus, StatusTone> = {
  proposed: 'waiting',
  confirmed: 'good',
  on_site: 'open',
  finished: 'done',
  cancelled: 'closed',
};

export function VisitStatusWord({ status }: { status: VisitStatus }) {
  const { t } = useTranslation('visits');
  return <StatusWord tone={tones[status]}>{t(`status.${status}`)}</StatusWord>;
}
