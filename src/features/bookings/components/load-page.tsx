import { useQuery } from '@tanstack/react-query';
import { Link, useParams } from 'react-router-dom';
import type { LoadDto } from '#shared/contracts/bookings.contract.ts';
import { paths } from '#src/app/paths.ts';
import { Page, Section } from '#src/components/layout/page.tsx';
import { FactList } from '#src/components/ui/fact-list.tsx';
import { ErrorState, Loading } from '#src/components/ui/feedback.tsx';
import { useMay, useSite } from '#src/hooks/use-site.ts';
import { formatInstant, formatSpan } from '#src/lib/format-date.ts';
import { formatNumber } from '#src/lib/format-number.ts';
import { formatTemperature } from '#src/lib/format-quantity.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { loadQuery } from '../api/bookings-queries.ts';
import { PhaseTable } from './booking-sections.tsx';
import { BookingsTable } from './bookings-table.tsx';
import { LoadActions } from './load-actions.tsx';

function Lead(props: { load: LoadDto }) {
  const { load } = props;
  const site = useSite();
  const words = t.bookings;
  const facts = words.loadFacts;
  const wh = (value: number) => formatNumber(value, { decimals: 0 });
  return (
    <FactList
      facts={[
        {
          name: facts.chamber,
          value: (
            <Link className="font-mono" to={paths.instrument.href(site.code, load.chamberTag)}>
              {load.chamberTag}
            </Link>
          ),
        },
        { name: facts.state, value: words.loadStates[load.state] },
        { name: facts.temperature, value: formatTemperature(load.setTemperatureC) },
        {
          name: facts.closes,
          value: load.closesAt === null ? '–' : formatInstant(load.closesAt, { zone: site.zone }),
        },
        { name: facts.positions, value: words.of(load.positionsTaken, load.positions) },
        { name: facts.cells, value: words.of(load.cellCount, load.maxCells) },
        {
          name: facts.energy,
          value: words.energy(words.of(wh(load.energyWh), wh(load.maxEnergyWh))),
        },
        { name: facts.door, value: load.isStrictDoor ? words.strictDoor : words.tolerantDoor },
      ]}
    />
  );
}

/** One load: what is in the chamber together, its phases, and whether more may join. */
export function LoadPage() {
  const site = useSite();
  const may = useMay();
  const { id = '' } = useParams();
  const query = useQuery(loadQuery(site.code, Number(id)));
  const failure = tableError(query);
  const words = t.bookings;
  const load = query.data;
  if (load === undefined) {
    const title = words.load(Number(id));
    return (
      <Page title={title}>
        {failure === undefined ? <Loading what={title} /> : <ErrorState {...failure} />}
      </Page>
    );
  }
  return (
    <Page
      title={words.load(load.id)}
      subtitle={load.chamberTag}
      intro={
        <>
          <p>
            <b>{formatSpan(load.startAt, load.endAt, { zone: site.zone })}</b>
          </p>
          <p>
            {words.loadIntro} {words.planned}
          </p>
        </>
      }
      actions={may('load.close') ? <LoadActions key={load.version} load={load} /> : undefined}
      lead={<Lead load={load} />}
    >
      <Section title={words.loadBookings} note={<p>{words.timesIn(site.zone)}</p>}>
        <BookingsTable caption={words.loadBookings} rows={load.bookings} empty={words.empty} />
      </Section>
      <Section title={words.loadPhases} note={<p>{words.loadPhasesNote}</p>}>
        <PhaseTable phases={load.phases} holdLikelyEndAt={null} />
        <p className="mp-note mt-3">{words.cautionCells}</p>
      </Section>
    </Page>
  );
}
