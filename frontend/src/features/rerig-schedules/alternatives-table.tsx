import type { RerigPlanDto } from '@stayledger/shared/contracts/rerig-schedules';
import { DataTable } from '../../components/tables/data-table';
import { useFormat } from '../../lib/formatting/use-format';
import { money, PREFERENCE_WORDS } from './schedule-words';

/** The same vessel planned three ways, side by side. */
export function AlternativesTable({
  plan,
  todayOn,
  zone,
}: {
  plan: RerigPlanDto;
  todayOn: string;
  zone: string;
}) {
  const format = useFormat();
  return (
    <section aria-labelledby="alternatives">
      <h2 id="alternatives">Planned otherwise</h2>
      <DataTable
        caption="The plan by what it is chosen for"
        rows={plan.alternatives}
        rowKey={({ preference }) => preference}
        stackOnPhone
        columns={[
          {
            key: 'preference',
            title: 'Chosen for',
            render: ({ preference }) => PREFERENCE_WORDS[preference],
          },
          {
            key: 'cost',
            title: 'Cost',
            numeric: true,
            render: ({ totalMinor }) => money(totalMinor, plan.plan.currency, format),
          },
          { key: 'visits', title: 'Visits', numeric: true, render: ({ visits }) => visits },
          {
            key: 'mast-out',
            title: 'With the mast out',
            numeric: true,
            render: ({ mastOutVisits }) => mastOutVisits,
          },
          {
            key: 'late',
            title: 'Days past dates',
            numeric: true,
            render: ({ lateDays }) => format.number(lateDays),
          },
          {
            key: 'when',
            title: 'Visits in',
            render: ({ startsOn }) =>
              startsOn.map((day) => format.dueDay(day, todayOn, zone)).join('; ') || 'none',
          },
        ]}
      />
    </section>
  );
}
