import type { ScopeStatus } from '@kerfyard/common/scopes';
import { useTranslation } from 'react-i18next';
import { StatusWord, type StatusTone } from '../../../components/status-word.tsx';

const tones: Record<ScopeStatus, StatusTone> = {
  draft: 'quiet',
  open: 'open',
  due: 'waiting',
  awarded: 'done',
  closed_without_award: 'closed',
  withdrawn: 'closed',
  discarded: 'closed',
};

export function ScopeStatusWord({ status }: { status: ScopeStatus }) {
  const { t } = useTranslation('scope');
  return <StatusWord tone={tones[status]}>{t(`status.${status}`)}</StatusWord>;
}
