import { Link } from 'react-router-dom';
import type { CheckResultDto } from '#shared/contracts/check.schemas.ts';
import type { OfferDto } from '#shared/contracts/offers.contract.ts';
import { paths } from '#src/app/paths.ts';
import { Button } from '#src/components/ui/button.tsx';
import { Slip } from '#src/components/ui/slip.tsx';
import { useSite } from '#src/hooks/use-site.ts';
import { formatDuration } from '#src/lib/format-duration.ts';
import type { CheckCode } from '#shared/domain/checks/types.ts';
import { t } from '#src/texts/t.ts';
import { slipLines } from '../check-lines.view.ts';
import { waysOf, type Way } from '../offers.view.ts';
import { useTime } from '../use-time.ts';

const words = t.request;

/** What a placement would mean, as a slip. */
export function OfferSlip(props: { offer: OfferDto }) {
  const { offer } = props;
  const time = useTime();
  const lengthS = (Date.parse(offer.endAt) - Date.parse(offer.startAt)) / 1000;
  return (
    <Slip
      label={words.slipLabel}
      title={words.slipTitle(offer.chamberTag, time(offer.startAt))}
      subtitle={words.slipUntil(time(offer.endAt), formatDuration(lengthS))}
      lines={slipLines(offer.checks)}
    />
  );
}

type Follow = {
  requestId: number;
  /** Left out for who may not ask for one. */
  onAskDeviation?: ((code: CheckCode) => void) | undefined;
};

function WayOut({ way, requestId, onAskDeviation }: Follow & { way: Way }) {
  const site = useSite();
  switch (way.kind) {
    case 'instrument':
      return <Link to={paths.instrument.href(site.code, way.tag)}>{way.sentence}</Link>;
    case 'change':
      return <Link to={paths.editRequest.href(site.code, requestId)}>{way.sentence}</Link>;
    case 'deviation':
      return onAskDeviation === undefined ? (
        way.sentence
      ) : (
        <Button
          kind="link"
          onClick={() => {
            onAskDeviation(way.code);
          }}
        >
          {way.sentence}
        </Button>
      );
    case 'say':
      return way.sentence;
  }
}

/** The ways out of a stop, each followed where it can be. */
export function WaysOut(props: Follow & { check: CheckResultDto }) {
  const { check, ...follow } = props;
  return waysOf(check).map((way) => (
    <span key={`${way.kind}-${way.sentence}`}>
      {' '}
      <WayOut way={way} {...follow} />
    </span>
  ));
}
