import { useEffect, useId, useRef, useState, type ReactNode } from 'react';
import { Button } from '#src/components/ui/button.tsx';
import { ThemeSwitch } from '#src/components/ui/theme-switch.tsx';
import { t } from '#src/texts/t.ts';

export type Person = { readonly name: string; readonly role: string };

export function PersonActs(props: { onSignOut: () => void; children?: ReactNode }) {
  return (
    <>
      <div className="mp-stack">
        <span className="mp-note">{t.ui.theme}</span>
        <ThemeSwitch />
      </div>
      {props.children}
      <div>
        <Button onClick={props.onSignOut}>{t.layout.signOut}</Button>
      </div>
    </>
  );
}

/** Person and role; opens the look and the way out. Escape and a click elsewhere close it. */
export function PersonMenu(props: { person: Person; onSignOut: () => void; children?: ReactNode }) {
  const [isOpen, setIsOpen] = useState(false);
  const panelId = useId();
  const root = useRef<HTMLDivElement>(null);
  const button = useRef<HTMLButtonElement>(null);
  useEffect(() => {
    if (!isOpen) {
      return undefined;
    }
    const closeOutside = (event: Event) => {
      if (event.target instanceof Node && root.current?.contains(event.target) !== true) {
        setIsOpen(false);
      }
    };
    const closeOnEscape = (event: KeyboardEvent) => {
      if (event.key === 'Escape') {
        setIsOpen(false);
        button.current?.focus();
      }
    };
    document.addEventListener('pointerdown', closeOutside);
    document.addEventListener('keydown', closeOnEscape);
    return () => {
      document.removeEventListener('pointerdown', closeOutside);
      document.removeEventListener('keydown', closeOnEscape);
    };
  }, [isOpen]);
  const { name, role } = props.person;
  return (
    <div className="mp-person" ref={root}>
      <button
        ref={button}
        type="button"
        aria-expanded={isOpen}
        aria-controls={panelId}
        onClick={() => {
          setIsOpen(!isOpen);
        }}
      >
        {t.layout.person(name, role)}
      </button>
      <div className="mp-person-slip" id={panelId} hidden={!isOpen}>
        <PersonActs onSignOut={props.onSignOut}>{props.children}</PersonActs>
      </div>
    </div>
  );
}
