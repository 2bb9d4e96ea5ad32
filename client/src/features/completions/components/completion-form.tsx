import {
  submitCompletionSchema,
  type SubmitCompletion,
  type SubmitCompletionInput,
} from '@kerfyard/common/completions';
import type { FileView } from '@kerfyard/common/files';
import type { CutLine } from '@kerfyard/common/scopes';
import type { SovLineView, SubcontractView } from '@kerfyard/common/subcontracts';
import type { VisitView } from '@kerfyard/common/visits';
import { Button, Heading, Text } from '@radix-ui/themes';
import { useEffect, useState } from 'react';
import { useWatch, type Control } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { FileThumbs } from '../../../components/file-thumb.tsx';
import { FileUploader } from '../../../components/file-uploader.tsx';
import { CheckboxField, CheckboxGroupField } from '../../../components/form/choice-fields.tsx';
import { TextField } from '../../../components/form/fields.tsx';
import { Form } from '../../../components/form/form.tsx';
import { NumberField } from '../../../components/form/number-fields.tsx';
import { useAppForm } from '../../../lib/app-form.ts';
import { formatMoney } from '../../../lib/format.ts';
import { newId } from '../../../lib/ids.ts';
import { useSubmitCompletion } from '../api/completions.mutations.ts';
import styles from './completions.module.css';

/** What was cut, line by line: all as listed in one press, then the exceptions; photos first, words later. */
export function CompletionForm({ subcontract, visit }: { subcontract: SubcontractView; visit: VisitView }) {
  const { t } = useTranslation('completions');
  const submit = useSubmitCompletion(subcontract.id);
  const [photos, setPhotos] = useState<FileView[]>([]);
  const lines = openLines(subcontract, visit);
  const cuts = cutsOf(subcontract, lines);
  const form = useAppForm({
    schema: submitCompletionSchema,
    defaultValues: {
      id: newId(),
      visitId: visit.id,
      sovLineIds: lines.map((line) => line.id),
      asCut: cuts.map((cut) => ({ cutId: cut.id, asListed: false, note: '' })),
      photoIds: [],
      note: '',
    },
  });
  const chosen = useWatch({ control: form.control, name: 'sovLineIds' });
  const chosenCuts = new Set(lines.filter((line) => chosen.includes(line.id)).flatMap((line) => line.cutIds));
  // Several photos may arrive between two renders, so each is added to what is there then.
  useEffect(() => {
    form.setValue(
      'photoIds',
      photos.map((file) => file.id),
    );
  }, [form, photos]);
  const allAsListed = () =>
    cuts.forEach((_, index) => form.setValue(`asCut.${index}.asListed`, true, { shouldDirty: true }));
  return (
    <Form
      form={form}
      label={t('form.title')}
      onSubmit={(values) =>
        submit.mutateAsync({ ...values, asCut: values.asCut.filter((row) => chosenCuts.has(row.cutId)) })
      }
    >
      <FileUploader
        kind="photo"
        label={t('form.photos')}
        onUploaded={(file) => setPhotos((before) => [...before, file])}
      />
      <FileThumbs
        files={photos}
        onRemove={(file) => setPhotos((before) => before.filter((one) => one.id !== file.id))}
      />
      <CheckboxGroupField
        control={form.control}
        name="sovLineIds"
        label={t('form.lines')}
        options={lines.map((line) => ({
          value: line.id,
          label: line.description,
          note: formatMoney(line.amountCents),
        }))}
      />
      <div className={styles.head}>
        <Heading as="h4" size="3" weight="medium">
          {t('form.asCut')}
        </Heading>
        <Button type="button" size="3" variant="soft" onClick={allAsListed}>
          {t('form.allAsListed')}
        </Button>
      </div>
      {cuts.map((cut, index) =>
        chosenCuts.has(cut.id) ? (
          <AsCutRow key={cut.id} cut={cut} index={index} control={form.control} />
        ) : null,
      )}
      <TextField control={form.control} name="note" label={t('form.note')} optional lines={3} />
      <Text as="p" size="2" color="gray">
        {t('form.meaning')}
      </Text>
      <div>
        <Button type="submit" size="4" loading={form.formState.isSubmitting}>
          {t('form.send')}
        </Button>
      </div>
    </Form>
  );
}

type CompletionControl = Control<SubmitCompletionInput, unknown, SubmitCompletion>;

function AsCutRow({ cut, index, control }: { cut: CutLine; index: number; control: CompletionControl }) {
  const { t } = useTranslation('completions');
  const asListed = useWatch({ control: control, name: `asCut.${index}.asListed` });
  return (
    <fieldset className={styles.asCut}>
      <legend className={styles.legend}>{t('form.cut', { mark: cut.mark })}</legend>
      <CheckboxField control={control} name={`asCut.${index}.asListed`} label={t('form.asListed')} />
      {asListed !== true && (
        <div className={styles.exceptions}>
          <NumberField
            control={control}
            name={`asCut.${index}.count`}
            label={t('form.count')}
            unit="×"
            optional
          />
          <NumberField
            control={control}
            name={`asCut.${index}.lengthFt`}
            label={t('form.length')}
            unit="ft"
            optional
          />
          <NumberField
            control={control}
            name={`asCut.${index}.depthIn`}
            label={t('form.depth')}
            unit="in"
            optional
          />
          <TextField control={control} name={`asCut.${index}.note`} label={t('form.found')} optional />
        </div>
      )}
    </fieldset>
  );
}

/** Lines of this visit that are not in a standing completion yet. */
function openLines(subcontract: SubcontractView, visit: VisitView): SovLineView[] {
  return subcontract.sov.filter((line) => visit.sovLineIds.includes(line.id) && line.state === 'set_aside');
}

function cutsOf(subcontract: SubcontractView, lines: readonly SovLineView[]): CutLine[] {
  const ids = new Set(lines.flatMap((line) => line.cutIds));
  return subcontract.cuts.filter((cut) => ids.has(cut.id));
}
