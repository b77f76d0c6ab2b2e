import type { EstimateInput } from '#shared/domain/hold-estimate/types.ts';
import { Table } from '#src/components/ui/table.tsx';
import { formatHours } from '#src/lib/format-duration.ts';
import { t } from '#src/texts/t.ts';
import { reasonOf, type KnownEstimate } from '../phase-reasons.view.ts';

const words = t.request;
type Phase = KnownEstimate['phases'][number];

/** The phases of a slot with the reason and the source of each length. */
export function PhaseRows(props: {
  estimate: KnownEstimate;
  input: EstimateInput | undefined;
  staffedHours: string | undefined;
}) {
  const { estimate, input } = props;
  const heads = words.phaseColumns;
  const attended =
    props.staffedHours === undefined ? words.attended : words.attendedIn(props.staffedHours);
  const reasonFor = (row: Phase) => reasonOf(row.phase, estimate, input);
  return (
    <Table
      caption={words.estimate}
      rows={estimate.phases}
      rowKey={(row) => row.phase}
      foot={[
        words.slot,
        formatHours(estimate.likelyTotalS),
        formatHours(estimate.safeTotalS),
        '',
        '',
      ]}
      columns={[
        {
          key: 'phase',
          head: heads.phase,
          nowrap: true,
          cell: (row) => t.drawings.phases[row.phase],
        },
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
          key: 'why',
          head: heads.why,
          cell: (row) => `${reasonFor(row).why}${row.isAttended ? ` ${attended}` : ''}`,
        },
        {
          key: 'origin',
          head: heads.origin,
          cell: (row) => {
            const { origin } = reasonFor(row);
            return origin === null ? null : (
              <span className="mp-note">{words.origins[origin]}</span>
            );
          },
        },
      ]}
    />
  );
}
