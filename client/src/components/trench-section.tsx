import { trenchSection, type TrenchPlanInput, type TrenchSection as Section } from '@kerfyard/common/cutting';
import { useMemo } from 'react';
import { useTranslation } from 'react-i18next';
import { formatNumber } from '../lib/format.ts';
import { DrawingFrame, drawingStyles as styles, type DrawingLabel } from './drawing-frame.tsx';

/**
 * A trench cut across: slab, soil, bedding and conduit to scale, with the heights that make its depth.
 * @throws CuttingInputError as `trenchPlan` does
 */
export function TrenchSection({ trench }: { trench: TrenchPlanInput }) {
  const { t } = useTranslation('drawings');
  const section = useMemo(() => trenchSection(trench), [trench]);
  const places = dimensionPlaces(section);
  const labels: DrawingLabel[] = section.dimensions.map(({ name, fromIn, toIn }) => ({
    at: { x: places[name], y: (fromIn + toIn) / 2 },
    text: t(`${name}`, { inches: formatNumber(toIn - fromIn, 2) }),
  }));
  return (
    <DrawingFrame box={section.box} label={t('trench')} text={section.text} labels={labels}>
      <TrenchShapes section={section} />
      {section.dimensions.map(({ name, fromIn, toIn }) => (
        <path
          key={name}
          className={styles.dimension}
          d={dimensionPath({ x: places[name], fromIn, toIn, tickIn: section.box.width / 80 })}
        />
      ))}
    </DrawingFrame>
  );
}

function TrenchShapes({ section }: { section: Section }) {
  const { slabs, trench, bedding, conduit, box } = section;
  const slabDepthIn = slabs[0].height;
  return (
    <>
      <rect
        className={styles.soil}
        x={box.x}
        y={slabDepthIn}
        width={box.width}
        height={box.height - slabDepthIn}
      />
      <rect className={styles.hollow} {...trench} />
      {bedding !== null && <rect className={styles.bedding} {...bedding} />}
      {slabs.map((slab) => (
        <rect key={slab.x} className={styles.body} {...slab} />
      ))}
      {[trench.x, trench.x + trench.width].map((x) => (
        <path key={x} className={styles.kerf} d={`M${x} 0V${slabDepthIn}`} />
      ))}
      <circle className={styles.pipe} cx={conduit.centre.x} cy={conduit.centre.y} r={conduit.radiusIn} />
    </>
  );
}

/** The slab is measured in its own concrete, the cover beside the conduit, the dig right of the trench. */
function dimensionPlaces({ slabs, trench, conduit }: Section) {
  const besideConduit = conduit.centre.x - Math.max(conduit.radiusIn * 2, trench.width * 0.32);
  return {
    slab: slabs[0].x + slabs[0].width * 0.12,
    cover: Math.max(trench.x + trench.width * 0.06, besideConduit),
    dig: trench.x + trench.width + slabs[1].width * 0.12,
  };
}

function dimensionPath(line: { x: number; fromIn: number; toIn: number; tickIn: number }): string {
  const { x, fromIn, toIn, tickIn } = line;
  return `M${x - tickIn} ${fromIn}h${2 * tickIn}M${x} ${fromIn}V${toIn}M${x - tickIn} ${toIn}h${2 * tickIn}`;
}
