import type { ScopeBody as Body, ScopeDetailView } from '@kerfyard/common/scopes';
import { Heading, Text } from '@radix-ui/themes';
import type { ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import { CutSketch } from '../../../components/cut-sketch.tsx';
import { FileThumbs } from '../../../components/file-thumb.tsx';
import { formatDate, formatPercent } from '../../../lib/format.ts';
import { CutTable } from './cut-table.tsx';
import { ResponsibilityTable } from './responsibility-table.tsx';
import styles from './scope-body.module.css';
import { ScopeCautions } from './scope-cautions.tsx';
import { ScopeTotals } from './scope-totals.tsx';

/** A published scope, read-only, for its own company and for crews alike. */
export function ScopeBody({ scope, body }: { scope: ScopeDetailView; body: Body }) {
  const { t } = useTranslation('scope');
  return (
    <div className={styles.stack}>
      <Section title={t('body.cuts')}>
        <CutSketch cuts={body.cuts.map((line) => line.cut)} />
        {scope.totals !== null && <ScopeTotals totals={scope.totals} cuts={body.cuts} />}
        <CutTable cuts={body.cuts} />
      </Section>
      {body.summary !== '' && <Text as="p">{body.summary}</Text>}
      {scope.files.length > 0 && (
        <Section title={t('body.files')}>
          <FileThumbs files={scope.files} />
        </Section>
      )}
      <ScopeCautions conditions={body.conditions} cuts={body.cuts} />
      <Section title={t('body.site')}>
        <Facts rows={siteRows(body, t)} />
      </Section>
      <Section title={t('responsibilities.title')}>
        <ResponsibilityTable sheet={body.responsibilities} reader={scope.isOwn ? 'gc' : 'crew'} />
      </Section>
      <Section title={t('body.terms')}>
        <Facts rows={termRows(body, t)} />
      </Section>
    </div>
  );
}

function Section({ title, children }: { title: string; children: ReactNode }) {
  return (
    <section className={styles.section}>
      <Heading as="h2" size="5" weight="medium">
        {title}
      </Heading>
      {children}
    </section>
  );
}

type Fact = readonly [label: string, value: string];

function Facts({ rows }: { rows: readonly Fact[] }) {
  return (
    <dl className={styles.facts}>
      {rows
        .filter(([, value]) => value !== '')
        .map(([label, value]) => (
          <FactRow key={label} label={label} value={value} />
        ))}
    </dl>
  );
}

function FactRow({ label, value }: { label: string; value: string }) {
  return (
    <>
      <dt>{label}</dt>
      <dd>{value}</dd>
    </>
  );
}

type Words = (key: string, values?: Record<string, string | number>) => string;

function siteRows({ site, conditions }: Body, t: Words): Fact[] {
  const yesNo = (value: boolean) => t(value ? 'yes' : 'no');
  return [
    [t('site.name'), site.name],
    [
      t('site.address'),
      site.address === '' ? '' : `${site.address}, ${site.city}, ${site.state} ${site.zip}`,
    ],
    [t('site.contact'), site.contact],
    [t('conditions.element'), t(`elements.${conditions.element}`)],
    [t('conditions.face'), t(`faces.${conditions.face}`)],
    [t('conditions.indoors'), yesNo(conditions.indoors)],
    [t('conditions.floor'), conditions.floor],
    [t('conditions.steel'), t(`steel.${conditions.steel}`)],
    [t('conditions.postTension'), t(`postTension.${conditions.postTension}`)],
    [t('conditions.below'), t(`below.${conditions.below}`)],
    [t('conditions.enginesAllowed'), yesNo(conditions.enginesAllowed)],
    [t('conditions.overcutsAllowed'), yesNo(conditions.overcutsAllowed)],
    [t('conditions.workHours'), conditions.workHours],
    [t('conditions.access'), conditions.access],
  ];
}

function termRows({ terms }: Body, t: Words): Fact[] {
  return [
    [t('terms.priceForm'), t(`priceForms.${terms.priceForm}`)],
    [t('terms.work'), `${formatDate(terms.workFrom)} – ${formatDate(terms.workTo)}`],
    [t('terms.retainage'), formatPercent(terms.retainageBasisPoints / 10_000, 1)],
    [t('terms.standbyFree'), t('terms.minutes', { count: terms.standbyFreeMinutes })],
    [t('terms.answerDays'), t('terms.days', { count: terms.answerDays })],
    [t('terms.bidValidDays'), t('terms.days', { count: terms.bidValidDays })],
    [t('terms.wages'), t(`wages.${terms.wages}`)],
    [t('terms.notes'), terms.notes],
  ];
}
