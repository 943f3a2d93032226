import { Tooltip } from '@radix-ui/themes';
import { useState } from 'react';
import { type Worth, WORTH_WORDS } from '@/lib/worth';
import './figures.css';

const HORIZON = <path d="M1 13.5h14" stroke="currentColor" strokeWidth="1.4" />;

const SHAPES: Record<Worth, React.ReactNode> = {
  clear: (
    <>
      <circle cx="8" cy="4.9" r="4" fill="currentColor" />
      {HORIZON}
    </>
  ),
  near: (
    <>
      <circle cx="8" cy="9" r="3.9" fill="none" stroke="currentColor" strokeWidth="1.3" />
      <path d="M4.1 9a3.9 3.9 0 0 0 7.8 0z" fill="currentColor" />
      {HORIZON}
    </>
  ),
  at: (
    <>
      <path d="M3.6 13.5a4.4 4.4 0 0 1 8.8 0" fill="none" stroke="currentColor" strokeWidth="1.4" />
      {HORIZON}
    </>
  ),
  'floor-unknown': (
    <>
      <circle cx="8" cy="5" r="3.3" fill="none" stroke="currentColor" strokeWidth="1.3" />
      <path d="M1 13.5h2.6m2 0h2.2m2 0h2.2m2 0h1.2" stroke="currentColor" strokeWidth="1.4" />
    </>
  ),
  'not-measured': (
    <>
      <path d="M4.5 4l7 7m0-7l-7 7" stroke="currentColor" strokeWidth="1.4" />
      {HORIZON}
    </>
  ),
};

export interface WorthMarkProps {
  worth: Worth;
  /** The distance or the reason, told with the words. */
  why?: string | null;
  sizePx?: number;
  /** A mark in a key is a picture only: no focus, no tip. */
  isPlain?: boolean;
}

/** What a figure is worth: a disc over a horizon, the horizon being what the rig alone gives. */
export function WorthMark({ worth, why, sizePx = 16, isPlain = false }: WorthMarkProps) {
  // Opened by a tap as well: a tooltip alone is out of reach on a phone.
  const [isOpen, setIsOpen] = useState(false);
  const drawing = (
    <svg width={sizePx} height={sizePx} viewBox="0 0 16 16" aria-hidden="true">
      {SHAPES[worth]}
    </svg>
  );
  if (isPlain) return <span className="bl-worth">{drawing}</span>;
  const words = WORTH_WORDS[worth] + (why ? `: ${why}` : '');
  return (
    <Tooltip content={words} open={isOpen} onOpenChange={setIsOpen}>
      <button type="button" className="bl-worth" aria-label={words} onClick={() => setIsOpen(true)}>
        {drawing}
      </button>
    </Tooltip>
  );
}

const KEY_WORDS: Record<Worth, string> = {
  clear: 'clear of the rig',
  near: 'near the rig: error given',
  at: 'at the rig: a bound, the unit may be better',
  'floor-unknown': 'floor not known',
  'not-measured': 'not measured, reason on the mark',
};

/** The key in words that ends every table of figures; pass the marks that the table uses. */
export function WorthKey({ worths }: { worths: readonly Worth[] }) {
  const shown = (Object.keys(KEY_WORDS) as Worth[]).filter((worth) => worths.includes(worth));
  if (shown.length === 0) return null;
  return (
    <ul className="bl-worth-key">
      {shown.map((worth) => (
        <li key={worth}>
          <WorthMark worth={worth} isPlain /> {KEY_WORDS[worth]}
        </li>
      ))}
    </ul>
  );
}
