import PlusOutlined from '@ant-design/icons/es/icons/PlusOutlined';
import { useInfiniteQuery } from '@tanstack/react-query';
import { useMemo } from 'react';
import { useSearchParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { EmptyState } from '../../components/feedback/empty-state';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { ButtonLink, PlainButton } from '../../components/plain-button/plain-button';
import { CsvDownload } from '../../components/tables/csv-download';
import { DataTable } from '../../components/tables/data-table';
import { FleetFilters, readFleetFilter } from '../../features/vessels/fleet-filters';
import { fleetColumns } from '../../features/vessels/fleet-table.columns';
import styles from '../../features/vessels/fleet.module.css';
import { vesselQueries, type FleetFilter } from '../../features/vessels/vessels.queries';
import { WorkDue } from '../../features/vessels/work-due';
import { useFormat } from '../../lib/formatting/use-format';
import { useCan } from '../../lib/session';

export function FleetPage() {
  const [search, setSearch] = useSearchParams();
  const format = useFormat();
  const mayRegister = useCan('vessels:register');
  const filter = readFleetFilter(search);
  const vessels = useInfiniteQuery(vesselQueries.list(filter));
  const columns = useMemo(() => fleetColumns(format), [format]);
  const narrowed = filter.q !== undefined || filter.filter !== 'all';

  const change = (next: Partial<FleetFilter>) =>
    setSearch((before) => {
      const after = new URLSearchParams(before);
      for (const [name, value] of Object.entries(next)) {
        if (value) after.set(name, value);
        else after.delete(name);
      }
      return after;
    });

  const register = mayRegister ? (
    <ButtonLink to={paths.registerVessel.pattern}>
      <PlusOutlined aria-hidden />
      Register a vessel
    </ButtonLink>
  ) : null;

  return (
    <>
      <PageHeading title="Fleet" actions={register} />
      <WorkDue format={format} />
      <section aria-labelledby="vessels">
        <h2 id="vessels">Vessels</h2>
        <FleetFilters filter={filter} onChange={change} />
        <QueryView query={vessels} loadingLabel="Opening the fleet">
          {(data) => {
            const rows = data.pages.flatMap((page) => page.items);
            if (rows.length === 0 && narrowed) {
              return (
                <EmptyState
                  title="No vessel matches"
                  actions={<PlainButton onClick={() => setSearch({})}>Show all vessels</PlainButton>}
                >
                  <p>Change the words or the filter above.</p>
                </EmptyState>
              );
            }
            if (rows.length === 0) {
              return (
                <EmptyState title="No vessels yet" actions={register}>
                  <p>
                    The vessels your firm looks after will stand here, the one with the next date first.
                    Register one, list the parts of its rig, then add its load logs.
                  </p>
                </EmptyState>
              );
            }
            return (
              <>
                <DataTable
                  caption="Vessels"
                  stackOnPhone
                  rows={rows}
                  columns={columns}
                  rowKey={(row) => row.id}
                />
                <div className={styles.more}>
                  {vessels.hasNextPage ? (
                    <PlainButton
                      disabled={vessels.isFetchingNextPage}
                      onClick={() => void vessels.fetchNextPage()}
                    >
                      {vessels.isFetchingNextPage ? 'Fetching more…' : 'Show more vessels'}
                    </PlainButton>
                  ) : null}{' '}
                  <CsvDownload name="fleet" rows={rows} columns={columns} />
                </div>
              </>
            );
          }}
        </QueryView>
      </section>
    </>
  );
}
