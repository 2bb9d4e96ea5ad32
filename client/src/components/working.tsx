import type { WorkingSource, WorkingStep } from '@kerfyard/common/cutting';
import type { ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import { formatNumber, formatRate } from '../lib/format.ts';
import styles from './working.module.css';

/** The steps behind a figure: formula, numbers put in, result, and whose number it was. */
export function Working({
  label,
  figure,
  steps,
}: {
  label: string;
  figure: ReactNode;
  steps: readonly WorkingStep[];
}) {
  const { t } = useTranslation();
  return (
    <div className={styles.working}>
      <p className={styles.title}>
        <span>{t('figure.title', { label })}</span>
        <span className={styles.answer}>{figure}</span>
      </p>
      <ol className={styles.steps}>
        {steps.map((step, index) => (
          <li key={`${step.label}${index}`} className={styles.step}>
            <div className={styles.head}>
              <span>{step.label}</span>
              <span className={styles.result}>
                <Amount value={step.value} unit={step.unit} />
              </span>
            </div>
            <code className={styles.formula}>{step.formula}</code>
            {step.inputs.length > 0 && (
              <dl className={styles.inputs}>
                {step.inputs.map((input) => (
                  <div key={input.name}>
                    <dt>{input.name}</dt>
                    <dd>
                      <Amount value={input.value} unit={input.unit} />
                    </dd>
                  </div>
                ))}
              </dl>
            )}
            <Source source={step.source} />
          </li>
        ))}
      </ol>
    </div>
  );
}

function Source({ source }: { source: WorkingSource }) {
  const { t } = useTranslation();
  const where = [source.document, source.section, source.edition].filter((part) => part !== undefined);
  const origin = t(`figure.origin.${source.origin.replaceAll(' ', '_')}`);
  return <p className={styles.source}>{where.length === 0 ? origin : `${origin}: ${where.join(', ')}`}</p>;
}

/** A number of a working and its unit; money, which the engine counts in cents, is shown in dollars. */
function Amount({ value, unit }: { value: number | string; unit: string }) {
  const perUnit = /^cents( per .+)?$/.exec(unit);
  if (perUnit !== null && typeof value === 'number') {
    return (
      <>
        {formatRate(value)} <span className={styles.unit}>{perUnit[1] ?? ''}</span>
      </>
    );
  }
  // More decimals than the figure itself, or the steps would not add up before the reader's eyes.
  const shown = typeof value === 'number' ? formatNumber(value, 3) : value;
  return (
    <>
      {shown} <span className={styles.unit}>{unit}</span>
    </>
  );
}
