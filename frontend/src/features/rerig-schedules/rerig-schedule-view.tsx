import type { RerigScheduleDto } from '@stayledger/shared/contracts/rerig-schedules';
import type { VesselDto } from '@stayledger/shared/contracts/vessels';
import { Link } from 'react-router-dom';
import { paths } from '../../app/paths';
import { Attention } from '../../components/feedback/attention';
import { EmptyState } from '../../components/feedback/empty-state';
import { PlainButton } from '../../components/plain-button/plain-button';
import { useFormat } from '../../lib/formatting/use-format';
import { AlternativesTable } from './alternatives-table';
import { PlanChanges } from './plan-changes';
import { PlanVisits } from './plan-visits';
import styles from './rerig-schedule.module.css';
import { useScheduleStep } from './rerig-schedules.mutations';
import { calendarUrl, isPlanning } from './rerig-schedules.queries';
import { ScheduleCsv } from './schedule-csv';
import { ScheduleSettings } from './schedule-settings';
import { isAcceptable, money, STATE_WORDS } from './schedule-words';
import { TimeLine } from './time-line';

const NEXT_STEP = {
  draft: { state: 'proposed', label: 'Propose to the owner' },
  proposed: null,
  accepted: { state: 'booked', label: 'Mark as booked' },
  booked: { state: 'done', label: 'Mark as done' },
  done: null,
} as const;

/** The Re-rig schedule tab of a vessel, for those who plan and for the owner who reads. */
export function RerigScheduleView({ vessel, schedule }: { vessel: VesselDto; schedule: RerigScheduleDto }) {
  const format = useFormat();
  const step = useScheduleStep(vessel.id);
  const mayPlan = vessel.permissions.includes('rerig:plan');
  const planning = isPlanning(schedule);
  const busy = planning || step.isPending;
  const { plan: shown, todayOn } = schedule;
  const version = schedule.version ?? undefined;
  const next = NEXT_STEP[schedule.state];
  const planAnew = () => step.mutate({ step: 'plan', input: { version } });
  return (
    <div className={styles.schedule}>
      {step.error ? <Attention role="alert">{step.error.message}</Attention> : null}
      <PlanningState schedule={schedule} />
      {shown === null ? (
        <EmptyState
          title="No plan yet"
          actions={
            mayPlan ? (
              <PlainButton weight="primary" disabled={busy} onClick={planAnew}>
                Plan the re-rig
              </PlainButton>
            ) : undefined
          }
        >
          <p>
            {mayPlan
              ? 'The plan is made from the dates of the parts, your prices, and the seasons of the yard: which visits, what is done in each, and why.'
              : schedule.draftHidden
                ? `${schedule.firmName} is drawing up a plan. It will stand here once it is proposed.`
                : `${schedule.firmName} has not planned the re-rig yet.`}
          </p>
        </EmptyState>
      ) : (
        <>
          <div className={styles.head}>
            <p className={styles.state}>
              {STATE_WORDS[schedule.state]}: plan {shown.number}, {shown.plan.visits.length}{' '}
              {shown.plan.visits.length === 1 ? 'visit' : 'visits'}, about{' '}
              {money(shown.plan.totalMinor, shown.plan.currency, format)} until{' '}
              {format.dueDay(shown.plan.horizonEndOn, todayOn, vessel.zone)}
            </p>
          </div>
          <p className="soft">
            Estimate by {schedule.firmName} of {format.day(shown.plan.asOfOn)}, not a quotation.{' '}
            {shown.plan.proof.gap <= 0.0005
              ? 'No cheaper plan keeps the same dates.'
              : `At most ${format.percent(shown.plan.proof.gap, 1)} dearer than the cheapest plan there can be.`}{' '}
            Asked for by {shown.askedByName}.
          </p>
          {schedule.question !== null ? <Attention>The owner asks: {schedule.question}</Attention> : null}
          {schedule.datesMoved ? (
            <Attention>
              Dates of parts were worked out again after this plan was made, so it may no longer keep them.{' '}
              {mayPlan ? 'Plan anew to see what changes.' : `${schedule.firmName} will plan it anew.`}
            </Attention>
          ) : null}
          <LateWork schedule={schedule} zone={vessel.zone} />
          <div className={styles.steps}>
            {mayPlan && next && version !== undefined ? (
              <PlainButton
                weight="primary"
                disabled={busy || (next.state === 'proposed' && schedule.datesMoved)}
                onClick={() => step.mutate({ step: 'state', input: { version, state: next.state } })}
              >
                {next.label}
              </PlainButton>
            ) : null}
            {mayPlan && schedule.state !== 'draft' && version !== undefined ? (
              <PlainButton
                disabled={busy}
                onClick={() => step.mutate({ step: 'state', input: { version, state: 'draft' } })}
              >
                Back to a draft
              </PlainButton>
            ) : null}
            {mayPlan ? (
              <PlainButton disabled={busy} onClick={planAnew}>
                Plan anew
              </PlainButton>
            ) : null}
            <ScheduleCsv name={vessel.name} plan={shown} />
            <a href={calendarUrl(vessel.id)} download>
              Calendar file
            </a>
          </div>
          {schedule.state === 'done' && mayPlan ? (
            <p>Enter the new parts in the register: fitting one closes the account of the part before it.</p>
          ) : null}
          <TimeLine plan={shown} />
          <PlanChanges
            plan={shown}
            todayOn={todayOn}
            zone={vessel.zone}
            undo={
              mayPlan && shown.canUndo && schedule.state === 'draft' && version !== undefined ? (
                <PlainButton
                  disabled={busy}
                  onClick={() => step.mutate({ step: 'undo', input: { version } })}
                >
                  Undo: back to the plan before
                </PlainButton>
              ) : null
            }
          />
          <PlanVisits
            key={shown.id}
            plan={shown}
            todayOn={todayOn}
            zone={vessel.zone}
            change={
              mayPlan && schedule.state === 'draft'
                ? { busy, onChange: (change) => step.mutate({ step: 'plan', input: { version, change } }) }
                : undefined
            }
          />
          {mayPlan && schedule.state !== 'draft' ? (
            <p className="soft">Take the plan back to a draft to lock, move, drop or split its visits.</p>
          ) : null}
          <AlternativesTable plan={shown} todayOn={todayOn} zone={vessel.zone} />
          <Remarks schedule={schedule} />
        </>
      )}
      {mayPlan ? (
        <>
          <ScheduleSettings
            key={schedule.version ?? 0}
            schedule={schedule}
            busy={busy}
            onSave={(input) => step.mutate({ step: 'settings', input })}
          />
          <p>
            <Link to={paths.yardTerms.pattern}>Prices, seasons and closures of the yard</Link>
          </p>
        </>
      ) : null}
    </div>
  );
}

