import type { LadderStep, OwnCompanyView } from '@kerfyard/common/people';
import { Heading } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { StatusWord } from '../../../components/status-word.tsx';
import styles from './company.module.css';
import { useMissingWords } from '../hooks/use-missing-words.ts';

const steps: Record<OwnCompanyView['kind'], readonly LadderStep[]> = {
  cutting_contractor: ['look', 'bid', 'be_paid'],
  general_contractor: ['look'],
};

/** What the company may do already, and what each further step still needs: asked for only when it is needed. */
export function Ladder({ company }: { company: OwnCompanyView }) {
  const { t } = useTranslation('company');
  const words = useMissingWords();
  return (
    <section aria-labelledby="ladder" className="k-panel">
      <Heading as="h2" size="4" weight="medium" mb="3" id="ladder">
        {t('ladder.title')}
      </Heading>
      <ol className={styles.ladder}>
        {steps[company.kind].map((step) => {
          const missing = company.ladder[step];
          return (
            <li key={step}>
              <StatusWord tone={missing.length === 0 ? 'good' : 'waiting'}>
                {t(missing.length === 0 ? `ladder.open.${step}` : `ladder.needs.${step}`)}
              </StatusWord>
              {missing.length > 0 && (
                <ul className={styles.missing}>
                  {words(missing).map((item) => (
                    <li key={item}>{item}</li>
                  ))}
                </ul>
              )}
            </li>
          );
        })}
      </ol>
    </section>
  );
}
