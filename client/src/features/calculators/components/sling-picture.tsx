import { useTranslation } from 'react-i18next';
import { DrawingFrame, drawingStyles as styles } from '../../../components/drawing-frame.tsx';
import { formatNumber } from '../../../lib/format.ts';

interface SlingPictureProps {
  legs: number;
  angleDeg: number;
  lengthFt: number;
  thicknessIn: number;
}

/** Steeper than this the legs stand upright in the picture. */
const uprightDeg = 89.5;
/** A flat sling would make a picture of nothing but width. */
const flattestDrawnDeg = 10;

/** The piece on its slings, the angle as measured: from the horizontal. Piece and angle to scale. */
export function SlingPicture({ legs, angleDeg, lengthFt, thicknessIn }: SlingPictureProps) {
  const { t } = useTranslation('calculators');
  const halfFt = legs === 1 ? 0 : lengthFt * 0.4;
  const drawnDeg = Math.max(angleDeg, flattestDrawnDeg);
  const riseFt =
    legs === 1 || drawnDeg >= uprightDeg
      ? lengthFt * 0.8
      : Math.min(halfFt * Math.tan((drawnDeg * Math.PI) / 180), lengthFt * 2);
  const hook = { x: lengthFt / 2, y: 0 };
  const slabFt = thicknessIn / 12;
  const ends = legs === 1 ? [hook.x] : [hook.x - halfFt, hook.x + halfFt];
  const isUpright = legs > 1 && drawnDeg >= uprightDeg;
  const degrees = formatNumber(angleDeg, 1);
  const box = { x: 0, y: -lengthFt * 0.08, width: lengthFt, height: riseFt + slabFt + lengthFt * 0.14 };
  return (
    <DrawingFrame
      box={box}
      heightPx={220}
      label={t('lifting.picture.label')}
      text={[t('lifting.picture.text', { count: legs, degrees })]}
      labels={
        legs === 1
          ? []
          : [{ at: { x: (ends[0] ?? 0) + lengthFt * 0.09, y: riseFt }, text: `${degrees}°`, side: 'above' }]
      }
    >
      {ends.map((x) => (
        <path key={x} className={styles.joint} d={`M${isUpright ? x : hook.x} ${hook.y}L${x} ${riseFt}`} />
      ))}
      <rect className={styles.body} x={0} y={riseFt} width={lengthFt} height={slabFt} />
      <path className={styles.kerf} d={`M${hook.x} ${box.y}V${hook.y}`} />
      <path className={styles.dimension} d={`M0 ${riseFt}H${lengthFt}`} />
    </DrawingFrame>
  );
}
