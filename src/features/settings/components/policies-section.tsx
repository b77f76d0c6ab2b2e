import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { listPolicies, setPolicy, type PolicyDto } from '#shared/contracts/settings.contract.ts';
import { findOffers } from '#shared/contracts/offers.contract.ts';
import { getEstimateBasis } from '#shared/contracts/registers.contract.ts';
import { Section } from '#src/components/layout/page.tsx';
import { Button } from '#src/components/ui/button.tsx';
import { Choice } from '#src/components/ui/choice.tsx';
import { Dialog } from '#src/components/ui/dialog.tsx';
import { Field } from '#src/components/ui/field.tsx';
import { NumberInput, TextInput } from '#src/components/ui/input.tsx';
import { Table } from '#src/components/ui/table.tsx';
import { useApiMutation } from '#src/hooks/use-api-mutation.ts';
import { useMay, useSite } from '#src/hooks/use-site.ts';
import { errorText } from '#src/lib/error-text.ts';
import { formatInstant } from '#src/lib/format-date.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { policiesQuery } from '../api/settings-queries.ts';
import { describeLimits, describeValue, fromField, toField } from '../policy-value.view.ts';

const words = t.settings;

function ValueField(props: { policy: PolicyDto; text: string; onText: (text: string) => void }) {
  const { policy, text, onText } = props;
  if (policy.kind === 'flag' || policy.kind === 'outcome') {
    const options =
      policy.kind === 'flag'
        ? [
            { value: 'true', label: words.yes },
            { value: 'false', label: words.no },
          ]
        : [
            { value: 'caution', label: words.outcomes.caution },
            { value: 'stop', label: words.outcomes.stop },
          ];
    return (
      <Field as="group" label={policy.label} layout="above">
        <Choice options={options} value={text} onChange={onText} />
      </Field>
    );
  }
  if (policy.kind === 'days') {
    return (
      <Field label={policy.label} layout="above" help={words.daysHelp}>
        <TextInput
          value={text}
          unit={policy.unit}
          onChange={(event) => {
            onText(event.target.value);
          }}
        />
      </Field>
    );
  }
  return (
    <Field label={policy.label} layout="above" help={describeLimits(policy)}>
      <NumberInput
        value={text}
        unit={policy.unit}
        onChange={(event) => {
          onText(event.target.value);
        }}
      />
    </Field>
  );
}

function EditPolicy(props: { policy: PolicyDto; onClose: () => void }) {
  const { policy, onClose } = props;
  const site = useSite();
  const [text, setText] = useState(toField(policy.value));
  const save = useApiMutation(setPolicy, {
    refreshes: [listPolicies, findOffers, getEstimateBasis],
    onDone: onClose,
  });
  return (
    <Dialog
      isOpen
      title={words.policyTitle}
      confirmLabel={words.save}
      kind="primary"
      busy={save.isPending}
      error={errorText(save.error)}
      onConfirm={() => {
        save.mutate({
          params: { site: site.code, key: policy.key },
          body: { value: fromField(policy.kind, text), version: policy.version },
        });
      }}
      onClose={onClose}
    >
      <ValueField policy={policy} text={text} onText={setText} />
    </Dialog>
  );
}

/** Every policy with the value in force, its default and who changed it last. */
export function PoliciesSection() {
  const site = useSite();
  const may = useMay();
  const [edited, setEdited] = useState<string | null>(null);
  const query = useQuery(policiesQuery(site.code));
  const rows = query.data?.items ?? [];
  const policy = rows.find((row) => row.key === edited);
  const heads = words.policyColumns;
  const changed = (row: PolicyDto) =>
    row.changedAt === null
      ? words.never
      : words.changedBy(
          row.changedBy ?? words.someone,
          formatInstant(row.changedAt, { zone: site.zone }),
        );
  return (
    <Section title={words.policies} note={<p>{words.policiesNote}</p>}>
      <Table
        caption={words.policies}
        rows={rows}
        rowKey={(row) => row.key}
        isLoading={query.isPending}
        error={tableError(query)}
        stack
        columns={[
          { key: 'label', head: heads.label, cell: (row) => row.label },
          {
            key: 'value',
            head: heads.value,
            nowrap: true,
            cell: (row) => <b className="font-mono">{describeValue(row, row.value)}</b>,
          },
          {
            key: 'fallback',
            head: heads.fallback,
            mono: true,
            cell: (row) => describeValue(row, row.fallback),
          },
          { key: 'limits', head: heads.limits, mono: true, cell: describeLimits },
          { key: 'changed', head: heads.changed, cell: changed },
          ...(may('policy.edit')
            ? [
                {
                  key: 'act',
                  head: '',
                  label: words.actions,
                  align: 'right',
                  cell: (row: PolicyDto) => (
                    <Button
                      kind="link"
                      aria-label={`${words.edit}: ${row.label}`}
                      onClick={() => {
                        setEdited(row.key);
                      }}
                    >
                      {words.edit}
                    </Button>
                  ),
                } as const,
              ]
            : []),
        ]}
      />
      {policy === undefined ? null : (
        <EditPolicy
          key={`${policy.key}-${policy.version}`}
          policy={policy}
          onClose={() => {
            setEdited(null);
          }}
        />
      )}
    </Section>
  );
}
