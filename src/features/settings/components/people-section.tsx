import { useInfiniteQuery } from '@tanstack/react-query';
import { useState } from 'react';
import {
  addGrant,
  listPeople,
  revokeGrant,
  type PersonDto,
} from '#shared/contracts/people.contract.ts';
import { getSession } from '#shared/contracts/session.contract.ts';
import { roles } from '#shared/domain/policies/actions.ts';
import { Section } from '#src/components/layout/page.tsx';
import { Button } from '#src/components/ui/button.tsx';
import { Dialog } from '#src/components/ui/dialog.tsx';
import { Field } from '#src/components/ui/field.tsx';
import { Filters } from '#src/components/ui/filters.tsx';
import { TextInput } from '#src/components/ui/input.tsx';
import { Select } from '#src/components/ui/select.tsx';
import { Table } from '#src/components/ui/table.tsx';
import { useApiMutation } from '#src/hooks/use-api-mutation.ts';
import { useDebouncedText } from '#src/hooks/use-debounced-text.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { useUrlState } from '#src/hooks/use-url-state.ts';
import { errorText } from '#src/lib/error-text.ts';
import { formatInstant } from '#src/lib/format-date.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { peopleQuery } from '../api/settings-queries.ts';

const words = t.settings;
const refreshes = [listPeople, getSession];
type Grant = PersonDto['grants'][number];

function describeGrant(grant: Grant): string {
  return words.roleAt(words.roles[grant.role], grant.siteCode ?? words.everySite);
}

function GiveRole(props: { person: PersonDto; onClose: () => void }) {
  const { person, onClose } = props;
  const site = useSite();
  const [role, setRole] = useState<Grant['role']>('engineer');
  const [at, setAt] = useState<string>(site.code);
  const give = useApiMutation(addGrant, { refreshes, onDone: onClose });
  return (
    <Dialog
      isOpen
      title={words.giveTo(person.name)}
      confirmLabel={words.give}
      kind="primary"
      busy={give.isPending}
      error={errorText(give.error)}
      onConfirm={() => {
        give.mutate({
          params: { id: person.id },
          body: { role, siteCode: at === '' ? null : at },
        });
      }}
      onClose={onClose}
    >
      <Field label={words.role} layout="above">
        <Select
          value={role}
          emptyLabel={null}
          options={roles.map((value) => ({ value, label: words.roles[value] }))}
          onChange={(event) => {
            setRole(roles.find((each) => each === event.target.value) ?? 'engineer');
          }}
        />
      </Field>
      <Field label={words.giveAt} layout="above" help={words.giveText}>
        <Select
          value={at}
          emptyLabel={words.everySite}
          options={[{ value: site.code, label: site.name }]}
          onChange={(event) => {
            setAt(event.target.value);
          }}
        />
      </Field>
    </Dialog>
  );
}

function TakeRole(props: { person: PersonDto; grant: Grant; onClose: () => void }) {
  const { person, grant, onClose } = props;
  const take = useApiMutation(revokeGrant, { refreshes, onDone: onClose });
  return (
    <Dialog
      isOpen
      title={words.revokeTitle(describeGrant(grant), person.name)}
      confirmLabel={words.revoke}
      busy={take.isPending}
      error={errorText(take.error)}
      onConfirm={() => {
        take.mutate({ params: { id: person.id, grantId: grant.id } });
      }}
      onClose={onClose}
    >
      <p>{words.revokeText}</p>
    </Dialog>
  );
}

function Roles(props: { person: PersonDto; onTake: (grant: Grant) => void }) {
  return (
    <ul>
      {props.person.grants.map((grant) => (
        <li key={grant.id}>
          {describeGrant(grant)}{' '}
          {grant.origin === 'claim' ? (
            <span className="mp-note">{words.fromProvider}</span>
          ) : (
            <Button
              kind="link"
              aria-label={`${words.revoke}: ${describeGrant(grant)}, ${props.person.name}`}
              onClick={() => {
                props.onTake(grant);
              }}
            >
              {words.revoke}
            </Button>
          )}
        </li>
      ))}
    </ul>
  );
}

type Asked = { readonly person: PersonDto; readonly grant: Grant | null };

/** People with their roles; for administrators. */
export function PeopleSection() {
  const site = useSite();
  const [text, setText] = useUrlState('person');
  const [asked, setAsked] = useState<Asked | null>(null);
  const list = useInfiniteQuery(peopleQuery(useDebouncedText(text, 250)));
  const heads = words.peopleColumns;
  const close = () => {
    setAsked(null);
  };
  return (
    <Section title={words.people} note={<p>{words.peopleNote}</p>}>
      <Filters>
        <label>
          <span className="mp-note">{words.findPerson}</span>
          <TextInput
            type="search"
            value={text}
            onChange={(event) => {
              setText(event.target.value);
            }}
          />
        </label>
      </Filters>
      <Table
        caption={words.people}
        rows={list.data?.pages.flatMap((page) => page.items) ?? []}
        rowKey={(row) => row.id}
        isLoading={list.isPending}
        error={tableError(list)}
        empty={words.noPeople}
        stack
        more={
          list.hasNextPage
            ? { onMore: () => void list.fetchNextPage(), busy: list.isFetchingNextPage }
            : undefined
        }
        columns={[
          {
            key: 'name',
            head: heads.name,
            cell: (row) => (
              <>
                <b>{row.name}</b> <span className="mp-note block">{row.email ?? ''}</span>
              </>
            ),
          },
          {
            key: 'roles',
            head: heads.roles,
            cell: (row) => (
              <Roles
                person={row}
                onTake={(grant) => {
                  setAsked({ person: row, grant });
                }}
              />
            ),
          },
          {
            key: 'seen',
            head: heads.seen,
            mono: true,
            cell: (row) =>
              row.lastSignedInAt === null
                ? words.neverSeen
                : formatInstant(row.lastSignedInAt, { zone: site.zone }),
          },
          {
            key: 'act',
            head: '',
            label: words.actions,
            align: 'right',
            cell: (row) => (
              <Button
                kind="link"
                aria-label={words.giveTo(row.name)}
                onClick={() => {
                  setAsked({ person: row, grant: null });
                }}
              >
                {words.give}
              </Button>
            ),
          },
        ]}
      />
      {asked === null ? null : asked.grant === null ? (
        <GiveRole person={asked.person} onClose={close} />
      ) : (
        <TakeRole person={asked.person} grant={asked.grant} onClose={close} />
      )}
    </Section>
  );
}
