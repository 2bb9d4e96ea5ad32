import type { RateRow } from '@kerfyard/common/people';
import { Button, Callout, Text } from '@radix-ui/themes';
import { useRef, useState } from 'react';
import { useTranslation } from 'react-i18next';
import { useAnnounce } from '../../../components/announcer.tsx';
import { downloadCsv } from '../../../lib/csv.ts';
import { MAX_FILE_BYTES, readRates, writeRates, type CsvIssue } from '../rate-csv.ts';
import styles from './rate-card.module.css';

interface RateFileProps {
  /** The rates as they stand; null while some of them make no sense. */
  rows: () => readonly RateRow[] | null;
  onRead: (rows: RateRow[]) => void;
  canEdit: boolean;
}

/** Rates out to a spreadsheet and back in: a file with a fault changes nothing and says where each is. */
export function RateFile({ rows, onRead, canEdit }: RateFileProps) {
  const { t } = useTranslation('rate-card');
  const announce = useAnnounce();
  const input = useRef<HTMLInputElement>(null);
  const [issues, setIssues] = useState<readonly CsvIssue[]>([]);
  const [said, setSaid] = useState<string | null>(null);
  const tell = (text: string) => {
    setSaid(text);
    announce(text);
  };
  const read = async (file: File) => {
    setIssues([]);
    setSaid(null);
    // Looked at before a byte of it is read.
    const found = file.size > MAX_FILE_BYTES ? tooLarge : readRates(await file.text());
    if (!found.ok) {
      setIssues(found.issues);
      announce(t('file.refused'));
      return;
    }
    onRead(found.rows);
    tell(t('file.read', { count: found.rows.length }));
  };
  const save = () => {
    const now = rows();
    if (now === null) tell(t('file.notYet'));
    else downloadCsv('rate-card.csv', writeRates(now));
  };
  return (
    <>
      <div className={styles.row}>
        <Button type="button" variant="soft" color="gray" size="2" onClick={save}>
          {t('file.save')}
        </Button>
        {canEdit && (
          <>
            <Button type="button" variant="soft" color="gray" size="2" onClick={() => input.current?.click()}>
              {t('file.open')}
            </Button>
            <input
              ref={input}
              type="file"
              accept=".csv,text/csv"
              hidden
              aria-label={t('file.open')}
              onChange={(event) => {
                const [file] = event.target.files ?? [];
                event.target.value = '';
                if (file !== undefined) void read(file);
              }}
            />
          </>
        )}
        {said !== null && <Text size="2">{said}</Text>}
      </div>
      {issues.length > 0 && <Faults issues={issues} />}
    </>
  );
}

const tooLarge = { ok: false, issues: [{ problem: 'too_large', allowed: '256 kB' }] } as const;

function Faults({ issues }: { issues: readonly CsvIssue[] }) {
  const { t } = useTranslation('rate-card');
  return (
    <Callout.Root color="red" variant="surface" role="alert">
      <div>
        <Text as="p" weight="medium" mb="1">
          {t('file.refused')}
        </Text>
        <ul className={styles.faults}>
          {issues.map((issue) => (
            <li key={`${issue.problem} ${issue.row ?? ''} ${issue.column ?? ''}`}>
              {t(`file.problems.${issue.problem}`, {
                row: issue.row,
                column: issue.column,
                given: issue.given === '' ? t('file.nothing') : issue.given,
                allowed: issue.allowed,
              })}
            </li>
          ))}
        </ul>
      </div>
    </Callout.Root>
  );
}
