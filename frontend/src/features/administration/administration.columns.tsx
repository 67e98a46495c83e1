import type { AuditEventDto } from '@stayledger/shared/contracts/audit';
import type { FirmDto } from '@stayledger/shared/contracts/firms';
import type { JobDto } from '@stayledger/shared/contracts/jobs';
import type { UserDto } from '@stayledger/shared/contracts/users';
import type { DataTableColumn } from '../../components/tables/data-table';
import type { Formatter } from '../../lib/formatting/format';

const FIRM_KIND_WORDS: Record<FirmDto['kind'], string> = {
  rigging: 'Rigging practice',
  survey: 'Survey practice',
  insurer: 'Insurer',
  service: 'Runs the service',
};

export function userColumns(format: Formatter, zone: string): DataTableColumn<UserDto>[] {
  return [
    { key: 'name', title: 'Name', render: (user) => user.name },
    { key: 'email', title: 'E-mail', render: (user) => user.email },
    {
      key: 'roles',
      title: 'Roles',
      render: (user) =>
        user.memberships.map(({ role, firmName }) => `${role} at ${firmName}`).join(', ') || 'owner, or none',
    },
    { key: 'active', title: 'Sign-in', render: (user) => (user.active ? 'open' : 'closed') },
    { key: 'created', title: 'Since', render: (user) => format.instant(user.createdAt, zone) },
  ];
}

export function firmColumns(format: Formatter, zone: string): DataTableColumn<FirmDto>[] {
  return [
    { key: 'name', title: 'Firm', render: (firm) => firm.name },
    { key: 'kind', title: 'Kind', render: (firm) => FIRM_KIND_WORDS[firm.kind] },
    { key: 'members', title: 'People', numeric: true, render: (firm) => format.number(firm.members) },
    { key: 'created', title: 'Since', render: (firm) => format.instant(firm.createdAt, zone) },
  ];
}

export function jobColumns(format: Formatter, zone: string): DataTableColumn<JobDto>[] {
  return [
    { key: 'kind', title: 'Job', render: (job) => job.kind },
    {
      key: 'state',
      title: 'State',
      render: (job) => (
        <>
          {job.state}
          {job.error ? <div className="soft">{job.error.message}</div> : null}
        </>
      ),
    },
    { key: 'progress', title: 'Done', numeric: true, render: (job) => format.percent(job.progress, 0) },
    { key: 'attempts', title: 'Attempts', numeric: true, render: (job) => format.number(job.attempts) },
    { key: 'created', title: 'Asked for', render: (job) => format.instant(job.createdAt, zone) },
    { key: 'finished', title: 'Ended', render: (job) => format.instant(job.finishedAt, zone) },
  ];
}

export function auditColumns(format: Formatter, zone: string): DataTableColumn<AuditEventDto>[] {
  return [
    { key: 'at', title: 'When', render: (event) => format.instant(event.at, zone) },
    { key: 'who', title: 'Who', render: (event) => event.userName ?? 'the service' },
    { key: 'action', title: 'What', render: (event) => event.action },
    { key: 'subject', title: 'On', render: (event) => `${event.subjectKind} ${event.subjectId}` },
  ];
}
