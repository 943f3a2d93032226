/** The lark: a period of a sine becomes tail, back, crest, beak, breast and wing. */
export function Lark({ sizePx = 34, title }: { sizePx?: number; title?: string }) {
  return (
    <svg
      className="bl-lark"
      width={sizePx}
      height={sizePx}
      viewBox="0 0 64 64"
      fill="none"
      stroke="currentColor"
      strokeWidth={sizePx < 34 ? 3.2 : 2.8}
      strokeLinecap="round"
      strokeLinejoin="round"
      {...(title ? { role: 'img', 'aria-label': title } : { 'aria-hidden': true })}
    >
      <path d="M2 33C4.2 26.5 7.4 26.5 9.6 33S15 39.8 17.6 33.6C20.6 26.6 27 25 33 23.4 37 22.3 38.6 17.2 37 12 42.3 12.4 46.6 14.4 48.4 18L58 14.4 50.4 22.8C51.8 34 46.6 43.4 37.2 47 29.5 50 19.5 49.4 7 58.5 16.5 47.4 31 45.6 38 33" />
    </svg>
  );
}
