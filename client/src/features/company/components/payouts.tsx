import type { OwnCompanyView } from '@kerfyard/common/people';
import { Button, Heading, Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { StatusWord, type StatusTone } from '../../../components/status-word.tsx';
import { useErrorWords } from '../../../lib/error-words.ts';
import { useFormId } from '../../../lib/use-form-id.ts';
import { useStartPayouts } from '../api/company.queries.ts';
import styles from './company.module.css';
import { useMissingWords } from '../hooks/use-missing-words.ts';

const tones: Record<OwnCompanyView['payouts']['state'], StatusTone> = {
  not_started: 'quiet',
  under_way: 'waiting',
  ready: 'good',
};

/** Where released money goes: set up on the payment provider's own page, which alone sees bank data. */
export function Payouts({ payouts, canStart }: { payouts: OwnCompanyView['payouts']; canStart: boolean }) {
  const { t } = useTranslation('company');
  const words = useErrorWords();
  const missingWords = useMissingWords();
  const { id, renew } = useFormId();
  const start = useStartPayouts();
  const go = () => start.mutate(id, { onError: renew });
  return (
    <section className="k-panel" aria-labelledby="payouts">
      <div className={styles.between}>
        <Heading as="h2" size="4" weight="medium" id="payouts">
          {t('payouts.title')}
        </Heading>
        <StatusWord tone={tones[payouts.state]}>{t(`payouts.state.${payouts.state}`)}</StatusWord>
      </div>
      <Text as="p" size="2" color="gray" mt="1">
        {t('payouts.text')}
      </Text>
      {payouts.missing.length > 0 && (
        <ul className={styles.missing}>
          {missingWords(payouts.missing).map((item) => (
            <li key={item}>{item}</li>
          ))}
        </ul>
      )}
      <div role="alert">
        {start.isError && (
          <Text as="p" color="red" mt="2">
            {words(start.error).what}
          </Text>
        )}
      </div>
      {canStart && payouts.state !== 'ready' && (
        <Button mt="3" size="3" variant="soft" loading={start.isPending || start.isSuccess} onClick={go}>
          {t(payouts.state === 'not_started' ? 'payouts.start' : 'payouts.goOn')}
        </Button>
      )}
    </section>
  );
}
