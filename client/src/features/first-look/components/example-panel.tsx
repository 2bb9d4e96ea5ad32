import { Heading, Text } from '@radix-ui/themes';
import { useId, useMemo, useState } from 'react';
import { useTranslation } from 'react-i18next';
import { CutSketch } from '../../../components/cut-sketch.tsx';
import { Figure } from '../../../components/figure.tsx';
import { MoneyLine } from '../../../components/money-line.tsx';
import { formatMoney } from '../../../lib/format.ts';
import { exampleScope } from '../example-scope.ts';
import styles from './first-look.module.css';

/** A scope as everyone here sees one: drawn, counted, priced, paid. Two of its numbers may be moved. */
export function ExamplePanel() {
  const { t } = useTranslation('first-look');
  const [trenchFt, setTrenchFt] = useState(40);
  const [slabIn, setSlabIn] = useState(6);
  const scope = useMemo(() => exampleScope({ trenchFt, slabIn }), [trenchFt, slabIn]);
  return (
    <section className={styles.example} aria-labelledby="example">
      <div className={styles.exampleHead}>
        <Heading as="h2" size="3" weight="medium" id="example">
          {t('example.title')}
        </Heading>
        <Text size="2" color="gray">
          {t('example.invented')}
        </Text>
      </div>
      <CutSketch cuts={scope.cuts} />
      <div className={styles.sliders}>
        <Slider
          label={t('example.trench')}
          unit="ft"
          min={10}
          max={80}
          value={trenchFt}
          onChange={setTrenchFt}
        />
        <Slider label={t('example.slab')} unit="in" min={4} max={10} value={slabIn} onChange={setSlabIn} />
      </div>
      <dl className={styles.figures}>
        <Entry label={t('example.saw')}>
          <Figure
            label={t('example.saw')}
            value={scope.sawFt}
            unit="LF"
            working={scope.working.sawFt}
            size="large"
          />
        </Entry>
        <Entry label={t('example.depth')}>
          <Figure
            label={t('example.depth')}
            value={scope.inchFeet}
            unit="in-ft"
            working={scope.working.inchFeet}
            size="large"
          />
        </Entry>
        <Entry label={t('example.pieces')}>
          <Figure
            label={t('example.pieces')}
            value={scope.pieces}
            unit={t('example.heaviest', { lb: Math.round(scope.heaviestLb ?? 0) })}
            working={scope.working.pieces}
            size="large"
          />
        </Entry>
        <Entry label={t('example.price')}>
          <Figure
            label={t('example.price')}
            value={formatMoney(scope.priceCents, { dropZeroCents: true })}
            unit=""
            working={scope.working.price}
            size="large"
          />
        </Entry>
      </dl>
      <MoneyLine money={scope.money} />
    </section>
  );
}

function Entry({ label, children }: { label: string; children: React.ReactNode }) {
  return (
    <div>
      <dt>{label}</dt>
      <dd>{children}</dd>
    </div>
  );
}

interface SliderProps {
  label: string;
  unit: string;
  min: number;
  max: number;
  value: number;
  onChange: (value: number) => void;
}

function Slider({ label, unit, min, max, value, onChange }: SliderProps) {
  const id = useId();
  return (
    <div className={styles.slider}>
      <label htmlFor={id}>{label}</label>
      <input
        id={id}
        type="range"
        min={min}
        max={max}
        step={1}
        value={value}
        aria-valuetext={`${value} ${unit}`}
        onChange={(event) => onChange(Number(event.target.value))}
      />
      <output htmlFor={id}>
        {value} <span>{unit}</span>
      </output>
    </div>
  );
}
