import { Button } from '@radix-ui/themes';
import { useDeferredValue, useMemo, useState } from 'react';
import { useTranslation } from 'react-i18next';
import { useAnnounce } from '../../../components/announcer.tsx';
import type { Calculator } from '../calculator.ts';
import { evaluate } from '../evaluate.ts';
import { useInputsInAddress } from '../hooks/use-inputs-in-address.ts';
import { CalculatorForm } from './calculator-form.tsx';
import { CalculatorFound } from './calculator-found.tsx';
import styles from './calculators.module.css';

/** One calculator: its fields, and beside them the drawing, the results with their working, sources and cautions. */
export function CalculatorView({
  calculator,
  isSheet = false,
}: {
  calculator: Calculator;
  /** Printed, what was typed stays away: the results say it again. */
  isSheet?: boolean;
}) {
  const { t } = useTranslation('calculators');
  const inputs = useInputsInAddress(calculator.fields);
  // The keystroke shows at once; what follows from it may come a moment later.
  const raw = useDeferredValue(inputs.raw);
  const evaluated = useMemo(() => evaluate(calculator, raw), [calculator, raw]);
  return (
    <div className={styles.view}>
      <div className={`${styles.inputs} ${isSheet ? 'k-no-print' : ''}`}>
        <CalculatorForm calculator={calculator} inputs={inputs} problems={evaluated.problems} />
        <div className={styles.actions}>
          <SendButton address={inputs.address} />
          {inputs.isChanged && (
            <Button type="button" variant="soft" color="gray" onClick={inputs.reset}>
              {t('reset')}
            </Button>
          )}
        </div>
      </div>
      <CalculatorFound calculator={calculator} evaluated={evaluated} />
    </div>
  );
}

/** Copies the address, inputs and all. Where the browser does not let it, the address bar holds the same. */
function SendButton({ address }: { address: () => string }) {
  const { t } = useTranslation('calculators');
  const announce = useAnnounce();
  const [said, setSaid] = useState('');
  const say = (words: string) => {
    announce(words);
    setSaid(words);
  };
  const copy = () => {
    const refused = () => say(t('copyRefused'));
    // Pages that do not come over HTTPS have no clipboard.
    const clipboard = navigator.clipboard as Clipboard | undefined;
    if (clipboard === undefined) return refused();
    clipboard.writeText(address()).then(() => say(t('copied')), refused);
  };
  return (
    <>
      <Button type="button" variant="soft" onClick={copy}>
        {t('copy')}
      </Button>
      {said !== '' && (
        <span className={styles.said} aria-hidden="true">
          {said}
        </span>
      )}
    </>
  );
}
