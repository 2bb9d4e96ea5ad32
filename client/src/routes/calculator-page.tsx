import { lazy, Suspense, type ComponentType } from 'react';
import { useTranslation } from 'react-i18next';
import { useParams } from 'react-router-dom';
import { ButtonLink, TextLink } from '../components/link.tsx';
import { Page } from '../components/page.tsx';
import { ErrorState, Loading } from '../components/states.tsx';
import {
  calculatorLoaders,
  calculatorSlugs,
  isCalculatorSlug,
  wordsOfCalculator,
  type CalculatorSlug,
} from '../features/calculators/calculators.ts';
import { CalculatorView } from '../features/calculators/components/calculator-view.tsx';
import styles from '../features/calculators/components/calculators.module.css';
import { useKnownSession } from '../features/calculators/hooks/use-known-session.ts';
import { paths } from '../lib/paths.ts';

const views = Object.fromEntries(
  calculatorSlugs.map((slug) => [
    slug,
    lazy(async () => {
      const { default: calculator } = await calculatorLoaders[slug]();
      return { default: () => <CalculatorView calculator={calculator} /> };
    }),
  ]),
) as unknown as Readonly<Record<CalculatorSlug, ComponentType>>;

/** One calculator by its name in the address. */
export default function CalculatorPage() {
  const { t } = useTranslation('calculators');
  const { calculator: slug } = useParams();
  useKnownSession();
  if (!isCalculatorSlug(slug)) return <UnknownCalculator />;
  const View = views[slug];
  const words = wordsOfCalculator(slug);
  return (
    <Page
      title={t(`${words}.title`)}
      lead={t(`${words}.lead`)}
      actions={<TextLink to={paths.calculators}>{t('all')}</TextLink>}
    >
      <Suspense fallback={<Loading />}>
        <View key={slug} />
      </Suspense>
      <nav aria-label={t('others')}>
        <ul className={styles.others}>
          {calculatorSlugs
            .filter((other) => other !== slug)
            .map((other) => (
              <li key={other}>
                <TextLink to={paths.calculator(other)}>{t(`${wordsOfCalculator(other)}.title`)}</TextLink>
              </li>
            ))}
        </ul>
      </nav>
    </Page>
  );
}

function UnknownCalculator() {
  const { t } = useTranslation('calculators');
  return (
    <Page title={t('unknown.title')}>
      <ErrorState
        what={t('unknown.what')}
        next={t('unknown.next')}
        action={<ButtonLink to={paths.calculators}>{t('all')}</ButtonLink>}
      />
    </Page>
  );
}
