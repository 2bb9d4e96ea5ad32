import { describeCut, takeoffCut, type CutTakeoff } from '@kerfyard/common/cutting';
import type { CutLine } from '@kerfyard/common/scopes';
import { Text } from '@radix-ui/themes';
import { useMemo } from 'react';
import { useTranslation } from 'react-i18next';
import { DataTable, type Column } from '../../../components/data-table.tsx';
import { Figure } from '../../../components/figure.tsx';

interface Row {
  line: CutLine;
  takeoff: CutTakeoff;
}

const quantities = [
  { key: 'sawFt', unit: 'ft' },
  { key: 'inchFeet', unit: 'in-ft' },
  { key: 'coreInches', unit: 'in' },
] as const;

/** The cut list with each line's quantities, as the engine takes it off. */
export function CutTable({ cuts }: { cuts: readonly CutLine[] }) {
  const { t } = useTranslation('scope');
  const rows = useMemo(() => cuts.map((line): Row => ({ line, takeoff: takeoffCut(line.cut) })), [cuts]);
  const quantity = (key: 'sawFt' | 'inchFeet' | 'coreInches', unit: string): Column<Row> => ({
    key,
    head: t(`totals.${key}`),
    align: 'right',
    cell: ({ line, takeoff }) =>
      takeoff[key] > 0 ? (
        <Figure
          label={`${line.mark}, ${t(`totals.${key}`)}`}
          value={takeoff[key]}
          unit={unit}
          working={takeoff.working}
        />
      ) : (
        ''
      ),
    csv: ({ takeoff }) => takeoff[key],
    // The sums above the table say it too; the words of a cut need the room.
    ...(key === 'sawFt' ? { narrow: 'hide' as const } : {}),
  });
  const columns: Column<Row>[] = [
    { key: 'mark', head: t('cuts.mark'), cell: ({ line }) => line.mark, csv: ({ line }) => line.mark },
    {
      key: 'cut',
      head: t('cuts.cut'),
      cell: ({ line }) => (
        <>
          {describeCut(line.cut)}
          {line.note !== '' && (
            <Text as="div" size="1" color="gray">
              {line.note}
            </Text>
          )}
        </>
      ),
      csv: ({ line }) => describeCut(line.cut),
    },
    ...quantities
      .filter(({ key }) => rows.some(({ takeoff }) => takeoff[key] > 0))
      .map(({ key, unit }) => quantity(key, unit)),
  ];
  return (
    <DataTable
      caption={t('cuts.title')}
      columns={columns}
      rows={rows}
      rowKey={({ line }) => line.id}
      csvName="cut-list"
    />
  );
}
