import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import {
  askDeviation,
  decideDeviation,
  type DeviationDto,
} from '#shared/contracts/registers.contract.ts';
import type { RequestDto } from '#shared/contracts/requests.contract.ts';
import { checkRules } from '#shared/domain/checks/check-rules.ts';
import type { CheckCode } from '#shared/domain/checks/types.ts';
import { Section } from '#src/components/layout/page.tsx';
import { Button } from '#src/components/ui/button.tsx';
import { Dialog } from '#src/components/ui/dialog.tsx';
import { Field } from '#src/components/ui/field.tsx';
import { DateTimeInput, TextArea } from '#src/components/ui/input.tsx';
import { Select } from '#src/components/ui/select.tsx';
import { State } from '#src/components/ui/state.tsx';
import { Table } from '#src/components/ui/table.tsx';
import { useApiMutation } from '#src/hooks/use-api-mutation.ts';
import { useMay, useSite } from '#src/hooks/use-site.ts';
import { errorText } from '#src/lib/error-text.ts';
import { formatInstant } from '#src/lib/format-date.ts';
import { fromSiteInput } from '#src/lib/site-time.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { deviationsQuery } from '../api/request-queries.ts';
import { liftableCodes } from '../offers.view.ts';
import { requestReaders } from '../refreshes.ts';

const words = t.request;
const looks = {
  asked: { mark: 'to-do', tone: 'marigold' },
  granted: { mark: 'pass', tone: 'reed' },
  refused: { mark: 'stop', tone: 'brick' },
  expired: { mark: 'done', tone: 'ink' },
} as const;

function AskDialog(props: { request: RequestDto; rule: CheckCode | 'any'; onClose: () => void }) {
  const site = useSite();
  const [code, setCode] = useState<CheckCode | ''>(props.rule === 'any' ? '' : props.rule);
  const [reason, setReason] = useState('');
  const ask = useApiMutation(askDeviation, { refreshes: requestReaders, onDone: props.onClose });
  const reasonFault = reason.trim().length < 3 ? words.reasonMissing : undefined;
  return (
    <Dialog
      isOpen
      title={words.askTitle}
      confirmLabel={words.askDeviation}
      kind="primary"
      busy={ask.isPending}
      why={code === '' ? words.ruleMissing : reasonFault}
      error={errorText(ask.error)}
      onConfirm={() => {
        if (code !== '') {
          ask.mutate({ params: { site: site.code, id: props.request.id }, body: { code, reason } });
        }
      }}
      onClose={props.onClose}
    >
      <p>{words.askText}</p>
      <Field label={words.rule} layout="above">
        <Select
          value={code}
          options={liftableCodes.map((value) => ({ value, label: checkRules[value].title }))}
          onChange={(event) => {
            setCode(liftableCodes.find((each) => each === event.target.value) ?? '');
          }}
        />
      </Field>
      <Field label={words.reason} layout="above" help={words.reasonHelp}>
        <TextArea
          value={reason}
          onChange={(event) => {
            setReason(event.target.value);
          }}
        />
      </Field>
    </Dialog>
  );
}

function DecideDialog(props: {
  deviation: DeviationDto;
  isReported: boolean;
  onClose: () => void;
}) {
  const { deviation, onClose } = props;
  const site = useSite();
  const [reason, setReason] = useState('');
  const [acceptance, setAcceptance] = useState('');
  const [expires, setExpires] = useState('');
  const decide = useApiMutation(decideDeviation, { refreshes: requestReaders, onDone: onClose });
  const reading = fromSiteInput(expires, site.zone);
  const send = (grant: boolean) => {
    decide.mutate({
      params: { site: site.code, id: deviation.id },
      body: {
        grant,
        reason,
        customerAcceptance: acceptance.trim() === '' ? null : acceptance,
        expiresAt: reading.kind === 'instant' ? reading.at : null,
      },
    });
  };
  const timeFault =
    reading.kind === 'gap'
      ? t.ui.timeGap(site.zone)
      : reading.kind === 'invalid'
        ? t.ui.timeInvalid
        : undefined;
  const refuseWhy = reason.trim().length < 3 ? words.reasonMissing : undefined;
  const isUnagreed = props.isReported && acceptance.trim() === '';
  const grantWhy =
    refuseWhy ??
    (isUnagreed ? words.acceptanceMissing : timeFault === undefined ? undefined : words.timeWrong);
  return (
    <Dialog
      isOpen
      title={words.decideTitle(checkRules[deviation.code].title)}
      confirmLabel={words.grant}
      kind="primary"
      busy={decide.isPending}
      why={grantWhy}
      error={errorText(decide.error)}
      onConfirm={() => {
        send(true);
      }}
      onClose={onClose}
    >
      <p>{deviation.reason}</p>
      <Field label={words.answer} layout="above" help={words.reasonHelp}>
        <TextArea
          value={reason}
          onChange={(event) => {
            setReason(event.target.value);
          }}
        />
      </Field>
      <Field
        label={words.acceptance}
        layout="above"
        help={props.isReported ? words.acceptanceHelp : undefined}
        optional={!props.isReported}
      >
        <TextArea
          value={acceptance}
          rows={2}
          onChange={(event) => {
            setAcceptance(event.target.value);
          }}
        />
      </Field>
      <Field
        label={words.expires}
        layout="above"
        help={words.expiresHelp(site.zone)}
        error={timeFault}
        optional
      >
        <DateTimeInput
          value={expires}
          onChange={(event) => {
            setExpires(event.target.value);
          }}
        />
      </Field>
      <div className="mp-acts mt-2">
        <Button
          kind="danger"
          busy={decide.isPending}
          why={refuseWhy}
          onClick={() => {
            send(false);
          }}
        >
          {words.refuse}
        </Button>
      </div>
    </Dialog>
  );
}

