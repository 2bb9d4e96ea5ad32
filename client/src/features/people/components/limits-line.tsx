import type { Actor, CompanyKind, Role } from '@kerfyard/common/people';
import { Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { formatMoney } from '../../../lib/format.ts';

/** A role in one word and its limits in one line. */
export function LimitsLine(props: { role: Role; limits: Actor['limits'] | null; kind: CompanyKind }) {
  const { t } = useTranslation('people');
  const { role, limits, kind } = props;
  const amount = (cents: number | null) =>
    cents === null ? t('noLimit') : formatMoney(cents, { dropZeroCents: true });
  return (
    <div>
      <Text as="p" size="3">
        {t(`role.${role}`)}
      </Text>
      {limits !== null && role !== 'owner' && (
        <Text as="p" size="2" color="gray">
          {t(`limitsLine.${kind}`, {
            sign: amount(limits.signCents),
            setAside: amount(limits.setAsideCents),
            change: amount(limits.changeCents),
          })}
        </Text>
      )}
    </div>
  );
}
