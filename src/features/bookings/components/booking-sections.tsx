import type { BookingDto } from '#shared/contracts/bookings.contract.ts';
import { checkRules } from '#shared/domain/checks/check-rules.ts';
import type { CheckResultDto, PhaseSpanDto } from '#shared/contracts/check.schemas.ts';
import { barPhases } from '#src/components/drawing/booking-bar.view.ts';
import { PhaseFigure } from '#src/components/drawing/phase-figure.tsx';
import { Section } from '#src/components/layout/page.tsx';
import { Disclosure } from '#src/components/ui/disclosure.tsx';
import { State } from '#src/components/ui/state.tsx';
import { Table } from '#src/components/ui/table.tsx';
import { useNow } from '#src/hooks/use-now.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { formatHours } from '#src/lib/format-duration.ts';
import { formatInstant, formatSpan, siteCalendar } from '#src/lib/format-date.ts';
import { formatTemperature } from '#src/lib/format-quantity.ts';
import { t } from '#src/texts/t.ts';
import { sortChecks } from '../check-lines.view.ts';
import { likelyHoldEnd } from '../phases.view.ts';

function useTimeFormat() {
  const site = useSite();
  const { currentYear } = siteCalendar(useNow(), site.zone);
  return { zone: site.zone, currentYear };
}

const secondsOf = (span: PhaseSpanDto) =>
  (Date.parse(span.endAt) - Date.parse(span.startAt)) / 1000;

/** Figure and table of phases; a load uses it too. */
export function PhaseTable(props: {
  phases: readonly PhaseSpanDto[];
  holdLikelyEndAt: string | null;
}) {
  const format = useTimeFormat();
  const words = t.bookings;
  const first = props.phases[0];
  const last = props.phases.at(-1);
  if (first === undefined || last === undefined) {
    return null;
  }
  const columns = words.phaseColumns;
  return (
    <>
      <PhaseFigure
        phases={barPhases(props.phases, props.holdLikelyEndAt)}
        label={words.phasesLabel(formatSpan(first.startAt, last.endAt, format))}
      />
      <div className="mt-4" />
      <Table
        caption={words.phases}
        rows={props.phases}
        rowKey={(row) => `${row.phase}-${row.startAt}`}
        columns={[
          { key: 'phase', head: columns.phase, cell: (row) => t.drawings.phases[row.phase] },
          {
            key: 'from',
            head: columns.from,
            mono: true,
            cell: (row) => formatInstant(row.startAt, format),
          },
          {
            key: 'to',
            head: columns.to,
            mono: true,
            cell: (row) => formatInstant(row.endAt, format),
          },
          {
            key: 'length',
            head: columns.length,
            mono: true,
            align: 'right',
            cell: (row) => formatHours(secondsOf(row)),
          },
          {
            key: 'temperature',
            head: columns.temperature,
            mono: true,
            align: 'right',
            cell: (row) => formatTemperature(row.setTemperatureC),
          },
        ]}
      />
    </>
  );
}

export function PhasesSection(props: { booking: BookingDto }) {
  const { booking } = props;
  const words = t.bookings;
  return (
    <Section title={words.phases} note={<p>{words.phasesNote}</p>}>
      <PhaseTable phases={booking.phases} holdLikelyEndAt={likelyHoldEnd(booking)} />
      <p className="mp-note mt-3">{words.cautionCells}</p>
    </Section>
  );
}

