import type { SubcontractView } from '@kerfyard/common/subcontracts';
import { proposeVisitSchema } from '@kerfyard/common/visits';
import { Button, Text } from '@radix-ui/themes';
import { useQuery } from '@tanstack/react-query';
import { useFieldArray } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { CheckboxGroupField } from '../../../components/form/choice-fields.tsx';
import { DateTimeField } from '../../../components/form/date-time-field.tsx';
import { SelectField, TextField } from '../../../components/form/fields.tsx';
import { Form } from '../../../components/form/form.tsx';
import { TextLink } from '../../../components/link.tsx';
import { useAppForm } from '../../../lib/app-form.ts';
import { now } from '../../../lib/clock.ts';
import { formatMoney, fromLocalInput } from '../../../lib/format.ts';
import { newId } from '../../../lib/ids.ts';
import { paths } from '../../../lib/paths.ts';
import { addDays, dateIn } from '../../../lib/week.ts';
import { companyQuery } from '../../company/api/company.queries.ts';
import { useProposeVisit } from '../api/visits.queries.ts';
import styles from './visits.module.css';

const MAX_WINDOWS = 5;

/** The crew offers windows for a visit; the general contractor takes one. */
export function ProposeVisit({ subcontract, onDone }: { subcontract: SubcontractView; onDone: () => void }) {
  const { t } = useTranslation('visits');
  const company = useQuery(companyQuery);
  if (company.data === undefined) return null;
  const { crews, trucks } = company.data;
  if (crews.length === 0 || trucks.length === 0) {
    return (
      <Text as="p">
        {t('propose.needUnits')} <TextLink to={paths.company}>{t('propose.toCompany')}</TextLink>
      </Text>
    );
  }
  return <ProposeForm subcontract={subcontract} crews={crews} trucks={trucks} onDone={onDone} />;
}

interface Unit {
  id: string;
  name: string;
}

function ProposeForm(props: {
  subcontract: SubcontractView;
  crews: Unit[];
  trucks: Unit[];
  onDone: () => void;
}) {
  const { subcontract, crews, trucks, onDone } = props;
  const { t } = useTranslation('visits');
  const zone = subcontract.site.timeZone;
  const propose = useProposeVisit();
  const planned = new Set(
    subcontract.visits.filter((visit) => visit.status !== 'cancelled').flatMap((visit) => visit.sovLineIds),
  );
  const open = subcontract.sov.filter((line) => !planned.has(line.id));
  const lines = open.length > 0 ? open : subcontract.sov.filter((line) => line.state !== 'released');
  const form = useAppForm({
    schema: proposeVisitSchema,
    defaultValues: {
      id: newId(),
      subcontractId: subcontract.id,
      crewId: crews[0]?.id ?? '',
      truckId: trucks[0]?.id ?? '',
      sovLineIds: lines.map((line) => line.id),
      windows: [windowOn(1, zone)],
      note: '',
    },
  });
  const windows = useFieldArray({ control: form.control, name: 'windows' });
  return (
    <Form
      form={form}
      label={t('propose.title')}
      onSubmit={async (values) => {
        await propose.mutateAsync(values);
        onDone();
      }}
    >
      <div className={styles.window}>
        <SelectField
          control={form.control}
          name="crewId"
          label={t('propose.crew')}
          options={options(crews)}
        />
        <SelectField
          control={form.control}
          name="truckId"
          label={t('propose.truck')}
          options={options(trucks)}
        />
      </div>
      <CheckboxGroupField
        control={form.control}
        name="sovLineIds"
        label={t('propose.lines')}
        options={lines.map((line) => ({
          value: line.id,
          label: line.description,
          note: formatMoney(line.amountCents),
        }))}
      />
      <fieldset className={styles.windows}>
        <Text size="2" weight="medium" mb="2" asChild>
          <legend>{t('propose.windows')}</legend>
        </Text>
        {windows.fields.map((field, index) => (
          <div key={field.id} className={styles.window}>
            <DateTimeField
              control={form.control}
              name={`windows.${index}.startsAt`}
              label={t('propose.from', { n: index + 1 })}
              timeZone={zone}
            />
            <DateTimeField
              control={form.control}
              name={`windows.${index}.endsAt`}
              label={t('propose.to', { n: index + 1 })}
              timeZone={zone}
            />
            {windows.fields.length > 1 && (
              <Button type="button" variant="soft" color="gray" onClick={() => windows.remove(index)}>
                {t('propose.drop', { n: index + 1 })}
              </Button>
            )}
          </div>
        ))}
        {windows.fields.length < MAX_WINDOWS && (
          <div>
            <Button
              type="button"
              variant="soft"
              onClick={() => windows.append(windowOn(windows.fields.length + 1, zone))}
            >
              {t('propose.another')}
            </Button>
          </div>
        )}
      </fieldset>
      <TextField control={form.control} name="note" label={t('propose.note')} optional lines={2} />
      <div className={styles.row}>
        <Button type="submit" size="3" loading={form.formState.isSubmitting}>
          {t('propose.send')}
        </Button>
        <Button type="button" size="3" variant="soft" color="gray" onClick={onDone}>
          {t('propose.leave')}
        </Button>
      </div>
    </Form>
  );
}

function options(units: readonly Unit[]) {
  return units.map((unit) => ({ value: unit.id, label: unit.name }));
}

/** A working day's window some days ahead, 7:00 to 15:30 in the site's zone: common practice, no source. */
function windowOn(daysAhead: number, zone: string) {
  const date = addDays(dateIn(now(), zone), daysAhead);
  return {
    startsAt: fromLocalInput(`${date}T07:00`, zone) ?? '',
    endsAt: fromLocalInput(`${date}T15:30`, zone) ?? '',
  };
}
