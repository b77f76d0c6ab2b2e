import { Mark } from '#src/components/ui/mark.tsx';
import { State } from '#src/components/ui/state.tsx';
import { Section } from '#src/components/layout/page.tsx';
import type { MarkGroup } from '../gallery.view.ts';

/** Each mark large, in use with its word, and without colour. */
export function MarkRows(props: { group: MarkGroup }) {
  const { group } = props;
  return (
    <Section title={group.title} note={group.note}>
      <ul className="mp-marks-grid">
        {group.marks.map((entry) => (
          <li key={entry.word}>
            <Mark name={entry.mark} tone={entry.tone} size={30} />
            <State mark={entry.mark} tone={entry.tone}>
              {entry.word}
            </State>
            <span className="mp-grey">
              <Mark name={entry.mark} tone={entry.tone} />
            </span>
          </li>
        ))}
      </ul>
    </Section>
  );
}