export function PathsSection(props: { booking: BookingDto }) {
  const { booking } = props;
  const words = t.bookings;
  const columns = words.pathColumns;
  const serialAt = new Map(booking.cells.map((cell) => [cell.positionTag, cell.serial]));
  return (
    <Section title={words.paths} note={<p>{words.pathsNote}</p>}>
      <Table
        caption={words.paths}
        rows={booking.paths}
        rowKey={(row) => row.positionUnitId}
        columns={[
          ...(booking.isVisible
            ? [
                {
                  key: 'cell',
                  head: columns.cell,
                  mono: true,
                  cell: (row: BookingDto['paths'][number]) =>
                    serialAt.get(row.positionTag) ?? (
                      <span className="mp-note">{words.noSerial}</span>
                    ),
                },
              ]
            : []),
          { key: 'position', head: columns.position, mono: true, cell: (row) => row.positionTag },
          { key: 'source', head: columns.source, mono: true, cell: (row) => row.sourceTag },
          { key: 'meter', head: columns.meter, mono: true, cell: (row) => row.meterTag },
          { key: 'range', head: columns.range, mono: true, cell: (row) => row.meterRangeLabel },
          { key: 'panel', head: columns.panel, cell: (row) => row.panelName },
        ]}
      />
    </Section>
  );
}

const looks = {
  pass: { mark: 'pass', tone: 'reed' },
  caution: { mark: 'caution', tone: 'marigold' },
  stop: { mark: 'stop', tone: 'brick' },
} as const;

function Found(props: { check: CheckResultDto }) {
  const { check } = props;
  const words = t.bookings;
  return (
    <>
      <span>{check.sentence}</span>
      {check.liftedByDeviationId === null ? null : (
        <span className="mp-note block">{words.lifted(check.liftedByDeviationId)}</span>
      )}
      {check.evidence.length === 0 ? null : (
        <Disclosure summary={words.evidence}>
          <ul className="mp-note">
            {check.evidence.map((each) => (
              <li key={`${each.label}-${each.source}`}>
                {each.label}: <span className="font-mono">{each.value}</span> ({each.source})
              </li>
            ))}
          </ul>
        </Disclosure>
      )}
    </>
  );
}

export function ChecksSection(props: { booking: BookingDto }) {
  const { booking } = props;
  const format = useTimeFormat();
  const words = t.bookings;
  const columns = words.checkColumns;
  return (
    <Section
      title={words.checks}
      note={
        booking.checkedAt === null ? undefined : (
          <p>{words.checksAt(formatInstant(booking.checkedAt, format))}</p>
        )
      }
    >
      <Table
        caption={words.checks}
        stack
        rows={sortChecks(booking.checks)}
        rowKey={(row) => row.code}
        empty={words.noChecks}
        columns={[
          {
            key: 'result',
            head: columns.result,
            nowrap: true,
            cell: (row) => (
              <State mark={looks[row.outcome].mark} tone={looks[row.outcome].tone}>
                {words.outcomes[row.outcome]}
              </State>
            ),
          },
          {
            key: 'rule',
            head: columns.rule,
            nowrap: true,
            cell: (row) => checkRules[row.code].title,
          },
          { key: 'what', head: columns.what, cell: (row) => <Found check={row} /> },
        ]}
      />
      {booking.deviations.length === 0 ? null : <Deviations booking={booking} />}
    </Section>
  );
}

function Deviations(props: { booking: BookingDto }) {
  const words = t.bookings;
  const columns = words.deviationColumns;
  return (
    <Table
      caption={words.deviations}
      rows={props.booking.deviations}
      rowKey={(row) => row.id}
      columns={[
        { key: 'rule', head: columns.rule, cell: (row) => row.code },
        { key: 'reason', head: columns.reason, cell: (row) => row.reason },
        { key: 'by', head: columns.by, cell: (row) => row.grantedBy },
      ]}
    />
  );
}

export function HistorySection(props: { booking: BookingDto }) {
  const format = useTimeFormat();
  const words = t.bookings;
  const columns = words.historyColumns;
  return (
    <Section title={words.history}>
      <Table
        caption={words.history}
        rows={props.booking.history}
        rowKey={(row) => `${row.at}-${row.what}`}
        empty={words.noHistory}
        columns={[
          {
            key: 'at',
            head: columns.at,
            mono: true,
            cell: (row) => formatInstant(row.at, format),
          },
          { key: 'who', head: columns.who, cell: (row) => row.actor },
          { key: 'what', head: columns.what, cell: (row) => row.what },
          { key: 'reason', head: columns.reason, cell: (row) => row.reason ?? '' },
        ]}
      />
    </Section>
  );
}
