/** "At most" and "at least": the text faces lack both signs, so they are drawn, one character wide. */
export function BoundSign({ side }: { side: 'at-most' | 'at-least' }) {
  const isLeast = side === 'at-least';
  return (
    <svg className="bl-bound" viewBox="0 0 6 10" role="img" aria-label={isLeast ? 'at least' : 'at most'}>
      <path
        d={isLeast ? 'M.9 1.8L5.1 4 .9 6.2M.9 8.6H5.1' : 'M5.1 1.8L.9 4 5.1 6.2M.9 8.6H5.1'}
        fill="none"
        stroke="currentColor"
        strokeWidth=".85"
        strokeLinecap="round"
        strokeLinejoin="round"
      />
    </svg>
  );
}
