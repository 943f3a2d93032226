import type { Ref } from 'react';
import { Link } from 'react-router-dom';
import { Lark } from '../lark';
import { FindField } from './find-field';
import type { Place } from './places';
import { PaperWord, type ShellPerson, WhoMenu } from './who-menu';

export interface RailProps {
  person: ShellPerson;
  places: readonly Place[];
  place: Place | undefined;
  notes: Readonly<Record<string, string>>;
  findRef: Ref<HTMLInputElement>;
  onFind: (words: string) => void;
  onKeys: () => void;
  onSignOut: () => void;
}

export function PlaceList({ places, place, notes }: Pick<RailProps, 'places' | 'place' | 'notes'>) {
  return (
    <nav aria-label="Places">
      <ul className="bl-places">
        {places.map(({ to, label }) => (
          <li key={to}>
            <Link to={to} aria-current={place?.to === to ? 'page' : undefined}>
              {label}
              {notes[to] && <span className="bl-places-note">{notes[to]}</span>}
            </Link>
          </li>
        ))}
      </ul>
    </nav>
  );
}

/** The rail: mark, Find, places in words; below, who, the paper, Fold. */
export function Rail({ onFold, ...rail }: RailProps & { onFold: () => void }) {
  return (
    <header className="bl-rail">
      <Link className="bl-brand" to="/">
        <Lark sizePx={34} />
        Benchlark
      </Link>
      <FindField ref={rail.findRef} onFind={rail.onFind} />
      <PlaceList places={rail.places} place={rail.place} notes={rail.notes} />
      <div className="bl-rail-foot">
        <WhoMenu person={rail.person} onKeys={rail.onKeys} onSignOut={rail.onSignOut} />
        <div className="bl-rail-words">
          <PaperWord />
          <button type="button" className="bl-word" onClick={onFold}>
            Fold
          </button>
        </div>
      </div>
    </header>
  );
}
