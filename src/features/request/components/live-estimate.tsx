import { useQuery } from '@tanstack/react-query';
import { useDeferredValue } from 'react';
import type { CellTypeDto } from '#shared/contracts/registers.contract.ts';
import { ErrorState, Loading } from '#src/components/ui/feedback.tsx';
import { useSite } from '#src/hooks/use-site.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { basisQuery } from '../api/request-queries.ts';
import { estimateLot } from '../estimate-input.view.ts';
import type { Basis } from '../estimate-input.view.ts';
import { looseFields } from '../loose-fields.view.ts';
import type { RequestDraft } from '../request-draft.view.ts';
import { EstimatePanel } from './estimate-panel.tsx';

const words = t.request;

function OfDraft(props: { draft: RequestDraft; cellTypes: readonly CellTypeDto[]; basis: Basis }) {
  const { draft, cellTypes, basis } = props;
  const fields = looseFields(draft);
  return fields.lots.map((lot, place) => {
    const cellType = cellTypes.find((each) => each.id === lot.cellTypeId);
    const result = estimateLot(fields, lot, cellType, basis);
    return (
      <section key={draft.lots[place]?.key} aria-label={words.estimateOfLot(place + 1)}>
        {draft.lots.length === 1 ? null : <h3>{words.estimateOfLot(place + 1)}</h3>}
        {result.kind === 'needs' ? (
          <p className="mp-note">
            {words.estimateAsks(result.needs.map((need) => words.needs[need]).join(', '))}
          </p>
        ) : (
          <EstimatePanel estimate={result.estimate} safePct={basis.process.safePercentile * 100} />
        )}
      </section>
    );
  });
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
  return (
    <div aria-live="polite" aria-busy={draft !== props.draft}>
      {basis.data === undefined ? (
        <Loading what={words.loadingBasis} />
      ) : (
        <OfDraft draft={draft} cellTypes={props.cellTypes} basis={basis.data} />
      )}
    </div>
  );
}
