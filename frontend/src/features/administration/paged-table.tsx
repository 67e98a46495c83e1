import { useInfiniteQuery, type InfiniteData, type UseInfiniteQueryOptions } from '@tanstack/react-query';
import { EmptyState } from '../../components/feedback/empty-state';
import { QueryView } from '../../components/feedback/query-view';
import { PlainButton } from '../../components/plain-button/plain-button';
import { DataTable, type DataTableColumn } from '../../components/tables/data-table';

interface Page<Item> {
  items: Item[];
  nextCursor: string | null;
}

interface PagedTableProps<Item, Key extends readonly unknown[]> {
  caption: string;
  options: UseInfiniteQueryOptions<Page<Item>, Error, InfiniteData<Page<Item>>, Key, string | undefined>;
  columns: DataTableColumn<Item>[];
  emptyText: string;
}

/** A keyset list as a table that grows on request. */
export function PagedTable<Item extends { id: string }, Key extends readonly unknown[]>({
  caption,
  options,
  columns,
  emptyText,
}: PagedTableProps<Item, Key>) {
  const query = useInfiniteQuery(options);
  return (
    <QueryView query={query}>
      {(data) => {
        const rows = data.pages.flatMap((page) => page.items);
        if (rows.length === 0) {
          return (
            <EmptyState title="Nothing yet">
              <p>{emptyText}</p>
            </EmptyState>
          );
        }
        return (
          <>
            <DataTable
              caption={caption}
              stackOnPhone
              rows={rows}
              columns={columns}
              rowKey={(row) => row.id}
            />
            {query.hasNextPage ? (
              <PlainButton disabled={query.isFetchingNextPage} onClick={() => void query.fetchNextPage()}>
                {query.isFetchingNextPage ? 'Fetching more…' : 'Show more'}
              </PlainButton>
            ) : null}
          </>
        );
      }}
    </QueryView>
  );
}
