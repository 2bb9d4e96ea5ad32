import { Heading, Text } from '@radix-ui/themes';
import { useId } from 'react';
import { useTranslation } from 'react-i18next';
import { formatMoney } from '../../../lib/format.ts';
import { priceScale, type ComparedBid } from '../compare.ts';
import styles from './tabulation.module.css';

const ROW_PX = 52;
const AXIS_PX = 26;
/** Room left and right of the scale, in percent, so that no mark is cut. */
const MARGIN = 2;

/** Each bid as a base mark and an adjusted mark joined by a line: its length is what the bid left out. */
export function PricePicture({ bids }: { bids: readonly ComparedBid[] }) {
  const { t } = useTranslation('tabulation');
  const id = useId();
  const scale = priceScale(bids.flatMap(({ row }) => [row.baseCents, row.adjustedCents]));
  const x = (cents: number) => `${MARGIN + scale.at(cents) * (100 - 2 * MARGIN)}%`;
  const height = bids.length * ROW_PX;
  const wordsOf = ({ bid, row }: ComparedBid) =>
    t('picture.row', {
      crew: bid.crew.name,
      base: formatMoney(row.baseCents),
      plugs: formatMoney(row.plugsCents),
      adjusted: formatMoney(row.adjustedCents),
    });
  return (
    <section className={styles.section} aria-labelledby={`${id}-title`}>
      <div>
        <Heading as="h2" size="5" weight="medium" id={`${id}-title`}>
          {t('picture.title')}
        </Heading>
        <Text as="p" size="2" color="gray">
          {t('picture.lead')}
        </Text>
      </div>
      <div className={styles.legend} aria-hidden="true">
        <span>
          <svg width="14" height="14" viewBox="0 0 14 14">
            <circle cx="7" cy="7" r="5" className={styles.base} />
          </svg>
          {t('picture.base')}
        </span>
        <span>
          <svg width="14" height="14" viewBox="0 0 14 14">
            <rect x="2" y="2" width="10" height="10" className={styles.adjusted} />
          </svg>
          {t('picture.adjusted')}
        </span>
      </div>
      <svg
        className={styles.picture}
        width="100%"
        height={height + AXIS_PX}
        role="img"
        aria-label={t('picture.title')}
        aria-describedby={id}
      >
        {scale.ticks.map((tick) => (
          <g key={tick} className={styles.tick}>
            <line x1={x(tick)} x2={x(tick)} y1={0} y2={height} />
            <text x={x(tick)} y={height + 17} textAnchor={anchorOf(scale.at(tick))}>
              {formatMoney(tick, { dropZeroCents: true })}
            </text>
          </g>
        ))}
        {bids.map((one, index) => (
          <BidMarks key={one.bid.id} compared={one} top={index * ROW_PX} x={x} />
        ))}
      </svg>
      <ul id={id} className="k-hidden">
        {bids.map((one) => (
          <li key={one.bid.id}>{wordsOf(one)}</li>
        ))}
      </ul>
    </section>
  );
}

function anchorOf(place: number): 'start' | 'middle' | 'end' {
  if (place < 0.08) return 'start';
  return place > 0.92 ? 'end' : 'middle';
}

function BidMarks(props: { compared: ComparedBid; top: number; x: (cents: number) => string }) {
  const { compared, top, x } = props;
  const { bid, row } = compared;
  const y = top + 36;
  return (
    <g>
      <text x="0" y={top + 18} className={styles.name}>
        {bid.crew.name}
      </text>
      <text x="100%" y={top + 18} textAnchor="end" className={styles.amount}>
        {formatMoney(row.adjustedCents)}
      </text>
      <line x1={x(row.baseCents)} x2={x(row.adjustedCents)} y1={y} y2={y} className={styles.leftOut} />
      <circle cx={x(row.baseCents)} cy={y} r="7" className={styles.base} />
      {/* Centred on its place: a rectangle's x is its left edge and takes no percent and pixels together. */}
      <rect
        x={x(row.adjustedCents)}
        y={y - 4.5}
        width="9"
        height="9"
        transform="translate(-4.5 0)"
        className={styles.adjusted}
      />
    </g>
  );
}
