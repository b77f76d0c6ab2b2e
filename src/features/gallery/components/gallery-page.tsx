import { Page, Section } from '#src/components/layout/page.tsx';
import { t } from '#src/texts/t.ts';
import { colourNames, markGroups } from '../gallery.view.ts';
import { ControlRows } from './control-rows.tsx';
import { BookingKey, ChamberKey, GaugeKey, SettlingKey } from './drawing-rows.tsx';
import { MarkRows } from './mark-rows.tsx';

/** Every mark, drawing and control with what it means. */
export function GalleryPage() {
  return (
    <Page title={t.gallery.title} intro={t.gallery.intro}>
      {markGroups.map((group) => (
        <MarkRows key={group.title} group={group} />
      ))}
      <BookingKey />
      <ChamberKey />
      <SettlingKey />
      <GaugeKey />
      <ControlRows />
      <Section title={t.gallery.colours.title} note={t.gallery.colours.note}>
        <ul className="mp-swatches">
          {colourNames.map((name) => (
            <li key={name}>
              <span className="mp-swatch" style={{ background: `var(--${name})` }} />
              {name}
            </li>
          ))}
        </ul>
      </Section>
    </Page>
  );
}
