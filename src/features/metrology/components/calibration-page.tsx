import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useParams } from 'react-router-dom';
import type { BookingRow } from '#shared/contracts/bookings.contract.ts';
import type { CalibrationDto } from '#shared/contracts/calibrations.contract.ts';
import { paths } from '#src/app/paths.ts';
import { Page, Section } from '#src/components/layout/page.tsx';
import { BookingStateWord } from '#src/components/ui/booking-state.tsx';
import { LinkButton } from '#src/components/ui/button.tsx';
import { FactList } from '#src/components/ui/fact-list.tsx';
import { ErrorState, Loading } from '#src/components/ui/feedback.tsx';
import { Notice } from '#src/components/ui/notice.tsx';
import { Table } from '#src/components/ui/table.tsx';
import { useMay, useSite } from '#src/hooks/use-site.ts';
import { formatDay, formatInstant } from '#src/lib/format-date.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { calibrationQuery } from '../api/calibration-queries.ts';
import { ConformityWord, RecordStateWord } from './calibration-record-state.tsx';
import { CertificateSection } from './certificate-section.tsx';
import { DecideCalibration } from './decide-calibration.tsx';

const words = t.metrology;

function Facts(props: { record: CalibrationDto }) {
  const { record } = props;
  const site = useSite();
  const { facts } = words;
  const time = (at: string) => formatInstant(at, { zone: site.zone });
  return (
    <FactList
      columns={3}
      facts={[
        { name: facts.performed, value: formatDay(record.performedOn) },
        { name: facts.due, value: formatDay(record.dueOn) },
        { name: facts.provider, value: record.provider },
        { name: facts.certificate, value: record.certificateNumber },
        { name: facts.found, value: <ConformityWord conformity={record.conformityAsFound} /> },
        { name: facts.left, value: <ConformityWord conformity={record.conformityAsLeft} /> },
        {
          name: facts.recorded,
          value: words.personAt(record.recordedBy.name, time(record.recordedAt)),
        },
        ...(record.decidedBy === null || record.decidedAt === null
          ? []
          : [
              {
                name: facts.decided,
                value: words.personAt(record.decidedBy.name, time(record.decidedAt)),
              },
            ]),
      ]}
    />
  );
}

function Matter(props: { record: CalibrationDto }) {
  const { record } = props;
  const site = useSite();
  return (
    <>
      <RecordStateWord state={record.state} />
      {record.state === 'awaiting-approval' ? <p>{words.awaitsNote}</p> : null}
      {record.refusalReason === null ? null : (
        <Notice kind="stop" title={words.refusedBecause}>
          {record.refusalReason}
        </Notice>
      )}
      {record.replacedById === null ? null : (
        <p>
          <Link to={paths.calibration.href(site.code, record.replacedById)}>
            {words.replacedBy(record.replacedById)}
          </Link>
        </p>
      )}
      {record.replacesId === null ? null : (
        <p>
          <Link to={paths.calibration.href(site.code, record.replacesId)}>
            {words.replaces(record.replacesId)}
          </Link>
        </p>
      )}
    </>
  );
}

function Scopes(props: { record: CalibrationDto }) {
  const heads = words.scopeColumns;
  return (
    <Section title={words.scopes} note={<p>{words.scopesNote}</p>}>
      <Table
        caption={words.scopes}
        rows={props.record.scopes}
        rowKey={(row) => `${row.channelId ?? ''}-${row.function}-${row.meterRangeId ?? ''}`}
        columns={[
          {
            key: 'channel',
            head: heads.channel,
            mono: true,
            cell: (row) => row.channelLabel ?? words.wholeInstrument,
          },
          {
            key: 'function',
            head: heads.function,
            cell: (row) => words.functions[row.function],
          },
          {
            key: 'range',
            head: heads.range,
            mono: true,
            cell: (row) => row.rangeLabel ?? words.allRanges,
          },
          { key: 'limit', head: heads.limitation, cell: (row) => row.limitation ?? '' },
        ]}
      />
    </Section>
  );
}

function Affected(props: { rows: readonly BookingRow[] }) {
  const site = useSite();
  const heads = words.affectedColumns;
  return (
    <Section title={words.affected}>
      <Table
        caption={words.affected}
        rows={props.rows}
        rowKey={(row) => row.id}
        columns={[
          {
            key: 'id',
            head: heads.id,
            mono: true,
            cell: (row) => <Link to={paths.booking.href(site.code, row.id)}>{row.id}</Link>,
          },
          {
            key: 'what',
            head: heads.what,
            cell: (row) => `${row.cellCount} × ${row.cellTypeName ?? ''}`,
          },
          {
            key: 'start',
            head: heads.start,
            mono: true,
            cell: (row) => formatInstant(row.startAt, { zone: site.zone }),
          },
          {
            key: 'state',
            head: heads.state,
            cell: (row) => <BookingStateWord state={row.state} isAtRisk={row.isAtRisk} />,
          },
          { key: 'reason', head: heads.reason, cell: (row) => row.atRiskReason ?? '' },
        ]}
      />
    </Section>
  );
}

function Loaded(props: { record: CalibrationDto }) {
  const { record } = props;
  const site = useSite();
  const may = useMay();
  const [affected, setAffected] = useState<readonly BookingRow[] | null>(null);
  const mayCorrect =
    record.state === 'approved' && record.replacedById === null && may('calibration.record');
  return (
    <Page
      title={words.calibrationTitle(record.id)}
      subtitle={
        <Link to={paths.instrument.href(site.code, record.tag)}>
          {words.of(record.tag, record.model)}
        </Link>
      }
      intro={<Matter record={record} />}
      actions={
        <>
          {record.state === 'awaiting-approval' ? (
            <DecideCalibration record={record} onApproved={setAffected} />
          ) : null}
          {mayCorrect ? (
            <LinkButton
              to={`${paths.newCalibration.href(site.code, record.tag)}&replaces=${record.id}`}
            >
              {words.correct}
            </LinkButton>
          ) : null}
        </>
      }
      notice={
        affected === null ? null : (
          <Notice kind={affected.length === 0 ? 'pass' : 'caution'} role="status">
            {words.approved(affected.length)}
          </Notice>
        )
      }
      lead={<Facts record={record} />}
    >
      {affected === null || affected.length === 0 ? null : <Affected rows={affected} />}
      <Scopes record={record} />
      <CertificateSection record={record} />
      {record.note === '' ? null : (
        <Section title={words.note}>
          <p className="whitespace-pre-line">{record.note}</p>
        </Section>
      )}
    </Page>
  );
}

/** One calibration record, its certificate in the page, and the second person's decision. */
export function CalibrationPage() {
  const site = useSite();
  const { id = '' } = useParams();
  const query = useQuery(calibrationQuery(site.code, Number(id)));
  const failure = tableError(query);
  if (query.data === undefined) {
    const title = words.calibrationTitle(Number(id));
    return (
      <Page title={title}>
        {failure === undefined ? <Loading what={title} /> : <ErrorState {...failure} />}
      </Page>
    );
  }
  return <Loaded key={query.data.id} record={query.data} />;
}
