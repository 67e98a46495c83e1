import type { RerigPlanDto } from '@stayledger/shared/contracts/rerig-schedules';
import type { ReactNode } from 'react';
import { useFormat } from '../../lib/formatting/use-format';
import styles from './rerig-schedule.module.css';
import { money } from './schedule-words';

/** What is different from the plan before, why, and the way back. */
export function PlanChanges({
  plan,
  todayOn,
  zone,
  undo,
}: {
  plan: RerigPlanDto;
  todayOn: string;
  zone: string;
  undo: ReactNode;
}) {
  const format = useFormat();
  const { diff } = plan;
  if (diff === null) return null;
  const day = (on: string | null) => (on === null ? 'not planned' : format.dueDay(on, todayOn, zone));
  const cost = money(Math.abs(diff.costMinor), plan.plan.currency, format);
  return (
    <section aria-labelledby="changes">
      <h2 id="changes">What changed</h2>
      <p role="status">
        {diff.costMinor === 0 ? 'Costs as much' : `Costs ${cost} ${diff.costMinor > 0 ? 'more' : 'less'}`}{' '}
        than the plan before
        {diff.visitCount === 0
          ? ', with as many visits'
          : `, with ${Math.abs(diff.visitCount)} ${Math.abs(diff.visitCount) === 1 ? 'visit' : 'visits'} ${diff.visitCount > 0 ? 'more' : 'fewer'}`}
        {diff.lateDays > 0
          ? `; it runs ${format.number(diff.lateDays)} days further past dates`
          : diff.lateDays < 0
            ? `; it runs ${format.number(-diff.lateDays)} days less past dates`
            : ''}
        .
      </p>
      {diff.tasksMoved.length > 0 ? (
        <ul>
          {diff.tasksMoved.map((task) => (
            <li key={`${task.name} ${task.occurrence}`}>
              {task.name}: from {day(task.fromOn)} to {day(task.toOn)}
            </li>
          ))}
        </ul>
      ) : null}
      {diff.causes.length > 0 ? <p className="soft">Because: {diff.causes.join(' ')}</p> : null}
      <div className={styles.steps}>{undo}</div>
    </section>
  );
}
