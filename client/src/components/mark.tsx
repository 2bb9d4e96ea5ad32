/** The mark: a short kerf, two parallel strokes with a gap. Decoration: the name stands beside it. */
export function Mark({ size = 24 }: { size?: number }) {
  return (
    <svg width={size} height={size} viewBox="0 0 24 24" aria-hidden="true" focusable="false">
      <path d="M4.5 21.5 11.9 2.5" stroke="currentColor" strokeWidth="3.2" fill="none" />
      <path d="M12.1 21.5 19.5 2.5" stroke="var(--k-stroke)" strokeWidth="3.2" fill="none" />
    </svg>
  );
}
