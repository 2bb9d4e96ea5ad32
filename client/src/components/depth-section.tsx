import {
  depthSection,
  type BeyondKind,
  type DepthSection as Section,
  type DepthSectionInput,
} from '@kerfyard/common/cutting';
import { useMemo } from 'react';
import { useTranslation } from 'react-i18next';
import { DrawingFrame, drawingStyles as styles, type DrawingLabel } from './drawing-frame.tsx';

const beyondStyles: Readonly<Record<BeyondKind, string | undefined>> = {
  soil: styles.beyondSoil,
  unoccupied: styles.beyondUnoccupied,
  occupied: styles.beyondOccupied,
  unknown: styles.beyondUnknown,
};

/** More passes than this stand too close for numbers. */
const maxNumbered = 12;

/**
 * An element cut open: passes stepped down, mats and known lines, and what lies beyond; the louder that is, the louder
 * it is drawn. Steel and lines that the cut reaches are marked, and named in the text under the drawing.
 * @throws CuttingInputError as the engine's `depthSection` does
 */
export function DepthSection({ section: input }: { section: DepthSectionInput }) {
  const { t } = useTranslation('drawings');
  const section = useMemo(() => depthSection(input), [input]);
  const { beyond } = section;
  const isSlab = section.element === 'slab';
  const middle = middleOf(beyond.box);
  const beyondLabel: DrawingLabel = {
    // Behind a wall there is no width for words: they stand under it.
    at: isSlab ? middle : { x: middle.x, y: section.box.y + section.box.height },
    text: t(`${isSlab ? 'below' : 'behind'}.${beyond.kind}`),
    side: isSlab ? 'centre' : 'below',
    isLoud: beyond.loudness > 2,
  };
  return (
    <DrawingFrame
      box={section.box}
      label={t('section')}
      text={section.text}
      showText
      labels={[...passLabels(section), beyondLabel]}
    >
      <SectionShapes section={section} />
    </DrawingFrame>
  );
}

function SectionShapes({ section }: { section: Section }) {
  const { body, beyond, passes, mats, embedded } = section;
  return (
    <>
      <rect className={`${styles.beyond} ${beyondStyles[beyond.kind]}`} {...beyond.box} />
      <rect className={styles.body} {...body} />
      {passes.map(({ pass, box }) => (
        <rect key={pass} className={styles.pass} {...box} />
      ))}
      {mats.flatMap(({ mat, bars }) =>
        bars.map(({ centre, radiusIn, isReached }) => (
          <circle
            key={`${mat}-${centre.x}-${centre.y}`}
            className={isReached ? styles.reached : styles.bar}
            cx={centre.x}
            cy={centre.y}
            r={radiusIn}
          />
        )),
      )}
      {embedded.map(({ name, centre, radiusIn, isReached }, index) => (
        <circle
          key={`${name}-${index}`}
          className={isReached ? styles.reached : styles.line}
          cx={centre.x}
          cy={centre.y}
          r={radiusIn}
        />
      ))}
    </>
  );
}

function passLabels({ passes, element }: Section): readonly DrawingLabel[] {
  if (passes.length > maxNumbered) return [];
  return passes.map(({ pass, box }) => ({
    at: element === 'slab' ? { x: box.x + box.width / 2, y: box.y } : { x: box.x, y: box.y + box.height / 2 },
    text: String(pass),
    side: element === 'slab' ? 'above' : 'left',
  }));
}

function middleOf(box: Section['box']): { x: number; y: number } {
  return { x: box.x + box.width / 2, y: box.y + box.height / 2 };
}
