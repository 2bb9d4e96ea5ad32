import { bladeReach, cornerChoices, CuttingInputError, type CornerChoice } from '@kerfyard/common/cutting';
import { Text } from '@radix-ui/themes';
import { useId, type ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import { FieldNotes } from '../../../../components/form/field-frame.tsx';
import formStyles from '../../../../components/form/form.module.css';
import { Figure } from '../../../../components/figure.tsx';
import { formatNumber } from '../../../../lib/format.ts';
import { kindOf, readCut, type DraftCut } from '../../cut-lines.ts';
import { CutInput } from './cut-input.tsx';
import styles from './cut-list.module.css';
import type { CutErrors } from './cut-row.tsx';
import type { CutListChange } from './use-cut-list.ts';

interface CutDetailsProps {
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
      {kind === 'opening' && <Corners {...props} />}
      {isPanel && <Removal {...props} />}
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

const sides = ['top', 'bottom', 'left', 'right'] as const;

function UncutSides({ line, errors, change }: CutDetailsProps) {
  const { t } = useTranslation('scopes');
  const id = useId();
  const uncut = Array.isArray(line.cut.uncutSides) ? line.cut.uncutSides : [];
  const toggle = (side: string) => {
    const next = uncut.includes(side) ? uncut.filter((one) => one !== side) : [...uncut, side];
    change({ type: 'figure', id: line.id, field: 'uncutSides', value: next });
  };
  return (
    <fieldset className={styles.choices}>
      <legend className={styles.label}>{t('cuts.fields.uncutSides')}</legend>
      <div className={styles.inline}>
        {sides.map((side) => (
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

function Corners({ line, index, change }: CutDetailsProps) {
  const { t } = useTranslation('scopes');
  const known = choicesOf(line);
  return (
    <fieldset className={styles.choices}>
      <legend className={styles.label}>{t('cuts.fields.corners')}</legend>
      <div className={styles.corners}>
        {(['overcut', 'cored', 'square'] as const).map((corners) => (
          <label key={corners} className={formStyles.card}>
            <input
              type="radio"
              name={`cuts.${index}.cut.corners`}
              checked={line.cut.corners === corners}
              onChange={() => change({ type: 'figure', id: line.id, field: 'corners', value: corners })}
            />
            <span>{t(`cuts.corners.${corners}.name`)}</span>
            <CornerCost
              choice={known?.choices.find((choice) => choice.corners === corners)}
              corners={corners}
            />
          </label>
        ))}
      </div>
      {known !== null && (
        <Text as="p" size="2" color="gray">
          {t('cuts.overcutIs')}{' '}
          <Figure
            label={t('cuts.overcut')}
            value={known.overcutIn}
            unit="in"
            size="small"
            digits={2}
            working={known.working}
          />
        </Text>
      )}
    </fieldset>
  );
}

function CornerCost({ choice, corners }: { choice: CornerChoice | undefined; corners: string }) {
  const { t } = useTranslation('scopes');
  if (choice === undefined)
    return <span className={formStyles.hint}>{t(`cuts.corners.${corners}.note`)}</span>;
  const feet = corners === 'overcut' ? choice.overcutFt : choice.squareFinishFt;
  return (
    <span className={formStyles.hint}>
      {corners === 'cored'
        ? t('cuts.corners.cored.comes', {
            count: choice.coreHoles,
            diameter: formatNumber(choice.coreDiameterIn, 1),
          })
        : t(`cuts.corners.${corners}.comes`, { feet: formatNumber(feet, 1) })}
    </span>
  );
}

/** The three ways side by side, once thickness and blade are there and the blade goes through. */
function choicesOf({ cut }: DraftCut): ReturnType<typeof cornerChoices> | null {
  const { thicknessIn, bladeDiameterIn, passThroughIn, uncutSides, count } = cut;
  if (typeof thicknessIn !== 'number' || typeof bladeDiameterIn !== 'number' || typeof count !== 'number') {
    return null;
  }
  try {
    return cornerChoices({
      thicknessIn,
      bladeDiameterIn,
      count,
      ...(typeof passThroughIn === 'number' ? { passThroughIn } : {}),
      ...(Array.isArray(uncutSides) ? { uncutSides: sides.filter((side) => uncutSides.includes(side)) } : {}),
    });
  } catch (error) {
    // The field beside it says what the engine does not take.
    if (error instanceof CuttingInputError) return null;
    throw error;
  }
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
