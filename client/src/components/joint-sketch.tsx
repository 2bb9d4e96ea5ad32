import { jointSketch, type JointPlanInput, type SketchLine } from '@kerfyard/common/cutting';
import { useMemo } from 'react';
import { useTranslation } from 'react-i18next';
import { formatNumber } from '../lib/format.ts';
import { DrawingFrame, drawingStyles as styles } from './drawing-frame.tsx';

/**
 * A slab from above with every joint where it falls; here positions are the plan's own.
 * @throws CuttingInputError as `jointPlan` does
 */
export function JointSketch({ slab }: { slab: JointPlanInput }) {
  const { t } = useTranslation('drawings');
  const sketch = useMemo(() => jointSketch(slab), [slab]);
  const { box } = sketch;
  const feet = (value: number) => t('feet', { feet: formatNumber(value, 2) });
  return (
    <DrawingFrame
      box={box}
      label={t('joints')}
      text={sketch.text}
      labels={[
        { at: { x: box.width / 2, y: 0 }, text: feet(box.width), side: 'above' },
        { at: { x: box.width, y: box.height / 2 }, text: feet(box.height), side: 'left' },
      ]}
    >
      <rect className={styles.body} {...box} />
      <path className={styles.edge} d={pathOf(sketch.outline)} />
      <path className={styles.joint} d={pathOf(sketch.joints)} />
    </DrawingFrame>
  );
}

function pathOf(lines: readonly SketchLine[]): string {
  return lines.map(({ from, to }) => `M${from.x} ${from.y}L${to.x} ${to.y}`).join('');
}
