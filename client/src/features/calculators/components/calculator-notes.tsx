import type { WorkingSource } from '@kerfyard/common/cutting';
import { Callout, Heading, Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import type { Calculator, Result } from '../calculator.ts';
import { sourcesOf } from '../evaluate.ts';
import styles from './calculators.module.css';

/** What can hurt, beside the result: the calculator's own cautions, the engine's, and who governs. */
export function Cautions({ calculator, result }: { calculator: Calculator; result: Result | null }) {
  const { t } = useTranslation('calculators');
  const keys = [...(result?.warnings ?? []), ...calculator.cautions];
  return (
    <Callout.Root color="amber" variant="surface">
      <div>
        <Text as="p" weight="medium" mb="2">
          {t('cautionsTitle')}
        </Text>
        <ul className={styles.cautions}>
          {keys.map((key) => (
            <li key={key}>{t(`cautions.${key}`)}</li>
          ))}
          {(result?.cautions ?? []).map((sentence) => (
            <li key={sentence}>{sentence}</li>
          ))}
        </ul>
        <Text as="p" size="2" mt="2">
          {t('cautions.defer')}
        </Text>
      </div>
    </Callout.Root>
  );
}

/** Where the numbers come from, each document once, and how certain it is. */
export function Sources({ result }: { result: Result }) {
  const { t } = useTranslation('calculators');
  const sources = sourcesOf(result);
  if (sources.length === 0) return <p className={styles.noSources}>{t('onlyArithmetic')}</p>;
  return (
    <section>
      <Heading as="h2" size="3" weight="medium" mb="2">
        {t('sourcesTitle')}
      </Heading>
      <ul className={styles.sources}>
        {sources.map((source) => (
          <SourceLine key={[source.origin, source.document, source.section].join()} source={source} />
        ))}
      </ul>
    </section>
  );
}

/** The document and how certain it is; a habit of the trade says itself that it has none. */
function SourceLine({ source }: { source: WorkingSource }) {
  const { t } = useTranslation('calculators');
  const { document, section, edition, origin } = source;
  const certainty = t(`certainty.${origin.replaceAll(' ', '_')}`);
  if (document === undefined) return <li>{certainty}</li>;
  const words = [document, section, edition].filter((part) => part !== undefined).join(', ');
  if (origin === 'common practice') return <li>{words}</li>;
  return (
    <li>
      {words} <span className={styles.certainty}>({certainty})</span>
    </li>
  );
}
