import { useQuery } from '@tanstack/react-query';
import { Link, useSearchParams } from 'react-router-dom';
import { Page, Section } from '#src/components/layout/page.tsx';
import { Table } from '#src/components/ui/table.tsx';
import { useSite } from '#src/hooks/use-site.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { searchQuery } from '../api/search-site.ts';

export function FindPage() {
  const site = useSite();
  const [params] = useSearchParams();
  const text = (params.get('text') ?? '').trim();
  const found = useQuery(searchQuery(site.code, text));
  const words = t.shell;
  return (
    <Page
      title={words.findTitle}
      intro={<p>{text === '' ? words.findNone : words.findIntro(text)}</p>}
    >
      {text === '' ? null : (
        <Section title={words.findCaption}>
          <Table
            caption={words.findCaption}
            rows={found.data?.hits ?? []}
            rowKey={(hit) => hit.href}
            isLoading={found.isPending}
            error={tableError(found)}
            empty={words.findNothing(text)}
            columns={[
              {
                key: 'kind',
                head: words.findColumns.kind,
                cell: (hit) => words.findKinds[hit.kind],
              },
              {
                key: 'what',
                head: words.findColumns.what,
                cell: (hit) => <Link to={`/${site.code}${hit.href}`}>{hit.label}</Link>,
              },
              { key: 'detail', head: words.findColumns.detail, cell: (hit) => hit.detail },
            ]}
          />
        </Section>
      )}
    </Page>
  );
}
