import { commonFactorsPct, productionRates } from '@kerfyard/common/cutting';
import {
  emptyRateCard,
  priceFactors,
  rateCardSchema,
  type RateCard,
  type RateCardView,
} from '@kerfyard/common/people';
import { Button, Heading, Text } from '@radix-ui/themes';
import { useState, type ReactNode } from 'react';
import { useFieldArray } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { useAnnounce } from '../../../components/announcer.tsx';
import { CheckboxField } from '../../../components/form/choice-fields.tsx';
import { Form } from '../../../components/form/form.tsx';
import { MoneyField, NumberField, RateField } from '../../../components/form/number-fields.tsx';
import { isApiError } from '../../../lib/api-error.ts';
import { useAppForm } from '../../../lib/app-form.ts';
import { formatNumber } from '../../../lib/format.ts';
import { useSaveRateCard } from '../api/rate-card.queries.ts';
import {
  cardValues,
  productionTools,
  rateCardFormSchema,
  rateValues,
  type RateCardValues,
} from '../rate-card-form-values.ts';
import styles from './rate-card.module.css';
import { RateFile } from './rate-file.tsx';
import { RateRows, type RateCardControl } from './rate-rows.tsx';

/** The whole card: rates by band, factors, minimum, own costs, own production. Saved as one, or not at all. */
export function RateCardForm({ view, canEdit }: { view: RateCardView; canEdit: boolean }) {
  const { t } = useTranslation('rate-card');
  const announce = useAnnounce();
  const save = useSaveRateCard();
  const [saved, setSaved] = useState(false);
  const form = useAppForm<RateCardValues, RateCard>({
    schema: rateCardFormSchema,
    defaultValues: cardValues(view.card ?? emptyRateCard()),
  });
  const { control } = form;
  const send = async (card: RateCard) => {
    setSaved(false);
    try {
      await save.mutateAsync({ version: view.version, card });
    } catch (error) {
      throw withFormPaths(error);
    }
    form.reset(cardValues(card));
    setSaved(true);
    announce(t('saved'));
  };
  const rows = () => {
    const { rates } = form.getValues();
    const parsed = rateCardSchema.shape.rates.safeParse(
      rates.map((row) => ({ ...row, kind: row.kind === '' ? null : row.kind })),
    );
    return parsed.success ? parsed.data : null;
  };
  return (
    <Form form={form} onSubmit={send} label={t('title')}>
      <fieldset className={styles.sections} disabled={!canEdit}>
        <Section title={t('rates.title')} text={t('rates.text')}>
          <RateRows control={control} canEdit={canEdit} />
          <RateFile
            rows={rows}
            canEdit={canEdit}
            onRead={(read) => form.setValue('rates', read.map(rateValues), { shouldDirty: true })}
          />
        </Section>
        <TripFields control={control} />
        <FactorFields control={control} />
        <CostFields control={control} />
        <ProductionFields control={control} canEdit={canEdit} />
      </fieldset>
      {canEdit && (
        <div className={styles.row}>
          <Button type="submit" size="3" loading={form.formState.isSubmitting}>
            {t('save')}
          </Button>
          {saved && !form.formState.isDirty && (
            <Text size="2" color="gray">
              {t('saved')}
            </Text>
          )}
        </div>
      )}
    </Form>
  );
}

function Section({ title, text, children }: { title: string; text: string; children: ReactNode }) {
  return (
    <section className={`k-panel ${styles.section}`}>
      <div>
        <Heading as="h2" size="4" weight="medium">
          {title}
        </Heading>
        <Text as="p" size="2" color="gray">
          {text}
        </Text>
      </div>
      {children}
    </section>
  );
}

function TripFields({ control }: { control: RateCardControl }) {
  const { t } = useTranslation('rate-card');
  return (
    <Section title={t('trip.title')} text={t('trip.text')}>
      <div className={styles.fields}>
        <MoneyField control={control} name="minimumCents" label={t('trip.minimum')} />
        <MoneyField control={control} name="mobilizationCents" label={t('trip.mobilization')} />
        <MoneyField control={control} name="standbyHourCents" label={t('trip.standby')} optional />
      </div>
      <CheckboxField control={control} name="minimumIncludesMobilization" label={t('trip.included')} />
    </Section>
  );
}

function FactorFields({ control }: { control: RateCardControl }) {
  const { t } = useTranslation('rate-card');
  return (
    <Section title={t('factors.title')} text={t('factors.text')}>
      <div className={styles.fields}>
        {priceFactors.map((factor) => (
          <NumberField
            key={factor}
            control={control}
            name={`factors.${factor}`}
            label={t(`factors.${factor}`)}
            hint={t('factors.common', { factor: formatNumber(commonFactorsPct.rows[factor] / 100, 2) })}
            scale={100}
            unit="×"
            optional
          />
        ))}
      </div>
    </Section>
  );
}

function CostFields({ control }: { control: RateCardControl }) {
  const { t } = useTranslation('rate-card');
  return (
    <Section title={t('costs.title')} text={t('costs.text')}>
      <div className={styles.fields}>
        <MoneyField control={control} name="costs.crewHourCents" label={t('costs.crewHour')} optional />
        <RateField control={control} name="costs.bladeRate" label={t('costs.blade')} optional />
        <RateField control={control} name="costs.bitRate" label={t('costs.bit')} optional />
      </div>
    </Section>
  );
}

function ProductionFields({ control, canEdit }: { control: RateCardControl; canEdit: boolean }) {
  const { t } = useTranslation('rate-card');
  const feeds = useFieldArray({ control, name: 'production.coreFeeds' });
  return (
    <Section title={t('production.title')} text={t('production.text')}>
      <div className={styles.fields}>
        {productionTools.map((tool) => {
          const { unit, lowPerHour, highPerHour } = productionRates.rows[tool];
          return (
            <NumberField
              key={tool}
              control={control}
              name={`production.perHour.${tool}`}
              label={t(`tools.${tool}`)}
              hint={t('production.common', { low: lowPerHour, high: highPerHour })}
              unit={`${unit}/h`}
              optional
            />
          );
        })}
        <NumberField
          control={control}
          name="production.coreSetUpMinutes"
          label={t('production.coreSetUp')}
          hint={t('production.common', { low: 5, high: 15 })}
          unit="min"
          optional
        />
      </div>
      {feeds.fields.map((field, index) => (
        <div key={field.id} className={styles.rate}>
          <NumberField
            control={control}
            name={`production.coreFeeds.${index}.upToIn`}
            label={t('production.feedUpTo')}
            unit="in"
            optional
          />
          <NumberField
            control={control}
            name={`production.coreFeeds.${index}.inchesPerMinute`}
            label={t('production.feed')}
            unit="in/min"
          />
          {canEdit && (
            <Button
              type="button"
              className={styles.remove}
              variant="soft"
              color="gray"
              size="3"
              onClick={() => feeds.remove(index)}
            >
              {t('production.removeFeed')}
            </Button>
          )}
        </div>
      ))}
      {canEdit && feeds.fields.length < 20 && (
        <div className={styles.row}>
          <Button
            type="button"
            variant="soft"
            size="2"
            onClick={() => feeds.append({ upToIn: null, inchesPerMinute: null })}
          >
            {t('production.addFeed')}
          </Button>
        </div>
      )}
    </Section>
  );
}

/** The server names fields of `card`; the form has the card's own names. */
function withFormPaths(error: unknown): unknown {
  if (isApiError(error, 'invalid_input')) {
    for (const issue of error.fields) Object.assign(issue, { path: issue.path.replace(/^card\./, '') });
  }
  return error;
}
