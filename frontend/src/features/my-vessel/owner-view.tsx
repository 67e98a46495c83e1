import type { PartStandingDto, PositionDto } from '@stayledger/shared/contracts/rig';
import type { VesselDto } from '@stayledger/shared/contracts/vessels';
import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import { paths } from '../../app/paths';
import { EmptyState } from '../../components/feedback/empty-state';
import { DueWord } from '../../components/part-mark/due-word';
import { PartMark } from '../../components/part-mark/part-mark';
import { ButtonLink } from '../../components/plain-button/plain-button';
import { clock } from '../../lib/clock';
import { useFormat } from '../../lib/formatting/use-format';
import { byUrgency, plainDue, plainMark, plainWhy } from './plain-words';
import styles from './my-vessel.module.css';

interface OwnerViewProps {
  vessel: VesselDto;
  positions: PositionDto[];
  hasPlan: boolean;
  /** The planned visit to the yard; left out where none is to be seen. */
  nextVisit?: ReactNode;
}

/** What an owner comes for, in the order they ask: what, by when, why, and what to do next. */
export function OwnerView({ vessel, positions, hasPlan, nextVisit }: OwnerViewProps) {
  const format = useFormat();
  const todayOn = clock.todayOn(vessel.zone);
  const fitted = positions.filter((position) => position.part !== null);
  const dated = byUrgency(fitted).filter((position) => position.part?.standing.replaceByOn);
  const dueNow = dated.filter((position) => ['due', 'overdue'].includes(position.part?.standing.due ?? ''));
  const first = dated.slice(0, 1);
  const shown = dueNow.length > 0 ? dueNow : first;

  if (fitted.length === 0) {
    return (
      <EmptyState title="No parts yet">
        <p>
          {vessel.firmName} has not listed the parts of this rig. What is due, and by when, will stand here.
        </p>
      </EmptyState>
    );
  }
  return (
    <>
      <section aria-labelledby="due">
        <h2 id="due">{dueNow.length > 0 ? 'What is due' : 'Nothing is due within twelve months'}</h2>
        {shown.length === 0 ? (
          <p>
            No part has a date yet. {hasPlan ? '' : 'Say how much you plan to sail, and dates can follow. '}
            {vessel.firmName} can say more.
          </p>
        ) : null}
        {dueNow.length === 0 && first.length > 0 ? <p>What comes first:</p> : null}
        <ul className={styles.due}>
          {shown.map((position) =>
            position.part ? (
              <li key={position.id}>
                <PartMark
                  standing={position.part.standing}
                  kindOfWire={position.part.kindOfWire}
                  size={48}
                  alternative={plainMark(position.part.standing)}
                />
                <div>
                  <p className={styles.sentence}>
                    <DueWord due={position.part.standing.due}>
                      {plainDue(position, format, todayOn, vessel.zone)}
                    </DueWord>
                  </p>
                  <p>{plainWhy(position.part.standing)}</p>
                </div>
              </li>
            ) : null,
          )}
        </ul>
        {dueNow.length > 0 && !nextVisit ? (
          <p>
            {vessel.firmName} looks after this rig: ask them for the cost and for a time in the yard, and
            order wire early.
          </p>
        ) : null}
      </section>
      {nextVisit}
      <NextStep vessel={vessel} hasPlan={hasPlan} part={shown[0]} />
      <LaterDates positions={dated.filter((position) => !shown.includes(position))} zone={vessel.zone} />
      <NotAssessed positions={fitted} />
    </>
  );
}

/** One button: what helps most now. */
function NextStep({ vessel, hasPlan, part }: { vessel: VesselDto; hasPlan: boolean; part?: PositionDto }) {
  const may = (permission: string) => vessel.permissions.includes(permission);
  if (!hasPlan && may('usage:state')) {
    return (
      <div className={styles.next}>
        <p>The dates by load need one thing from you: how many hours you plan to sail in a year.</p>
        <ButtonLink weight="primary" to={paths.usagePlan.to(vessel.id)}>
          Say how much you will sail
        </ButtonLink>
      </div>
    );
  }
  if (part?.part) {
    return (
      <div className={styles.next}>
        <ButtonLink weight="primary" to={paths.part.to(part.part.id)}>
          See what the date rests on
        </ButtonLink>
        {may('usage:state') ? <Link to={paths.usagePlan.to(vessel.id)}>Change planned sailing</Link> : null}
      </div>
    );
  }
  if (may('load-logs:upload')) {
    return (
      <div className={styles.next}>
        <ButtonLink weight="primary" to={paths.addLoadLog.to(vessel.id)}>
          Add a load log
        </ButtonLink>
      </div>
    );
  }
  return null;
}

/** One part of a list: its mark, its name, and what the list says of it. An empty position has no line. */
function PartLine({
  position: { part, label },
  children,
}: {
  position: PositionDto;
  children: (standing: PartStandingDto) => ReactNode;
}) {
  if (part === null) return null;
  return (
    <li>
      <PartMark
        standing={part.standing}
        kindOfWire={part.kindOfWire}
        size={24}
        alternative={plainMark(part.standing)}
      />
      <Link to={paths.part.to(part.id)}>{label}</Link>
      {children(part.standing)}
    </li>
  );
}

function LaterDates({ positions, zone }: { positions: PositionDto[]; zone: string }) {
  const format = useFormat();
  if (positions.length === 0) return null;
  const todayOn = clock.todayOn(zone);
  return (
    <section aria-labelledby="later">
      <h2 id="later">Later</h2>
      <ul className={styles.list}>
        {positions.map((position) => (
          <PartLine key={position.id} position={position}>
            {({ replaceByOn }) => <span>{format.dueDay(replaceByOn, todayOn, zone)}</span>}
          </PartLine>
        ))}
      </ul>
    </section>
  );
}

/** Said as plainly as what is due: silence about a part would read as good news. */
function NotAssessed({ positions }: { positions: PositionDto[] }) {
  const unknown = positions.filter((position) => position.part?.standing.assessment === 'not-assessed');
  const byAge = positions.filter((position) => position.part?.standing.assessment === 'calendar-only');
  return (
    <section aria-labelledby="not-assessed">
      <h2 id="not-assessed">What is not assessed</h2>
      {unknown.length === 0 && byAge.length === 0 ? (
        <p>The loads of every part on the list are recorded or follow from a part beside it.</p>
      ) : null}
      {unknown.length > 0 ? (
        <>
          <p>Nothing is known about the loads of these parts. Their age and inspections decide:</p>
          <ul className={styles.list}>
            {unknown.map((position) => (
              <PartLine key={position.id} position={position}>
                {({ notAssessedReason }) => <span className="soft">{notAssessedReason}</span>}
              </PartLine>
            ))}
          </ul>
        </>
      ) : null}
      {byAge.length > 0 ? (
        <p>Judged by age only: {byAge.map((position) => position.label).join('; ')}.</p>
      ) : null}
    </section>
  );
}
