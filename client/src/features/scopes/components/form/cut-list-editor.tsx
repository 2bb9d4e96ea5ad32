import { cutKinds, MAX_CUT_LINES } from '@kerfyard/common/scopes';
import { Button, DropdownMenu, Text } from '@radix-ui/themes';
import { memo, useCallback, useEffect, useRef, type KeyboardEvent } from 'react';
import { useTranslation } from 'react-i18next';
import { useAnnounce } from '../../../../components/announcer.tsx';
import { FieldNotes } from '../../../../components/form/field-frame.tsx';
import type { DraftCut, DraftKind } from '../../cut-lines.ts';
import styles from './cut-list.module.css';
import { PlanButton } from './plan-button.tsx';
import type { PlannedKind } from './planners.ts';
import { CutRow, type CutErrors } from './cut-row.tsx';
import { isFull, type CutListChange } from './use-cut-list.ts';

/** From here on lines out of sight are not laid out. */
const LONG = 40;

interface CutListEditorProps {
  lines: readonly DraftCut[];
  change: (change: CutListChange) => void;
  /** Complaints by place in the list. */
  errors: ReadonlyMap<number, CutErrors>;
  /** A complaint about the list as a whole. */
  error: string | undefined;
}

/**
 * The cut list as it is typed. Return in a figure begins the next cut of the same kind; up and down move between the
 * lines in one column.
 */
export const CutListEditor = memo(function CutListEditor(props: CutListEditorProps) {
  const { lines, change, errors, error } = props;
  const { t } = useTranslation('scopes');
  const list = useRef<HTMLOListElement>(null);
  const changeAndFollow = useFocusAfter(list, lines, change);
  const onKeyDown = (event: KeyboardEvent<HTMLOListElement>) => {
    const target = event.target;
    if (!(target instanceof HTMLInputElement) || target.dataset.column === undefined) return;
    const row = target.closest<HTMLElement>('[data-row]');
    if (row === null) return;
    if (event.key === 'Enter') {
      event.preventDefault();
      changeAndFollow({ type: 'addBelow', id: row.dataset.row ?? '' });
    } else if (event.key === 'ArrowDown' || event.key === 'ArrowUp') {
      const next = neighbour(row, target.dataset.column, event.key);
      if (next === null) return;
      event.preventDefault();
      next.focus();
      next.select();
    }
  };
  return (
    <div className={styles.editor}>
      {lines.length > 0 && (
        <ol
          className={`${styles.rows} ${lines.length > LONG ? styles.long : ''}`}
          ref={list}
          onKeyDown={onKeyDown}
          aria-label={t('cuts.title')}
        >
          {lines.map((line, index) => (
            <CutRow
              key={line.id}
              line={line}
              index={index}
              errors={errors.get(index)}
              change={changeAndFollow}
            />
          ))}
        </ol>
      )}
      <FieldNotes id="cuts" hint={undefined} error={error} />
      <AddButtons
        isFull={isFull(lines)}
        onAdd={(kind) => changeAndFollow({ type: 'add', kind })}
        onPlan={(kind, figures) => changeAndFollow({ type: 'add', kind, figures })}
      />
      <Text as="p" size="1" color="gray">
        {isFull(lines) ? t('cuts.full', { count: MAX_CUT_LINES }) : t('cuts.keys')}
      </Text>
    </div>
  );
});

/** The kinds most scopes are made of; the others are one press further. */
const usualKinds = ['line', 'trench', 'opening', 'core'] as const satisfies readonly DraftKind[];
const otherKinds = cutKinds.filter((kind) => !usualKinds.some((usual) => usual === kind));

const plannedKinds = ['trench', 'joints'] as const satisfies readonly PlannedKind[];

