import { useEffect, useRef } from 'react';
import { Link, useLocation, useSearchParams } from 'react-router-dom';
import { formatDuration } from '@/lib/format/quantity';
import type { ServedBody } from '../../api/record-queries';
import { partSearch } from '../../model/part-address';
import { partTitle } from '../../model/part-words';
import './parts.css';

interface PartHeadProps {
  parts: readonly ServedBody[];
  /** 1, 2, 3 ... */
  number: number;
}

/** Which part of the programme is open, with the ways back and on. */
export function PartHead({ parts, number }: PartHeadProps) {
  const [params] = useSearchParams();
  const headingRef = useRef<HTMLHeadingElement>(null);
  const { key } = useLocation();
  // The page stays the same one: who opened a part by key or voice is taken to it. A page just loaded is not moved.
  useEffect(() => {
    if (key !== 'default') headingRef.current?.focus();
  }, [number, key]);
  const body = parts[number - 1];
  if (!body) return null;
  const { title, detail } = partTitle(body);
  return (
    <nav className="bl-part-head" aria-label="Parts of the programme">
      <p>
        <Link to={{ search: partSearch(params, null) }}>All parts</Link>
        {number > 1 && <Link to={{ search: partSearch(params, number - 1) }}>The part before</Link>}
        {number < parts.length && <Link to={{ search: partSearch(params, number + 1) }}>The next part</Link>}
      </p>
      <h2 ref={headingRef} tabIndex={-1}>
        Part {number} of {parts.length}: {title}
        {detail && `, ${detail}`}
      </h2>
      <p className="bl-ink-2">
        {formatDuration(body.settings.fromS)} to {formatDuration(body.settings.toS)} of the recording
      </p>
    </nav>
  );
}
