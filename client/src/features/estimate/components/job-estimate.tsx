import type { PricedBid } from '@kerfyard/common/bids';
import { CuttingInputError } from '@kerfyard/common/cutting';
import { estimateJob, type JobEstimate as Estimated } from '@kerfyard/common/estimates';
import type { Method, RateCard } from '@kerfyard/common/people';
import type { ScopeBody } from '@kerfyard/common/scopes';
import { Heading, Text } from '@radix-ui/themes';
import { useQuery } from '@tanstack/react-query';
import { useEffect, useMemo } from 'react';
import { useForm, useWatch, type Control } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { NumberField } from '../../../components/form/number-fields.tsx';
import { keepTail } from '../../../lib/draft-tail.ts';
import { rateCardQuery } from '../../rate-card/api/rate-card.queries.ts';
import {
  hourFields,
  machineFields,
  startEstimate,
  tailOf,
  toEstimate,
  type EstimateValues,
} from '../estimate-values.ts';
import { EstimateFigures } from './estimate-figures.tsx';
import styles from './estimate.module.css';

interface JobEstimateProps {
  scopeId: string;
  body: ScopeBody;
  /** How each cut is done. */
  methods: ReadonlyMap<string, Method>;
  priced: PricedBid | null;
  distanceMi: number | null;
}

/** What the job takes the crew and what is left of the price; for its own eyes, nothing of it is sent. */
export function JobEstimate({ scopeId, body, methods, priced, distanceMi }: JobEstimateProps) {
  const { t } = useTranslation('estimate');
  const card = useQuery(rateCardQuery).data?.card ?? null;
  const { control } = useForm<EstimateValues>({ defaultValues: startEstimate(scopeId, distanceMi) });
  const values = useWatch({ control }) as EstimateValues;
  useEffect(() => keepTail(tailOf(scopeId), values), [scopeId, values]);
  const reading = useMemo(() => readEstimate({ body, methods, card, values }), [body, methods, card, values]);
  return (
    <section className={styles.panel} aria-labelledby="estimate">
      <div>
        <Heading as="h3" size="3" weight="medium" id="estimate">
          {t('title')}
        </Heading>
        <Text as="p" size="2" color="gray">
          {t(card === null ? 'leadWithoutCard' : 'lead')}
        </Text>
      </div>
      {reading.ok ? (
        <>
          <EstimateFigures
            estimate={reading.estimate}
            responsibilities={body.responsibilities}
            priced={priced}
          />
          <NotCounted estimate={reading.estimate} />
        </>
      ) : (
        <Text as="p" role="alert" color="red" size="2">
          {t('wrong', {
            field: t(`fields.${reading.field}`, { defaultValue: t('fields.cuts') }),
            allowed: reading.allowed,
          })}
        </Text>
      )}
      <EstimateInputs control={control} />
    </section>
  );
}

type Reading = { ok: true; estimate: Estimated } | { ok: false; field: string; allowed: string };

function readEstimate(input: {
  body: ScopeBody;
  methods: ReadonlyMap<string, Method>;
  card: RateCard | null;
  values: EstimateValues;
}): Reading {
  const { body, methods, card, values } = input;
  try {
    const { cuts, conditions: place } = body;
    return { ok: true, estimate: estimateJob({ cuts, place, methods, card, ...toEstimate(values) }) };
  } catch (error) {
    if (!(error instanceof CuttingInputError)) throw error;
    return { ok: false, field: error.field, allowed: error.allowed };
  }
}

function NotCounted({ estimate: { notCounted } }: { estimate: Estimated }) {
  const { t } = useTranslation('estimate');
  if (notCounted.length === 0) return null;
  return (
    <div>
      <Text as="p" size="2" weight="medium">
        {t('notCounted')}
      </Text>
      <ul className={styles.list}>
        {notCounted.map(({ mark, reason }) => (
          <li key={`${mark} ${reason}`}>
            <Text size="2">{t(`reasons.${reason}`, { mark })}</Text>
          </li>
        ))}
      </ul>
    </div>
  );
}

function EstimateInputs({ control }: { control: Control<EstimateValues> }) {
  const { t } = useTranslation('estimate');
  return (
    <details className={styles.more}>
      <summary>{t('inputs')}</summary>
      <Text as="p" size="2" color="gray">
        {t('inputsText')}
      </Text>
      <div className={styles.inputs}>
        {hourFields.map((field) => (
          <NumberField
            key={field}
            control={control}
            name={`hours.${field}`}
            label={t(`fields.${field}`)}
            unit="h"
          />
        ))}
        <NumberField control={control} name="load.tons" label={t('fields.tons')} unit="tons" />
        <NumberField control={control} name="load.cuYd" label={t('fields.cuYd')} unit="cu yd" />
        {machineFields.map((field) => (
          <NumberField
            key={field}
            control={control}
            name={`machine.${field}`}
            label={t(`fields.${field}`)}
            {...(field === 'phases' ? {} : { unit: field === 'volts' ? 'V' : 'A' })}
            optional={field !== 'phases'}
          />
        ))}
      </div>
    </details>
  );
}
