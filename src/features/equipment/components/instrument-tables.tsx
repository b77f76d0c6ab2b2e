import { Link } from 'react-router-dom';
import type { InstrumentDto } from '#shared/contracts/equipment.contract.ts';
import { paths } from '#src/app/paths.ts';
import { Section } from '#src/components/layout/page.tsx';
import { CalibrationState } from '#src/components/ui/calibration-state.tsx';
import { State } from '#src/components/ui/state.tsx';
import { Table } from '#src/components/ui/table.tsx';
import { useSite } from '#src/hooks/use-site.ts';
import { formatDay, formatInstant } from '#src/lib/format-date.ts';
import { formatNumber } from '#src/lib/format-number.ts';
import { formatTemperature } from '#src/lib/format-quantity.ts';
import { t } from '#src/texts/t.ts';
import { groupScopes } from '../scope-groups.view.ts';

/** Calibration state of each channel, function and range. */
/** What it is calibrated for, a row per range and state. */
export function ScopesSection(props: { instrument: InstrumentDto }) {
  const site = useSite();
  const words = t.equipment;
  return (
    <Section title={words.scopes} note={<p>{words.scopesNote}</p>}>
      <Table
        caption={words.scopes}
        rows={groupScopes(props.instrument.scopes)}
        rowKey={(row) => row.key}
        empty={words.noScopes}
        columns={[
          {
            key: 'channel',
            head: words.scopeColumns.channel,
            mono: true,
            cell: (row) => row.channels ?? words.wholeInstrument,
          },
          {
            key: 'function',
            head: words.scopeColumns.function,
            cell: ({ scope }) => words.functions[scope.function],
          },
          {
            key: 'range',
            head: words.scopeColumns.range,
            mono: true,
            cell: ({ scope }) => scope.rangeLabel ?? words.allRanges,
          },
          {
            key: 'state',
            head: words.scopeColumns.state,
            cell: ({ scope }) => (
              <>
                <CalibrationState badge={scope.badge} />
                {scope.limitation === null ? null : (
                  <span className="mp-note block">{words.limitedTo(scope.limitation)}</span>
                )}
              </>
            ),
          },
          {
            key: 'due',
            head: words.scopeColumns.due,
            mono: true,
            cell: ({ scope }) => (scope.dueOn === null ? words.noDue : formatDay(scope.dueOn)),
          },
          {
            key: 'calibration',
            head: words.scopeColumns.calibration,
            align: 'right',
            cell: ({ scope }) =>
              scope.calibrationId === null ? (
                ''
              ) : (
                <Link to={paths.calibration.href(site.code, scope.calibrationId)}>
                  {words.record(scope.calibrationId)}
                </Link>
              ),
          },
        ]}
      />
    </Section>
  );
}

export function HistorySection(props: { instrument: InstrumentDto }) {
  const site = useSite();
  const words = t.equipment;
  const conformity = (key: string) =>
    Object.entries(words.conformities).find(([name]) => name === key)?.[1] ?? key;
  return (
    <Section title={words.history}>
      <Table
        caption={words.history}
        rows={props.instrument.calibrations}
        rowKey={(row) => row.id}
        empty={words.noHistory}
        columns={[
          {
            key: 'id',
            head: words.historyColumns.id,
            cell: (row) => (
              <Link to={paths.calibration.href(site.code, row.id)}>{words.record(row.id)}</Link>
            ),
          },
          {
            key: 'performed',
            head: words.historyColumns.performed,
            mono: true,
            cell: (row) => formatDay(row.performedOn),
          },
          {
            key: 'due',
            head: words.historyColumns.due,
            mono: true,
            cell: (row) => formatDay(row.dueOn),
          },
          {
            key: 'certificate',
            head: words.historyColumns.certificate,
            mono: true,
            cell: (row) => row.certificateNumber,
          },
          { key: 'provider', head: words.historyColumns.provider, cell: (row) => row.provider },
          {
            key: 'conformity',
            head: words.historyColumns.conformity,
            cell: (row) => conformity(row.conformityAsLeft),
          },
          {
            key: 'state',
            head: words.historyColumns.state,
            align: 'right',
            cell: (row) => row.state.replaceAll('-', ' '),
          },
        ]}
      />
    </Section>
  );
}

const mK = (kelvin: number, unit: string) =>
  `${formatNumber(kelvin * 1000, { decimals: kelvin * 1000 < 10 ? 1 : 0 })} ${unit}`;

export function AssessmentsTable(props: { instrument: InstrumentDto }) {
  const words = t.equipment;
  const columns = words.assessmentColumns;
  return (
    <Table
      caption={words.assessments}
      rows={props.instrument.assessments}
      rowKey={(row) => row.id}
      empty={words.noAssessments}
      columns={[
        {
          key: 'temperature',
          head: columns.temperature,
          mono: true,
          cell: (row) => formatTemperature(row.setTemperatureC),
        },
        {
          key: 'judged',
          head: columns.judged,
          cell: (row) => (
            <>
              <span className="mp-figure">{formatDay(row.assessedOn)}</span>
              {row.isTooOld ? (
                <span className="block">
                  <State mark="caution" tone="marigold">
                    {words.tooOld}
                  </State>
                </span>
              ) : null}
            </>
          ),
        },
        {
          key: 'hours',
          head: columns.hours,
          mono: true,
          align: 'right',
          cell: (row) => `${formatNumber(row.hoursLogged, { decimals: 0 })} h`,
        },
        {
          key: 'drift',
          head: columns.drift,
          mono: true,
          align: 'right',
          cell: (row) => mK(row.driftKPerH, 'mK/h'),
        },
        {
          key: 'band',
          head: columns.band,
          mono: true,
          align: 'right',
          cell: (row) => `± ${mK(row.halfBandK, 'mK')}`,
        },
        {
          key: 'period',
          head: columns.period,
          mono: true,
          align: 'right',
          cell: (row) =>
            row.periodS === null
              ? words.periodUnknown
              : `${formatNumber(row.periodS / 60, { decimals: 0 })} min`,
        },
        {
          key: 'resolution',
          head: columns.resolution,
          mono: true,
          align: 'right',
          cell: (row) => mK(row.resolutionK, 'mK'),
        },
        { key: 'place', head: columns.place, cell: (row) => row.sensorPlace },
        { key: 'by', head: columns.by, cell: (row) => row.assessedBy },
      ]}
    />
  );
}

export function UnavailabilitySection(props: { instrument: InstrumentDto }) {
  const site = useSite();
  const words = t.equipment;
  const columns = words.unavailabilityColumns;
  const time = (at: string) => formatInstant(at, { zone: site.zone });
  return (
    <Section title={words.unavailability}>
      <Table
        caption={words.unavailability}
        rows={props.instrument.unavailability}
        rowKey={(row) => row.id}
        empty={words.noUnavailability}
        columns={[
          { key: 'kind', head: columns.kind, cell: (row) => words.reasons[row.kind] },
          { key: 'from', head: columns.from, mono: true, cell: (row) => time(row.from) },
          {
            key: 'until',
            head: columns.until,
            mono: true,
            cell: (row) => (row.until === null ? words.untilFurther : time(row.until)),
          },
          { key: 'reason', head: columns.reason, cell: (row) => row.reason },
          { key: 'by', head: columns.by, align: 'right', cell: (row) => row.reportedBy },
        ]}
      />
    </Section>
  );
}
