import { overcutIn } from '@kerfyard/common/cutting';
import { useTranslation } from 'react-i18next';
import { DrawingFrame, drawingStyles as styles } from '../../../components/drawing-frame.tsx';
import { formatNumber } from '../../../lib/format.ts';

interface OvercutPictureProps {
  bladeDiameterIn: number;
  thicknessIn: number;
  passThroughIn: number;
}

/**
 * Why a blade runs past a corner: seen from the side, it must reach the corner on the far face, and its rim is then
 * further on at the entry face. To scale; the entry face is the top.
 */
export function OvercutPicture({ bladeDiameterIn, thicknessIn, passThroughIn }: OvercutPictureProps) {
  const { t } = useTranslation('calculators');
  const pastIn = overcutIn({ bladeDiameterIn, thicknessIn, passThroughIn });
  const radiusIn = bladeDiameterIn / 2;
  const plungeIn = thicknessIn + passThroughIn;
  // The rim meets the far face at the corner; the blade's centre is half a chord of the far face before it.
  const cornerIn = 2 * radiusIn;
  const centre = {
    x: cornerIn - Math.sqrt(passThroughIn * (bladeDiameterIn - passThroughIn)),
    y: plungeIn - radiusIn,
  };
  const edgeIn = cornerIn + Math.max(pastIn * 1.6, radiusIn * 0.5);
  const left = centre.x - radiusIn * 1.05;
  const top = centre.y - radiusIn * 1.05;
  const box = { x: left, y: top, width: edgeIn - left, height: plungeIn + thicknessIn * 0.25 - top };
  const inches = formatNumber(pastIn, 2);
  return (
    <DrawingFrame
      box={box}
      heightPx={240}
      label={t('opening.picture.label')}
      text={[t('opening.picture.text', { past: inches })]}
      labels={[
        {
          at: { x: cornerIn + pastIn / 2, y: 0 },
          text: t('opening.picture.past', { past: inches }),
          side: 'above',
        },
        { at: { x: cornerIn, y: thicknessIn }, text: t('opening.picture.corner'), side: 'below' },
      ]}
    >
      <rect className={styles.body} x={left} y={0} width={edgeIn - left} height={thicknessIn} />
      <circle className={styles.blade} cx={centre.x} cy={centre.y} r={radiusIn} />
      <path className={styles.dimension} d={`M${cornerIn} 0V${thicknessIn}`} strokeDasharray="4 3" />
      <path className={styles.overcut} d={`M${cornerIn} 0H${cornerIn + pastIn}`} />
    </DrawingFrame>
  );
}
