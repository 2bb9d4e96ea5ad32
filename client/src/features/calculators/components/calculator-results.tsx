import { Heading } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { Figure } from '../../../components/figure.tsx';
import { StatusWord } from '../../../components/status-word.tsx';
import type { Result, ResultBlock, ResultFigure } from '../calculator.ts';
import { inPlainWords } from '../evaluate.ts';
import styles from './calculators.module.css';

/** What a calculator found: figures in blocks, each opening to its working. */
export function CalculatorResults({ name, result }: { name: string; result: Result }) {
  const { t } = useTranslation('calculators');
  const heading = (block: ResultBlock) => {
    if (block.heading !== undefined) {
      return block.heading.map((part) => (typeof part === 'string' ? part : t(part.word))).join(' · ');
    }
    if (block.option !== undefined) return t(`options.${block.option.group}.${block.option.value}`);
    return block.name === undefined ? null : t(`${name}.blocks.${block.name}`);
  };
  return (
    <div className={styles.blocks}>
      {result.blocks.map((block, index) => (
        <section
          key={index}
          className={`${styles.block} ${block.isWay === true ? styles.way : styles.half} ${block.isChosen === true ? styles.chosen : ''}`}
        >
          {heading(block) !== null && (
            <Heading as="h3" size="2" weight="medium" className={styles.blockHead}>
              {heading(block)}
              {block.isChosen === true && <span className={styles.chosenWord}> {t('chosen')}</span>}
            </Heading>
          )}
          <dl className={styles.figures}>
            {block.figures.map((figure, place) => (
              <ResultEntry key={`${figure.name}${place}`} calculator={name} figure={figure} place={place} />
            ))}
          </dl>
          {block.text?.map((sentence) => (
            <p key={sentence} className={styles.blockText}>
              {sentence}
            </p>
          ))}
        </section>
      ))}
    </div>
  );
}

function ResultEntry({
  calculator,
  figure,
  place,
}: {
  calculator: string;
  figure: ResultFigure;
  place: number;
}) {
  const { t } = useTranslation('calculators');
  const label = t(`${calculator}.figures.${figure.name}`, { number: place });
  const { value } = figure;
  return (
    <div className={figure.isLead === true || figure.isWide === true ? styles.wideFigure : ''}>
      <dt>{label}</dt>
      <dd>
        <Figure
          label={label}
          value={typeof value === 'object' ? t(value.word) : value}
          unit={figure.unit}
          digits={figure.digits ?? 1}
          size={figure.isLead === true ? 'large' : 'normal'}
          working={figure.working === undefined ? undefined : inPlainWords(figure.working)}
        />
        {figure.isOver === true && (
          <StatusWord tone="warn">{t(`${calculator}.over.${figure.name}`)}</StatusWord>
        )}
      </dd>
    </div>
  );
}
