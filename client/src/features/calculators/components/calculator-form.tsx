import { memo } from 'react';
import { useTranslation } from 'react-i18next';
import type { Calculator, FieldSpec, RawValue } from '../calculator.ts';
import type { Inputs } from '../hooks/use-inputs-in-address.ts';
import type { Problems } from '../inputs.ts';
import { ChoiceInput, NumberInput, SetInput, SwitchInput } from './calculator-fields.tsx';
import styles from './calculators.module.css';
import { RowsInput, said } from './rows-input.tsx';

interface CalculatorFormProps {
  calculator: Calculator;
  inputs: Pick<Inputs, 'raw' | 'set'>;
  problems: Problems;
}

/** The fields of a calculator in their groups. It computes while one types: there is nothing to send. */
export function CalculatorForm({ calculator, inputs, problems }: CalculatorFormProps) {
  const { t } = useTranslation('calculators');
  return (
    <form className={styles.form} onSubmit={(event) => event.preventDefault()} noValidate>
      {calculator.sections.map((section) => (
        <fieldset key={section.name} className={styles.section}>
          <legend className={styles.sectionHead}>{t(`${calculator.name}.sections.${section.name}`)}</legend>
          <div className={styles.fields}>
            {section.fields.map((name) => {
              const spec = calculator.fields[name];
              return spec === undefined ? null : (
                <Field
                  key={name}
                  calculator={calculator.name}
                  name={name}
                  spec={spec}
                  value={inputs.raw[name] ?? ''}
                  problem={problems[name]}
                  cellProblems={spec.kind === 'rows' ? problems : undefined}
                  onSet={inputs.set}
                />
              );
            })}
          </div>
        </fieldset>
      ))}
    </form>
  );
}

interface FieldProps {
  calculator: string;
  name: string;
  spec: FieldSpec;
  value: RawValue;
  problem: string | undefined;
  /** Of a table: what is wrong in its cells. */
  cellProblems: Problems | undefined;
  onSet: Inputs['set'];
}

/** One field; drawn anew only when something of its own changed, since a calculator draws on every keystroke. */
const Field = memo(function Field(props: FieldProps) {
  const { calculator, name, spec, value, problem, cellProblems, onSet } = props;
  const { t, i18n } = useTranslation('calculators');
  if (spec.kind === 'rows') {
    return (
      <RowsInput
        calculator={calculator}
        field={name}
        spec={spec}
        rows={typeof value === 'string' ? [] : value}
        problems={cellProblems ?? {}}
        onChange={(rows) => onSet(name, rows)}
      />
    );
  }
  const hintKey = `${calculator}.hints.${name}`;
  const shared = {
    name,
    label: t(`${calculator}.fields.${name}`),
    hint: i18n.exists(hintKey, { ns: 'calculators' }) ? t(hintKey) : undefined,
    error: said(problem, t),
    text: typeof value === 'string' ? value : '',
    onChange: (text: string) => onSet(name, text),
  };
  switch (spec.kind) {
    case 'number':
      return <NumberInput {...shared} spec={spec} />;
    case 'numbers':
      return <NumberInput {...shared} spec={{ unit: spec.unit, optional: true }} long />;
    case 'choice':
      return <ChoiceInput {...shared} spec={spec} words={name} />;
    case 'set':
      return <SetInput {...shared} spec={spec} words={name} />;
    case 'switch':
      return <SwitchInput {...shared} spec={spec} />;
  }
});
