import { useQuery } from '@tanstack/react-query';
import { useMemo } from 'react';
import { Link, useParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { EmptyState } from '../../components/feedback/empty-state';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { CsvDownload } from '../../components/tables/csv-download';
import { DataTable } from '../../components/tables/data-table';
import { partHistoryColumns } from '../../features/position-history/part-history.columns';
import { positionHistoryQueries } from '../../features/position-history/position-history.queries';
import { useFormat } from '../../lib/formatting/use-format';

/** A place on the rig through time: every part it has had, each with its own account. */
export function PositionHistoryPage() {
  const { positionId = '' } = useParams();
  const query = useQuery(positionHistoryQueries.of(positionId));
  const format = useFormat();
  const columns = useMemo(() => partHistoryColumns(format), [format]);
  return (
    <QueryView query={query} loadingLabel="Reading what has been here">
      {({ label, alias, parts, vesselId, vesselName }) => (
        <>
          <PageHeading
            title={`${label} through time`}
            above={<Link to={paths.vessel.to(vesselId)}>{vesselName}</Link>}
            below={alias === null ? undefined : `${alias}.`}
          />
          {parts.length === 0 ? (
            <EmptyState title="No part yet">
              <p>Every part this place has had will stand here, the newest first, each with its account.</p>
            </EmptyState>
          ) : (
            <>
              <p>
                The account belongs to the part, not to the place: it ends when the part comes off, and a new
                part begins with none of it.
              </p>
              <DataTable
                caption={`Parts of ${label} through time`}
                stackOnPhone
                rows={parts}
                columns={columns}
                rowKey={(part) => part.id}
              />
              <p>
                <CsvDownload name={`parts of ${label}`} rows={parts} columns={columns} />
              </p>
            </>
          )}
        </>
      )}
    </QueryView>
  );
}