function AddButtons(props: {
  isFull: boolean;
  onAdd: (kind: DraftKind) => void;
  onPlan: (kind: PlannedKind, figures: DraftCut['cut']) => void;
}) {
  const { t } = useTranslation('scopes');
  // The menu gives the focus back to its button; the new line asks for it afterwards.
  const chosen = useRef<DraftKind | null>(null);
  return (
    <div className={styles.add} role="group" aria-label={t('cuts.addGroup')}>
      {usualKinds.map((kind, index) => (
        <Button
          key={kind}
          type="button"
          variant="soft"
          size="3"
          // The summary leads here when the list is empty.
          {...(index === 0 ? { name: 'cuts' } : {})}
          disabled={props.isFull}
          onClick={() => props.onAdd(kind)}
        >
          {t(`cuts.add.${kind}`)}
        </Button>
      ))}
      <DropdownMenu.Root>
        <DropdownMenu.Trigger>
          <Button type="button" variant="soft" color="gray" size="3" disabled={props.isFull}>
            {t('cuts.addMore')}
            <DropdownMenu.TriggerIcon />
          </Button>
        </DropdownMenu.Trigger>
        <DropdownMenu.Content
          onCloseAutoFocus={(event) => {
            if (chosen.current === null) return;
            event.preventDefault();
            props.onAdd(chosen.current);
            chosen.current = null;
          }}
        >
          {otherKinds.map((kind) => (
            <DropdownMenu.Item
              key={kind}
              onSelect={() => {
                chosen.current = kind;
              }}
            >
              {t(`cuts.kinds.${kind}`)}
            </DropdownMenu.Item>
          ))}
        </DropdownMenu.Content>
      </DropdownMenu.Root>
      {plannedKinds.map((kind) => (
        <PlanButton
          key={kind}
          kind={kind}
          line={null}
          onWrite={(figures) => props.onPlan(kind, figures)}
          button={(opener) => (
            <Button
              {...opener}
              type="button"
              variant="outline"
              color="gray"
              size="3"
              aria-haspopup="dialog"
              disabled={props.isFull}
            >
              {t(`cuts.plan.${kind}`)}
            </Button>
          )}
        />
      ))}
    </div>
  );
}

/** The same column of the next or previous line that has it. */
function neighbour(row: HTMLElement, column: string, key: string): HTMLInputElement | null {
  const step = key === 'ArrowDown' ? 'nextElementSibling' : 'previousElementSibling';
  for (let next = row[step]; next !== null; next = next[step]) {
    const found = next.querySelector<HTMLInputElement>(`input[data-column="${CSS.escape(column)}"]`);
    if (found !== null) return found;
  }
  return null;
}

/** After a line was added the focus is in its first figure; after one was removed, in the line that took its place. */
function useFocusAfter(
  list: React.RefObject<HTMLOListElement | null>,
  lines: readonly DraftCut[],
  change: (change: CutListChange) => void,
): (change: CutListChange) => void {
  const { t } = useTranslation('scopes');
  const announce = useAnnounce();
  const before = useRef<{ lines: readonly DraftCut[]; change: CutListChange } | null>(null);
  const latest = useRef(lines);
  useEffect(() => {
    latest.current = lines;
    const done = before.current;
    before.current = null;
    if (done === null) return;
    if (done.change.type === 'remove') {
      const removed = done.lines.findIndex(
        (line) => done.change.type === 'remove' && line.id === done.change.id,
      );
      announce(t('cuts.removed', { mark: done.lines[removed]?.mark ?? '' }));
      const next = lines[Math.min(removed, lines.length - 1)];
      if (next !== undefined) focusLine(list.current, next.id, 'button');
      return;
    }
    const known = new Set(done.lines.map((line) => line.id));
    const added = lines.find((line) => !known.has(line.id));
    if (added !== undefined) focusLine(list.current, added.id, 'input[inputmode]');
  }, [lines, list, announce, t]);
  return useCallback(
    (wanted: CutListChange) => {
      const moves = ['add', 'addBelow', 'duplicate', 'remove'].includes(wanted.type);
      if (moves) before.current = { lines: latest.current, change: wanted };
      change(wanted);
    },
    [change],
  );
}

function focusLine(list: HTMLElement | null, id: string, what: string): void {
  const row = list?.querySelector<HTMLElement>(`[data-row="${id}"]`);
  row?.querySelector<HTMLElement>(what)?.focus();
}
