import { Page } from '#src/components/layout/page.tsx';
import { useMay } from '#src/hooks/use-site.ts';
import { t } from '#src/texts/t.ts';
import { HoursSection } from './hours-section.tsx';
import { PeopleSection } from './people-section.tsx';
import { PoliciesSection } from './policies-section.tsx';
import { TrailSection } from './trail-section.tsx';

/** What the site has decided, who may do what, and what was done. */
export function SettingsPage() {
  const may = useMay();
  return (
    <Page title={t.settings.title} intro={<p>{t.settings.intro}</p>}>
      <PoliciesSection />
      <HoursSection />
      {may('people.manage') ? <PeopleSection /> : null}
      {may('audit.read') ? <TrailSection /> : null}
    </Page>
  );
}
