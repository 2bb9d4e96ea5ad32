import { lazy, Suspense, useRef, useState, type ReactNode, type Ref } from 'react';
import { useTranslation } from 'react-i18next';
import { useAnnounce } from '../../../../components/announcer.tsx';
import { loadWords } from '../../../../lib/i18n.ts';
import type { RawValues } from '../../../calculators/calculator.ts';
import { calculatorLoaders } from '../../../calculators/calculators.ts';
import type { DraftCut } from '../../cut-lines.ts';
import type { PlanDialogProps } from './plan-dialog.tsx';
import { planners, type PlannedKind } from './planners.ts';

// Most cut lists are typed without a plan: the calculators and their words come with the first press.
const dialogs = {
  trench: lazy(() => loadDialog('trench')),
  joints: lazy(() => loadDialog('joints')),
} satisfies Record<PlannedKind, unknown>;

async function loadDialog(kind: PlannedKind) {
  const [{ PlanDialog }, { default: calculator }] = await Promise.all([
    import('./plan-dialog.tsx'),
    calculatorLoaders[kind](),
    loadWords(['calculators', 'drawings']),
  ]);
  return { default: (props: PlanDialogProps) => <PlanDialog {...props} calculator={calculator} /> };
}

interface PlanButtonProps {
  kind: PlannedKind;
  /** The cut that is planned; null for one that is not in the list yet. */
  line: DraftCut | null;
  onWrite: (figures: DraftCut['cut']) => void;
  button: (props: { ref: Ref<HTMLButtonElement>; onClick: () => void }) => ReactNode;
}

/** A button that opens the plan of a trench or of joints, and keeps what was typed there for the next look. */
export function PlanButton({ kind, line, onWrite, button }: PlanButtonProps) {
  const { t } = useTranslation('scopes');
  const announce = useAnnounce();
  const [isOpen, setOpen] = useState(false);
  const [typed, setTyped] = useState<RawValues>({});
  const opener = useRef<HTMLButtonElement>(null);
  // A cut that was just added takes the focus itself.
  const isAdded = useRef(false);
  const Dialog = dialogs[kind];
  const { blank, read, write } = planners[kind];
  return (
    <>
      {button({ ref: opener, onClick: () => setOpen(true) })}
      {isOpen && (
        <Suspense fallback={null}>
          <Dialog
            start={line === null ? { ...blank, ...typed } : { ...typed, ...read(line.cut) }}
            title={line === null ? t(`cuts.plan.${kind}`) : t(`cuts.plan.${kind}Of`, { mark: line.mark })}
            write={line === null ? t('cuts.plan.add') : t('cuts.plan.write', { mark: line.mark })}
            onWrite={(values) => {
              onWrite(write(values));
              isAdded.current = line === null;
              announce(line === null ? t('cuts.plan.added') : t('cuts.plan.written', { mark: line.mark }));
            }}
            onClose={(kept) => {
              setTyped(kept);
              setOpen(false);
            }}
            onFocusBack={() => {
              if (!isAdded.current) opener.current?.focus();
              isAdded.current = false;
            }}
          />
        </Suspense>
      )}
    </>
  );
}
