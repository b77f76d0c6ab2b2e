import { useInfiniteQuery } from '@tanstack/react-query';
import type { AuditEventDto } from '#shared/contracts/audit.contract.ts';
import { Section } from '#src/components/layout/page.tsx';
import { Disclosure } from '#src/components/ui/disclosure.tsx';
import { Filters } from '#src/components/ui/filters.tsx';
import { TextInput } from '#src/components/ui/input.tsx';
import { Table } from '#src/components/ui/table.tsx';
import { useDebouncedText } from '#src/hooks/use-debounced-text.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { useClearUrlState, useUrlState } from '#src/hooks/use-url-state.ts';
import { formatInstant } from '#src/lib/format-date.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { trailQuery } from '../api/settings-queries.ts';

const words = t.settings;

function Change(props: { event: AuditEventDto }) {
  const { before, after, sealNo } = props.event;
  return (
    <Disclosure summary={words.show}>
      <p className="mp-note">{sealNo === null ? words.unsealed : words.sealed(sealNo)}</p>
      {[
        { name: words.old, value: before },
        { name: words.new, value: after },
      ].map(({ name, value }) =>
        value === null || value === undefined ? null : (
          <div key={name}>
            <span className="mp-note">{name}</span>
            <pre className="max-w-[60ch] overflow-x-auto font-mono text-[11px] whitespace-pre-wrap">
              {JSON.stringify(value, null, 1)}
            </pre>
          </div>
        ),
      )}
    </Disclosure>
  );
}

/** What was done at the site; for auditors and administrators. */
export function TrailSection() {
  const site = useSite();
  const [kind, setKind] = useUrlState('trail');
  const [action, setAction] = useUrlState('action');
  const clear = useClearUrlState(['trail', 'action']);
  const settledKind = useDebouncedText(kind, 250);
  const settledAction = useDebouncedText(action, 250);
  const list = useInfiniteQuery(
    trailQuery(site.code, {
      limit: 25,
      ...(settledKind === '' ? {} : { subjectKind: settledKind }),
      ...(settledAction === '' ? {} : { action: settledAction }),
    }),
  );
  const heads = words.trailColumns;
  const field = (label: string, value: string, set: (text: string) => void) => (
    <label>
      <span className="mp-note">{label}</span>
      <TextInput
        type="search"
        value={value}
        onChange={(event) => {
          set(event.target.value);
        }}
      />
    </label>
  );
  return (
    <Section title={words.trail} note={<p>{words.trailNote}</p>}>
      <Filters onClear={kind === '' && action === '' ? undefined : clear}>
        {field(words.subjectKind, kind, setKind)}
        {field(words.action, action, setAction)}
      </Filters>
      <Table
        caption={words.trail}
        rows={list.data?.pages.flatMap((page) => page.items) ?? []}
        rowKey={(row) => row.id}
        isLoading={list.isPending}
        error={tableError(list)}
        empty={words.noTrail}
        stack
        more={
          list.hasNextPage
            ? { onMore: () => void list.fetchNextPage(), busy: list.isFetchingNextPage }
            : undefined
        }
        columns={[
          {
            key: 'at',
            head: heads.at,
            mono: true,
            cell: (row) => formatInstant(row.at, { zone: site.zone }),
          },
          { key: 'who', head: heads.who, cell: (row) => row.actor?.name ?? words.system },
          { key: 'what', head: heads.what, mono: true, cell: (row) => row.action },
          {
            key: 'subject',
            head: heads.subject,
            cell: (row) => `${row.subjectKind} ${row.subjectId ?? ''}`,
          },
          { key: 'change', head: heads.change, cell: (row) => <Change event={row} /> },
        ]}
      />
    </Section>
  );
}
