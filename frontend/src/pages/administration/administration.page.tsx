import { Link, useSearchParams } from 'react-router-dom';
import { PageHeading } from '../../components/page-heading/page-heading';
import {
  auditColumns,
  firmColumns,
  jobColumns,
  userColumns,
} from '../../features/administration/administration.columns';
import { administrationQueries } from '../../features/administration/administration.queries';
import { PagedTable } from '../../features/administration/paged-table';
import { browserZone } from '../../lib/clock';
import { useFormat } from '../../lib/formatting/use-format';
import tabs from '../../components/page-tabs/page-tabs.module.css';

const VIEWS = [
  ['users', 'Users'],
  ['firms', 'Firms'],
  ['jobs', 'Background jobs'],
  ['audit', 'Audit trail'],
] as const;

export function AdministrationPage() {
  const [search] = useSearchParams();
  const format = useFormat();
  const zone = browserZone();
  const view = VIEWS.find(([key]) => key === search.get('view'))?.[0] ?? 'users';
  return (
    <>
      <PageHeading
        title="Administration"
        below="People, firms, work in the background, and who did what. Vessel data is not shown here."
      />
      <nav aria-label="Parts of the administration" className={tabs.tabs}>
        {VIEWS.map(([key, label]) => (
          <Link key={key} to={`?view=${key}`} aria-current={key === view ? 'page' : undefined}>
            {label}
          </Link>
        ))}
      </nav>
      {view === 'users' ? (
        <PagedTable
          caption="Users"
          options={administrationQueries.users()}
          columns={userColumns(format, zone)}
          emptyText="The people who may sign in will stand here."
        />
      ) : null}
      {view === 'firms' ? (
        <PagedTable
          caption="Firms"
          options={administrationQueries.firms()}
          columns={firmColumns(format, zone)}
          emptyText="The practices and insurers will stand here."
        />
      ) : null}
      {view === 'jobs' ? (
        <PagedTable
          caption="Background jobs"
          options={administrationQueries.jobs()}
          columns={jobColumns(format, zone)}
          emptyText="Counting a load log is a job; each will stand here with its progress."
        />
      ) : null}
      {view === 'audit' ? (
        <PagedTable
          caption="Audit trail"
          options={administrationQueries.audit()}
          columns={auditColumns(format, zone)}
          emptyText="Sign-ins, changes and postings will stand here, newest first."
        />
      ) : null}
    </>
  );
}
