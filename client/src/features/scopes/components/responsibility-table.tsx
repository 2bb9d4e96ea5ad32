import { countResponsibilities, type Responsibility } from '@kerfyard/common/scopes';
import { Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { DataTable } from '../../../components/data-table.tsx';

/** Who has what. The sentence says it at a glance; the table says it whole. */
export function ResponsibilityTable({
  sheet,
  reader,
}: {
  sheet: readonly Responsibility[];
  reader: 'gc' | 'crew';
}) {
  const { t } = useTranslation('scope');
  const counts = countResponsibilities(sheet);
  const needed = sheet.filter((row) => row.by !== 'not_needed');
  return (
    <>
      <Text as="p">
        {t('responsibilities.sentence', {
          gc: counts.gc,
          crew: counts.crew,
          other: counts.other,
          gcName: t(`responsibilities.${reader === 'gc' ? 'ours' : 'theirs'}`),
          crewName: t(`responsibilities.${reader === 'crew' ? 'ours' : 'theirCrew'}`),
        })}
      </Text>
      <DataTable
        caption={t('responsibilities.title')}
        columns={[
          { key: 'item', head: t('responsibilities.item'), cell: (row) => t(`items.${row.item}`) },
          {
            key: 'by',
            head: t('responsibilities.by'),
            cell: (row) => (row.by === 'other' ? row.name : t(`responsibilities.holders.${row.by}`)),
          },
        ]}
        rows={needed}
        rowKey={(row) => row.item}
      />
    </>
  );
}
