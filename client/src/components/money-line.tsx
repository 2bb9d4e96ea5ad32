import type { MoneyLineView } from '@kerfyard/common/payments';
import { useId } from 'react';
import { useTranslation } from 'react-i18next';
import { formatMoney } from '../lib/format.ts';
import styles from './money-line.module.css';
import { moneyParts, type MoneyPart } from './money-parts.ts';

interface MoneyLineProps {
  money: MoneyLineView;
  /** `full` lists the amounts under the bar; `bar` leaves them to the text equivalent (rows and cards). */
  look?: 'full' | 'bar';
}

const HEIGHT = 18;
const WIDTH = 1000;

/**
 * One bar to scale: the contract is its length; released, held, objected and retainage stand in it, and what is not set
 * aside yet stays open. The same picture for the general contractor, the crew and staff.
 */
export function MoneyLine({ money, look = 'full' }: MoneyLineProps) {
  const { t } = useTranslation();
  const pattern = useId();
  const { parts, totalCents } = moneyParts(money);
  const text = t('moneyLine.text', {
    total: formatMoney(totalCents),
    parts: parts.map((part) => `${t(`moneyLine.${part.kind}`)} ${formatMoney(part.cents)}`).join(', '),
  });
  return (
    <figure className={styles.line}>
      <svg
        className={styles.bar}
        viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
        preserveAspectRatio="none"
        role="img"
        aria-label={text}
      >
        <defs>
          <Hatch id={`${pattern}-objected`} />
        </defs>
        {placed(parts, totalCents).map(({ part, x, width }) => (
          <g key={part.kind} className={styles[part.kind]}>
            <rect x={x} y="0" width={width} height={HEIGHT} />
            {part.kind === 'objected' && (
              <rect
                x={x}
                y="0"
                width={width}
                height={HEIGHT}
                fill={`url(#${pattern}-objected)`}
                stroke="none"
              />
            )}
            {part.kind === 'retainage' && (
              <path d={`M${x} ${HEIGHT / 2}h${width}`} className={styles.score} />
            )}
          </g>
        ))}
      </svg>
      {look === 'full' && (
        <figcaption>
          <dl className={styles.legend}>
            <div>
              <dt>{t('moneyLine.contract')}</dt>
              <dd>{formatMoney(totalCents)}</dd>
            </div>
            {parts.map((part) => (
              <div key={part.kind}>
                <dt>
                  <span className={`${styles.swatch} ${styles[part.kind]}`} aria-hidden="true" />
                  {t(`moneyLine.${part.kind}`)}
                </dt>
                <dd>{formatMoney(part.cents)}</dd>
              </div>
            ))}
          </dl>
        </figcaption>
      )}
    </figure>
  );
}

function placed(parts: readonly MoneyPart[], totalCents: number) {
  let x = 0;
  return parts.map((part) => {
    const width = totalCents === 0 ? 0 : (part.cents / totalCents) * WIDTH;
    const at = { part, x, width };
    x += width;
    return at;
  });
}

function Hatch({ id }: { id: string }) {
  return (
    <pattern id={id} width="14" height="18" patternUnits="userSpaceOnUse">
      <path d="M0 18 14 0" className={styles.hatch} />
    </pattern>
  );
}
