import { Page } from '#src/components/layout/page.tsx';
import { LinkButton } from '#src/components/ui/button.tsx';
import { paths } from '#src/app/paths.ts';
import { useMay, useSite } from '#src/hooks/use-site.ts';
import { t } from '#src/texts/t.ts';
import { DutiesSection } from './duties-section.tsx';
import { RecordsSection } from './records-section.tsx';

/** What falls due and what was recorded, one page for the metrologist's day. */
export function MetrologyPage() {
  const site = useSite();
  const may = useMay();
  const words = t.metrology;
  return (
    <Page
      title={words.title}
      intro={<p>{words.intro}</p>}
      actions={
        may('calibration.record') ? (
          <LinkButton kind="primary" to={paths.newCalibration.href(site.code)}>
            {words.record}
          </LinkButton>
        ) : undefined
      }
    >
      <DutiesSection />
      <RecordsSection />
    </Page>
  );
}
