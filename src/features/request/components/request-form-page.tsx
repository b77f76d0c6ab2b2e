import { useQuery } from '@tanstack/react-query';
import { useMemo, useState } from 'react';
import { useNavigate, useParams } from 'react-router-dom';
import {
  createRequest,
  updateRequest,
  type RequestDto,
} from '#shared/contracts/requests.contract.ts';
import { paths } from '#src/app/paths.ts';
import { Page } from '#src/components/layout/page.tsx';
import { Button, LinkButton } from '#src/components/ui/button.tsx';
import { ErrorState, Loading } from '#src/components/ui/feedback.tsx';
import { useApiMutation } from '#src/hooks/use-api-mutation.ts';
import { useMay, useSite } from '#src/hooks/use-site.ts';
import { errorText } from '#src/lib/error-text.ts';
import { isProblem } from '#src/lib/problem.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { requestQuery } from '../api/request-queries.ts';
import {
  draftOf,
  emptyDraft,
  readDraft,
  readFreeEntries,
  type FieldErrors,
} from '../request-draft.view.ts';
import { requestReaders } from '../refreshes.ts';
import { useRequestDraft } from '../use-request-draft.ts';
import { RequestForm } from './request-form.tsx';

const words = t.request;
const noErrors: FieldErrors = new Map();

/** Errors found here and those the server named, at their fields. */
function mergeErrors(local: FieldErrors, error: unknown): FieldErrors {
  return isProblem(error) ? new Map([...error.fieldErrors, ...local]) : local;
}

function NewForm() {
  const site = useSite();
  const navigate = useNavigate();
  const [saved] = useState(() => ({ version: 0, draft: emptyDraft() }));
  const state = useRequestDraft(`new-request-${site.code}`, saved);
  const [local, setLocal] = useState<FieldErrors>(noErrors);
  const create = useApiMutation(createRequest, {
    refreshes: requestReaders,
    onDone: (made) => {
      state.finish();
      void navigate(paths.request.href(site.code, made.id));
    },
  });
  const save = () => {
    const read = readDraft(state.draft, site.zone);
    setLocal(read.errors);
    if (read.fields !== null) {
      create.mutate({ params: { site: site.code }, body: read.fields });
    }
  };
  return (
    <RequestForm
      state={state}
      errors={mergeErrors(local, create.error)}
      failure={errorText(create.error)}
      onSave={save}
      actions={
        <>
          <Button kind="primary" type="submit" busy={create.isPending}>
            {words.saveAndFind}
          </Button>
          <LinkButton kind="link" to={paths.requests.href(site.code)}>
            {words.leave}
          </LinkButton>
        </>
      }
    />
  );
}

/** A new request: kept as a draft, then its page offers slots. */
export function NewRequestPage() {
  const may = useMay();
  const isAllowed = may('request.create');
  return (
    <Page title={words.newTitle} intro={<p>{isAllowed ? words.newIntro : words.mayNotAsk}</p>}>
      {isAllowed ? <NewForm /> : null}
    </Page>
  );
}

function EditForm(props: { request: RequestDto }) {
  const { request } = props;
  const site = useSite();
  const navigate = useNavigate();
  const saved = useMemo(
    () => ({ version: request.version, draft: draftOf(request, site.zone) }),
    [request, site.zone],
  );
  const state = useRequestDraft(`request-${site.code}-${request.id}`, saved);
  const [local, setLocal] = useState<FieldErrors>(noErrors);
  const isBooked = request.state === 'booked' || request.state === 'partly-booked';
  const update = useApiMutation(updateRequest, {
    refreshes: requestReaders,
    onDone: () => {
      state.finish();
      void navigate(paths.request.href(site.code, request.id));
    },
  });
  const save = () => {
    const read = isBooked
      ? readFreeEntries(state.draft, request, site.zone)
      : readDraft(state.draft, site.zone);
    setLocal(read.errors);
    if (read.fields !== null) {
      update.mutate({
        params: { site: site.code, id: request.id },
        body: { ...read.fields, version: state.version },
      });
    }
  };
  return (
    <RequestForm
      state={state}
      isBooked={isBooked}
      errors={mergeErrors(local, update.error)}
      failure={errorText(update.error)}
      onSave={save}
      actions={
        <>
          <Button
            kind="primary"
            type="submit"
            busy={update.isPending}
            why={state.isBehind ? words.behindWhy : undefined}
          >
            {words.saveChanges}
          </Button>
          <LinkButton kind="link" to={paths.request.href(site.code, request.id)}>
            {words.leave}
          </LinkButton>
        </>
      }
    />
  );
}

function editIntro(request: RequestDto | undefined): string | undefined {
  if (request === undefined) {
    return undefined;
  }
  if (request.state === 'booked' || request.state === 'partly-booked') {
    return words.editBooked;
  }
  return request.proposal === null ? words.editPlain : words.editIntro;
}

/** Changes a draft or a submitted request; of a booked one only the note and the needed-by day. */
export function EditRequestPage() {
  const site = useSite();
  const { id = '' } = useParams();
  const query = useQuery(requestQuery(site.code, Number(id)));
  const failure = tableError(query);
  const title = words.editTitle(Number(id));
  const intro = editIntro(query.data);
  return (
    <Page title={title} intro={intro === undefined ? undefined : <p>{intro}</p>}>
      {failure === undefined ? null : <ErrorState {...failure} />}
      {query.isPending ? <Loading what={title} /> : null}
      {query.data === undefined ? null : <EditForm key={query.data.id} request={query.data} />}
    </Page>
  );
}
