import {
  conditionsSchema,
  methodFits,
  methodQuestion,
  methodVerdicts,
  type CutLine,
  type CutPlace,
  type MethodFit,
  type SaidOfCuts,
} from '@kerfyard/common/scopes';
import { Button, Text } from '@radix-ui/themes';
import { memo, useId, useMemo, useState } from 'react';
import { useFormContext, useWatch } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { readCut, type DraftCut } from '../../cut-lines.ts';
import type { ScopeFormValues } from '../../scope-form-values.ts';
import styles from './method-picker.module.css';

/** Marks and sentences shown one by one; a list of 500 cuts has more than anyone reads. */
const SHOWN = 8;

/**
 * Which saws and drills fit the cut list under its conditions, in one line; opened, every method with its reasons and
 * cautions. The same verdicts decide which crews hear of the scope.
 */
export const MethodPicker = memo(function MethodPicker({ lines }: { lines: readonly DraftCut[] }) {
  const { t } = useTranslation(['scopes', 'scope']);
  const { control } = useFormContext<ScopeFormValues>();
  const conditions = useWatch({ control, name: 'conditions' });
  const [isOpen, setOpen] = useState(false);
  const id = useId();
  const whole = useMemo(() => wholeLines(lines), [lines]);
  const asked = askedOf(conditions);
  const place = placeOf(conditions);
  // The same place by value, whatever else of the conditions is typed.
  const key = JSON.stringify(place);
  const verdicts = useSameItems(
    useMemo(() => {
      const known = JSON.parse(key) as CutPlace | null;
      return known === null ? [] : whole.map((line) => verdictsOf(line.cut, known));
    }, [whole, key]),
  );
  const fits = useMemo(() => (verdicts.length === 0 ? null : methodFits(verdicts)), [verdicts]);
  if (fits === null) {
    return (
      <Text as="p" size="2" color="gray">
        {whole.length === 0
          ? t('methods.noCuts')
          : t('methods.noPlace', { names: asked.map((name) => t(`scope:conditions.${name}`)).join(', ') })}
      </Text>
    );
  }
  const able = fits.filter((fit) => fit.fits.length > 0);
  const others = fits.filter((fit) => fit.fits.length === 0);
  return (
    <>
      <div className={styles.sentence}>
        <Text as="p" size="4" weight="medium" className={styles.words ?? ''}>
          {able.length === 0
            ? t('methods.none')
            : t('methods.sentence', {
                names: able.map(({ method }) => t(`methods.names.${method}`)).join(', '),
                count: others.length,
              })}
        </Text>
        <Button
          type="button"
          variant="soft"
          size="3"
          aria-expanded={isOpen}
          aria-controls={id}
          onClick={() => setOpen(!isOpen)}
        >
          {t(isOpen ? 'methods.close' : 'methods.open')}
        </Button>
      </div>
      {isOpen && (
        <div id={id} className={styles.lists}>
          {able.length > 0 && <Methods title={t('methods.fit')} fits={able} lines={whole} />}
          {others.length > 0 && <Methods title={t('methods.doNotFit')} fits={others} lines={whole} />}
          <Text as="p" size="1" color="gray">
            {t('methods.source')}
          </Text>
        </div>
      )}
    </>
  );
});

function Methods(props: { title: string; fits: readonly MethodFit[]; lines: readonly CutLine[] }) {
  const { title, fits, lines } = props;
  const { t } = useTranslation('scopes');
  const id = useId();
  return (
    <section aria-labelledby={id} className={styles.list}>
      <Text as="p" size="2" weight="medium" id={id}>
        {title}
      </Text>
      <ul className={styles.methods} aria-labelledby={id}>
        {fits.map((fit) => (
          <li key={fit.method} className={styles.method}>
            <Text as="p" size="2" weight="medium" className={styles.words ?? ''}>
              {t(`methods.names.${fit.method}`)}
            </Text>
            {fit.fits.length > 0 && fit.fits.length < lines.length && (
              <Text as="p" size="2">
                {t('methods.does', { marks: marksOf(fit.fits, lines) })}
              </Text>
            )}
            <Said said={fit.cautions} lines={lines} look={styles.caution} />
            <Said said={fit.reasons} lines={lines} look={styles.reason} />
          </li>
        ))}
      </ul>
    </section>
  );
}

/** Sentences with the cuts each is about; without them where it is every cut. */
function Said(props: { said: readonly SaidOfCuts[]; lines: readonly CutLine[]; look: string | undefined }) {
  const { said, lines, look } = props;
  const { t } = useTranslation('scopes');
  if (said.length === 0) return null;
  return (
    <ul className={`${styles.said} ${look ?? ''}`}>
      {said.slice(0, SHOWN).map(({ text, cuts }) => (
        <li key={text}>
          {cuts.length === lines.length ? text : t('methods.of', { marks: marksOf(cuts, lines), text })}
        </li>
      ))}
      {said.length > SHOWN && <li>{t('methods.more', { count: said.length - SHOWN })}</li>}
    </ul>
  );
}

function marksOf(places: readonly number[], lines: readonly CutLine[]): string {
  const marks = places.slice(0, SHOWN).map((place) => lines[place]?.mark ?? '');
  return places.length > SHOWN ? `${marks.join(', ')} +${places.length - SHOWN}` : marks.join(', ');
}

function wholeLines(lines: readonly DraftCut[]): CutLine[] {
  return lines.flatMap((line) => {
    const reading = readCut(line);
    return reading.state === 'whole' ? [reading.line] : [];
  });
}

type Verdicts = ReturnType<typeof methodVerdicts>;

// Cuts that ask the same share one verdict: a length changes none, however long the list.
const judged = new Map<string, Verdicts>();
const MOST_JUDGED = 2000;

function verdictsOf(cut: CutLine['cut'], place: CutPlace): Verdicts {
  const ownCores = (cut.kind === 'opening' && cut.corners) || (cut.kind === 'wire' && cut.pilotCores > 0);
  const question = JSON.stringify([methodQuestion(cut, place), ownCores]);
  const known = judged.get(question);
  if (known !== undefined) return known;
  const verdicts = methodVerdicts(cut, place);
  if (judged.size >= MOST_JUDGED) judged.clear();
  judged.set(question, verdicts);
  return verdicts;
}

/** The very same list for as long as each of its items is the same. */
function useSameItems<Item>(items: readonly Item[]): readonly Item[] {
  const [kept, setKept] = useState(items);
  if (kept === items) return kept;
  const isSame = kept.length === items.length && kept.every((item, index) => item === items[index]);
  if (isSame) return kept;
  setKept(items);
  return items;
}

const placeSchema = conditionsSchema.pick({
  face: true,
  below: true,
  indoors: true,
  enginesAllowed: true,
  overcutsAllowed: true,
});

/** The conditions that decide; null while one of them is not answered. */
function placeOf(conditions: ScopeFormValues['conditions']): CutPlace | null {
  const { face, below, indoors, enginesAllowed, overcutsAllowed } = conditions;
  const known = placeSchema.safeParse({ face, below, indoors, enginesAllowed, overcutsAllowed });
  return known.success ? known.data : null;
}

/** Names of the conditions that are not answered yet. */
function askedOf(conditions: ScopeFormValues['conditions']): string[] {
  return placeSchema.keyof().options.filter((name) => conditions[name] === '' || conditions[name] === null);
}