function PlanningState({ schedule }: { schedule: RerigScheduleDto }) {
  const { planning } = schedule;
  if (planning === null) return null;
  if (planning.state === 'failed') {
    return (
      <Attention role="alert">
        {planning.error?.message ?? 'The plan could not be made.'}
        {schedule.plan === null ? '' : ' The plan below is the one before.'}
      </Attention>
    );
  }
  return (
    <p role="status">
      Planning… You can leave this page and come back.
      {schedule.plan === null ? '' : ' Below is the plan that stands until then.'}
    </p>
  );
}

/** What no plan keeps within its date, said first and in rust. */
function LateWork({ schedule, zone }: { schedule: RerigScheduleDto; zone: string }) {
  const format = useFormat();
  const late = schedule.plan?.plan.lateTasks ?? [];
  if (late.length === 0) return null;
  return (
    <section className={styles.late} aria-labelledby="late">
      <h2 id="late">Past its date</h2>
      <ul>
        {late.map(({ taskId, name, dueOn, words }) => (
          <li key={taskId}>
            {name}, due {format.dueDay(dueOn, schedule.todayOn, zone)}: {words}
          </li>
        ))}
      </ul>
      <p>
        This is the plan with the fewest days past dates.
        {isAcceptable(schedule.plan?.plan) ? '' : ' It cannot be accepted as it stands.'}
      </p>
    </section>
  );
}

function Remarks({ schedule }: { schedule: RerigScheduleDto }) {
  const shown = schedule.plan;
  if (shown === null) return null;
  const { withoutDate, remarks } = shown.plan;
  const lines = [
    ...(withoutDate.length === 0
      ? []
      : [
          `No date stands for ${withoutDate.join('; ')}: nothing is planned for them, which is no good news.`,
        ]),
    ...remarks,
    ...shown.notes,
    'A new part is taken to last as long as the one before it from fitting to its date.',
    'Prices of a part grow with its length and diameter; rod is changed with the mast out.',
  ];
  return (
    <section aria-labelledby="remarks">
      <h2 id="remarks">What this rests on</h2>
      <ul>
        {lines.map((line) => (
          <li key={line}>{line}</li>
        ))}
      </ul>
    </section>
  );
}
