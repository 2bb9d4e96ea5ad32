import type { Conditions, CutLine } from '@kerfyard/common/scopes';
import { Callout, Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import styles from './scope-body.module.css';

/** What can hurt in this scope, beside the matter itself; local codes and licensed practice decide. */
export function ScopeCautions({
  conditions,
  cuts,
}: {
  conditions: Partial<Conditions>;
  cuts: readonly Pick<CutLine, 'cut'>[];
}) {
  const { t } = useTranslation('scope');
  const pieces = cuts.some(({ cut }) => cut.kind === 'opening' || cut.kind === 'trench');
  const cores = cuts.some(({ cut }) => cut.kind === 'core');
  const elevated =
    conditions.face !== 'floor' || (conditions.below !== undefined && conditions.below !== 'soil');
  const shown = [
    conditions.postTension !== 'proved_none' && 'post_tension',
    'embedded',
    'silica',
    conditions.indoors === true && 'carbon_monoxide',
    elevated && pieces && 'falling_pieces',
    elevated && cores && 'falling_cores',
    conditions.below === 'unknown' && 'below_unknown',
    conditions.face === 'floor' && conditions.below === 'soil' && pieces && 'soil',
    'slurry',
  ].filter((key) => key !== false);
  return (
    <Callout.Root color="amber" variant="surface">
      <div>
        <Text as="p" weight="medium" mb="2">
          {t('cautions.title')}
        </Text>
        <ul className={styles.cautions}>
          {shown.map((key) => (
            <li key={key}>{t(`cautions.${key}`)}</li>
          ))}
        </ul>
        <Text as="p" size="2" mt="2">
          {t('cautions.defer')}
        </Text>
      </div>
    </Callout.Root>
  );
}
