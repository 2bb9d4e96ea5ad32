import { cutKinds } from '@kerfyard/common/scopes';
import { IconButton, Text } from '@radix-ui/themes';
import { memo, useCallback, useId, useState } from 'react';
import { useTranslation } from 'react-i18next';
import { FieldNotes } from '../../../../components/form/field-frame.tsx';
import formStyles from '../../../../components/form/form.module.css';
import { Figure } from '../../../../components/figure.tsx';
import {
  fieldsOfKind,
  isDetailField,
  kindOf,
  readCut,
  type DraftCut,
  type DraftKind,
} from '../../cut-lines.ts';
import { CutDetails } from './cut-details.tsx';
import { CutInput } from './cut-input.tsx';
import styles from './cut-list.module.css';
import { PlanButton } from './plan-button.tsx';
import { isPlanned } from './planners.ts';
import type { CutListChange } from './use-cut-list.ts';

/** Complaints about one line by field: `mark`, `note`, `depthIn`, `removal.maxPieceLb`. */
export type CutErrors = Readonly<Record<string, string>>;

interface CutRowProps {
  line: DraftCut;
  index: number;
  errors: CutErrors | undefined;
  change: (change: CutListChange) => void;
}

const noErrors: CutErrors = {};

/** One cut: its mark, its kind, its figures, what they come to. Only the line that changes is drawn again. */
export const CutRow = memo(function CutRow({ line, index, errors, change }: CutRowProps) {
  const { t } = useTranslation('scopes');
  const reading = readCut(line);
  const said: CutErrors =
    reading.state === 'refused' ? { ...reading.errors, ...errors } : (errors ?? noErrors);
  const needsDetails = Object.keys(said).some(isDetailField);
  const [wanted, setWanted] = useState(false);
  // Opened by a complaint they stay open once it is answered: someone is typing in there.
  if (needsDetails && !wanted) setWanted(true);
  const open = wanted || needsDetails;
  const kind = kindOf(line);
  const { id } = line;
  const setFigure = useCallback(
    (field: string, value: number | string | null) => change({ type: 'figure', id, field, value }),
    [change, id],
  );
  const words = { mark: line.mark };
  return (
    <li className={styles.row} data-row={id} aria-label={t('cuts.row', words)}>
      <div className={styles.line}>
        <MarkInput line={line} index={index} error={said.mark} change={change} />
        <KindSelect line={line} change={change} />
        {fieldsOfKind[kind].map((field) => (
          <CutInput
            key={field.name}
            name={`cuts.${index}.cut.${field.name}`}
            column={field.name}
            label={t(`cuts.fields.${field.name}`)}
            unit={field.unit}
            value={line.cut[field.name]}
            error={said[field.name]}
            onChange={setFigure}
          />
        ))}
        <CutInput
          name={`cuts.${index}.cut.count`}
          column="count"
          label={t('cuts.fields.count')}
          value={line.cut.count}
          error={said.count}
          onChange={setFigure}
        />
        <div className={styles.buttons}>
          <RowButton label={t('cuts.duplicate', words)} onPress={() => change({ type: 'duplicate', id })}>
            <path d="M2 5h7v7H2zM5 5V2h7v7H9" />
          </RowButton>
          <RowButton label={t('cuts.remove', words)} onPress={() => change({ type: 'remove', id })}>
            <path d="m3 3 8 8M11 3l-8 8" />
          </RowButton>
        </div>
      </div>
      <div className={styles.sum}>
        <Quantities line={line} />
        {isPlanned(kind) && (
          <PlanButton
            kind={kind}
            line={line}
            onWrite={(figures) => change({ type: 'figures', id, figures })}
            button={(opener) => (
              <button
                {...opener}
                type="button"
                className={`${styles.more} ${styles.plan}`}
                aria-haspopup="dialog"
                aria-label={t('cuts.plan.of', words)}
              >
                {t('cuts.plan.short')}
              </button>
            )}
          />
        )}
        <button
          type="button"
          className={styles.more}
          aria-expanded={open}
          aria-label={t('cuts.detailsOf', words)}
          onClick={() => setWanted(!open)}
        >
          {t(open ? 'cuts.lessDetails' : 'cuts.details')}
        </button>
      </div>
      {open && <CutDetails line={line} index={index} errors={said} change={change} onFigure={setFigure} />}
    </li>
  );
});

function MarkInput(props: {
  line: DraftCut;
  index: number;
  error: string | undefined;
  change: (change: CutListChange) => void;
}) {
  const { line, index, error, change } = props;
  const { t } = useTranslation('scopes');
  const id = useId();
  return (
    <span className={styles.field}>
      <label htmlFor={id} className={styles.label}>
        {t('cuts.fields.mark')}
      </label>
      <input
        id={id}
        name={`cuts.${index}.mark`}
        data-column="mark"
        className={formStyles.control}
        autoComplete="off"
        maxLength={16}
        value={line.mark}
        aria-invalid={error === undefined ? undefined : true}
        aria-describedby={error === undefined ? undefined : `${id}-error`}
        onChange={(event) => change({ type: 'mark', id: line.id, mark: event.target.value })}
      />
      <FieldNotes id={id} hint={undefined} error={error} />
    </span>
  );
}

function KindSelect({ line, change }: { line: DraftCut; change: (change: CutListChange) => void }) {
  const { t } = useTranslation('scopes');
  const id = useId();
  return (
    <span className={styles.field}>
      <label htmlFor={id} className={styles.label}>
        {t('cuts.fields.kind')}
      </label>
      <select
        id={id}
        className={formStyles.control}
        value={kindOf(line)}
        onChange={(event) => change({ type: 'kind', id: line.id, kind: event.target.value as DraftKind })}
      >
        {cutKinds.map((kind) => (
          <option key={kind} value={kind}>
            {t(`cuts.kinds.${kind}`)}
          </option>
        ))}
      </select>
    </span>
  );
}

const shownFigures = [
  { key: 'inchFeet', unit: 'in-ft' },
  { key: 'sawFt', unit: 'ft' },
  { key: 'overcutFt', unit: 'ft' },
  { key: 'crossCutFt', unit: 'ft' },
  { key: 'coreInches', unit: 'core-in' },
] as const;

/** What the line comes to; each figure opens to its working. */
function Quantities({ line }: { line: DraftCut }) {
  const { t } = useTranslation(['scopes', 'scope']);
  const reading = readCut(line);
  if (reading.state !== 'whole') {
    return (
      <Text size="2" color="gray">
        {t('cuts.half')}
      </Text>
    );
  }
  const { takeoff } = reading;
  return (
    <dl className={styles.quantities}>
      {shownFigures
        .filter(({ key }) => takeoff[key] > 0)
        .map(({ key, unit }) => (
          <div key={key}>
            <dt>{t(`scope:totals.${key}`)}</dt>
            <dd>
              <Figure
                label={`${line.mark}, ${t(`scope:totals.${key}`)}`}
                value={takeoff[key]}
                unit={unit}
                size="small"
                working={takeoff.working}
              />
            </dd>
          </div>
        ))}
    </dl>
  );
}

function RowButton(props: { label: string; onPress: () => void; children: React.ReactNode }) {
  return (
    <IconButton
      type="button"
      variant="soft"
      color="gray"
      size="3"
      aria-label={props.label}
      title={props.label}
      onClick={props.onPress}
    >
      <svg
        width="14"
        height="14"
        viewBox="0 0 14 14"
        fill="none"
        stroke="currentColor"
        strokeWidth="1.6"
        aria-hidden="true"
        focusable="false"
      >
        {props.children}
      </svg>
    </IconButton>
  );
}
