import { Heading, Text } from '@radix-ui/themes';
import { memo, useId, type ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import type { Calculator } from '../calculator.ts';
import type { Evaluated } from '../evaluate.ts';
import { Cautions, Sources } from './calculator-notes.tsx';
import { CalculatorResults } from './calculator-results.tsx';
import styles from './calculators.module.css';

/** Drawing, results, cautions and sources of what is typed. */
export const CalculatorFound = memo(function CalculatorFound({
  calculator,
  evaluated,
}: {
  calculator: Calculator;
  evaluated: Evaluated;
}) {
  const { t } = useTranslation('calculators');
  const id = useId();
  const { result, values, problems, refused } = evaluated;
  return (
    <section className={styles.found} aria-labelledby={id}>
      <Heading as="h2" size="4" weight="medium" id={id}>
        {t('found')}
      </Heading>
      {result === null ? (
        <NothingFound count={Object.keys(problems).length} refused={refused} />
      ) : (
        <>
          <Drawing>{calculator.draw?.(values as never)}</Drawing>
          <CalculatorResults name={calculator.name} result={result} />
        </>
      )}
      <Cautions calculator={calculator} result={result} />
      {result !== null && <Sources result={result} />}
    </section>
  );
});

function Drawing({ children }: { children: ReactNode }) {
  return children === undefined ? null : <div className={styles.drawing}>{children}</div>;
}

/** No number is better than a wrong one: which field keeps it from counting stands beside that field. */
function NothingFound({ count, refused }: { count: number; refused: string | null }) {
  const { t } = useTranslation('calculators');
  return (
    <div className={styles.nothing} role="status">
      <Text as="p" weight="medium">
        {refused === null ? t('nothing', { count }) : t('refused')}
      </Text>
      <Text as="p" size="2" color="gray">
        {refused ?? t('nothingNext')}
      </Text>
    </div>
  );
}
