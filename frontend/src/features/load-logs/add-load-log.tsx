import type { PositionDto } from '@stayledger/shared/contracts/rig';
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useRef, useState } from 'react';
import { Link, useNavigate } from 'react-router-dom';
import { paths } from '../../app/paths';
import { Attention } from '../../components/feedback/attention';
import { LoadingState } from '../../components/feedback/loading-state';
import { PlainButton } from '../../components/plain-button/plain-button';
import { apiGet, newIdempotencyKey } from '../../lib/api-client';
import { isApiError } from '../../lib/api-error';
import { useFormat } from '../../lib/formatting/use-format';
import { loadLogSchema } from '@stayledger/shared/contracts/load-logs';
import { FileDrop } from './file-drop';
import { fingerprintOf, type FileFingerprint } from './file-fingerprint';
import { FirstRows } from './first-rows';
import styles from './load-log-page.module.css';
import { createLoadLog } from './load-logs.mutations';
import { loadLogQueries } from './load-logs.queries';
import {
  draftMapping,
  draftProblems,
  mappingOf,
  type DraftProblem,
  type MappingDraft,
} from './mapping-draft';
import { MappingForm } from './mapping-form';
import { recogniseFile, type RecognisedFile } from './recognise-file';
import { findUnfinishedUpload, forgetUpload } from './unfinished-uploads';
import { uploadManager } from './upload-manager';

interface Chosen {
  file: File;
  fingerprint: FileFingerprint;
  recognised: RecognisedFile;
  draft: MappingDraft;
  /** One key for this file: pressing Start again after a lost reply announces it once. */
  idempotencyKey: string;
}

interface AddLoadLogProps {
  vesselId: string;
  zone: string;
  positions: readonly PositionDto[];
}

