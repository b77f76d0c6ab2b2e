import { useQuery } from '@tanstack/react-query';
import { DateTime } from 'luxon';
import { Page } from '#src/components/layout/page.tsx';
import { ErrorState, Loading } from '#src/components/ui/feedback.tsx';
import { useNow } from '#src/hooks/use-now.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { formatClock, siteCalendar } from '#src/lib/format-date.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { todayQuery } from '../api/get-today.ts';
import { staffedText } from '../day-window.view.ts';
import { DaySheet } from './day-sheet.tsx';
import { DueSection } from './due-section.tsx';
import { WaitsSection } from './waits-section.tsx';

const words = t.today;

/** The day at the site, the work that waits for whoever looks, and what falls due. */
export function TodayPage() {
  const site = useSite();
  const query = useQuery(todayQuery(site.code));
  const failure = tableError(query);
  const { today } = siteCalendar(useNow(), site.zone);
  const day = query.data?.day ?? today;
  const title = DateTime.fromISO(day, { zone: 'utc', locale: 'en-GB' }).toFormat('cccc d LLLL');
  const hours = staffedText(
    query.data?.staffed ?? [],
    (at) => formatClock(at, site.zone),
    t.board.to,
  );
  return (
    <Page
      title={title}
      subtitle={
        query.data === undefined ? (
          site.name
        ) : (
          <>
            {hours === '' ? words.nobody(site.name) : words.staffed(site.name, hours)}
            <span className="mp-note mp-margin-note block">{words.dayNote}</span>
          </>
        )
      }
      intro={
        <>
          {failure === undefined ? null : <ErrorState {...failure} />}
          {query.isPending ? <Loading what={words.title} /> : null}
        </>
      }
      lead={query.data === undefined ? undefined : <DaySheet today={query.data} />}
    >
      {query.data === undefined ? null : (
        <>
          <WaitsSection waits={query.data.waits} />
          <DueSection rows={query.data.fallsDue} />
        </>
      )}
    </Page>
  );
}
