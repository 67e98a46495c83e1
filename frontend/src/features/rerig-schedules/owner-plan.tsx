import type { RerigScheduleDto } from '@stayledger/shared/contracts/rerig-schedules';
import type { VesselDto } from '@stayledger/shared/contracts/vessels';
import { useId, useState, type FormEvent } from 'react';
import { Link } from 'react-router-dom';
import { paths } from '../../app/paths';
import { Attention } from '../../components/feedback/attention';
import { PlainButton } from '../../components/plain-button/plain-button';
import { useFormat } from '../../lib/formatting/use-format';
import styles from './rerig-schedule.module.css';
import { useScheduleStep } from './rerig-schedules.mutations';
import { isAcceptable, money, windowLabel } from './schedule-words';

const KIND_IN_PLAIN_WORDS = {
  aloft: 'a rigger works aloft and the mast stays up',
  'mast-out-afloat': 'the mast is lifted out, afloat',
  'mast-out-ashore': 'the mast is lifted out, ashore',
} as const;

/** The next visit in plain words: when, what, what it costs, and the owner's answer. */
export function OwnerPlan({ vessel, schedule }: { vessel: VesselDto; schedule: RerigScheduleDto }) {
  const format = useFormat();
  const { plan: shown, todayOn, firmName } = schedule;
  if (shown === null) {
    return schedule.draftHidden ? (
      <section aria-labelledby="plan">
        <h2 id="plan">The next visit to the yard</h2>
        <p>{firmName} is drawing up a plan. It will stand here once they propose it to you.</p>
      </section>
    ) : null;
  }
  const next = shown.plan.visits.find(({ doneByOn }) => doneByOn >= todayOn);
  return (
    <section aria-labelledby="plan">
      <h2 id="plan">The next visit to the yard</h2>
      {next ? (
        <>
          <p>
            {windowLabel(shown, next.windowId)}, from {format.dueDay(next.startOn, todayOn, vessel.zone)}:{' '}
            {KIND_IN_PLAIN_WORDS[next.kind]}.
          </p>
          <ul>
            {next.tasks.map(({ taskId, action, name }) => (
              <li key={taskId}>
                {action === 'replace' ? 'New' : 'Looked over'}: {name}
              </li>
            ))}
          </ul>
          <p>
            About {money(next.totalMinor, shown.plan.currency, format)}, an estimate by {firmName} of{' '}
            {format.day(shown.plan.asOfOn)}, not a quotation. Ask them whether tax is included.
          </p>
        </>
      ) : (
        <p>No visit is planned within the years looked at.</p>
      )}
      <LateWork schedule={schedule} zone={vessel.zone} />
      <Answer vessel={vessel} schedule={schedule} />
      <p>
        <Link to={paths.rerigSchedule.to(vessel.id)}>See the whole plan and why</Link>
      </p>
    </section>
  );
}

/** A plan is no leave to sail on with a part that is past its date. */
function LateWork({ schedule, zone }: { schedule: RerigScheduleDto; zone: string }) {
  const format = useFormat();
  const late = schedule.plan?.plan.lateTasks ?? [];
  if (late.length === 0) return null;
  return (
    <div className={styles.late}>
      {late.map(({ taskId, name, dueOn, doneOn }) => (
        <p key={taskId}>
          {name}: due by {format.dueDay(dueOn, schedule.todayOn, zone)},{' '}
          {doneOn === null
            ? 'and not done in this plan'
            : `done in this plan by ${format.dueDay(doneOn, schedule.todayOn, zone)}`}
          .
        </p>
      ))}
      <p>
        {isAcceptable(schedule.plan?.plan)
          ? `That is past its date, and the soonest the yard can. Ask ${schedule.firmName} what holds until then.`
          : `This plan runs past a date and cannot be accepted as it stands. Ask ${schedule.firmName} what can be done sooner.`}
      </p>
    </div>
  );
}

function Answer({ vessel, schedule }: { vessel: VesselDto; schedule: RerigScheduleDto }) {
  const id = useId();
  const step = useScheduleStep(vessel.id);
  const [question, setQuestion] = useState('');
  const { state, version } = schedule;
  if (state !== 'proposed') {
    const words = {
      draft: null,
      accepted: 'You have accepted this plan.',
      booked: 'The yard has booked this plan.',
      done: 'The work is done.',
    }[state];
    return words ? <p>{words}</p> : null;
  }
  if (version === null || !vessel.permissions.includes('rerig:accept')) return null;

  function onAsk(event: FormEvent): void {
    event.preventDefault();
    if (version === null || question.trim() === '') return;
    step.mutate({ step: 'answer', input: { version, answer: 'ask', question: question.trim() } });
  }
  return (
    <>
      {step.error ? <Attention role="alert">{step.error.message}</Attention> : null}
      {isAcceptable(schedule.plan?.plan) ? (
        <div className={styles.steps}>
          <PlainButton
            weight="primary"
            disabled={step.isPending}
            onClick={() => step.mutate({ step: 'answer', input: { version, answer: 'accept' } })}
          >
            Accept this plan
          </PlainButton>
        </div>
      ) : null}
      {schedule.question !== null ? (
        <p role="status">You asked: {schedule.question}</p>
      ) : (
        <form onSubmit={onAsk}>
          <label htmlFor={id}>Or ask {schedule.firmName} first</label>
          <textarea
            id={id}
            className={styles.question}
            value={question}
            maxLength={2000}
            onChange={(event) => setQuestion(event.target.value)}
          />
          <PlainButton type="submit" disabled={step.isPending || question.trim() === ''}>
            Ask
          </PlainButton>
        </form>
      )}
    </>
  );
}
