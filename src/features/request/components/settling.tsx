import { settlingCurve } from '#shared/domain/hold-estimate/settling-curve.ts';
import { SettlingChart } from '#src/components/drawing/settling-chart.tsx';
import { formatDuration } from '#src/lib/format-duration.ts';
import { formatCurrentA } from '#src/lib/format-quantity.ts';
import { t } from '#src/texts/t.ts';
import type { KnownEstimate } from '../phase-reasons.view.ts';
import { nameStarts } from '../settling-labels.view.ts';

const words = t.request;

/** The settling current with its band; the same drawing wherever an estimate is shown. */
export function Settling(props: { estimate: KnownEstimate }) {
  const { hold, numbers } = props.estimate;
  const curve = settlingCurve({ numbers, hold: { ...hold, modelS: hold.likelyS } });
  const low = formatCurrentA(curve.bandLowA);
  const high = formatCurrentA(curve.bandHighA);
  const { lower, upper } = nameStarts(curve);
  return (
    <>
      <SettlingChart
        curves={[
          {
            key: 'negative',
            kind: 'predicted',
            label: lower,
            points: curve.points.map((point) => ({
              seconds: point.timeS,
              currentA: point.negativeA,
            })),
          },
          {
            key: 'positive',
            kind: 'predicted',
            label: upper,
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
      <p className="mp-note">{words.settlingNote}</p>
    </>
  );
}
