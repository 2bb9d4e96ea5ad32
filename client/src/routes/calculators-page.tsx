import { useTranslation } from 'react-i18next';
import { Link } from 'react-router-dom';
import { Page } from '../components/page.tsx';
import { calculatorSlugs, wordsOfCalculator } from '../features/calculators/calculators.ts';
import { CalculatorGlyph } from '../features/calculators/components/calculator-glyph.tsx';
import styles from '../features/calculators/components/calculators.module.css';
import { useKnownSession } from '../features/calculators/hooks/use-known-session.ts';
import { paths } from '../lib/paths.ts';

/** The calculators by name of the work; anyone may open them. */
export default function CalculatorsPage() {
  const { t } = useTranslation('calculators');
  useKnownSession();
  return (
    <Page title={t('title')} lead={t('lead')}>
      <ul className={styles.shelf}>
        {calculatorSlugs.map((slug) => (
          <li key={slug}>
            <Link to={paths.calculator(slug)} className={styles.card}>
              <CalculatorGlyph slug={slug} />
              <span>
                <span className={styles.cardName}>{t(`${wordsOfCalculator(slug)}.title`)}</span>
                <span className={styles.cardText}>{t(`${wordsOfCalculator(slug)}.short`)}</span>
              </span>
            </Link>
          </li>
        ))}
      </ul>
    </Page>
  );
}
