import type { SubcontractView } from '@kerfyard/common/subcontracts';
import { Button, Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { ButtonLink } from '../../../components/link.tsx';
import { paths } from '../../../lib/paths.ts';
import { nextOf, type Step } from '../next-step.ts';
import styles from './work.module.css';

const places: Record<Exclude<Step, 'setAside' | 'payouts'>, string> = {
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
      {isOurs && <Way step={step} subcontractId={subcontract.id} />}
    </div>
  );
}

function Way({ step, subcontractId }: { step: Step; subcontractId: string }) {
  const { t } = useTranslation('work');
  const words = t(`next.go.${step}`);
  if (step === 'setAside' || step === 'payouts') {
    return (
      <ButtonLink to={step === 'setAside' ? paths.workMoney(subcontractId) : paths.company} size="3">
        {words}
      </ButtonLink>
    );
  }
  return (
    <Button asChild size="3" variant="soft">
      <a href={`#${places[step]}`}>{words}</a>
    </Button>
  );
}
