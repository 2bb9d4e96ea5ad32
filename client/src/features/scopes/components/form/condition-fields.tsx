import { conditionsSchema, type CutLine } from '@kerfyard/common/scopes';
import { memo, useMemo } from 'react';
import { useFormContext, useWatch } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { SelectField, TextField } from '../../../../components/form/fields.tsx';
import type { ScopeFormValues } from '../../scope-form-values.ts';
import { readCut, type DraftCut } from '../../cut-lines.ts';
import { ScopeCautions } from '../scope-cautions.tsx';
import styles from './scope-form.module.css';
import { YesNoField } from './yes-no-field.tsx';

const choices = {
  element: { options: conditionsSchema.shape.element.options, words: 'elements' },
  face: { options: conditionsSchema.shape.face.options, words: 'faces' },
  steel: { options: conditionsSchema.shape.steel.options, words: 'steel' },
  postTension: { options: conditionsSchema.shape.postTension.options, words: 'postTension' },
  below: { options: conditionsSchema.shape.below.options, words: 'below' },
} as const;

/** What is cut and where, and what may hurt there. */
export const ConditionFields = memo(function ConditionFields({ lines }: { lines: readonly DraftCut[] }) {
  const { t } = useTranslation(['scopes', 'scope']);
  const { control } = useFormContext<ScopeFormValues>();
  const conditions = useWatch({ control, name: 'conditions' });
  const whole = useMemo(() => wholeLines(lines), [lines]);
  const select = (name: keyof typeof choices, hint?: string) => (
    <SelectField
      control={control}
      name={`conditions.${name}`}
      label={t(`scope:conditions.${name}`)}
      placeholder={t('choose')}
      {...(hint === undefined ? {} : { hint })}
      options={choices[name].options.map((value) => ({
        value,
        label: t(`scope:${choices[name].words}.${value}`),
      }))}
    />
  );
  return (
    <>
      <div className={styles.triple}>
        {select('element')}
        {select('face')}
        {select('below', conditions.below === 'unknown' ? t('conditions.belowUnknown') : undefined)}
        {select('steel')}
        {select(
          'postTension',
          conditions.postTension === 'proved_none' ? undefined : t('conditions.postTensionHint'),
        )}
        <TextField
          control={control}
          name="conditions.floor"
          label={t('scope:conditions.floor')}
          optional
          maxLength={60}
        />
      </div>
      <Permissions lines={whole} />
      <div className={styles.pair}>
        <TextField
          control={control}
          name="conditions.workHours"
          label={t('scope:conditions.workHours')}
          optional
          maxLength={120}
        />
        <TextField
          control={control}
          name="conditions.access"
          label={t('scope:conditions.access')}
          hint={t('conditions.accessHint')}
          optional
          maxLength={500}
        />
      </div>
      {whole.length > 0 && (
        <ScopeCautions
          cuts={whole}
          conditions={{
            face: choices.face.options.find((face) => face === conditions.face),
            below: choices.below.options.find((below) => below === conditions.below) ?? 'unknown',
            postTension: choices.postTension.options.find((one) => one === conditions.postTension),
            indoors: conditions.indoors === true,
          }}
        />
      )}
    </>
  );
});

/** What is allowed there; each warns where it does not fit the rest. */
function Permissions({ lines }: { lines: readonly CutLine[] }) {
  const { t } = useTranslation(['scopes', 'scope']);
  const { control, getValues, setValue } = useFormContext<ScopeFormValues>();
  const conditions = useWatch({ control, name: 'conditions' });
  const overcut = lines
    .filter(({ cut }) => cut.kind === 'opening' && cut.corners === 'overcut')
    .map((line) => line.mark);
  // Engines stay outside unless someone says otherwise.
  const chooseIndoors = (indoors: boolean) => {
    if (getValues('conditions.enginesAllowed') === null) setValue('conditions.enginesAllowed', !indoors);
  };
  return (
    <div className={styles.triple}>
      <YesNoField
        control={control}
        name="conditions.indoors"
        label={t('scope:conditions.indoors')}
        hint={t('conditions.indoorsHint')}
        onChoose={chooseIndoors}
      />
      <YesNoField
        control={control}
        name="conditions.enginesAllowed"
        label={t('scope:conditions.enginesAllowed')}
        hint={
          conditions.indoors === true && conditions.enginesAllowed === true
            ? t('conditions.enginesIndoors')
            : undefined
        }
      />
      <YesNoField
        control={control}
        name="conditions.overcutsAllowed"
        label={t('scope:conditions.overcutsAllowed')}
        hint={
          conditions.overcutsAllowed === false && overcut.length > 0
            ? t('conditions.overcutsClash', { marks: overcut.join(', ') })
            : undefined
        }
      />
    </div>
  );
}

function wholeLines(lines: readonly DraftCut[]): CutLine[] {
  return lines.flatMap((line) => {
    const reading = readCut(line);
    return reading.state === 'whole' ? [reading.line] : [];
  });
}
