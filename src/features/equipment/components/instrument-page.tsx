import { useQuery } from '@tanstack/react-query';
import { lazy, Suspense, useState } from 'react';
import { Link, useParams } from 'react-router-dom';
import type { BookingRow } from '#shared/contracts/bookings.contract.ts';
import type { InstrumentDto } from '#shared/contracts/equipment.contract.ts';
import { paths } from '#src/app/paths.ts';
import { Page, Section } from '#src/components/layout/page.tsx';
import { Button, LinkButton } from '#src/components/ui/button.tsx';
import { CalibrationState } from '#src/components/ui/calibration-state.tsx';
import { FactList } from '#src/components/ui/fact-list.tsx';
import { ErrorState, Loading } from '#src/components/ui/feedback.tsx';
import { Notice } from '#src/components/ui/notice.tsx';
import { Table } from '#src/components/ui/table.tsx';
import { useMay, useSite } from '#src/hooks/use-site.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { instrumentQuery } from '../api/get-instrument.ts';
import { AssessmentForm } from './assessment-form.tsx';
import { BookingsSection } from './bookings-section.tsx';
import { InstrumentActions } from './instrument-actions.tsx';
import {
  AssessmentsTable,
  HistorySection,
  ScopesSection,
  UnavailabilitySection,
} from './instrument-tables.tsx';

const InstrumentWeek = lazy(async () => {
  const { InstrumentWeek: Week } = await import('./instrument-week.tsx');
  return { default: Week };
});

function TagLinks(props: { tags: readonly string[] }) {
  const site = useSite();
  return props.tags.map((tag) => (
    <Link key={tag} className="mr-2 font-mono" to={paths.instrument.href(site.code, tag)}>
      {tag}
    </Link>
  ));
}

function Lead(props: { instrument: InstrumentDto }) {
  const { instrument } = props;
  const words = t.equipment;
  const facts = [
    { name: words.state, value: words.states[instrument.state] },
    { name: words.room, value: instrument.roomName ?? '–' },
    { name: words.custodian, value: instrument.custodian?.name ?? '–' },
    { name: words.firmware, value: instrument.firmware ?? '–' },
    ...(instrument.parentTag === null
      ? []
      : [{ name: words.parent, value: <TagLinks tags={[instrument.parentTag]} /> }]),
    ...(instrument.childTags.length === 0
      ? []
      : [{ name: words.children, value: <TagLinks tags={instrument.childTags} /> }]),
  ];
  return (
    <>
      <FactList facts={facts} />
      {instrument.note === '' ? null : <p className="mp-note">{instrument.note}</p>}
    </>
  );
}

function Assessments(props: { instrument: InstrumentDto }) {
  const may = useMay();
  const [isEntering, setIsEntering] = useState(false);
  const words = t.equipment;
  return (
    <Section title={words.assessments} note={<p>{words.assessmentsNote}</p>}>
      <AssessmentsTable instrument={props.instrument} />
      {may('stability.assess') && !isEntering ? (
        <div className="mp-acts mt-3">
          <Button
            onClick={() => {
              setIsEntering(true);
            }}
          >
            {words.enterAssessment}
          </Button>
        </div>
      ) : null}
      {isEntering ? (
        <AssessmentForm
          instrument={props.instrument}
          onClose={() => {
            setIsEntering(false);
          }}
        />
      ) : null}
    </Section>
  );
}

function Facts(props: { instrument: InstrumentDto }) {
  const words = t.equipment;
  return (
    <Section title={words.facts} note={<p>{words.factsNote}</p>}>
      <Table
        caption={words.facts}
        rows={props.instrument.facts}
        rowKey={(row) => row.name}
        empty={words.noFacts}
        columns={[
          { key: 'name', head: words.factColumns.name, cell: (row) => row.name },
          { key: 'value', head: words.factColumns.value, mono: true, cell: (row) => row.value },
          { key: 'source', head: words.factColumns.source, cell: (row) => row.source },
        ]}
      />
    </Section>
  );
}

export function InstrumentPage() {
  const site = useSite();
  const may = useMay();
  const { tag = '' } = useParams();
  const query = useQuery(instrumentQuery(site.code, tag));
  const [affected, setAffected] = useState<readonly BookingRow[] | null>(null);
  const words = t.equipment;
  const failure = tableError(query);
  const instrument = query.data;
  if (instrument === undefined) {
    return (
      <Page title={tag}>
        {failure === undefined ? <Loading what={tag} /> : <ErrorState {...failure} />}
      </Page>
    );
  }
  const isChamber = instrument.kind === 'chamber';
  return (
    <Page
      title={words.instrument(instrument.tag)}
      subtitle={words.kinds[instrument.kind]}
      intro={
        <p>
          <CalibrationState badge={instrument.badge} />{' '}
          <span className="ml-3">
            {words.kindAndModel(words.kinds[instrument.kind], instrument.model, instrument.serial)}
          </span>
        </p>
      }
      actions={
        <>
          {may('calibration.record') ? (
            <LinkButton to={paths.newCalibration.href(site.code, instrument.tag)}>
              {words.recordCalibration}
            </LinkButton>
          ) : null}
          <InstrumentActions instrument={instrument} onAffected={setAffected} />
        </>
      }
      notice={
        affected === null ? null : (
          <Notice kind={affected.length === 0 ? 'info' : 'caution'} role="status">
            {words.affected(affected.length)}
          </Notice>
        )
      }
      lead={<Lead instrument={instrument} />}
    >
      {affected === null || affected.length === 0 ? null : (
        <BookingsSection title={t.ui.atRisk} rows={affected} />
      )}
      <UnavailabilitySection instrument={instrument} />
      <ScopesSection instrument={instrument} />
      <Section title={words.week} note={<p>{words.weekNote}</p>}>
        <Suspense fallback={<Loading />}>
          <InstrumentWeek tag={instrument.tag} />
        </Suspense>
        {isChamber ? <p className="mp-note mt-2">{words.caution}</p> : null}
      </Section>
      <BookingsSection title={words.nextBookings} rows={instrument.nextBookings} />
      {isChamber ? <Assessments instrument={instrument} /> : null}
      <Facts instrument={instrument} />
      <HistorySection instrument={instrument} />
    </Page>
  );
}
