import type { LoadLogDto } from '@stayledger/shared/contracts/load-logs';
import type { VesselDto } from '@stayledger/shared/contracts/vessels';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useParams, useSearchParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { Attention } from '../../components/feedback/attention';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { PlainButton } from '../../components/plain-button/plain-button';
import { BeforeAfter } from '../../features/load-logs/before-after';
import { CountingLog } from '../../features/load-logs/counting-log';
import { DecisionFoot } from '../../features/load-logs/decision-foot';
import { FindingList } from '../../features/load-logs/finding-list';
import { highestMomentOfDay } from '../../features/load-logs/highest-moment';
import { LoadLogFacts } from '../../features/load-logs/load-log-facts';
import { loadLogStateWords, loadLogWords } from '../../features/load-logs/load-log-states';
import { loadLogQueries } from '../../features/load-logs/load-logs.queries';
import styles from '../../features/load-logs/load-log-page.module.css';
import { ReceivingLog } from '../../features/load-logs/receiving-log';
import { RecountForm } from '../../features/load-logs/recount-form';
import { ReverseLog } from '../../features/load-logs/reverse-log';
import { Traces } from '../../features/load-logs/traces';
import { rigQueries } from '../../features/rig/rig.queries';
import { vesselQueries } from '../../features/vessels/vessels.queries';
import { useFormat } from '../../lib/formatting/use-format';

/** One load log from its first byte to the decision about it: the same address in every state. */
export function LoadLogReviewPage() {
  const { loadLogId = '' } = useParams();
  const log = useQuery(loadLogQueries.detail(loadLogId));
  const vessel = useQuery({
    ...vesselQueries.detail(log.data?.vesselId ?? ''),
    enabled: log.data !== undefined,
  });
  return (
    <QueryView query={log} loadingLabel="Loading the load log">
      {(loaded) => (
        <>
          <PageHeading
            title={loaded.fileName}
            above={
              <>
                <Link to={paths.vessel.to(loaded.vesselId)}>{loaded.vesselName}</Link>
                {' / '}
                <Link to={paths.loadLogs.to(loaded.vesselId)}>Loads</Link>
              </>
            }
            below={`${loadLogWords(loaded).word}. ${loadLogWords(loaded).meaning}`}
          />
          <QueryView query={vessel}>{(found) => <LogInItsState log={loaded} vessel={found} />}</QueryView>
        </>
      )}
    </QueryView>
  );
}

function LogInItsState({ log, vessel }: { log: LoadLogDto; vessel: VesselDto }) {
  const mayUpload = vessel.permissions.includes('load-logs:upload');
  return (
    <>
      {log.sameFileAs !== null && (
        <div className={styles.notice}>
          <Attention>
            The same file is here already:{' '}
            <Link to={paths.loadLog.to(log.sameFileAs.id)}>{log.sameFileAs.fileName}</Link> (
            {loadLogStateWords(log.sameFileAs.state).word.toLowerCase()}). Its cycles can be posted once only.
          </Attention>
        </div>
      )}
      {log.state === 'receiving' && <ReceivingLog log={log} mayUpload={mayUpload} />}
      {(log.state === 'received' || log.state === 'counting') && <CountingLog log={log} />}
      {log.state === 'failed' && <FailedLog log={log} vessel={vessel} mayUpload={mayUpload} />}
      {(log.state === 'counted' || log.state === 'posted' || log.state === 'set-aside') && (
        <CountedLog log={log} vessel={vessel} mayUpload={mayUpload} />
      )}
    </>
  );
}

function FailedLog({ log, vessel, mayUpload }: { log: LoadLogDto; vessel: VesselDto; mayUpload: boolean }) {
  return (
    <>
      <Attention>
        <p>{log.failure?.message ?? 'The file could not be read.'}</p>
      </Attention>
      {log.findings.length > 0 && <FindingList findings={log.findings} zone={vessel.zone} />}
      {mayUpload && mayBeReadAgain(log) && (
        <div className={styles.again}>
          <Recount log={log} vessel={vessel} />
        </div>
      )}
    </>
  );
}

/** A file that came in full and is a table can be read in another way; no mapping mends any other. */
function mayBeReadAgain(log: LoadLogDto): boolean {
  return log.receivedBytes === log.sizeBytes && log.failure?.code !== 'not-a-table';
}

function Recount({ log, vessel }: { log: LoadLogDto; vessel: VesselDto }) {
  const rig = useQuery(rigQueries.ofVessel(vessel.id));
  return (
    <QueryView query={rig}>
      {({ items }) => <RecountForm key={log.version} log={log} positions={items} zone={vessel.zone} />}
    </QueryView>
  );
}

function CountedLog({ log, vessel, mayUpload }: { log: LoadLogDto; vessel: VesselDto; mayUpload: boolean }) {
  const format = useFormat();
  const [search] = useSearchParams();
  const [isRecounting, setIsRecounting] = useState(false);
  const review = useQuery(loadLogQueries.review(log.id, log.version));
  return (
    <>
      {log.state !== 'counted' && (
        <p>
          {log.state === 'posted' ? 'Posted' : 'Set aside'} by {log.decidedByName ?? 'a former user'} on{' '}
          {format.instant(log.decidedAt, vessel.zone)}.
          {log.decisionReason !== null && log.decisionReason !== '' && ` Reason: ${log.decisionReason}`}
        </p>
      )}
      {log.state === 'counted' && log.decidedAt !== null && (
        <div className={styles.notice}>
          <Attention>
            This log was posted and taken back by {log.decidedByName ?? 'a former user'} on{' '}
            {format.instant(log.decidedAt, vessel.zone)}. Reason: {log.decisionReason}
          </Attention>
        </div>
      )}
      <LoadLogFacts log={log} zone={vessel.zone} />
      <QueryView query={review} loadingLabel="Working out what posting would change">
        {(loaded) => (
          <>
            <div className={styles.columns}>
              <section className={styles.column} aria-labelledby="findings">
                <h2 id="findings">Findings</h2>
                <FindingList findings={log.findings} zone={vessel.zone} />
              </section>
              <section className={`${styles.column} ${styles.traces}`} aria-labelledby="traces">
                <h2 id="traces">Traces</h2>
                <Traces
                  traces={loaded.traces}
                  findings={log.findings}
                  zone={vessel.zone}
                  initialMs={highestMomentOfDay(loaded.traces, search.get('day') ?? '', vessel.zone)}
                />
              </section>
              <section className={`${styles.column} ${styles.accounts}`} aria-labelledby="accounts">
                <h2 id="accounts">Allowance used</h2>
                <BeforeAfter parts={loaded.parts} isPosted={log.state === 'posted'} />
              </section>
            </div>
            {log.state === 'posted' && vessel.permissions.includes('load-logs:post') && (
              <ReverseLog key={log.version} log={log} />
            )}
            {log.state === 'counted' && mayUpload && !isRecounting && (
              <p>
                <PlainButton onClick={() => setIsRecounting(true)}>
                  Read it again with another mapping…
                </PlainButton>
              </p>
            )}
            {log.state === 'counted' && isRecounting && <Recount log={log} vessel={vessel} />}
            {log.state === 'counted' && (
              <DecisionFoot
                key={log.version}
                log={log}
                postDisabledReason={loaded.postDisabledReason}
                mayDecide={vessel.permissions.includes('load-logs:post')}
              />
            )}
          </>
        )}
      </QueryView>
    </>
  );
}
