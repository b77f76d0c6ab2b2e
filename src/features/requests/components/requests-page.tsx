import { useInfiniteQuery } from '@tanstack/react-query';
import { paths } from '#src/app/paths.ts';
import { Page, Section } from '#src/components/layout/page.tsx';
import { LinkButton } from '#src/components/ui/button.tsx';
import { useDebouncedText } from '#src/hooks/use-debounced-text.ts';
import { useMay, useSite } from '#src/hooks/use-site.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { requestsQuery } from '../api/requests-queries.ts';
import { listQuery } from '../list-filters.view.ts';
import { RequestsFilters, useRequestFilters } from './requests-filters.tsx';
import { RequestsTable } from './requests-table.tsx';

/** All requests of the site that the person may see. */
export function RequestsPage() {
  const site = useSite();
  const may = useMay();
  const filters = useRequestFilters();
  const text = useDebouncedText(filters.values.text, 250);
  const list = useInfiniteQuery(requestsQuery(site.code, listQuery({ ...filters.values, text })));
  const words = t.requests;
  return (
    <Page
      title={words.title}
      intro={<p>{words.intro}</p>}
      actions={
        may('request.create') ? (
          <LinkButton kind="primary" to={paths.newRequest.href(site.code)}>
            {words.newRequest}
          </LinkButton>
        ) : undefined
      }
    >
      <Section title={words.caption} note={<p>{words.timesIn(site.zone)}</p>}>
        <RequestsFilters {...filters} />
        <RequestsTable
          caption={words.caption}
          rows={list.data?.pages.flatMap((page) => page.items) ?? []}
          isLoading={list.isPending}
          error={tableError(list)}
          empty={filters.clear === undefined ? words.list.none : words.list.empty}
          more={
            list.hasNextPage
              ? { onMore: () => void list.fetchNextPage(), busy: list.isFetchingNextPage }
              : undefined
          }
        />
      </Section>
    </Page>
  );
}
