import type { LoadLogDto } from '@stayledger/shared/contracts/load-logs';
import { Attention } from '../../components/feedback/attention';
import { useFormat } from '../../lib/formatting/use-format';
import { ProgressLine } from './progress-line';

/** A log the server is working on. The page asks each second how far it is. */
export function CountingLog({ log }: { log: LoadLogDto }) {
  const format = useFormat();
  const share = log.job?.progress ?? 0;
  const waits = log.state === 'received' || log.job?.state === 'queued';
  return (
    <>
      <ProgressLine
        label={waits ? 'Waiting for its turn to be counted' : 'Counting cycles'}
        share={share}
        detail={`${format.bytes(share * log.sizeBytes)} of ${format.bytes(log.sizeBytes)} read`}
      />
      <p>
        You may leave this page or close the window: counting goes on, and the log waits here for review when
        it is done.
      </p>
      {log.job !== null && log.job.attempts > 1 && (
        <Attention>
          Counting was interrupted and began again (attempt {format.number(log.job.attempts)}). Nothing is
          counted twice.
        </Attention>
      )}
    </>
  );
}
