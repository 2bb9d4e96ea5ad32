import {
  bidInputSchema,
  methodsOfCutHere,
  readPrice,
  type BidInput,
  type OwnBidView,
  type PricedBid,
} from '@kerfyard/common/bids';
import type { Method } from '@kerfyard/common/people';
import type { ScopeBody } from '@kerfyard/common/scopes';
import { Button, Text } from '@radix-ui/themes';
import { useEffect, useMemo, useRef } from 'react';
import { useWatch, type Control } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { CheckboxField, RadioField } from '../../../components/form/choice-fields.tsx';
import { SelectField, TextField } from '../../../components/form/fields.tsx';
import { Form } from '../../../components/form/form.tsx';
import { MoneyField, NumberField } from '../../../components/form/number-fields.tsx';
import { isApiError } from '../../../lib/api-error.ts';
import { useAppForm } from '../../../lib/app-form.ts';
import { dropTail, keepTail } from '../../../lib/draft-tail.ts';
import { saveBidDraft, usePlaceBid } from '../api/bids.queries.ts';
import { bidFormSchema, fieldOf, toPrice, type BidFormValues } from '../bid-form-values.ts';
import { JobEstimate } from '../../estimate/components/job-estimate.tsx';
import styles from './bids.module.css';
import { FactorFields } from './factor-fields.tsx';
import { LineFields } from './line-fields.tsx';
import { PriceSummary } from './price-summary.tsx';
import { RateCardPress } from './rate-card-press.tsx';

const SAVE_AFTER_MS = 1200;

interface BidFormProps {
  scopeId: string;
  revision: number;
  body: ScopeBody;
  /** What was typed before, of a bid or of a draft. */
  start: BidFormValues;
  ownBid: OwnBidView | null;
  /** Methods that the crew's company offers. */
  offered: readonly Method[];
  /** From the crew's yard to the site. */
  distanceMi: number | null;
  onDone: () => void;
}

/** A bid: a lump sum in two minutes, or line by line; what is in it, what is not. The total is computed, never typed. */
export function BidForm(props: BidFormProps) {
  const { scopeId, revision, body, start, ownBid, offered, distanceMi, onDone } = props;
  const { t } = useTranslation('bid');
  const place = usePlaceBid(scopeId);
  const schema = useMemo(() => bidFormSchema(revision), [revision]);
  const form = useAppForm<BidFormValues, BidInput>({ schema, defaultValues: start });
  const { control } = form;
  const priceForm = useWatch({ control, name: 'form' });
  const draft = useSavedDraft(scopeId, control);
  const send = async (input: BidInput) => {
    try {
      await place.mutateAsync(input);
    } catch (error) {
      throw withFormPaths(error, form.getValues());
    }
    draft.forget();
    onDone();
  };
  return (
    <>
      <Form form={form} label={t('form.title')} onSubmit={send}>
        {body.terms.priceForm === 'either' && (
          <RadioField
            control={control}
            name="form"
            label={t('form.form')}
            options={[
              { value: 'lump', label: t('form.lump') },
              { value: 'lines', label: t('form.lines') },
            ]}
          />
        )}
        <RateCardPress form={form} body={body} />
        {priceForm === 'lump' ? (
          <MoneyField
            control={control}
            name="lumpCents"
            label={t('form.lumpCents')}
            hint={t('form.lumpHint')}
          />
        ) : (
          <LinesPart control={control} body={body} offered={offered} />
        )}
        <LivePrice body={body} control={control} />
        <Answers control={control} items={start.answers} />
        <TextField
          control={control}
          name="inclusions"
          label={t('form.inclusions')}
          hint={t('form.onePerLine')}
          optional
          lines={2}
        />
        <TextField
          control={control}
          name="exclusions"
          label={t('form.exclusions')}
          hint={t('form.onePerLine')}
          optional
          lines={2}
        />
        <div className={styles.pair}>
          <NumberField control={control} name="validDays" label={t('form.validDays')} unit={t('form.days')} />
          <TextField
            control={control}
            name="startFrom"
            label={t('form.startFrom')}
            hint={t('form.dateHint')}
            optional
          />
        </div>
        <TextField control={control} name="note" label={t('form.note')} optional lines={3} />
        <Text as="p" size="2" color="gray">
          {t(body.bidding.mode === 'sealed' ? 'form.sealedMeaning' : 'form.rankedMeaning')}
        </Text>
        <div className={styles.row}>
          <Button type="submit" size="3" loading={form.formState.isSubmitting}>
            {t(ownBid === null ? 'form.send' : 'form.revise')}
          </Button>
          {ownBid !== null && (
            <Button type="button" size="3" variant="soft" color="gray" onClick={onDone}>
              {t('form.leave')}
            </Button>
          )}
        </div>
      </Form>
      <LiveEstimate
        scopeId={scopeId}
        body={body}
        control={control}
        offered={offered}
        distanceMi={distanceMi}
      />
    </>
  );
}

type BidControl = Control<BidFormValues, unknown, BidInput>;

