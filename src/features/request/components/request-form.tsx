import { useQuery } from '@tanstack/react-query';
import { useEffect, useRef, type ReactNode } from 'react';
import { Section, TwoColumns } from '#src/components/layout/page.tsx';
import { Button } from '#src/components/ui/button.tsx';
import { ErrorState } from '#src/components/ui/feedback.tsx';
import { Notice } from '#src/components/ui/notice.tsx';
import { useSite } from '#src/hooks/use-site.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { cellTypesQuery } from '../api/request-queries.ts';
import { emptyLot, type FieldErrors, type LotDraft } from '../request-draft.view.ts';
import type { DraftState } from '../use-request-draft.ts';
import { AimFields } from './aim-fields.tsx';
import { FormNotices } from './form-notices.tsx';
import { LeaveGuard } from './leave-guard.tsx';
import { LiveEstimate } from './live-estimate.tsx';
import { LotFields } from './lot-fields.tsx';
import { OrderFields } from './order-fields.tsx';

const words = t.request;
const mostLots = 12;

function Lots(props: {
  state: DraftState;
  cellTypes: Parameters<typeof LotFields>[0]['cellTypes'];
  errorOf: (pointer: string) => string | undefined;
}) {
  const { state, cellTypes, errorOf } = props;
  const { draft, set } = state;
  const change = (key: string, what: Partial<LotDraft>) => {
    set({ lots: draft.lots.map((lot) => (lot.key === key ? { ...lot, ...what } : lot)) });
  };
  return (
    <>
      {draft.lots.map((lot, place) => (
        <LotFields
          key={lot.key}
          draft={draft}
          lot={lot}
          place={place}
          cellTypes={cellTypes}
          errorOf={errorOf}
          onChange={(what) => {
            change(lot.key, what);
          }}
          onRemove={
            draft.lots.length === 1
              ? undefined
              : () => {
                  set({ lots: draft.lots.filter((each) => each.key !== lot.key) });
                }
          }
        />
      ))}
      {draft.lots.length >= mostLots ? null : (
        <div className="mp-acts mb-4">
          <Button
            size="small"
            onClick={() => {
              set({ lots: [...draft.lots, emptyLot()] });
            }}
          >
            {words.addLot}
          </Button>
        </div>
      )}
    </>
  );
}

/** After a refused send the first marked field takes the focus, so that nobody has to look for it. */
function useFocusOnFault(errors: FieldErrors) {
  const form = useRef<HTMLFormElement>(null);
  useEffect(() => {
    if (errors.size > 0) {
      form.current
        ?.querySelector<HTMLElement>('[aria-invalid="true"]:is(input, select, textarea)')
        ?.focus();
    }
  }, [errors]);
  return form;
}

type RequestFormProps = {
  state: DraftState;
  errors: FieldErrors;
  failure: string | undefined;
  actions: ReactNode;
  onSave: () => void;
  /** Of a booked request only the note and the needed-by day are shown. */
  isBooked?: boolean | undefined;
};

function What(props: Pick<RequestFormProps, 'state' | 'errors'>) {
  const { state, errors } = props;
  const site = useSite();
  const cellTypes = useQuery(cellTypesQuery(site.code));
  const failure = tableError(cellTypes);
  const errorOf = (pointer: string) => errors.get(pointer);
  const types = cellTypes.data?.items ?? [];
  return (
    <Section title={words.what} note={<p>{words.whatNote}</p>}>
      <FormNotices state={state} />
      {failure === undefined ? null : <ErrorState {...failure} />}
      <TwoColumns kind="form">
        <div>
          <Lots state={state} cellTypes={types} errorOf={errorOf} />
          <AimFields draft={state.draft} errorOf={errorOf} onChange={state.set} />
        </div>
        <LiveEstimate draft={state.draft} cellTypes={types} />
      </TwoColumns>
    </Section>
  );
}

/** The form of a request with its estimate beside it; the page around it says what to do with it. */
export function RequestForm(props: RequestFormProps) {
  const { state, errors } = props;
  const form = useFocusOnFault(errors);
  return (
    <form
      ref={form}
      className="mp-rule-above"
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        props.onSave();
      }}
    >
      <LeaveGuard mayLeave={state.mayLeave} />
      {props.isBooked ? null : <What state={state} errors={errors} />}
      <Section title={words.order}>
        {props.isBooked ? <FormNotices state={state} /> : null}
        <OrderFields
          draft={state.draft}
          isBooked={props.isBooked ?? false}
          errorOf={(pointer) => errors.get(pointer)}
          onChange={state.set}
        />
        <div className="mt-4" aria-live="polite">
          {errors.size === 0 || props.failure !== undefined ? null : (
            <Notice kind="stop" role="alert">
              {words.fix(errors.size)}
            </Notice>
          )}
          {props.failure === undefined ? null : (
            <Notice kind="stop" role="alert">
              {props.failure}
            </Notice>
          )}
        </div>
        <div className="mp-acts mt-3">{props.actions}</div>
      </Section>
    </form>
  );
}
