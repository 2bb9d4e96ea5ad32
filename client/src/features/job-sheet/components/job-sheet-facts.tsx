import type { SubcontractView } from '@kerfyard/common/subcontracts';
import type { VisitView } from '@kerfyard/common/visits';
import { useTranslation } from 'react-i18next';
import { formatDateTime, formatTime } from '../../../lib/format.ts';
import styles from './job-sheet.module.css';

/** Where, when, who, and the conditions that decide how it is cut. */
export function JobSheetFacts({
  subcontract,
  visit,
}: {
  subcontract: SubcontractView;
  visit: VisitView | null;
}) {
  const { t } = useTranslation(['calculators', 'scope']);
  const { site, conditions } = subcontract;
  const facts: readonly (readonly [string, string])[] = [
    ['site', `${site.name}, ${site.address}, ${site.city}, ${site.state}`],
    ...(visit?.window
      ? [['window', windowWords(visit.window.startsAt, visit.window.endsAt, visit.timeZone)] as const]
      : []),
    ...(visit === null ? [] : [['unit', `${visit.crew.name} · ${visit.truck.name}`] as const]),
    ['element', t(`scope:elements.${conditions.element}`)],
    ['steel', t(`scope:steel.${conditions.steel}`)],
    ['postTension', t(`scope:postTension.${conditions.postTension}`)],
    ['below', t(`scope:below.${conditions.below}`)],
    ['engines', t(conditions.enginesAllowed && !conditions.indoors ? 'yes' : 'no')],
    ['overcuts', t(conditions.overcutsAllowed ? 'yes' : 'no')],
  ];
  return (
    <dl className={styles.facts}>
      {facts.map(([name, words]) => (
        <div key={name}>
          <dt>{t(`jobSheet.facts.${name}`)}</dt>
          <dd>{words}</dd>
        </div>
      ))}
    </dl>
  );
}

function windowWords(startsAt: string, endsAt: string, timeZone: string): string {
  return `${formatDateTime(startsAt, timeZone)} – ${formatTime(endsAt, timeZone)}`;
}
