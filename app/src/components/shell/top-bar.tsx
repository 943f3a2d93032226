import { useEffect, useId, useRef, useState } from 'react';
import { Link } from 'react-router-dom';
import { Lark } from '../lark';
import { FindField } from './find-field';
import { PlaceList, type RailProps } from './rail';
import { PaperWord, WhoMenu } from './who-menu';

/** On phones: lark, section, Menu, which opens the rail's content below the bar. */
export function TopBar(rail: RailProps) {
  const [isOpen, setIsOpen] = useState(false);
  const menuId = useId();
  const buttonRef = useRef<HTMLButtonElement>(null);
  useEffect(() => {
    if (!isOpen) return;
    const onKeyDown = (event: KeyboardEvent) => {
      if (event.key !== 'Escape' || event.defaultPrevented) return;
      setIsOpen(false);
      buttonRef.current?.focus();
    };
    document.addEventListener('keydown', onKeyDown);
    return () => document.removeEventListener('keydown', onKeyDown);
  }, [isOpen]);
  return (
    <header className="bl-topbar">
      <div className="bl-topbar-bar">
        <Link className="bl-brand" to="/" aria-label="Benchlark, to Today">
          <Lark sizePx={28} />
        </Link>
        <strong>{rail.place?.label ?? 'Benchlark'}</strong>
        <button
          ref={buttonRef}
          type="button"
          className="bl-topbar-menu"
          aria-expanded={isOpen}
          aria-controls={menuId}
          onClick={() => setIsOpen(!isOpen)}
        >
          {isOpen ? 'Close' : 'Menu'}
        </button>
      </div>
      <div id={menuId} className="bl-topbar-content" hidden={!isOpen}>
        <FindField ref={rail.findRef} onFind={rail.onFind} />
        <PlaceList places={rail.places} place={rail.place} notes={rail.notes} />
        <div className="bl-topbar-foot">
          <WhoMenu person={rail.person} onKeys={rail.onKeys} onSignOut={rail.onSignOut} />
          <PaperWord />
        </div>
      </div>
    </header>
  );
}
