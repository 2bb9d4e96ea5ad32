/** Small drawings for the navigation, in the hand of the big ones: outlines, overcuts, bars. Decoration beside words. */
const drawings = {
  scopes: 'M6 3v18M18 3v18M3 6h18M3 18h18',
  openScopes: 'M4 8V4h4M16 4h4v4M20 16v4h-4M8 20H4v-4M12 8.5a3.5 3.5 0 1 0 0 7 3.5 3.5 0 0 0 0-7',
  bids: 'M4 7h10M4 12h16M4 17h6M14 5v4M20 10v4M10 15v4',
  work: 'M3 17h18M3 17V9h8v8M11 12h6l4 3v2M6.5 17a1.5 1.5 0 1 0 .01 0M17 17a1.5 1.5 0 1 0 .01 0',
  money: 'M3 8h18v8H3zM10 8v8M16 8v8',
  company: 'M4 20V9l8-5 8 5v11M4 20h16M9 20v-6h6v6',
  talk: 'M3 5h13v9H8l-3 3v-3H3zM19 9h2v9h-2v3l-3-3h-5',
  books: 'M5 4h14v16H5zM9 4v16M12 9h4M12 13h4',
} as const;

export type NavPictureName = keyof typeof drawings;

export function NavPicture({ name }: { name: NavPictureName }) {
  return (
    <svg width="20" height="20" viewBox="0 0 24 24" aria-hidden="true" focusable="false">
      <path d={drawings[name]} fill="none" stroke="currentColor" strokeWidth="1.7" strokeLinejoin="round" />
    </svg>
  );
}
