import type { VisitView } from '@kerfyard/common/visits';
import { Button, Heading, Text } from '@radix-ui/themes';
import { useQuery } from '@tanstack/react-query';
import { useTranslation } from 'react-i18next';
import { useSearchParams } from 'react-router-dom';
import { TextLink } from '../../../components/link.tsx';
import { Loading, QueryErrorState } from '../../../components/states.tsx';
import { deviceTimeZone, now } from '../../../lib/clock.ts';
import { formatDate, formatDay, formatTime, zoneName } from '../../../lib/format.ts';
import { useLiveHints } from '../../../lib/live.ts';
import { paths } from '../../../lib/paths.ts';
import { addDays, dateIn, weekOf, type WeekDay } from '../../../lib/week.ts';
import { visitKeys, visitsQuery } from '../api/visits.queries.ts';
import { blocksBetween } from '../visit-blocks.ts';
import { VisitList } from './visit-list.tsx';
import { VisitStatusWord } from './visit-status.tsx';
import styles from './visits.module.css';

/** How far the list looks ahead, in weeks. */
const LIST_WEEKS = 8;

/** Visits as a week of seven columns, or as a list of the weeks to come. Which of them stands in the address. */
export function Week() {
  const { t } = useTranslation('visits');
  const zone = deviceTimeZone();
  const [search, setSearch] = useSearchParams();
  const date = readDate(search.get('week')) ?? dateIn(now(), zone);
  const days = weekOf(date, zone);
  const isList = search.get('visits') === 'list';
  const lastDays = isList ? weekOf(addDays(date, 7 * (LIST_WEEKS - 1)), zone) : days;
  const span = { from: days[0]?.startsAt ?? '', to: lastDays[6]?.endsAt ?? '' };
  const visits = useQuery(visitsQuery(span));
  useLiveHints({ visits: () => [visitKeys.all] });
  const set = (name: 'week' | 'visits', value: string) =>
    setSearch(
      (current) => {
        current.set(name, value);
        return current;
      },
      { replace: true },
    );
  const go = (to: string) => set('week', to);
  return (
    <section aria-labelledby="week">
      <div className={styles.weekHead}>
        <Heading as="h2" size="5" weight="medium" id="week">
          {t(isList ? 'week.listTitle' : 'week.title', { date: formatDate(days[0]?.date ?? date) })}
        </Heading>
        <div className={styles.row}>
          <Button variant="soft" color="gray" onClick={() => go(addDays(date, -7))}>
            {t('week.before')}
          </Button>
          <Button variant="soft" color="gray" onClick={() => go(dateIn(now(), zone))}>
            {t('week.now')}
          </Button>
          <Button variant="soft" color="gray" onClick={() => go(addDays(date, 7))}>
            {t('week.after')}
          </Button>
          <Button variant="soft" onClick={() => set('visits', isList ? 'week' : 'list')}>
            {t(isList ? 'week.asWeek' : 'week.asList')}
          </Button>
        </div>
      </div>
      <Text as="p" size="2" color="gray" mb="3">
        {t('week.zone', { zone: zoneName(zone) })}
      </Text>
      {visits.isPending && <Loading />}
      {visits.isError && <QueryErrorState error={visits.error} onRetry={() => void visits.refetch()} />}
      {visits.data !== undefined && isList && <VisitList visits={visits.data} span={span} zone={zone} />}
      {visits.data !== undefined && !isList && (
        <div className={styles.week}>
          {days.map((day) => (
            <Day
              key={day.date}
              day={day}
              visits={visits.data}
              isToday={day.date === dateIn(now(), zone)}
              zone={zone}
            />
          ))}
        </div>
      )}
    </section>
  );
}

function Day({
  day,
  visits,
  isToday,
  zone,
}: {
  day: WeekDay;
  visits: readonly VisitView[];
  isToday: boolean;
  zone: string;
}) {
  const { t } = useTranslation('visits');
  const blocks = blocksBetween(day, visits);
  return (
    <div className={`${styles.day} ${isToday ? styles.today : ''} ${blocks.length === 0 ? styles.free : ''}`}>
      <Heading as="h3" size="2" weight="medium">
        {formatDay(day.startsAt, zone)}
      </Heading>
      {blocks.length === 0 && (
        <Text size="2" color="gray">
          {t('week.free')}
        </Text>
      )}
      {blocks.map(({ visit, startsAt, endsAt, isOffer }) => (
        <article
          key={`${visit.id}-${startsAt}`}
          className={`${styles.block} ${isOffer ? styles.offered : ''}`}
        >
          <Text size="2" weight="medium">
            {t('week.span', { from: formatTime(startsAt, zone), to: formatTime(endsAt, zone) })}
          </Text>
          <TextLink to={paths.workItem(visit.subcontractId)} size="2">
            {visit.title}
          </TextLink>
          <Text size="1" color="gray">
            {t('week.unit', { crew: visit.crew.name, truck: visit.truck.name })}
          </Text>
          <VisitStatusWord status={visit.status} />
        </article>
      ))}
    </div>
  );
}

function readDate(value: string | null): string | null {
  return value !== null && /^\d{4}-\d{2}-\d{2}$/.test(value) && Number.isFinite(Date.parse(value))
    ? value
    : null;
}
