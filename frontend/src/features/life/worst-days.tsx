import type { PartLifeDto } from '@stayledger/shared/contracts/life';
import { Link } from 'react-router-dom';
import { paths } from '../../app/paths';
import { DataTable, type DataTableColumn } from '../../components/tables/data-table';
import { useFormat } from '../../lib/formatting/use-format';

type WorstDay = PartLifeDto['worstDays'][number];

/** The days that used most of the allowance, each leading to its place on the trace. */
export function WorstDays({ life }: { life: PartLifeDto }) {
  const format = useFormat();
  if (life.worstDays.length === 0) return <p>No day has used any allowance yet.</p>;
  const columns: DataTableColumn<WorstDay>[] = [
    {
      key: 'day',
      title: 'Day',
      render: (day) => (
        <Link to={`${paths.loadLog.to(day.loadLogId)}?day=${day.dayOn}`}>{format.day(day.dayOn)}</Link>
      ),
      value: (day) => day.dayOn,
    },
    {
      key: 'share',
      title: 'Share of all so far',
      numeric: true,
      render: (day) => format.percent(day.shareOfTotal),
      value: (day) => day.shareOfTotal,
    },
    {
      key: 'allowance',
      title: 'Allowance used that day',
      numeric: true,
      render: (day) => format.percent(day.allowance),
      value: (day) => day.allowance,
    },
    { key: 'log', title: 'Log', render: (day) => day.loadLogName, value: (day) => day.loadLogName },
  ];
  return (
    <DataTable
      caption="Days that used most"
      rows={life.worstDays}
      columns={columns}
      rowKey={(day) => `${day.dayOn}-${day.loadLogId}`}
    />
  );
}
