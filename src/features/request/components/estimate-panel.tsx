import type { EstimateInput } from '#shared/domain/hold-estimate/types.ts';
import { PhaseFigure } from '#src/components/drawing/phase-figure.tsx';
import type { BarPhase } from '#src/components/drawing/phase-bar.view.ts';
import { Disclosure } from '#src/components/ui/disclosure.tsx';
import { Notice } from '#src/components/ui/notice.tsx';
import { Table } from '#src/components/ui/table.tsx';
import { formatDuration, formatHours } from '#src/lib/format-duration.ts';
import { t } from '#src/texts/t.ts';
import type { KnownEstimate, ShownEstimate } from '../phase-reasons.view.ts';
import { shorterWays } from '../shorter.view.ts';
import { FigureTable } from './figure-table.tsx';
import { PhaseRows } from './phase-rows.tsx';
import { Settling } from './settling.tsx';

const words = t.request;

function isKnown(estimate: ShownEstimate): estimate is KnownEstimate {
  return estimate.outcome === 'ok' || estimate.outcome === 'too-long';
}

function barOf(estimate: KnownEstimate): readonly BarPhase[] {
  const last = estimate.phases.some(({ phase }) => phase === 'measure') ? 'measure' : 'hold';
  const hold = estimate.phases.find(({ phase }) => phase === 'hold');
  const margin = hold === undefined ? 0 : hold.safeS - hold.likelyS;
  return estimate.phases.flatMap((phase): BarPhase[] => {
    const drawn: BarPhase = { phase: phase.phase, seconds: phase.likelyS };
    return phase.phase === last && margin > 0
      ? [drawn, { phase: 'hold', seconds: margin, margin: true }]
      : [drawn];
  });
}

const problemTitles = {
  'too-long': words.tooLong,
  range: words.rangeTitle,
  impossible: words.impossible,
  unknown: words.unknown,
} as const;

function Trouble(props: { estimate: ShownEstimate }) {
  const { estimate } = props;
  if (estimate.outcome === 'ok') {
    return null;
  }
  return (
    <Notice
      kind={estimate.outcome === 'range' ? 'caution' : 'stop'}
      title={problemTitles[estimate.outcome]}
    >
      {estimate.reason}{' '}
      {estimate.outcome === 'range' ? (
        <>
          {words.range(
            formatDuration(estimate.shortest.totalS),
            estimate.shortest.label,
            formatDuration(estimate.longest.totalS),
            estimate.longest.label,
          )}{' '}
          <b>{estimate.question.text}</b>
        </>
      ) : null}
    </Notice>
  );
}

/** Likely and safe length, what decides it, and the slot as a drawing. */
export function EstimateHead(props: {
  estimate: ShownEstimate;
  safePct: number;
  /** Over which wiring it was worked out. */
  over?: string | undefined;
}) {
  const { estimate, over } = props;
  return (
    <>
      {isKnown(estimate) ? (
        <div className="mb-3 flex flex-wrap items-start gap-x-8 gap-y-2">
          <div>
            <span className="mp-lead-label">{words.likely}</span>
            <span className="mp-lead-figure">{formatDuration(estimate.likelyTotalS)}</span>
          </div>
          <div>
            <span className="mp-lead-label">{words.safe(props.safePct)}</span>
            <span className="mp-lead-figure">{formatDuration(estimate.safeTotalS)}</span>
          </div>
          <p className="mp-note max-w-[46ch] flex-1 basis-[240px]">
            {words.safeNote} {estimate.limitText}
          </p>
        </div>
      ) : null}
      <Trouble estimate={estimate} />
      {isKnown(estimate) ? (
        <PhaseFigure
          phases={barOf(estimate)}
          label={words.slotSummary(
            formatDuration(estimate.likelyTotalS),
            formatDuration(estimate.safeTotalS),
          )}
        />
      ) : null}
      {over === undefined ? null : <p className="mp-note mt-2">{over}</p>}
    </>
  );
}

function Shorter(props: { estimate: KnownEstimate; input: EstimateInput }) {
  const ways = shorterWays(props.input, props.estimate.safeTotalS);
  if (ways.length === 0) {
    return null;
  }
  return (
    <div className="mt-4 max-w-[560px]">
      <h3 className="mb-1 text-[13px]">{words.shorter.title}</h3>
      <Table
        caption={words.shorter.title}
        rows={ways}
        rowKey={(row) => row.key}
        columns={[
          { key: 'change', head: words.shorter.change, cell: (row) => row.text },
          {
            key: 'length',
            head: words.shorter.length,
            mono: true,
            align: 'right',
            cell: (row) => formatHours(row.safeTotalS),
          },
        ]}
      />
    </div>
  );
}

function Notes(props: { notes: readonly string[] }) {
  return props.notes.map((note) => (
    <Notice key={note} kind="caution">
      {note}
    </Notice>
  ));
}

export type EstimateProps = {
  estimate: ShownEstimate;
  /** Where the estimate was made here: why each phase is as long, and what would shorten it. */
  input?: EstimateInput | undefined;
  staffedHours?: string | undefined;
};

/** Everything behind the lengths: phases, cautions, the settling curve, every figure with its source. */
export function EstimateDetail(props: EstimateProps) {
  const { estimate, input } = props;
  return (
    <>
      {isKnown(estimate) ? (
        <div className="mt-4">
          <PhaseRows estimate={estimate} input={input} staffedHours={props.staffedHours} />
        </div>
      ) : null}
      <Notes notes={estimate.notes} />
      {isKnown(estimate) ? (
        <div className="mt-4">
          <Settling estimate={estimate} />
        </div>
      ) : null}
      {isKnown(estimate) && input !== undefined ? (
        <Shorter estimate={estimate} input={input} />
      ) : null}
      {estimate.figures.length === 0 ? null : (
        <div className="mt-4">
          <Disclosure summary={words.figures}>
            <FigureTable figures={estimate.figures} />
          </Disclosure>
        </div>
      )}
    </>
  );
}

/** One estimate: lengths, phases, the settling curve, and every figure with its source. */
export function EstimatePanel(props: EstimateProps & { safePct: number }) {
  return (
    <div>
      <EstimateHead
        estimate={props.estimate}
        safePct={props.safePct}
        over={props.input === undefined ? undefined : words.overWiring(props.input.wiring.label)}
      />
      <EstimateDetail
        estimate={props.estimate}
        input={props.input}
        staffedHours={props.staffedHours}
      />
    </div>
  );
}
