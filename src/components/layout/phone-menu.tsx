import { useEffect, useId, useRef, useState, type ReactNode } from 'react';
import { t } from '#src/texts/t.ts';
import { NavWords, type NavWord } from './navigation.tsx';
import { PersonActs, type Person } from './person-menu.tsx';

/** What the wide header carries, behind one word on the phone. */
export function usePhoneMenu(props: {
  nav: readonly NavWord[];
  person: Person;
  onSignOut: () => void;
  find?: ReactNode;
  siteSwitch?: ReactNode;
}) {
  const [isOpen, setIsOpen] = useState(false);
  const panelId = useId();
  const button = useRef<HTMLButtonElement>(null);
  useEffect(() => {
    if (!isOpen) {
      return undefined;
    }
    const closeOnEscape = (event: KeyboardEvent) => {
      if (event.key === 'Escape') {
        setIsOpen(false);
        button.current?.focus();
      }
    };
    document.addEventListener('keydown', closeOnEscape);
    return () => {
      document.removeEventListener('keydown', closeOnEscape);
    };
  }, [isOpen]);
  const opener = (
    <button
      ref={button}
      type="button"
      className="mp-menu-button"
      aria-expanded={isOpen}
      aria-controls={panelId}
      onClick={() => {
        setIsOpen(!isOpen);
      }}
    >
      {isOpen ? t.layout.closeMenu : t.layout.menu}
    </button>
  );
  const panel = (
    <div className={isOpen ? 'mp-menu' : undefined} id={panelId} hidden={!isOpen}>
      <nav aria-label={t.layout.mainNavigation}>
        <NavWords
          words={props.nav}
          onFollow={() => {
            setIsOpen(false);
          }}
        />
      </nav>
      {isOpen ? props.find : null}
      {props.siteSwitch}
      <p>{t.layout.person(props.person.name, props.person.role)}</p>
      <PersonActs onSignOut={props.onSignOut} />
    </div>
  );
  return { opener, panel };
}