function Decision(props: { deviation: DeviationDto }) {
  const { decidedBy, decisionReason, customerAcceptance } = props.deviation;
  if (decidedBy === null) {
    return words.none;
  }
  return (
    <div>
      {decidedBy}
      {decisionReason === null ? null : <span className="mp-note block">{decisionReason}</span>}
      {customerAcceptance === null ? null : (
        <span className="mp-note block">{words.agreed(customerAcceptance)}</span>
      )}
    </div>
  );
}

function DeviationTable(props: {
  rows: readonly DeviationDto[];
  query: { error: unknown; refetch: () => unknown; isPending: boolean };
  onDecide: (deviation: DeviationDto) => void;
}) {
  const site = useSite();
  const may = useMay();
  const heads = words.deviationColumns;
  const time = (at: string | null) =>
    at === null ? words.none : formatInstant(at, { zone: site.zone });
  return (
    <Table
      caption={words.deviations}
      rows={props.rows}
      rowKey={(row) => row.id}
      isLoading={props.query.isPending}
      error={tableError(props.query)}
      empty={words.noDeviations}
      stack
      columns={[
        { key: 'rule', head: heads.rule, cell: (row) => checkRules[row.code].title },
        {
          key: 'state',
          head: heads.state,
          cell: (row) => (
            <State mark={looks[row.state].mark} tone={looks[row.state].tone}>
              {words.deviationStates[row.state]}
            </State>
          ),
        },
        { key: 'reason', head: heads.reason, cell: (row) => row.reason },
        { key: 'by', head: heads.by, cell: (row) => row.askedBy },
        { key: 'decided', head: heads.decided, cell: (row) => <Decision deviation={row} /> },
        { key: 'until', head: heads.until, mono: true, cell: (row) => time(row.expiresAt) },
        {
          key: 'act',
          head: '',
          label: words.actions,
          align: 'right',
          cell: (row) =>
            row.state === 'asked' && may('deviation.grant') ? (
              <Button
                size="small"
                why={row.askedBy === site.personName ? words.ownDeviation : undefined}
                onClick={() => {
                  props.onDecide(row);
                }}
              >
                {words.decide}
              </Button>
            ) : null,
        },
      ]}
    />
  );
}

/** Rules lifted for this request: asked, answered, over. */
export function DeviationsSection(props: {
  request: RequestDto;
  /** The rule somebody is asking about, here or at a slot that it blocks. */
  asking: CheckCode | 'any' | null;
  onAsk: ((rule: 'any') => void) | undefined;
  onClose: () => void;
}) {
  const { request, asking, onAsk } = props;
  const site = useSite();
  const query = useQuery(deviationsQuery(site.code, request.id));
  const [deciding, setDeciding] = useState<DeviationDto | null>(null);
  return (
    <Section title={words.deviations} note={<p>{words.deviationsNote}</p>}>
      <DeviationTable rows={query.data?.items ?? []} query={query} onDecide={setDeciding} />
      {onAsk === undefined ? null : (
        <div className="mp-acts mt-3">
          <Button
            kind="link"
            onClick={() => {
              onAsk('any');
            }}
          >
            {words.askDeviation}
          </Button>
        </div>
      )}
      {asking === null ? null : (
        <AskDialog request={request} rule={asking} onClose={props.onClose} />
      )}
      {deciding === null ? null : (
        <DecideDialog
          deviation={deciding}
          isReported={request.grade === 'reported'}
          onClose={() => {
            setDeciding(null);
          }}
        />
      )}
    </Section>
  );
}
