import {
  conditionsSchema,
  methodFits,
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
  const fits = useMemo(() => {
    const known = JSON.parse(key) as CutPlace | null;
    if (known === null || whole.length === 0) return null;
    return methodFits(whole.map((line) => verdictsOf(line.cut, known, key)));
  }, [whole, key]);
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

// A cut is judged once for as long as neither it nor the place changes, however long the list.
const judged = new WeakMap<CutLine['cut'], { key: string; verdicts: Verdicts }>();

function verdictsOf(cut: CutLine['cut'], place: CutPlace, key: string): Verdicts {
  const known = judged.get(cut);
  if (known?.key === key) return known.verdicts;
  const verdicts = methodVerdicts(cut, place);
  judged.set(cut, { key, verdicts });
  return verdicts;
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
