import { useNow } from '#src/hooks/use-now.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { formatInstant, siteCalendar } from '#src/lib/format-date.ts';
import { t } from '#src/texts/t.ts';

/** Instants in the zone of the site, the year only where it is another one. */
export function useTime(): (at: string | null) => string {
  const site = useSite();
  const { currentYear } = siteCalendar(useNow(), site.zone);
  return (at) =>
    at === null ? t.request.none : formatInstant(at, { zone: site.zone, currentYear });
}
