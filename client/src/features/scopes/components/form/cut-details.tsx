import { bladeReach, openingSides, type OpeningSide } from '@kerfyard/common/cutting';
import { Text } from '@radix-ui/themes';
import { useId, type ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import { FieldNotes } from '../../../../components/form/field-frame.tsx';
import formStyles from '../../../../components/form/form.module.css';
import { Figure } from '../../../../components/figure.tsx';
import { formatNumber } from '../../../../lib/format.ts';
import { kindOf, readCut, uncutSidesOf, type DraftCut } from '../../cut-lines.ts';
import { CornerFields } from './corner-fields.tsx';
import { CutInput } from './cut-input.tsx';
import styles from './cut-list.module.css';
import type { CutErrors } from './cut-row.tsx';
import { JointFields } from './joint-fields.tsx';
import type { CutListChange } from './use-cut-list.ts';

export interface CutDetailsProps {
  line: DraftCut;
  index: number;
  errors: CutErrors;
  change: (change: CutListChange) => void;
  onFigure: (field: string, value: number | string | null) => void;
}

/** What a cut may say beyond its size: sides, corners, blade, how the piece comes out, a note. */
export function CutDetails(props: CutDetailsProps) {
  const kind = kindOf(props.line);
  const isPanel = kind === 'opening' || kind === 'trench';
  return (
    <div className={styles.details}>
      {kind === 'trench' && <TrenchSides {...props} />}
      {kind === 'opening' && <UncutSides {...props} />}
      {isPanel && <Blade {...props} />}
      {kind === 'opening' && <CornerFields line={props.line} index={props.index} change={props.change} />}
      {isPanel && <Removal {...props} />}
      {kind === 'joints' && <JointFields {...props} />}
      {kind === 'stitch' && <ClosedLoop {...props} />}
      <Note {...props} />
    </div>
  );
}

function TrenchSides({ line, change }: CutDetailsProps) {
  const { t } = useTranslation('scopes');
  const select = (field: 'sideCuts' | 'endCuts', counts: readonly number[]) => (
    <label className={styles.field}>
      <span className={styles.label}>{t(`cuts.fields.${field}`)}</span>
      <select
        className={formStyles.control}
        value={String(line.cut[field] ?? 2)}
        onChange={(event) =>
          change({ type: 'figure', id: line.id, field, value: Number(event.target.value) })
        }
      >
        {counts.map((count) => (
          <option key={count} value={count}>
            {t(`cuts.${field}`, { count })}
          </option>
        ))}
      </select>
    </label>
  );
  return (
    <div className={styles.detailLine}>
      {select('sideCuts', [2, 1])}
      {select('endCuts', [2, 1, 0])}
    </div>
  );
}

function UncutSides({ line, errors, change }: CutDetailsProps) {
  const { t } = useTranslation('scopes');
  const id = useId();
  const uncut = uncutSidesOf(line);
  const toggle = (side: OpeningSide) => {
    const next = uncut.includes(side) ? uncut.filter((one) => one !== side) : [...uncut, side];
    change({ type: 'figure', id: line.id, field: 'uncutSides', value: next });
  };
  return (
    <fieldset className={styles.choices}>
      <legend className={styles.label}>{t('cuts.fields.uncutSides')}</legend>
      <div className={styles.inline}>
        {openingSides.map((side) => (
          <label key={side} className={styles.tick}>
            <input type="checkbox" checked={uncut.includes(side)} onChange={() => toggle(side)} />
            {t(`cuts.sides.${side}`)}
          </label>
        ))}
      </div>
      <FieldNotes id={id} hint={t('cuts.uncutHint')} error={errors.uncutSides} />
    </fieldset>
  );
}

function Blade({ line, index, errors, onFigure }: CutDetailsProps) {
  const { t } = useTranslation('scopes');
  const reaching = bladeReaching(line.cut.thicknessIn);
  return (
    <div className={styles.detailLine}>
      <CutInput
        name={`cuts.${index}.cut.bladeDiameterIn`}
        column="bladeDiameterIn"
        label={t('cuts.fields.bladeDiameterIn')}
        unit="in"
        value={line.cut.bladeDiameterIn}
        error={errors.bladeDiameterIn}
        optional
        hint={
          reaching === null
            ? t('cuts.bladeHint')
            : t('cuts.bladeReaches', { blade: reaching.diameterIn, reach: formatNumber(reaching.reachIn, 3) })
        }
        onChange={onFigure}
      />
      <CutInput
        name={`cuts.${index}.cut.passThroughIn`}
        column="passThroughIn"
        label={t('cuts.fields.passThroughIn')}
        unit="in"
        value={line.cut.passThroughIn}
        error={errors.passThroughIn}
        optional
        hint={t('cuts.passThroughHint')}
        onChange={onFigure}
      />
    </div>
  );
}

/** The smallest wall-saw blade that goes through, by the engine's table of common practice. */
function bladeReaching(thickness: unknown): { diameterIn: number; reachIn: number } | null {
  if (typeof thickness !== 'number') return null;
  return bladeReach.rows.wall.find((row) => row.reachIn >= thickness) ?? null;
}

const removalFields = [
  { name: 'maxPieceLb', unit: 'lb' },
  { name: 'maxSideFt', unit: 'ft' },
  { name: 'allowancePct', unit: '%' },
  { name: 'densityPcf', unit: 'pcf' },
] as const;

function Removal({ line, index, errors, change, onFigure }: CutDetailsProps) {
  const { t } = useTranslation('scopes');
  const removal =
    typeof line.cut.removal === 'object' && !Array.isArray(line.cut.removal) ? line.cut.removal : null;
  return (
    <div className={styles.choices}>
      <label className={styles.tick}>
        <input
          type="checkbox"
          checked={removal !== null}
          onChange={(event) => change({ type: 'removal', id: line.id, isWanted: event.target.checked })}
        />
        {t('cuts.removal')}
      </label>
      {removal !== null && (
        <>
          <div className={styles.detailLine}>
            {removalFields.map(({ name, unit }) => (
              <CutInput
                key={name}
                name={`cuts.${index}.cut.removal.${name}`}
                column={`removal.${name}`}
                label={t(`cuts.fields.${name}`)}
                unit={unit}
                value={removal[name]}
                error={errors[`removal.${name}`]}
                optional={name !== 'maxPieceLb'}
                onChange={onFigure}
              />
            ))}
          </div>
          <Pieces line={line} />
        </>
      )}
    </div>
  );
}

/** How many pieces, how large, how heavy: found by the engine's search. */
function Pieces({ line }: { line: DraftCut }): ReactNode {
  const { t } = useTranslation('scopes');
  const reading = readCut(line);
  const pieces = reading.state === 'whole' ? reading.takeoff.pieces : null;
  if (pieces === null || reading.state !== 'whole') return null;
  return (
    <Text as="p" size="2">
      {t('cuts.pieces', {
        count: pieces.count,
        length: formatNumber(pieces.lengthFt, 2),
        width: formatNumber(pieces.widthFt, 2),
      })}{' '}
      <Figure
        label={t('cuts.pieceWeight')}
        value={pieces.weightLb}
        unit="lb"
        size="small"
        digits={0}
        working={reading.takeoff.working}
      />
      <span className={styles.caution}>{t('cuts.pieceCaution')}</span>
    </Text>
  );
}

function ClosedLoop({ line, change }: CutDetailsProps) {
  const { t } = useTranslation('scopes');
  return (
    <label className={styles.tick}>
      <input
        type="checkbox"
        checked={line.cut.closed === true}
        onChange={(event) =>
          change({ type: 'figure', id: line.id, field: 'closed', value: event.target.checked })
        }
      />
      {t('cuts.closed')}
    </label>
  );
}

function Note({ line, index, errors, change }: CutDetailsProps) {
  const { t } = useTranslation('scopes');
  const id = useId();
  return (
    <div className={styles.field}>
      <label htmlFor={id} className={styles.label}>
        {t('cuts.fields.note')} <span className={formStyles.optional}>{t('shell:form.optional')}</span>
      </label>
      <input
        id={id}
        name={`cuts.${index}.note`}
        className={formStyles.control}
        maxLength={300}
        value={line.note}
        onChange={(event) => change({ type: 'note', id: line.id, note: event.target.value })}
      />
      <FieldNotes id={id} hint={undefined} error={errors.note} />
    </div>
  );
}
