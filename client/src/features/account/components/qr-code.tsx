import { encode } from 'uqr';

/** A QR code (ISO/IEC 18004) drawn in dark squares on white, with its quiet zone. */
export default function QrCode({ text, label }: { text: string; label: string }) {
  const { data, size } = encode(text, { ecc: 'M', border: 2 });
  const squares = data.flatMap((row, y) =>
    row.flatMap((isDark, x) => (isDark ? [`M${x} ${y}h1v1h-1z`] : [])),
  );
  return (
    <svg viewBox={`0 0 ${size} ${size}`} role="img" aria-label={label} shapeRendering="crispEdges">
      <path d={squares.join('')} fill="currentColor" />
    </svg>
  );
}
