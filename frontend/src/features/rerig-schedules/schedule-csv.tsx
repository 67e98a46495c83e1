import type { PlannedVisitDto, RerigPlanDto } from '@stayledger/shared/contracts/rerig-schedules';
import { CsvDownload } from '../../components/tables/csv-download';
import { VISIT_KIND_WORDS, windowLabel } from './schedule-words';

interface Row {
  visit: PlannedVisitDto;
  task: PlannedVisitDto['tasks'][number];
}

/** The list of all work as a file: one line for each piece of work, amounts in minor units. */
export function ScheduleCsv({ name, plan }: { name: string; plan: RerigPlanDto }) {
  const rows: Row[] = plan.plan.visits.flatMap((visit) => visit.tasks.map((task) => ({ visit, task })));
  const column = (key: string, title: string, value: (row: Row) => string | number | null) => ({
    key,
    title,
    value,
    render: (row: Row) => value(row),
  });
  return (
    <CsvDownload
      name={`${name} re-rig schedule`}
      rows={rows}
      columns={[
        column('window', 'Window', ({ visit }) => windowLabel(plan, visit.windowId)),
        column('kind', 'Visit', ({ visit }) => VISIT_KIND_WORDS[visit.kind]),
        column('start', 'First day', ({ visit }) => visit.startOn),
        column('by', 'Done by', ({ visit }) => visit.doneByOn),
        column('action', 'Action', ({ task }) => task.action),
        column('work', 'Work', ({ task }) => task.name),
        column('due', 'Due', ({ task }) => task.dueOn),
        column('late', 'Days late', ({ task }) => task.lateDays),
        column('order', 'Order by', ({ task }) => task.orderByOn),
        column('hours', 'Hours', ({ task }) => task.hours),
        column('cost', `Cost, minor units of ${plan.plan.currency}`, ({ task }) => task.costMinor),
      ]}
    />
  );
}
