import type { PartLifeDto } from '@stayledger/shared/contracts/life';
import type { FittedPartDto } from '@stayledger/shared/contracts/parts';
import type { VesselDto } from '@stayledger/shared/contracts/vessels';
import { useQuery } from '@tanstack/react-query';
import { Link, useParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { Cautions } from '../../components/cautions/cautions';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { PartMark } from '../../components/part-mark/part-mark';
import { ButtonLink } from '../../components/plain-button/plain-button';
import { LedgerEntries } from '../../features/ledger/ledger-entries';
import { AllowanceChart } from '../../features/life/allowance-chart';
import { CyclesChart } from '../../features/life/cycles-chart';
import { DetailsTable } from '../../features/life/details-table';
import { lifeQueries } from '../../features/life/life.queries';
import styles from '../../features/life/part-life.module.css';
import { StandingSummary } from '../../features/life/standing-summary';
import { Working } from '../../features/life/working';
import { WorstDays } from '../../features/life/worst-days';
import { rigQueries } from '../../features/rig/rig.queries';
import { vesselQueries } from '../../features/vessels/vessels.queries';
import { useFormat } from '../../lib/formatting/use-format';
import { useSession } from '../../lib/session';

/** One fitted part: what is known of its life, by which rule, and the way back to every figure. */
export function PartPage() {
  const { partId = '' } = useParams();
  const part = useQuery(rigQueries.part(partId));
  const life = useQuery(lifeQueries.ofPart(partId));
  const vessel = useQuery({
    ...vesselQueries.detail(part.data?.vesselId ?? ''),
    enabled: part.data !== undefined,
  });
  return (
    <QueryView query={part} loadingLabel="Loading the part">
      {(fitted) => (
        <QueryView query={vessel} loadingLabel="Loading the part">
          {(found) => (
            <>
              <PartHeading part={fitted} vessel={found} />
              <QueryView query={life} loadingLabel="Reading its account">
                {(loaded) => <PartAccount life={loaded} part={fitted} vessel={found} />}
              </QueryView>
            </>
          )}
        </QueryView>
      )}
    </QueryView>
  );
}

function PartHeading({ part, vessel }: { part: FittedPartDto; vessel: VesselDto }) {
  const format = useFormat();
  const mayUpdate = vessel.permissions.includes('rig:update') && part.removedOn === null;
  return (
    <PageHeading
      title={part.positionLabel}
      above={<Link to={paths.vessel.to(vessel.id)}>{vessel.name}</Link>}
      mark={<PartMark standing={part.standing} kindOfWire={part.kindOfWire} size={160} />}
      below={
        <>
          {part.positionAlias === null ? '' : `${part.positionAlias}. `}
          {part.constructionName}, {format.diameter(part.diameterMm)}.{' '}
          {part.fittedOn === null ? 'Fitted on a day not known' : `Fitted on ${format.day(part.fittedOn)}`}
          {part.removedOn === null
            ? ''
            : `, removed on ${format.day(part.removedOn)} (${part.removedReason ?? ''})`}
          . Breaking load {format.force(part.breakingLoadKn)}, {BREAKING_LOAD_WORDS[part.breakingLoadSource]}.{' '}
          {assemblyWords(part, format.force)}
        </>
      }
      actions={
        <>
          {mayUpdate && (
            <>
              <ButtonLink to={paths.editPart.to(part.id)}>Edit part</ButtonLink>
              <ButtonLink to={paths.removePart.to(part.id)}>Remove part…</ButtonLink>
            </>
          )}
          <ButtonLink to={paths.positionHistory.to(part.positionId)}>Parts here through time</ButtonLink>
        </>
      }
    />
  );
}

const BREAKING_LOAD_WORDS: Record<FittedPartDto['breakingLoadSource'], string> = {
  certificate: 'from its certificate',
  table: 'from the table',
  'table-lower-grade': 'the lower grade of the table, since no certificate is known',
};

function assemblyWords(part: FittedPartDto, force: (kn: number) => string): string {
  const { breakingLoadKn, weakestElement, unknownElements } = part.assembly;
  const known =
    breakingLoadKn === null
      ? 'The strength of the whole assembly is not known'
      : `The whole assembly carries ${force(breakingLoadKn)}${weakestElement === null ? '' : `, limited by ${weakestElement}`}`;
  return unknownElements.length === 0 ? `${known}.` : `${known}; not known: ${unknownElements.join(', ')}.`;
}

function PartAccount({ life, part, vessel }: { life: PartLifeDto; part: FittedPartDto; vessel: VesselDto }) {
  const { roles } = useSession();
  // A person who only owns vessels reads the words made for owners; everyone else those of the trade.
  const isOwnerOnly = roles.every(({ role }) => role === 'owner');
  return (
    <>
      <p className={styles.headline}>{isOwnerOnly ? life.plainHeadline : life.headline}</p>
      <StandingSummary life={life} zone={vessel.zone} />
      {life.wouldGiveDate.length > 0 && (
        <section className={styles.section} aria-labelledby="would-give">
          <h2 id="would-give">What would give a fatigue date</h2>
          <ul className={styles.list}>
            {life.wouldGiveDate.map((sentence) => (
              <li key={sentence}>{sentence}</li>
            ))}
          </ul>
          {vessel.permissions.includes('usage:state') && (
            <p>
              <Link to={paths.usagePlan.to(vessel.id)}>State the planned sailing</Link>
            </p>
          )}
        </section>
      )}
      <section className={styles.section} aria-labelledby="account">
        <h2 id="account">Account</h2>
        <AllowanceChart life={life} zone={vessel.zone} />
      </section>
      <section className={styles.section} aria-labelledby="details">
        <h2 id="details">Details</h2>
        <p>
          A detail is a place on the part that can fail by itself. The part is as good as its worst detail.
        </p>
        <DetailsTable life={life} zone={vessel.zone} />
        <p>
          <Link to={paths.partDetails.to(part.id)}>What each detail stands on, and who confirmed it</Link>
        </p>
      </section>
      <section className={styles.section} aria-labelledby="worst-days">
        <h2 id="worst-days">Worst days</h2>
        <WorstDays life={life} />
      </section>
      <section className={styles.section} aria-labelledby="entries">
        <h2 id="entries">Ledger</h2>
        <LedgerEntries partId={part.id} zone={vessel.zone} />
      </section>
      <section className={styles.section} aria-labelledby="assumptions">
        <h2 id="assumptions">What these figures assume</h2>
        <ul className={styles.list}>
          {life.assumptions.map((sentence) => (
            <li key={sentence}>{sentence}</li>
          ))}
        </ul>
      </section>
      <section className={styles.section} aria-labelledby="cycles">
        <h2 id="cycles">Cycles</h2>
        <CyclesChart life={life} />
      </section>
      <section className={styles.section} aria-labelledby="working">
        <h2 id="working">The working</h2>
        <Working steps={life.working} />
      </section>
      <Cautions plain={isOwnerOnly} />
    </>
  );
}
