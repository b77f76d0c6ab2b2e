import { useQuery } from '@tanstack/react-query';
import { useDeferredValue } from 'react';
import type { CellTypeDto } from '#shared/contracts/registers.contract.ts';
import { ErrorState, Loading } from '#src/components/ui/feedback.tsx';
import { LiveRegion } from '#src/components/ui/live-region.tsx';
import { useSite } from '#src/hooks/use-site.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { basisQuery } from '../api/request-queries.ts';
import { estimateLot, type Basis } from '../estimate-input.view.ts';
import { estimateSentence, estimatesSentence } from '../estimate-words.view.ts';
import { looseFields } from '../loose-fields.view.ts';
import type { RequestDraft } from '../request-draft.view.ts';
import { EstimatePanel } from './estimate-panel.tsx';

const words = t.request;

function OfDraft(props: { draft: RequestDraft; cellTypes: readonly CellTypeDto[]; basis: Basis }) {
  const { draft, cellTypes, basis } = props;
  const fields = looseFields(draft);
  const results = fields.lots.map((lot) =>
    estimateLot(
      fields,
      lot,
      cellTypes.find((each) => each.id === lot.cellTypeId),
      basis,
    ),
  );
  return (
    <>
      <LiveRegion message={estimatesSentence(results)} />
      {results.map((result, place) => (
        <section
          key={draft.lots[place]?.key}
          aria-label={words.estimateLabel(place + 1)}
          className={place === 0 ? undefined : 'mp-rule-above mt-4 pt-4'}
        >
          {results.length === 1 ? null : (
            <h3 className="mb-2 text-[13px]">{words.estimateOfLot(place + 1)}</h3>
          )}
          {result.kind === 'needs' ? (
            <p className="mp-note">{estimateSentence(result)}</p>
          ) : (
            <EstimatePanel
              estimate={result.estimate}
              input={result.input}
              staffedHours={basis.staffedHours}
              safePct={basis.process.safePercentile * 100}
            />
          )}
        </section>
      ))}
    </>
  );
}

/** The estimate beside the form: computed here at every key, over the site's reference wiring. */
export function LiveEstimate(props: { draft: RequestDraft; cellTypes: readonly CellTypeDto[] }) {
  const site = useSite();
  const basis = useQuery(basisQuery(site.code));
  const draft = useDeferredValue(props.draft);
  const failure = tableError(basis);
  if (failure !== undefined) {
    return <ErrorState {...failure} />;
  }
  return basis.data === undefined ? (
    <Loading what={words.loadingBasis} />
  ) : (
    <OfDraft draft={draft} cellTypes={props.cellTypes} basis={basis.data} />
  );
}
