import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
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
import { useSite } from '#src/hooks/use-site.ts';
import { errorText } from '#src/lib/error-text.ts';
import { isProblem } from '#src/lib/problem.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { requestQuery } from '../api/request-queries.ts';
import { draftOf, readDraft, type FieldErrors } from '../request-draft.view.ts';
import { requestReaders } from '../refreshes.ts';
import { useRequestDraft } from '../use-request-draft.ts';
import { RequestForm } from './request-form.tsx';

const words = t.request;
const noErrors: FieldErrors = new Map();

/** Errors found here and those the server named, at their fields. */
function mergeErrors(local: FieldErrors, error: unknown): FieldErrors {
  return isProblem(error) ? new Map([...error.fieldErrors, ...local]) : local;
}

/** A new request: kept as a draft, then its page offers slots. */
export function NewRequestPage() {
  const site = useSite();
  const navigate = useNavigate();
  const state = useRequestDraft(`new-request-${site.code}`, null);
  const [local, setLocal] = useState<FieldErrors>(noErrors);
  const create = useApiMutation(createRequest, {
    refreshes: requestReaders,
    onDone: (made) => {
      state.forget();
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
    <Page title={words.newTitle} intro={<p>{words.newIntro}</p>}>
      <RequestForm
        state={state}
        errors={mergeErrors(local, create.error)}
        failure={errorText(create.error)}
        actions={
          <>
            <Button kind="primary" busy={create.isPending} onClick={save}>
              {words.saveAndFind}
            </Button>
            <LinkButton kind="link" to={paths.requests.href(site.code)}>
              {words.leave}
            </LinkButton>
          </>
        }
      />
    </Page>
  );
}

function EditForm(props: { request: RequestDto }) {
  const { request } = props;
  const site = useSite();
  const navigate = useNavigate();
  const state = useRequestDraft(
    `request-${request.id}-${request.version}`,
    draftOf(request, site.zone),
  );
  const [local, setLocal] = useState<FieldErrors>(noErrors);
  const update = useApiMutation(updateRequest, {
    refreshes: requestReaders,
    onDone: () => {
      state.forget();
      void navigate(paths.request.href(site.code, request.id));
    },
  });
  const save = () => {
    const read = readDraft(state.draft, site.zone);
    setLocal(read.errors);
    if (read.fields !== null) {
      update.mutate({
        params: { site: site.code, id: request.id },
        body: { ...read.fields, version: request.version },
      });
    }
  };
  return (
    <RequestForm
      state={state}
      errors={mergeErrors(local, update.error)}
      failure={errorText(update.error)}
      actions={
        <>
          <Button kind="primary" busy={update.isPending} onClick={save}>
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

/** Changes a draft or a submitted request; of a booked one the server lets only note and needed-by change. */
export function EditRequestPage() {
  const site = useSite();
  const { id = '' } = useParams();
  const query = useQuery(requestQuery(site.code, Number(id)));
  const failure = tableError(query);
  const title = words.editTitle(Number(id));
  return (
    <Page title={title} intro={<p>{words.editIntro}</p>}>
      {failure === undefined ? null : <ErrorState {...failure} />}
      {query.isPending ? <Loading what={title} /> : null}
      {query.data === undefined ? null : <EditForm key={query.data.version} request={query.data} />}
    </Page>
  );
}
