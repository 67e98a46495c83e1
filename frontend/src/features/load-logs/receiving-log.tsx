import type { LoadLogDto } from '@stayledger/shared/contracts/load-logs';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { paths } from '../../app/paths';
import { Attention } from '../../components/feedback/attention';
import { PlainButton } from '../../components/plain-button/plain-button';
import { useFormat } from '../../lib/formatting/use-format';
import { FileDrop } from './file-drop';
import { fingerprintOf } from './file-fingerprint';
import { loadLogQueries } from './load-logs.queries';
import styles from './load-log-page.module.css';
import { ProgressLine } from './progress-line';
import { unfinishedUploadOf } from './unfinished-uploads';
import { uploadManager } from './upload-manager';
import { useUploadProgress } from './use-upload-progress';

/** A log whose bytes are still on their way, from this tab or from one that was closed. */
export function ReceivingLog({ log, mayUpload }: { log: LoadLogDto; mayUpload: boolean }) {
  const format = useFormat();
  const navigate = useNavigate();
  const client = useQueryClient();
  const progress = useUploadProgress(log.id);
  const [complaint, setComplaint] = useState<string | null>(null);
  const [isConfirming, setIsConfirming] = useState(false);
  const discard = useMutation({
    mutationFn: () => uploadManager.discard(log.id),
    onSuccess: async () => {
      client.removeQueries({ queryKey: loadLogQueries.detail(log.id).queryKey });
      await client.invalidateQueries({ queryKey: loadLogQueries.all() });
      await navigate(paths.loadLogs.to(log.vesselId));
    },
  });
  const isFinished = progress?.phase === 'finished';
  useEffect(() => {
    if (isFinished) void client.invalidateQueries({ queryKey: loadLogQueries.all() });
  }, [isFinished, client]);

  async function goOn(file: File): Promise<void> {
    setComplaint(null);
    if (file.name !== log.fileName || file.size !== log.sizeBytes) {
      setComplaint(
        `That is another file. This upload was begun with “${log.fileName}” (${format.bytes(log.sizeBytes)}). Choose that one, or add the other as a log of its own.`,
      );
      return;
    }
    const fingerprint = await fingerprintOf(file);
    const remembered = unfinishedUploadOf(log.id);
    if (remembered !== null && remembered.headSha256 !== fingerprint.headSha256) {
      setComplaint(
        'The file has the same name and size but another content: it was changed since the upload began. Throw this upload away and add the file anew.',
      );
      return;
    }
    uploadManager.start({ loadLogId: log.id, vesselId: log.vesselId, file, fingerprint, isNew: false });
  }

  const sentBytes = Math.max(progress?.sentBytes ?? 0, log.receivedBytes);
  const isRunning = progress?.phase === 'sending' || progress?.phase === 'waiting' || isFinished;
  return (
    <>
      <ProgressLine
        label={isRunning ? 'Uploading' : 'Upload not finished'}
        share={sentBytes / log.sizeBytes}
        detail={`${format.bytes(sentBytes)} of ${format.bytes(log.sizeBytes)}`}
      />
      {progress !== null && progress.message !== null && (
        <div className={styles.notice}>
          <Attention role="status">{progress.message}</Attention>
        </div>
      )}
      {isRunning && (
        <p>
          You may go to other pages meanwhile. If this window is closed, choose the same file here again: it
          goes on where it stopped.
        </p>
      )}
      {!isRunning && progress === null && mayUpload && (
        <>
          <p>{format.bytes(log.receivedBytes)} arrived. Choose the same file again to send the rest of it.</p>
          <FileDrop
            label={`Choose ${log.fileName} to go on`}
            hint="Only what is missing is sent."
            onFile={(file) => void goOn(file)}
          />
        </>
      )}
      {complaint !== null && <Attention role="alert">{complaint}</Attention>}
      {discard.isError && <Attention role="alert">{discard.error.message}</Attention>}
      {mayUpload && (
        <div className={styles.actions}>
          {progress?.phase === 'sending' && (
            <PlainButton onClick={() => void uploadManager.pause(log.id)}>Pause the upload</PlainButton>
          )}
          {(progress?.phase === 'stopped' || progress?.phase === 'failed') && (
            <PlainButton weight="primary" onClick={() => uploadManager.resume(log.id)}>
              Go on
            </PlainButton>
          )}
          {!isFinished && !isConfirming && (
            <PlainButton onClick={() => setIsConfirming(true)}>Cancel the upload…</PlainButton>
          )}
          {!isFinished && isConfirming && (
            <>
              <span>What has arrived is thrown away.</span>
              <PlainButton onClick={() => discard.mutate()} disabled={discard.isPending}>
                Throw it away
              </PlainButton>
              <PlainButton onClick={() => setIsConfirming(false)} disabled={discard.isPending}>
                Keep it
              </PlainButton>
            </>
          )}
        </div>
      )}
    </>
  );
}
