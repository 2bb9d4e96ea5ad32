import { Button, Text } from '@radix-ui/themes';
import type { ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import { useSearchParams } from 'react-router-dom';
import { now } from '../../../lib/clock.ts';
import type { OpenScopesFilter } from '../api/open-scopes.queries.ts';
import { filterNames, type FilterName } from '../filter-in-address.ts';
import styles from './open-scopes.module.css';

// Written out here: the schema's own list would pull the whole validator into the first page a crew loads.
const methods = [
  'flat_saw',
  'wall_saw',
  'hand_saw',
  'ring_saw',
  'chain_saw',
  'wire_saw',
  'core_drill',
  'stitch_drill',
  'joint_saw',
];
const distances = ['25', '50', '100', '200'];
const sizes = ['100', '500', '2000'];
const sorts = ['newest', 'due', 'nearest', 'largest'];
const dueDays = [1, 3, 7, 14];
const DAY_MS = 86_400_000;

/** The filters of the list. All of them stand in the address, so a list can be kept, sent and gone back to. */
export function Filters({ filter }: { filter: OpenScopesFilter }) {
  const { t } = useTranslation('open-scopes');
  const [, setSearch] = useSearchParams();
  const set = (name: FilterName, value: string) =>
    setSearch(
      (current) => {
        if (value === '') current.delete(name);
        else current.set(name, value);
        return current;
      },
      { replace: true },
    );
  const clear = () =>
    setSearch(
      (current) => {
        for (const name of filterNames) current.delete(name);
        return current;
      },
      { replace: true },
    );
  const any = t('filters.any');
  return (
    <search className={styles.filters} aria-label={t('filters.label')}>
      <Choice
        label={t('filters.method')}
        value={filter.method ?? ''}
        onChange={(value) => set('method', value)}
      >
        <option value="">{any}</option>
        {methods.map((method) => (
          <option key={method} value={method}>
            {t(`methods.${method}`)}
          </option>
        ))}
      </Choice>
      <Choice
        label={t('filters.within')}
        value={filter.withinMiles ?? ''}
        onChange={(value) => set('withinMiles', value)}
      >
        <option value="">{any}</option>
        {distances.map((miles) => (
          <option key={miles} value={miles}>
            {t('filters.miles', { miles })}
          </option>
        ))}
      </Choice>
      <Choice
        label={t('filters.due')}
        value={dueChoice(filter.dueBefore)}
        onChange={(days) =>
          set('dueBefore', days === '' ? '' : new Date(now().getTime() + Number(days) * DAY_MS).toISOString())
        }
      >
        <option value="">{any}</option>
        {dueDays.map((days) => (
          <option key={days} value={days}>
            {t('filters.days', { count: days })}
          </option>
        ))}
      </Choice>
      <Choice
        label={t('filters.size')}
        value={filter.minInchFeet ?? ''}
        onChange={(value) => set('minInchFeet', value)}
      >
        <option value="">{any}</option>
        {sizes.map((inchFeet) => (
          <option key={inchFeet} value={inchFeet}>
            {t('filters.atLeast', { inchFeet })}
          </option>
        ))}
      </Choice>
      <Choice
        label={t('filters.sort')}
        value={filter.sort ?? 'newest'}
        onChange={(value) => set('sort', value)}
      >
        {sorts.map((sort) => (
          <option key={sort} value={sort}>
            {t(`sorts.${sort}`)}
          </option>
        ))}
      </Choice>
      {Object.keys(filter).length > 0 && (
        <Button variant="soft" color="gray" size="3" onClick={clear}>
          {t('filters.clear')}
        </Button>
      )}
    </search>
  );
}

/** The choice nearest above the instant that stands in the address. */
function dueChoice(dueBefore: string | undefined): string {
  if (dueBefore === undefined) return '';
  const left = (Date.parse(dueBefore) - now().getTime()) / DAY_MS;
  return String(dueDays.find((days) => left <= days) ?? '');
}

function Choice(props: {
  label: string;
  value: string;
  onChange: (value: string) => void;
  children: ReactNode;
}) {
  return (
    <label className={styles.filter}>
      <Text size="2" weight="medium">
        {props.label}
      </Text>
      <select
        className={styles.control}
        value={props.value}
        onChange={(event) => props.onChange(event.target.value)}
      >
        {props.children}
      </select>
    </label>
  );
}
