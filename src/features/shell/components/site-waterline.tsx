import { useQuery } from '@tanstack/react-query';
import { Waterline } from '#src/components/layout/waterline.tsx';
import { useSite } from '#src/hooks/use-site.ts';
import { formatClock } from '#src/lib/format-date.ts';
import { waterlineQuery } from '../api/get-waterline.ts';

/** The site's chambers under the header. It stays away while it could not be read: no old levels. */
export function SiteWaterline() {
  const site = useSite();
  const { data } = useQuery(waterlineQuery(site.code));
  if (data === undefined) {
    return <section className="mp-waterline" aria-hidden="true" />;
  }
  return (
    <Waterline
      siteName={site.name}
      clock={formatClock(data.at, site.zone)}
      vessels={data.vessels.map((vessel) => ({
        tag: vessel.tag,
        temperatureC: vessel.setTemperatureC,
        taken: vessel.taken,
        positions: vessel.positions,
        state: vessel.state,
        sentence: vessel.sentence,
        href: `/${site.code}/equipment/${vessel.tag}`,
      }))}
    />
  );
}
