import { useQuery } from '@tanstack/react-query';
import type { OfferDto } from '#shared/contracts/offers.contract.ts';
import type { LotDto, RequestDto } from '#shared/contracts/requests.contract.ts';
import { Disclosure } from '#src/components/ui/disclosure.tsx';
import { ErrorState } from '#src/components/ui/feedback.tsx';
import { useSite } from '#src/hooks/use-site.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { basisQuery, cellTypesQuery } from '../api/request-queries.ts';
import { estimateLot, type Basis } from '../estimate-input.view.ts';
import { estimateToShow, type ShownLotEstimate } from '../shown-estimate.view.ts';
import { EstimateDetail, EstimateHead } from './estimate-panel.tsx';

function Shown(props: { shown: ShownLotEstimate; basis: Basis }) {
  const { shown, basis } = props;
  if (shown.kind === 'needs') {
    return <p className="mp-note mt-3">{shown.sentence}</p>;
  }
  const { estimate, input, over } = shown;
  return (
    <div className="mt-4">
      <EstimateHead estimate={estimate} safePct={basis.process.safePercentile * 100} over={over} />
      <div className="mt-3">
        <Disclosure summary={t.request.estimateDetail}>
          <EstimateDetail estimate={estimate} input={input} staffedHours={basis.staffedHours} />
        </Disclosure>
      </div>
    </div>
  );
}

/** The estimate of a saved lot that still waits for a place. */
export function LotEstimate(props: {
  request: RequestDto;
  lot: LotDto;
  first: OfferDto | undefined;
}) {
  const { request, lot } = props;
  const site = useSite();
  const basis = useQuery(basisQuery(site.code));
  const cellTypes = useQuery(cellTypesQuery(site.code));
  const failure = tableError(basis.error === null ? cellTypes : basis);
  if (failure !== undefined) {
    return <ErrorState {...failure} />;
  }
  if (basis.data === undefined || cellTypes.data === undefined) {
    return null;
  }
  const cellType = cellTypes.data.items.find((each) => each.id === lot.cellTypeId);
  const reference = estimateLot(request, lot, cellType, basis.data);
  return <Shown shown={estimateToShow(props.first, reference)} basis={basis.data} />;
}
