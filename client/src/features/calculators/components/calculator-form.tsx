import { useTranslation } from 'react-i18next';
import type { Calculator, FieldSpec } from '../calculator.ts';
import type { Inputs } from '../hooks/use-inputs-in-address.ts';
import type { Problems } from '../inputs.ts';
import { ChoiceInput, NumberInput, SetInput, SwitchInput } from './calculator-fields.tsx';
import styles from './calculators.module.css';
import { RowsInput, said } from './rows-input.tsx';

interface CalculatorFormProps {
  calculator: Calculator;
  inputs: Inputs;
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
                  calculator={calculator}
                  name={name}
                  spec={spec}
                  inputs={inputs}
                  problems={problems}
                />
              );
            })}
          </div>
        </fieldset>
      ))}
    </form>
  );
}

interface FieldProps extends CalculatorFormProps {
  name: string;
  spec: FieldSpec;
}

function Field({ calculator, name, spec, inputs, problems }: FieldProps) {
  const { t, i18n } = useTranslation('calculators');
  const value = inputs.raw[name] ?? '';
  if (spec.kind === 'rows') {
    return (
      <RowsInput
        calculator={calculator.name}
        field={name}
        spec={spec}
        rows={typeof value === 'string' ? [] : value}
        problems={problems}
        onChange={(rows) => inputs.set(name, rows)}
      />
    );
  }
  const hintKey = `${calculator.name}.hints.${name}`;
  const shared = {
    name,
    label: t(`${calculator.name}.fields.${name}`),
    hint: i18n.exists(hintKey, { ns: 'calculators' }) ? t(hintKey) : undefined,
    error: said(problems[name], t),
    text: typeof value === 'string' ? value : '',
    onChange: (text: string) => inputs.set(name, text),
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
}
