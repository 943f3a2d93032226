import { Link } from 'react-router-dom';
import { Lark } from '../lark';
import type { Place } from './places';

/** The folded rail: lark, the section's name reading upward, Menu at the foot. */
export function Spine({ place, onUnfold }: { place: Place | undefined; onUnfold: () => void }) {
  return (
    <header className="bl-spine">
      <Link className="bl-brand" to="/" aria-label="Benchlark, to Today">
        <Lark sizePx={30} />
      </Link>
      <p className="bl-spine-name">{place?.label}</p>
      <button type="button" className="bl-word" onClick={onUnfold}>
        Menu
      </button>
    </header>
  );
}
