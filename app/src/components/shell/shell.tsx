import { type ReactNode, useEffect, useRef, useState } from 'react';
import { useLocation, useNavigate } from 'react-router-dom';
import { PHONE_QUERY, useMedia } from '@/lib/use-media';
import { KeysDialog } from './keys-dialog';
import { placeOf, placesFor } from './places';
import { Rail } from './rail';
import './shell.css';
import { Spine } from './spine';
import { TopBar } from './top-bar';
import { useShellKeys } from './use-shell-keys';
import type { ShellPerson } from './who-menu';

const FOLD_KEY = 'benchlark.rail-folded';

export interface ShellProps {
  person: ShellPerson;
  /** At the right of a place in the rail, by its path: a count, or "live". */
  notes?: Readonly<Record<string, string>>;
  onSignOut: () => void;
  /** Key U. Goes to the archive with `{ add: true }` as the location's state when left out. */
  onAddRecordings?: () => void;
  children: ReactNode;
}

/** The frame of every signed-in page: rail (or spine, or top bar), skip link, keys, focus. */
export function Shell({ person, notes = {}, onSignOut, onAddRecordings, children }: ShellProps) {
  const navigate = useNavigate();
  const { pathname } = useLocation();
  const isPhone = useMedia(PHONE_QUERY);
  const [isFolded, setIsFolded] = useFolded(pathname === '/live');
  const [areKeysOpen, setAreKeysOpen] = useState(false);
  const findRef = useRef<HTMLInputElement>(null);
  const mainRef = useFocusOnNewPage(pathname);
  const places = placesFor(person.roles);
  const place = placeOf(pathname, places);
  const find = (words: string) =>
    void navigate(words === '' ? '/archive' : `/archive?q=${encodeURIComponent(words)}`);
  const add = onAddRecordings ?? (() => void navigate('/archive', { state: { add: true } }));

  useShellKeys({
    onFind: () => {
      setIsFolded(false);
      // The rail may only now be drawn.
      requestAnimationFrame(() => findRef.current?.focus());
    },
    onAddRecordings: add,
    onHelp: () => setAreKeysOpen(true),
    onGo: (letter) => {
      const target = places.find(({ goKey }) => goKey === letter);
      if (target) void navigate(target.to);
      return target !== undefined;
    },
  });

  const railProps = {
    person,
    places,
    place,
    notes,
    findRef,
    onFind: find,
    onKeys: () => setAreKeysOpen(true),
    onSignOut,
  };
  return (
    <div className={isPhone ? 'bl-shell bl-shell-phone' : isFolded ? 'bl-shell bl-shell-folded' : 'bl-shell'}>
      <a className="bl-skip" href="#main" onClick={() => mainRef.current?.focus()}>
        To the page
      </a>
      {isPhone ? (
        <TopBar key={pathname} {...railProps} />
      ) : isFolded ? (
        <Spine place={place} onUnfold={() => setIsFolded(false)} />
      ) : (
        <Rail {...railProps} onFold={() => setIsFolded(true)} />
      )}
      <main id="main" ref={mainRef} tabIndex={-1}>
        {children}
      </main>
      <KeysDialog isOpen={areKeysOpen} onOpenChange={setAreKeysOpen} places={places} />
    </div>
  );
}

/** The Live page needs the room: there the rail is folded until it is unfolded, and elsewhere it stays as it was. */
function useFolded(isRoomy: boolean): [boolean, (isFolded: boolean) => void] {
  const key = isRoomy ? `${FOLD_KEY}.live` : FOLD_KEY;
  const read = () => (sessionStorage.getItem(key) ?? (isRoomy ? '1' : '0')) === '1';
  const [held, setHeld] = useState(() => ({ key, isFolded: read() }));
  const isFolded = held.key === key ? held.isFolded : read();
  const remember = (next: boolean) => {
    sessionStorage.setItem(key, next ? '1' : '0');
    setHeld({ key, isFolded: next });
  };
  return [isFolded, remember];
}

/** After a change of page the keyboard and the screen reader start at its top, not in the old page's link. */
function useFocusOnNewPage(pathname: string) {
  const mainRef = useRef<HTMLElement>(null);
  const shownRef = useRef(pathname);
  useEffect(() => {
    if (shownRef.current === pathname) return;
    shownRef.current = pathname;
    mainRef.current?.focus({ preventScroll: true });
    window.scrollTo({ top: 0 });
  }, [pathname]);
  return mainRef;
}
