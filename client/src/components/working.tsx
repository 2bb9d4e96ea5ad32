import type { WorkingSource, WorkingStep } from '@kerfyard/common/cutting';
import type { ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import { formatNumber } from '../lib/format.ts';
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
                {show(step.value)} <span className={styles.unit}>{step.unit}</span>
              </span>
            </div>
            <code className={styles.formula}>{step.formula}</code>
            {step.inputs.length > 0 && (
              <dl className={styles.inputs}>
                {step.inputs.map((input) => (
                  <div key={input.name}>
                    <dt>{input.name}</dt>
                    <dd>
                      {show(input.value)} <span className={styles.unit}>{input.unit}</span>
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

/** Workings show more decimals than the figure itself, or the steps would not add up before the reader's eyes. */
function show(value: number | string): string {
  return typeof value === 'number' ? formatNumber(value, 3) : value;
}
