import { describeCut, takeoffCut, type CutTakeoff } from '@kerfyard/common/cutting';
import type { CutLine } from '@kerfyard/common/scopes';
import { useMemo } from 'react';
import { useTranslation } from 'react-i18next';
import { DataTable, type Column } from '../../../components/data-table.tsx';
import { Figure } from '../../../components/figure.tsx';

interface Row {
  line: CutLine;
  takeoff: CutTakeoff;
}

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
  });
  const columns: Column<Row>[] = [
    { key: 'mark', head: t('cuts.mark'), cell: ({ line }) => line.mark, csv: ({ line }) => line.mark },
    {
      key: 'cut',
      head: t('cuts.cut'),
      cell: ({ line }) =>
        line.note === '' ? describeCut(line.cut) : `${describeCut(line.cut)} ${line.note}`,
      csv: ({ line }) => describeCut(line.cut),
    },
    quantity('sawFt', 'ft'),
    quantity('inchFeet', 'in-ft'),
    quantity('coreInches', 'in'),
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
