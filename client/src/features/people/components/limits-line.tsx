import type { Actor, CompanyKind, Role } from '@kerfyard/common/people';
import { Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { formatMoney } from '../../../lib/format.ts';
import { limitsFor } from '../limits-for.ts';

/** A role in one word and its limits in one line. */
export function LimitsLine(props: { role: Role; limits: Actor['limits'] | null; kind: CompanyKind }) {
  const { t } = useTranslation('people');
  const { role, limits, kind } = props;
  const amount = (cents: number | null) =>
    cents === null ? t('noLimit') : t('upTo', { amount: formatMoney(cents, { dropZeroCents: true }) });
  const shown = limits === null ? [] : limitsFor(kind, role).map((name) => ({ name, cents: limits[name] }));
  return (
    <div>
      <Text as="p" size="3">
        {t(`role.${role}`)}
      </Text>
      {shown.length > 0 && (
        <Text as="p" size="2" color="gray">
          {shown.map(({ name, cents }) => t(`limitsLine.${name}`, { amount: amount(cents) })).join(' · ')}
        </Text>
      )}
    </div>
  );
}
