import type { SubcontractView } from '@kerfyard/common/subcontracts';
import { Button, Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { ButtonLink } from '../../../components/link.tsx';
import { paths } from '../../../lib/paths.ts';
import { nextOf, type Step } from '../next-step.ts';
import styles from './work.module.css';

const places: Record<Exclude<Step, 'setAside'>, string> = {
  sign: 'paper',
  propose: 'visits',
  confirm: 'visits',
  start: 'visits',
  finish: 'visits',
  complete: 'completion',
  accept: 'completion',
  release: 'completion',
};

/** One sentence: what is next, and whose move it is; with the way there when it is the reader's. */
export function NextStep({ subcontract }: { subcontract: SubcontractView }) {
  const { t } = useTranslation('work');
  const next = nextOf(subcontract);
  if (next === null) return null;
  const { step, isOurs } = next;
  const other = subcontract.side === 'gc' ? subcontract.crew : subcontract.gc;
  return (
    <div className={styles.next}>
      <Text size="3">
        <Text color="gray" mr="2">
          {t('next.label')}
        </Text>
        {t(`next.${isOurs ? 'ours' : 'wait'}.${step}`, { name: other.name })}
      </Text>
      {isOurs && step === 'setAside' && (
        <ButtonLink to={paths.workMoney(subcontract.id)} size="3">
          {t('next.go.setAside')}
        </ButtonLink>
      )}
      {isOurs && step !== 'setAside' && (
        <Button asChild size="3" variant="soft">
          <a href={`#${places[step]}`}>{t(`next.go.${step}`)}</a>
        </Button>
      )}
    </div>
  );
}