/** From a file on somebody's disk to a running upload. Nothing is sent before Start upload. */
export function AddLoadLog({ vesselId, zone, positions }: AddLoadLogProps) {
  const format = useFormat();
  const navigate = useNavigate();
  const client = useQueryClient();
  const remembered = useQuery(loadLogQueries.remembered(vesselId));
  const [chosen, setChosen] = useState<Chosen | null>(null);
  const [isLooking, setIsLooking] = useState(false);
  const [complaint, setComplaint] = useState<string | null>(null);
  const [problems, setProblems] = useState<DraftProblem[]>([]);
  const summaryRef = useRef<HTMLDivElement>(null);
  const labelOf = (id: string): string =>
    positions.find((position) => position.id === id)?.label ?? 'this position';

  async function goOnWithUnfinished(file: File, fingerprint: FileFingerprint): Promise<boolean> {
    const unfinished = findUnfinishedUpload(vesselId, fingerprint);
    if (unfinished === null) return false;
    try {
      const log = await apiGet(`/load-logs/${unfinished.loadLogId}`, loadLogSchema);
      if (log.state !== 'receiving') {
        forgetUpload(log.id);
        return false;
      }
      uploadManager.start({ loadLogId: log.id, vesselId, file, fingerprint, isNew: false });
      await navigate(paths.loadLog.to(log.id));
      return true;
    } catch (error) {
      // Thrown away meanwhile, or no longer ours to see: it is added anew.
      if (isApiError(error, 'not-found')) forgetUpload(unfinished.loadLogId);
      return false;
    }
  }

  async function choose(file: File): Promise<void> {
    setIsLooking(true);
    setComplaint(null);
    setProblems([]);
    setChosen(null);
    try {
      const recognised = await recogniseFile(file);
      const fingerprint = await fingerprintOf(file);
      if (await goOnWithUnfinished(file, fingerprint)) return;
      const positionIds = positions.map((position) => position.id);
      const draft = draftMapping(recognised.log, remembered.data?.items ?? [], positionIds);
      setChosen({ file, fingerprint, recognised, draft, idempotencyKey: newIdempotencyKey() });
    } catch (error) {
      setComplaint(error instanceof Error ? error.message : 'The file cannot be read. Choose it again.');
    } finally {
      setIsLooking(false);
    }
  }

  const start = useMutation({
    mutationFn: ({ file, draft, idempotencyKey }: Chosen) =>
      createLoadLog(
        vesselId,
        { fileName: file.name, sizeBytes: file.size, mapping: mappingOf(draft) },
        idempotencyKey,
      ),
    onSuccess: async (log, { file, fingerprint }) => {
      uploadManager.start({ loadLogId: log.id, vesselId, file, fingerprint, isNew: true });
      client.setQueryData(loadLogQueries.detail(log.id).queryKey, log);
      await navigate(paths.loadLog.to(log.id));
    },
  });

  function tryToStart(): void {
    if (chosen === null) return;
    const found = draftProblems(chosen.draft, labelOf);
    setProblems(found);
    if (found.length === 0) start.mutate(chosen);
    else requestAnimationFrame(() => summaryRef.current?.focus());
  }

  if (remembered.isPending) return <LoadingState />;
  return (
    <>
      <FileDrop
        label={chosen === null ? 'Drop a load log here, or choose it' : 'Choose another file instead'}
        hint="CSV text (.csv) or packed (.csv.gz), one line for each sample. It is first looked at in this browser; nothing is sent yet."
        disabled={isLooking || start.isPending}
        onFile={(file) => void choose(file)}
      />
      {isLooking && <LoadingState label="Looking at the beginning of the file" />}
      {complaint !== null && <Attention role="alert">{complaint}</Attention>}
      {chosen !== null && (
        <>
          <h2>{chosen.file.name}</h2>
          <p>
            {whatWasRecognised(chosen, format.bytes(chosen.file.size), (hz) => format.significant(hz, 3))}
          </p>
          {chosen.recognised.notes.map((note) => (
            <Attention key={note}>{note}</Attention>
          ))}
          <FirstRows columns={chosen.recognised.headers} rows={chosen.recognised.rows} />
          {positions.length === 0 ? (
            <Attention>
              This vessel has no positions yet, so no column can be matched.{' '}
              <Link to={paths.addPosition.to(vesselId)}>Add the first position</Link> and come back with the
              file.
            </Attention>
          ) : (
            <MappingForm
              draft={chosen.draft}
              onChange={(draft) => setChosen({ ...chosen, draft, idempotencyKey: newIdempotencyKey() })}
              positions={positions}
              zone={zone}
              firstValues={chosen.recognised.firstValues}
              columnDoubts={chosen.recognised.columnDoubts}
              firstTime={chosen.recognised.firstTime}
              problems={problems}
            />
          )}
          <div ref={summaryRef} tabIndex={-1}>
            {problems.length > 0 && (
              <Attention role="alert">
                <p>Before the upload can start:</p>
                <ul>
                  {problems.map((problem) => (
                    <li key={problem.message}>{problem.message}</li>
                  ))}
                </ul>
              </Attention>
            )}
          </div>
          {start.isError && <Attention role="alert">{start.error.message}</Attention>}
          <div className={styles.actions}>
            <PlainButton
              weight="primary"
              onClick={tryToStart}
              disabled={start.isPending || positions.length === 0}
            >
              {start.isPending ? 'Starting…' : 'Start upload'}
            </PlainButton>
            <PlainButton onClick={() => setChosen(null)} disabled={start.isPending}>
              Put the file away
            </PlainButton>
          </div>
        </>
      )}
    </>
  );
}

const DELIMITER_WORDS: Record<MappingDraft['delimiter'], string> = {
  ',': 'commas',
  ';': 'semicolons',
  '\t': 'tabs',
  '|': 'bars',
  ' ': 'spaces',
};

function whatWasRecognised(
  { recognised, draft }: Chosen,
  size: string,
  hz: (rate: number) => string,
): string {
  const rate = recognised.log.sampleRateHz;
  return [
    `${size}${recognised.compressed ? ', packed with gzip' : ''}.`,
    `Cells are parted by ${DELIMITER_WORDS[draft.delimiter]}, decimals written with a ${draft.decimalComma ? 'comma' : 'point'}.`,
    rate === null ? '' : `About ${hz(rate)} samples per second in the first rows.`,
  ]
    .filter((sentence) => sentence !== '')
    .join(' ');
}
