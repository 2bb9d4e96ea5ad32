import type { SubcontractView } from '@kerfyard/common/subcontracts';
import { Button, Callout, Checkbox, Heading, Text } from '@radix-ui/themes';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import { MoneyText } from '../../../components/money-text.tsx';
import { Loading, QueryErrorState } from '../../../components/states.tsx';
import { formatMoney } from '../../../lib/format.ts';
import { useIsLive } from '../../../lib/live.ts';
import { useFormId } from '../../../lib/use-form-id.ts';
import { setAsideQuoteQuery, useSetAside } from '../api/money.queries.ts';
import { Amounts } from './amounts.tsx';
import styles from './money.module.css';

/** Choose lines, see the cost, go to the payment page. Every amount is the server's. */
export function SetAsideForm({ subcontract, canPay }: { subcontract: SubcontractView; canPay: boolean }) {
  const { t } = useTranslation('money');
  const free = subcontract.sov.filter((line) => line.state === 'not_set_aside' && line.amountCents > 0);
  const [left, setLeft] = useState<ReadonlySet<string>>(new Set());
  const chosen = free.filter((line) => !left.has(line.id)).map((line) => line.id);
  const toggle = (id: string) => {
    const next = new Set(left);
    if (!next.delete(id)) next.add(id);
    setLeft(next);
  };
  const hint = hintFor(subcontract, free.length, canPay);
  // The bar above says it.
  if (hint === 'none') return null;
  return (
    <section className={styles.section} aria-labelledby="set-aside">
      <Heading as="h2" size="5" weight="medium" id="set-aside">
        {t('setAside.title')}
      </Heading>
      <Text as="p" color="gray">
        {hint === null ? t('setAside.why') : t(`setAside.${hint}`)}
      </Text>
      {hint === null && (
        <>
          <fieldset className={styles.lines}>
            <legend>{t('setAside.choose')}</legend>
            {free.map((line) => (
              <Text as="label" size="3" key={line.id} className={styles.line}>
                <Checkbox size="3" checked={!left.has(line.id)} onCheckedChange={() => toggle(line.id)} />
                <span>{line.description}</span>
                <MoneyText cents={line.amountCents} />
              </Text>
            ))}
          </fieldset>
          <Pay subcontractId={subcontract.id} chosen={chosen} />
        </>
      )}
    </section>
  );
}

function hintFor(
  subcontract: SubcontractView,
  free: number,
  canPay: boolean,
): 'unsigned' | 'none' | 'role' | null {
  if (subcontract.status === 'awaiting_signatures') return 'unsigned';
  if (free === 0) return 'none';
  return canPay ? null : 'role';
}

function Pay({ subcontractId, chosen }: { subcontractId: string; chosen: readonly string[] }) {
  const { t } = useTranslation('money');
  const isLive = useIsLive();
  const form = useFormId();
  const quote = useQuery(setAsideQuoteQuery(subcontractId, chosen));
  const setAside = useSetAside(subcontractId);
  if (chosen.length === 0) return null;
  if (quote.isError) return <QueryErrorState error={quote.error} onRetry={() => void quote.refetch()} />;
  if (quote.data === undefined) return <Loading />;
  const { amountCents, platformChargeCents, totalCents } = quote.data;
  const press = () =>
    setAside.mutate(
      { id: form.id, sovLineIds: [...chosen].sort(), method: 'card' },
      // After an answer the next press asks for other money; after a lost one the same id finds the same payment.
      { onSuccess: form.renew },
    );
  return (
    <>
      <Amounts
        rows={[
          { label: t('setAside.amount'), cents: amountCents },
          { label: t('setAside.charge'), cents: platformChargeCents },
          { label: t('setAside.total'), cents: totalCents, isTotal: true },
        ]}
      />
      <Text as="p" size="2" color="gray">
        {t('setAside.chargeWhy')}
      </Text>
      {!isLive && (
        <Callout.Root color="amber" size="1">
          <Callout.Text>{t('setAside.offline')}</Callout.Text>
        </Callout.Root>
      )}
      {setAside.isError && <QueryErrorState error={setAside.error} />}
      <div>
        <Button size="3" loading={setAside.isPending} disabled={!isLive || quote.isFetching} onClick={press}>
          {t('setAside.press', { amount: formatMoney(totalCents) })}
        </Button>
      </div>
    </>
  );
}
