import { takeoffCutList, type CutTakeoff, type WorkingStep } from '@kerfyard/common/cutting';
import type { CutLine, ScopeTotals as Totals } from '@kerfyard/common/scopes';
import { useMemo } from 'react';
import { useTranslation } from 'react-i18next';
import { Figure } from '../../../components/figure.tsx';
import styles from './scope-body.module.css';

const figures = [
  { key: 'inchFeet', unit: 'in-ft' },
  { key: 'sawFt', unit: 'ft' },
  { key: 'overcutFt', unit: 'ft' },
  { key: 'crossCutFt', unit: 'ft' },
  { key: 'sawSqFt', unit: 'sq ft' },
  { key: 'coreHoles', unit: '' },
  { key: 'coreInches', unit: 'in' },
  { key: 'pieces', unit: '' },
  { key: 'pieceCuts', unit: '' },
  { key: 'removedLb', unit: 'lb' },
] as const satisfies readonly { key: keyof Totals; unit: string }[];

/** Lines shown one by one in a sum's working; the rest are one number. */
const SHOWN_LINES = 30;

/** A cut list's sums, those that are not zero; each opens to what every cut adds to it. */
export function ScopeTotals(props: {
  totals: Totals;
  cuts: readonly CutLine[];
  /** Of the cuts in their order, where they are known already. */
  takeoffs?: readonly CutTakeoff[];
}) {
  const { totals, cuts, takeoffs: known } = props;
  const { t } = useTranslation('scope');
  // Square feet are what a wire cut is sold by; elsewhere they say the same as inch-feet.
  const hasWire = cuts.some(({ cut }) => cut.kind === 'wire');
  const takeoffs = useMemo(
    () => known ?? takeoffCutList({ cuts: cuts.map((line) => line.cut) }).cuts,
    [known, cuts],
  );
  return (
    <dl className={styles.totals}>
      {figures
        .filter(({ key }) => totals[key] > 0 && (key !== 'sawSqFt' || hasWire))
        .map(({ key, unit }) => (
          <div key={key}>
            <dt>{t(`totals.${key}`)}</dt>
            <dd>
              <Figure
                label={t(`totals.${key}`)}
                value={totals[key]}
                digits={unit === 'lb' ? 0 : 1}
                unit={unit}
                size="large"
                working={sumOf(t(`totals.${key}`), unit, totals[key], partsOf(key, cuts, takeoffs))}
              />
            </dd>
          </div>
        ))}
    </dl>
  );
}

interface Part {
  name: string;
  value: number;
}

function partsOf(key: keyof Totals, cuts: readonly CutLine[], takeoffs: readonly CutTakeoff[]): Part[] {
  return takeoffs.flatMap((takeoff, index) => {
    const mark = cuts[index]?.mark ?? '';
    const value = key === 'pieces' ? (takeoff.pieces?.count ?? 0) * takeoff.count : takeoff[key];
    return value > 0 ? [{ name: mark, value }] : [];
  });
}

function sumOf(label: string, unit: string, value: number, parts: readonly Part[]): WorkingStep[] {
  const shown = parts.slice(0, SHOWN_LINES);
  const rest = parts.slice(SHOWN_LINES).reduce((sum, part) => sum + part.value, 0);
  const inputs = rest > 0 ? [...shown, { name: '…', value: rest }] : shown;
  return [
    {
      label,
      formula: inputs.length === 1 ? (inputs[0]?.name ?? '') : inputs.map((part) => part.name).join(' + '),
      inputs: inputs.map((part) => ({ ...part, unit })),
      value,
      unit,
      source: { origin: 'arithmetic' },
    },
  ];
}
