import { useState } from 'react';
import {
  declineRequest,
  submitRequest,
  withdrawRequest,
  type RequestDto,
} from '#shared/contracts/requests.contract.ts';
import { paths } from '#src/app/paths.ts';
import { Button, LinkButton } from '#src/components/ui/button.tsx';
import { Dialog } from '#src/components/ui/dialog.tsx';
import { Field } from '#src/components/ui/field.tsx';
import { TextArea } from '#src/components/ui/input.tsx';
import { useApiMutation } from '#src/hooks/use-api-mutation.ts';
import { useMay, useSite } from '#src/hooks/use-site.ts';
import { t } from '#src/texts/t.ts';
import { refusalText } from '../refusal.view.ts';
import { requestReaders } from '../refreshes.ts';

const words = t.request;
type Act = 'submit' | 'withdraw' | 'decline';

function useActs(request: RequestDto, onDone: () => void) {
  const site = useSite();
  const options = { refreshes: requestReaders, onDone };
  const submit = useApiMutation(submitRequest, options);
  const withdraw = useApiMutation(withdrawRequest, options);
  const decline = useApiMutation(declineRequest, options);
  const params = { site: site.code, id: request.id };
  const { version } = request;
  return {
    isBusy: submit.isPending || withdraw.isPending || decline.isPending,
    error: refusalText(submit.error ?? withdraw.error ?? decline.error),
    reset: () => {
      submit.reset();
      withdraw.reset();
      decline.reset();
    },
    run: (act: Act, reason: string) => {
      if (act === 'submit') {
        submit.mutate({ params, body: { version } });
      } else if (act === 'withdraw') {
        withdraw.mutate({ params, body: { version, reason } });
      } else {
        decline.mutate({ params, body: { version, reason } });
      }
    },
  };
}

const acts = {
  submit: { title: words.submitTitle, text: words.submitText, verb: words.submit },
  withdraw: { title: words.withdrawTitle, text: words.withdrawText, verb: words.withdraw },
  decline: { title: words.declineTitle, text: words.declineText, verb: words.decline },
} as const;

function shownActs(request: RequestDto, may: ReturnType<typeof useMay>): readonly Act[] {
  const owner = { ownerId: request.requester.id };
  const isOpen = request.state === 'draft' || request.state === 'submitted';
  return [
    ...(isOpen && may('request.withdraw', owner) ? (['withdraw'] as const) : []),
    ...(request.state === 'submitted' && may('request.decline') ? (['decline'] as const) : []),
    ...(request.state === 'draft' && may('request.edit', owner) ? (['submit'] as const) : []),
  ];
}

const kinds = { submit: 'primary', withdraw: 'danger', decline: 'secondary' } as const;

/** What can be done to a request by this person in its state. */
export function RequestActions(props: { request: RequestDto }) {
  const { request } = props;
  const site = useSite();
  const may = useMay();
  const [act, setAct] = useState<Act | null>(null);
  const [reason, setReason] = useState('');
  const doing = useActs(request, () => {
    setAct(null);
    setReason('');
  });
  const isEditable = !['done', 'withdrawn'].includes(request.state);
  const asked = acts[act ?? 'submit'];
  const needsReason = act === 'withdraw' || act === 'decline';
  return (
    <>
      {isEditable && may('request.edit', { ownerId: request.requester.id }) ? (
        <LinkButton to={paths.editRequest.href(site.code, request.id)}>{words.edit}</LinkButton>
      ) : null}
      {shownActs(request, may).map((each) => (
        <Button
          key={each}
          kind={kinds[each]}
          onClick={() => {
            setAct(each);
          }}
        >
          {acts[each].verb}
        </Button>
      ))}
      <Dialog
        isOpen={act !== null}
        title={asked.title(request.id)}
        confirmLabel={asked.verb}
        kind={act === 'withdraw' ? 'danger' : 'primary'}
        busy={doing.isBusy}
        why={needsReason && reason.trim().length < 3 ? words.reasonMissing : undefined}
        error={doing.error}
        onConfirm={() => {
          if (act !== null) {
            doing.run(act, reason);
          }
        }}
        onClose={() => {
          setAct(null);
          doing.reset();
        }}
      >
        <p>{asked.text}</p>
        {needsReason ? (
          <Field label={words.reason} layout="above" help={words.reasonHelp}>
            <TextArea
              value={reason}
              onChange={(event) => {
                setReason(event.target.value);
              }}
            />
          </Field>
        ) : null}
      </Dialog>
    </>
  );
}
