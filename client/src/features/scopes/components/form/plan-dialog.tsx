import { Button, Dialog } from '@radix-ui/themes';
import { useCallback, useDeferredValue, useMemo, useState } from 'react';
import { useTranslation } from 'react-i18next';
import type { Calculator, RawValue, RawValues } from '../../../calculators/calculator.ts';
import { CalculatorForm } from '../../../calculators/components/calculator-form.tsx';
import { CalculatorFound } from '../../../calculators/components/calculator-found.tsx';
import { evaluate } from '../../../calculators/evaluate.ts';
import { initialValues, type Problems } from '../../../calculators/inputs.ts';
import styles from './plan-dialog.module.css';

export interface PlanDialogProps {
  /** Over what the calculator starts with. */
  start: RawValues;
  title: string;
  /** The words of the button that writes the plan into the cut. */
  write: string;
  onWrite: (values: Readonly<Record<string, unknown>>) => void;
  /** With what was typed, to begin with next time. */
  onClose: (typed: RawValues) => void;
  /** Where the focus goes when it is closed. */
  onFocusBack: () => void;
}

/** A calculator over the cut list: its fields, drawing, figures with their working and cautions, and one press to write the cut. */
export function PlanDialog(props: PlanDialogProps & { calculator: Calculator }) {
  const { calculator, start, title, write, onWrite, onClose, onFocusBack } = props;
  const { t } = useTranslation(['scopes', 'calculators']);
  const inputs = useInputsHere(calculator, start);
  // The keystroke shows at once; what follows from it may come a moment later.
  const raw = useDeferredValue(inputs.raw);
  const evaluated = useMemo(() => evaluate(calculator, raw), [calculator, raw]);
  const close = () => onClose(inputs.raw);
  const finish = () => {
    // What is deferred may be a key behind.
    const now = evaluate(calculator, inputs.raw);
    if (now.result === null) return;
    onWrite(now.values);
    close();
  };
  return (
    <Dialog.Root open onOpenChange={(open) => !open && close()}>
      <Dialog.Content
        maxWidth="68rem"
        // It scrolls in itself, so that its buttons stay at its foot.
        maxHeight="calc(100dvh - 4rem)"
        className={styles.dialog ?? ''}
        onCloseAutoFocus={(event) => {
          event.preventDefault();
          onFocusBack();
        }}
      >
        <Dialog.Title as="h2" mb="1">
          {title}
        </Dialog.Title>
        <Dialog.Description size="2" color="gray" mb="4">
          {t(`calculators:${calculator.name}.lead`)}
        </Dialog.Description>
        <div className={styles.plan}>
          <CalculatorForm
            calculator={calculator}
            inputs={inputs}
            problems={seenProblems(evaluated.problems, inputs.raw, inputs.touched)}
          />
          <CalculatorFound calculator={calculator} evaluated={evaluated} />
        </div>
        <div className={styles.actions}>
          <Dialog.Close>
            <Button type="button" size="3" variant="soft" color="gray">
              {t('cuts.plan.close')}
            </Button>
          </Dialog.Close>
          <Button type="button" size="3" disabled={evaluated.result === null} onClick={finish}>
            {write}
          </Button>
        </div>
      </Dialog.Content>
    </Dialog.Root>
  );
}

function useInputsHere(calculator: Calculator, start: RawValues) {
  const [raw, setRaw] = useState<RawValues>(() => ({ ...initialValues(calculator.fields), ...start }));
  const [touched, setTouched] = useState<ReadonlySet<string>>(new Set());
  const set = useCallback((field: string, value: RawValue) => {
    setRaw((before) => ({ ...before, [field]: value }));
    setTouched((before) => (before.has(field) ? before : new Set([...before, field])));
  }, []);
  return { raw, set, touched };
}

/** A field nobody has come to yet is not complained about. */
function seenProblems(problems: Problems, raw: RawValues, touched: ReadonlySet<string>): Problems {
  return Object.fromEntries(
    Object.entries(problems).filter(([field]) => raw[field] !== '' || touched.has(field)),
  );
}
