import type {
  PlanChangeInput,
  PlannedVisitDto,
  RerigPlanDto,
} from '@stayledger/shared/contracts/rerig-schedules';
import { explanationWords } from '@stayledger/shared/rerig-schedule/explanation-words';
import { useFormat } from '../../lib/formatting/use-format';
import { ChangeVisit } from './change-visit';
import styles from './rerig-schedule.module.css';
import { money, VISIT_KIND_WORDS, windowLabel } from './schedule-words';

interface PlanVisitsProps {
  plan: RerigPlanDto;
  todayOn: string;
  zone: string;
  /** Left out where the person may not change the plan. */
  change?: { busy: boolean; onChange: (change: PlanChangeInput) => void };
}

/** Each visit with its work: why it falls there, by when to order, and what it costs. */
export function PlanVisits({ plan, todayOn, zone, change }: PlanVisitsProps) {
  const format = useFormat();
  const amount = (minor: number) => money(minor, plan.plan.currency, format);
  return (
    <section aria-labelledby="visits">
      <h2 id="visits">Visits</h2>
      {plan.plan.visits.length === 0 ? <p>Nothing falls due within the years planned.</p> : null}
      {plan.plan.visits.map((visit) => {
        const label = windowLabel(plan, visit.windowId);
        return (
          <article key={visit.windowId} className={styles.visit} aria-label={`Visit of ${label}`}>
            <h3>
              {label}, {VISIT_KIND_WORDS[visit.kind]}
              {visit.locked ? ' (locked)' : ''}
            </h3>
            <p className="soft">
              {format.day(visit.startOn)} to {format.day(visit.doneByOn)} at the latest;{' '}
              {format.hours(visit.hours)} of work; {amount(visit.totalMinor)} in all, of which{' '}
              {amount(visit.visitCostMinor)} for the visit itself
              {contingencyOf(visit) > 0
                ? ` and ${amount(contingencyOf(visit))} set aside for what opening up may show`
                : ''}
              .
            </p>
            <ul className={styles.tasks}>
              {visit.tasks.map((task) => {
                const explanation = plan.explanations.find(
                  ({ taskId, windowId }) => taskId === task.taskId && windowId === visit.windowId,
                );
                return (
                  <li key={task.taskId}>
                    <p className={styles.task}>
                      <span>
                        {task.action === 'replace' ? 'Replace' : 'Inspect'}: {task.name}
                      </span>
                      <span>{amount(task.costMinor)}</span>
                    </p>
                    <p>
                      {explanation
                        ? explanationWords(explanation, plan.plan, {
                            day: (day) => format.dueDay(day, todayOn, zone),
                            money: amount,
                          })
                        : `${task.dueOn === null ? 'No date of its own' : `Due by ${format.dueDay(task.dueOn, todayOn, zone)}`}.`}
                    </p>
                    {task.orderByOn !== null ? (
                      <p className="soft">
                        {task.orderNow
                          ? 'Order now: the day to order the material by has passed.'
                          : `Order by ${format.dueDay(task.orderByOn, todayOn, zone)}.`}
                      </p>
                    ) : null}
                  </li>
                );
              })}
            </ul>
            {change ? (
              <ChangeVisit
                plan={plan}
                visit={visit}
                label={label}
                busy={change.busy}
                onChange={change.onChange}
              />
            ) : null}
          </article>
        );
      })}
    </section>
  );
}

function contingencyOf({ visitContingencyMinor, tasks }: PlannedVisitDto): number {
  return tasks.reduce((sum, { contingencyMinor }) => sum + contingencyMinor, visitContingencyMinor);
}
