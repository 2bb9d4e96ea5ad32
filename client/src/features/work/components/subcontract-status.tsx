import type { SubcontractStatus } from '@kerfyard/common/subcontracts';
import { useTranslation } from 'react-i18next';
import { StatusWord, type StatusTone } from '../../../components/status-word.tsx';

const tones: Record<SubcontractStatus, StatusTone> = {
  awaiting_signatures: 'waiting',
  active: 'open',
  completed: 'done',
  lapsed: 'closed',
};

export function SubcontractStatusWord({ status }: { status: SubcontractStatus }) {
  const { t } = useTranslation('work');
  return <StatusWord tone={tones[status]}>{t(`status.${status}`)}</StatusWord>;
}
