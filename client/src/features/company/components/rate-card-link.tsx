import { Heading, Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { ButtonLink } from '../../../components/link.tsx';
import { paths } from '../../../lib/paths.ts';

/** The way to the crew's own rate card. */
export function RateCardLink() {
  const { t } = useTranslation('company');
  return (
    <section className="k-panel" aria-labelledby="rate-card">
      <Heading as="h2" size="4" weight="medium" mb="1" id="rate-card">
        {t('rateCard.title')}
      </Heading>
      <Text as="p" size="2" color="gray" mb="3">
        {t('rateCard.text')}
      </Text>
      <ButtonLink to={paths.rateCard} size="3" variant="soft">
        {t('rateCard.open')}
      </ButtonLink>
    </section>
  );
}
