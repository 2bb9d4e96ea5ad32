import type { VisitView } from '@kerfyard/common/visits';
import { Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { DataTable, type Column } from '../../../components/data-table.tsx';
import { TextLink } from '../../../components/link.tsx';
import { formatDateTime, formatTime } from '../../../lib/format.ts';
import { paths } from '../../../lib/paths.ts';
import { blocksBetween, type VisitBlock } from '../visit-blocks.ts';
import { VisitStatusWord } from './visit-status.tsx';

interface VisitListProps {
  visits: readonly VisitView[];
  span: { from: string; to: string };
  zone: string;
}

/** The visits of some weeks, one line each, for reading, sorting elsewhere and sending on. */
export function VisitList({ visits, span, zone }: VisitListProps) {
  const { t } = useTranslation('visits');
  const blocks = blocksBetween({ startsAt: span.from, endsAt: span.to }, visits);
  if (blocks.length === 0) return <Text color="gray">{t('list.empty')}</Text>;
  const columns: Column<VisitBlock>[] = [
    {
      key: 'when',
      head: t('list.when'),
      cell: ({ startsAt, endsAt }) => `${formatDateTime(startsAt, zone)} – ${formatTime(endsAt, zone)}`,
      csv: ({ startsAt }) => startsAt,
    },
    {
      key: 'what',
      head: t('list.what'),
      cell: ({ visit }) => <TextLink to={paths.workItem(visit.subcontractId)}>{visit.title}</TextLink>,
      csv: ({ visit }) => visit.title,
    },
    {
      key: 'unit',
      head: t('list.unit'),
      cell: ({ visit }) => t('week.unit', { crew: visit.crew.name, truck: visit.truck.name }),
      csv: ({ visit }) => `${visit.crew.name}, ${visit.truck.name}`,
    },
    {
      key: 'place',
      head: t('list.place'),
      cell: ({ visit }) => `${visit.city}, ${visit.state}`,
      csv: ({ visit }) => `${visit.city}, ${visit.state}`,
    },
    {
      key: 'status',
      head: t('list.status'),
      cell: ({ visit }) => <VisitStatusWord status={visit.status} />,
      csv: ({ visit }) => visit.status,
    },
  ];
  return (
    <DataTable
      caption={t('list.caption')}
      hideCaption
      columns={columns}
      rows={blocks}
      rowKey={({ visit, startsAt }) => `${visit.id}-${startsAt}`}
      csvName="visits"
    />
  );
}
