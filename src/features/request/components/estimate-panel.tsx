import type { SlotEstimateDto } from '#shared/contracts/estimate.schemas.ts';
import type { SlotEstimate } from '#shared/domain/hold-estimate/types.ts';
import { settlingCurve } from '#shared/domain/hold-estimate/settling-curve.ts';
import { PhaseFigure } from '#src/components/drawing/phase-figure.tsx';
import type { BarPhase } from '#src/components/drawing/phase-bar.view.ts';
import { SettlingChart } from '#src/components/drawing/settling-chart.tsx';
import { Disclosure } from '#src/components/ui/disclosure.tsx';
import { Notice } from '#src/components/ui/notice.tsx';
import { Table } from '#src/components/ui/table.tsx';
import { formatDuration, formatHours } from '#src/lib/format-duration.ts';
import { formatCurrentA } from '#src/lib/format-quantity.ts';
import { t } from '#src/texts/t.ts';
import { FigureTable } from './figure-table.tsx';

const words = t.request;

/** As computed here, or as the server sent it. */
type Shown = SlotEstimate | SlotEstimateDto;
type Known = Extract<Shown, { outcome: 'ok' | 'too-long' }>;

function barOf(estimate: Known): readonly BarPhase[] {
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

function Phases(props: { estimate: Known }) {
  const { estimate } = props;
  const heads = words.phaseColumns;
  return (
    <>
      <PhaseFigure
        phases={barOf(estimate)}
        label={words.settlingSummary(
          formatDuration(estimate.likelyTotalS),
          formatDuration(estimate.safeTotalS),
        )}
      />
      <div className="mt-4" />
      <Table
        caption={words.estimate}
        rows={estimate.phases}
        rowKey={(row) => row.phase}
        foot={[
          <b key="slot">{words.slot}</b>,
          <b key="likely">{formatHours(estimate.likelyTotalS)}</b>,
          <b key="safe">{formatHours(estimate.safeTotalS)}</b>,
          '',
        ]}
        columns={[
          { key: 'phase', head: heads.phase, cell: (row) => t.drawings.phases[row.phase] },
          {
            key: 'likely',
            head: heads.likely,
            mono: true,
            align: 'right',
            cell: (row) => formatHours(row.likelyS),
          },
          {
            key: 'safe',
            head: heads.safe,
            mono: true,
            align: 'right',
            cell: (row) =>
              row.safeS === row.likelyS ? (
                <span className="mp-note">{words.same}</span>
              ) : (
                formatHours(row.safeS)
              ),
          },
          {
            key: 'attended',
            head: heads.attended,
            align: 'right',
            cell: (row) => (row.isAttended ? words.attended : ''),
          },
        ]}
      />
    </>
  );
}

/** The settling current with its band; the same drawing wherever an estimate is shown. */
export function Settling(props: { estimate: Known }) {
  const { hold, numbers } = props.estimate;
  const curve = settlingCurve({ numbers, hold: { ...hold, modelS: hold.likelyS } });
  const low = formatCurrentA(curve.bandLowA);
  const high = formatCurrentA(curve.bandHighA);
  return (
    <SettlingChart
      curves={[
        {
          key: 'negative',
          kind: 'predicted',
          label: words.starts.low,
          points: curve.points.map((point) => ({
            seconds: point.timeS,
            currentA: point.negativeA,
          })),
        },
        {
          key: 'positive',
          kind: 'predicted',
          label: words.starts.high,
          points: curve.points.map((point) => ({
            seconds: point.timeS,
            currentA: point.positiveA,
          })),
        },
      ]}
      target={{
        lowA: curve.bandLowA,
        highA: curve.bandHighA,
        label: words.settledBand(low, high),
      }}
      likelySeconds={curve.likelyS}
      safeSeconds={curve.safeS}
      summary={words.settlingSummary(formatDuration(curve.likelyS), formatDuration(curve.safeS))}
    />
  );
}

function Headline(props: { estimate: Known; safePct: number }) {
  const { estimate } = props;
  return (
    <div className="mb-3 flex flex-wrap gap-x-8 gap-y-2">
      <div>
        <span className="mp-note block">{words.likely}</span>
        <b className="text-[21px]">{formatDuration(estimate.likelyTotalS)}</b>
      </div>
      <div>
        <span className="mp-note block">{words.safe(props.safePct)}</span>
        <b className="text-[21px]">{formatDuration(estimate.safeTotalS)}</b>
      </div>
      <p className="mp-note max-w-[42ch] self-center">
        {words.safeNote} {estimate.limitText}
      </p>
    </div>
  );
}

const problemTitles = {
  'too-long': words.tooLong,
  range: words.rangeTitle,
  impossible: words.impossible,
  unknown: words.unknown,
} as const;

function Trouble(props: { estimate: Shown }) {
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
      {estimate.outcome === 'range'
        ? `${words.range(formatDuration(estimate.shortest.totalS), formatDuration(estimate.longest.totalS))} ${estimate.question.text}`
        : null}
    </Notice>
  );
}

/** One estimate: lengths, phases, the settling curve, and every figure with its source. */
export function EstimatePanel(props: { estimate: Shown; safePct: number }) {
  const { estimate } = props;
  const isKnown = estimate.outcome === 'ok' || estimate.outcome === 'too-long';
  return (
    <div>
      {isKnown ? <Headline estimate={estimate} safePct={props.safePct} /> : null}
      <Trouble estimate={estimate} />
      {isKnown ? <Phases estimate={estimate} /> : null}
      {estimate.notes.map((note) => (
        <p key={note} className="mp-note mt-2">
          {note}
        </p>
      ))}
      {isKnown ? (
        <Disclosure summary={words.settling}>
          <Settling estimate={estimate} />
          <p className="mp-note">{words.settlingNote}</p>
        </Disclosure>
      ) : null}
      <Disclosure summary={words.figures}>
        <FigureTable figures={estimate.figures} />
      </Disclosure>
    </div>
  );
}
