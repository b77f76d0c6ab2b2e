import { useEffect, useRef, type SyntheticEvent } from 'react';
import { Kbd } from '#src/components/ui/kbd.tsx';
import { t } from '#src/texts/t.ts';

function isTyping(target: EventTarget | null): boolean {
  return (
    target instanceof HTMLElement &&
    (target.isContentEditable || ['INPUT', 'TEXTAREA', 'SELECT'].includes(target.tagName))
  );
}

/** Finds by what people say: a tag, a serial, a number. `/` comes here from anywhere. */
export function FindField(props: { onFind: (text: string) => void }) {
  const ref = useRef<HTMLInputElement>(null);
  useEffect(() => {
    const focus = (event: KeyboardEvent) => {
      if (event.key === '/' && !event.ctrlKey && !event.metaKey && !isTyping(event.target)) {
        event.preventDefault();
        ref.current?.focus();
      }
    };
    window.addEventListener('keydown', focus);
    return () => {
      window.removeEventListener('keydown', focus);
    };
  }, []);
  const submit = (event: SyntheticEvent) => {
    event.preventDefault();
    const text = ref.current?.value.trim() ?? '';
    if (text !== '') {
      props.onFind(text);
    }
  };
  return (
    <form className="mp-find" role="search" onSubmit={submit}>
      <input
        ref={ref}
        type="search"
        aria-label={t.layout.findLabel}
        placeholder={t.layout.find}
        aria-keyshortcuts="/"
      />
      <span aria-hidden="true">
        <Kbd>/</Kbd>
      </span>
    </form>
  );
}
