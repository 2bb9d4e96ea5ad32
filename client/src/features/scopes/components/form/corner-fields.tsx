import {
  cornerChoices,
  cornerTreatments,
  CuttingInputError,
  type CornerChoice,
  type CornerChoices,
} from '@kerfyard/common/cutting';
import { Text } from '@radix-ui/themes';
import { lazy, Suspense } from 'react';
import { useTranslation } from 'react-i18next';
import formStyles from '../../../../components/form/form.module.css';
import { Figure } from '../../../../components/figure.tsx';
import { formatNumber } from '../../../../lib/format.ts';
import { loadWords } from '../../../../lib/i18n.ts';
import { uncutSidesOf, type DraftCut } from '../../cut-lines.ts';
import type { CutDetailsProps } from './cut-details.tsx';
import styles from './cut-list.module.css';

const OvercutPicture = lazy(async () => {
  const [picture] = await Promise.all([
    import('../../../calculators/components/overcut-picture.tsx'),
    loadWords(['calculators', 'drawings']),
  ]);
  return { default: picture.OvercutPicture };
});

/** The three ways to treat the corners, what each adds, and why a blade runs past them. */
export function CornerFields({ line, index, change }: Pick<CutDetailsProps, 'line' | 'index' | 'change'>) {
  const { t } = useTranslation('scopes');
  const known = choicesOf(line);
  return (
    <fieldset className={styles.choices}>
      <legend className={styles.label}>{t('cuts.fields.corners')}</legend>
      <div className={styles.corners}>
        {cornerTreatments.map((corners) => (
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
      {known !== null && <Overcut line={line} known={known} />}
    </fieldset>
  );
}

function CornerCost({ choice, corners }: { choice: CornerChoice | undefined; corners: string }) {
  const { t } = useTranslation('scopes');
  if (choice === undefined)
    return <span className={formStyles.hint}>{t(`cuts.corners.${corners}.note`)}</span>;
  const feet = corners === 'overcut' ? choice.overcutFt : choice.squareFinishFt;
  if (corners !== 'cored') {
    return (
      <span className={formStyles.hint}>
        {t(`cuts.corners.${corners}.comes`, { feet: formatNumber(feet, 1) })}
      </span>
    );
  }
  return (
    <span className={formStyles.hint}>
      <span>
        {t('cuts.corners.cored.comes', {
          count: choice.coreHoles,
          diameter: formatNumber(choice.coreDiameterIn, 1),
        })}
      </span>
      , <span>{t('cuts.corners.cored.inches', { inches: formatNumber(choice.coreInches, 1) })}</span>
    </span>
  );
}

/** The run past a corner with its working, drawn from the side. */
function Overcut({ line, known }: { line: DraftCut; known: CornerChoices }) {
  const { t } = useTranslation('scopes');
  const { thicknessIn, bladeDiameterIn, passThroughIn } = line.cut;
  const feet = known.choices.find(({ corners }) => corners === 'overcut')?.overcutFt ?? 0;
  return (
    <div className={styles.overcut}>
      <Text as="p" size="2" color="gray">
        {t('cuts.overcutIs')}{' '}
        <Figure
          label={t('cuts.overcut')}
          value={known.overcutIn}
          unit="in"
          size="small"
          digits={2}
          working={known.working.slice(0, 1)}
        />{' '}
        {t('cuts.overcutInAll')}{' '}
        <Figure label={t('cuts.overcutAll')} value={feet} unit="ft" size="small" working={known.working} />
      </Text>
      <Suspense fallback={null}>
        <OvercutPicture
          thicknessIn={Number(thicknessIn)}
          bladeDiameterIn={Number(bladeDiameterIn)}
          passThroughIn={Number(passThroughIn ?? 0)}
        />
      </Suspense>
    </div>
  );
}

/** The three ways side by side, once thickness and blade are there and the blade goes through. */
function choicesOf(line: DraftCut): CornerChoices | null {
  const { thicknessIn, bladeDiameterIn, passThroughIn, count } = line.cut;
  if (typeof thicknessIn !== 'number' || typeof bladeDiameterIn !== 'number' || typeof count !== 'number') {
    return null;
  }
  try {
    return cornerChoices({
      thicknessIn,
      bladeDiameterIn,
      count,
      ...(typeof passThroughIn === 'number' ? { passThroughIn } : {}),
      uncutSides: uncutSidesOf(line),
    });
  } catch (error) {
    // The field beside it says what the engine does not take.
    if (error instanceof CuttingInputError) return null;
    throw error;
  }
}