interface LinesPartProps {
  control: BidControl;
  body: ScopeBody;
  offered: readonly Method[];
}

/** Line by line: a rate for each cut, what multiplies them all, and what the trip costs at least. */
function LinesPart({ control, body, offered }: LinesPartProps) {
  const { t } = useTranslation('bid');
  return (
    <>
      <div className={styles.lines}>
        {body.cuts.map((line, index) => (
          <LineFields
            key={line.id}
            line={line}
            index={index}
            control={control}
            conditions={body.conditions}
            offered={offered}
          />
        ))}
      </div>
      <FactorFields control={control} />
      <div className={styles.pair}>
        <MoneyField
          control={control}
          name="minimumCents"
          label={t('form.minimum')}
          hint={t('form.minimumHint')}
        />
        <MoneyField control={control} name="mobilizationCents" label={t('form.mobilization')} />
      </div>
      <CheckboxField
        control={control}
        name="minimumIncludesMobilization"
        label={t('form.minimumIncludesMobilization')}
      />
    </>
  );
}

/** The price as the server will compute it, by the same function; null while something is missing. */
function pricedOf(values: BidFormValues, body: ScopeBody): PricedBid | null {
  const price = bidInputSchema.shape.price.safeParse(toPrice(values));
  const reading = price.success ? readPrice(body, price.data) : null;
  return reading?.ok === true ? reading.priced : null;
}

function LivePrice({ body, control }: { body: ScopeBody; control: BidControl }) {
  const values = useWatch({ control }) as BidFormValues;
  const priced = useMemo(() => pricedOf(values, body), [body, values]);
  return <div aria-live="polite">{priced !== null && <PriceSummary priced={priced} />}</div>;
}

interface LiveEstimateProps extends LinesPartProps {
  scopeId: string;
  distanceMi: number | null;
}

/** What the job would take, beside what it would bring, as both stand in the form. */
function LiveEstimate({ scopeId, body, control, offered, distanceMi }: LiveEstimateProps) {
  const values = useWatch({ control }) as BidFormValues;
  const priced = useMemo(() => pricedOf(values, body), [body, values]);
  const methods = useMemo(() => methodsOf(values.lines, body, offered), [values.lines, body, offered]);
  return (
    <JobEstimate scopeId={scopeId} body={body} methods={methods} priced={priced} distanceMi={distanceMi} />
  );
}

/** How each cut is done: as the crew picked, else as it usually does, else as it usually is done. */
function methodsOf(
  lines: BidFormValues['lines'],
  { cuts, conditions }: ScopeBody,
  offered: readonly Method[],
): Map<string, Method> {
  const picked = new Map(lines.map(({ cutId, method }) => [cutId, method]));
  return new Map(
    cuts.flatMap(({ id, cut }): [string, Method][] => {
      const method =
        picked.get(id) ||
        (methodsOfCutHere(cut, conditions, offered)[0] ?? methodsOfCutHere(cut, conditions)[0]);
      return method === undefined ? [] : [[id, method]];
    }),
  );
}

function Answers({ control, items }: { control: BidControl; items: BidFormValues['answers'] }) {
  const { t } = useTranslation(['bid', 'scope']);
  if (items.length === 0) return null;
  return (
    <fieldset className={styles.answers}>
      <Text asChild size="2" weight="medium" mb="2">
        <legend>{t('form.answers')}</legend>
      </Text>
      <div className={styles.pair}>
        {items.map(({ item }, index) => (
          <SelectField
            key={item}
            control={control}
            name={`answers.${index}.answer`}
            label={t(`scope:items.${item}`)}
            options={(['included', 'excluded', 'unclear'] as const).map((value) => ({
              value,
              label: t(`answers.${value}`),
            }))}
          />
        ))}
      </div>
    </fieldset>
  );
}

/** Saves what is typed: at once in this tab, a moment later at the server, encrypted there like the bid. */
function useSavedDraft(scopeId: string, control: BidControl): { forget: () => void } {
  const values = useWatch({ control });
  const first = useRef(true);
  const done = useRef(false);
  useEffect(() => {
    if (first.current) {
      first.current = false;
      return undefined;
    }
    if (done.current) return undefined;
    keepTail(`bid.${scopeId}`, values);
    const timer = setTimeout(() => {
      saveBidDraft(scopeId, values as Record<string, unknown>).then(
        () => dropTail(`bid.${scopeId}`),
        // What could not be saved stays in this tab and is tried with the next change.
        () => undefined,
      );
    }, SAVE_AFTER_MS);
    return () => clearTimeout(timer);
  }, [scopeId, values]);
  return {
    forget: () => {
      done.current = true;
      dropTail(`bid.${scopeId}`);
    },
  };
}

/** The server names fields of the bid; the form has its own names for them. */
function withFormPaths(error: unknown, values: BidFormValues): unknown {
  if (isApiError(error, 'invalid_input')) {
    for (const issue of error.fields)
      Object.assign(issue, { path: fieldOf(values, issue.path.split('.')).join('.') });
  }
  return error;
}
